// The page: figures in their places, what is chosen, themes, print.
"use strict";

(() => {
  const { textOf, titleOf, fieldOf, isNumber } = gapwright;
  const byId = (id) => document.getElementById(id);
  const make = (tag, properties = {}, ...children) => {
    const element = Object.assign(document.createElement(tag), properties);
    element.append(...children);
    return element;
  };
  const report = gapwright.unpack(JSON.parse(byId("report-data").textContent));
  const printedRows = 60;

  // Theme ---------------------------------------------------------------------------------------

  const prefersDark = matchMedia("(prefers-color-scheme: dark)");
  let theme = prefersDark.matches ? "dark" : "light";
  const showTheme = () => {
    document.documentElement.dataset.theme = theme;
    byId("theme").textContent = theme === "dark" ? "Light" : "Dark";
  };

  // Figures -------------------------------------------------------------------------------------

  const views = new Map(); // id → {view, figure}

  const save = (name, text, type) => {
    const link = make("a", { download: name, href: URL.createObjectURL(new Blob([text], { type })) });
    link.click();
    setTimeout(() => URL.revokeObjectURL(link.href), 1000);
  };

  const saveSvg = async (id) => {
    const view = views.get(id).view;
    save(`${id}.svg`, await view.toSVG(), "image/svg+xml");
  };
  const saveCsv = (id) => {
    for (const [name, rows] of Object.entries(views.get(id).figure.tables))
      save(`${id}${name && "-"}${name}.csv`, gapwright.csv(rows), "text/csv");
  };

  const frameOf = (slot, figure) => {
    let frame = slot.querySelector("figure");
    if (!frame) {
      frame = make("figure", { id: figure.id },
        make("figcaption", {}, make("h3"), make("p", { className: "caption" })),
        make("div", { className: "plot" }),
        make("div", { className: "tools" },
          make("button", { type: "button", textContent: "SVG", title: "Save this figure", onclick: () => saveSvg(figure.id) }),
          make("button", { type: "button", textContent: "CSV", title: "Save its data", onclick: () => saveCsv(figure.id) })));
      slot.append(frame);
    }
    frame.querySelector("h3").textContent = figure.title;
    frame.querySelector(".caption").textContent = figure.caption;
    return frame;
  };

  const draw = (slot, figure, withTheme = theme) => {
    if (!figure) { slot.replaceChildren(); return; }
    const plot = frameOf(slot, figure).querySelector(".plot");
    const known = views.get(figure.id);
    if (known) known.view.finalize();
    plot.style.minHeight = `${plot.offsetHeight}px`;
    const marks = Object.values(figure.data).reduce((sum, rows) => sum + rows.length, 0);
    const view = new vega.View(vega.parse(gapwright.compiled(figure, withTheme)), {
      renderer: marks > 2500 ? "canvas" : "svg", container: plot, hover: true, tooltip: hover,
    });
    view.addEventListener("click", (event, item) => {
      if (item && item.datum && isNumber(item.datum.id)) choose(item.datum.id, figure.id);
    });
    view.run();
    plot.style.minHeight = "";
    plot.setAttribute("role", "img");
    plot.setAttribute("aria-label", `${figure.title}. ${figure.caption}`);
    views.set(figure.id, { view, figure });
    markIn(figure.id);
  };

  // Drawing in turns, so that the page answers meanwhile.
  const slots = []; // {slot, figure: (options) => figure}
  const optionsOf = (slot) => ({ width: Math.max(300, slot.clientWidth - 42), theme });
  const drawSlot = ({ slot, figure }, withTheme = theme) =>
    draw(slot, figure({ ...optionsOf(slot), theme: withTheme }), withTheme);
  let turn = 0;
  const drawAll = () => new Promise((done) => {
    const mine = ++turn;
    const next = (i) => {
      if (mine !== turn) return done(false);
      if (i === slots.length) return done(true);
      drawSlot(slots[i]);
      setTimeout(() => next(i + 1), 15); // a breath to scroll and type in
    };
    setTimeout(() => next(0), 15);
  });

  // Hover ---------------------------------------------------------------------------------------

  const hoverFields = ["diameter_1_nm", "diameter_2_nm", "gap_nm", report.order.field, "energy_eV_per_nm",
    "dispersion_eV_per_nm", "electronic_share_eV_per_nm", "contact_eV_per_nm", "rank"];
  const hoverBox = byId("hover");

  const lineOf = (row, name) => make("tr", {}, make("td", { textContent: titleOf(name) }),
    make("td", { textContent: textOf(name, row[name]) }));

  function hover(handler, event, item, value) {
    const datum = item && item.datum;
    if (value === null || value === undefined || !datum || !isNumber(datum.id)) { hoverBox.hidden = true; return; }
    const row = report.rows[datum.id];
    const names = [...new Set([...hoverFields, byId("map-field").value])].filter((name) => isNumber(row[name]));
    hoverBox.replaceChildren(
      ...(datum.tube ? [make("b", { textContent: datum.tube }), make("span", { textContent: `best pair of ${datum.pairs}: ` })] : []),
      make("b", { textContent: row.pair }),
      make("table", {}, make("tbody", {}, ...names.map((name) => lineOf(row, name)))));
    hoverBox.hidden = false;
    const { innerWidth, innerHeight } = window;
    const x = event.clientX + 14, y = event.clientY + 14;
    hoverBox.style.left = `${Math.min(x, innerWidth - hoverBox.offsetWidth - 8)}px`;
    hoverBox.style.top = `${y + hoverBox.offsetHeight > innerHeight ? Math.max(4, y - hoverBox.offsetHeight - 28) : y}px`;
  }

  // The chosen pair -----------------------------------------------------------------------------

  let chosen = -1;
  let ranking = null;

  // What the title of a pair or the conditions of all say.
  const unlisted = new Set(["object_1", "object_2", "arrangement", "temperature_K", "chemical_potential_eV", "medium", "contact_target"]);

  const numbersOf = (row) => {
    const list = make("dl", { className: "numbers" });
    for (const name of Object.keys(report.packed.columns)) {
      const value = row[name];
      if (value === null || value === undefined || unlisted.has(name)) continue;
      const { label, unit } = fieldOf(name);
      list.append(make("div", {}, make("dt", { textContent: label }),
        make("dd", { textContent: `${textOf(name, value)}${unit && unit !== "°" ? "\u00a0" : ""}${unit}` })));
    }
    return list;
  };

  const pairId = (row) => `pair-${row}`;

  const showChosen = () => {
    const row = report.rows[chosen];
    const links = report.pairs.some((pair) => pair.row === chosen)
      ? [make("p", { className: "note" }, make("a", { href: `#${pairId(chosen)}`, textContent: "its figures" }))]
      : [make("p", { className: "note", textContent: `gapwright report … --pair "${row.pair}" draws its bands and curves` })];
    byId("chosen").replaceChildren(make("h3", { textContent: row.pair }), ...links, numbersOf(row));
  };

  // The ring around the chosen point of a figure, where it has one.
  function markIn(id) {
    const { view, figure } = views.get(id);
    if (!figure.data.chosen) return;
    const points = chosen < 0 ? [] : figure.data.rows.filter((datum) =>
      datum.tube ? [report.rows[chosen].object_1, report.rows[chosen].object_2].includes(datum.tube) : datum.id === chosen);
    view.change("chosen", vega.changeset().remove(() => true).insert(points.map((point) => ({ ...point })))).run();
  }

  function choose(id, from) {
    chosen = id;
    ranking.mark(id, from !== "table");
    for (const figure of views.keys()) markIn(figure);
    showChosen();
    if (from === "table") return;
    const target = report.pairs.some((pair) => pair.row === id) ? byId(pairId(id)) : byId("ranking");
    target.scrollIntoView({ behavior: "smooth" });
  }

  // Parts ---------------------------------------------------------------------------------------

  const fill = (select, choices, selected) => {
    select.replaceChildren(...Object.entries(choices).map(([value, text]) =>
      make("option", { value, textContent: text, selected: value === selected })));
  };

  const addFigure = (slot, figure, ...selects) => {
    const entry = { slot, figure };
    slots.push(entry);
    for (const select of selects) select.addEventListener("change", () => drawSlot(entry));
  };

  const makeParts = () => {
    const [field, axes, colour, role] = ["map-field", "map-axes", "tube-colour", "tube-role"].map(byId);
    fill(field, Object.fromEntries(report.varying.map((name) => [name, titleOf(name)])), report.order.field);
    fill(axes, gapwright.mapAxes(report));
    fill(colour, gapwright.tubeColours(report));
    fill(role, gapwright.tubeRoles(report));
    addFigure(byId("map-slot"), (options) =>
      gapwright.mapFigure(report, { ...options, field: field.value, axes: axes.value }), field, axes);
    if (report.energy) addFigure(byId("gap-slot"), (options) => gapwright.gapFigure(report, options));
    else byId("gap-part").remove();
    addFigure(byId("tube-slot"), (options) =>
      gapwright.tubeFigure(report, { ...options, colour: colour.value, role: role.value }), colour, role);
  };

  const makePairs = () => {
    const list = byId("pair-list");
    if (report.pairs.length === 0) { byId("pairs").remove(); return; }
    list.append(make("p", { className: "jump" }, ...report.pairs.map((pair) =>
      make("a", { href: `#${pairId(pair.row)}`, textContent: report.rows[pair.row].pair }))));
    for (const pair of report.pairs) {
      const row = report.rows[pair.row];
      const part = make("div", { className: "pair", id: pairId(pair.row) },
        make("h3", { textContent: `${row.pair}, rank ${row.rank}` }), numbersOf(row));
      list.append(part);
      const count = gapwright.pairFigures(report, pair, { width: 800, theme }).length;
      for (let i = 0; i < count; ++i) {
        const slot = make("div", { className: "slot" });
        part.append(slot);
        addFigure(slot, (options) => gapwright.pairFigures(report, pair, options)[i]);
      }
    }
  };

  const tableOf = (heads, rows) => make("div", { className: "scroll" }, make("table", { className: "plain" },
    make("thead", {}, make("tr", {}, ...heads.map((text) => make("th", { textContent: text })))),
    make("tbody", {}, ...rows.map((cells) => make("tr", {}, ...cells.map((text) => make("td", { textContent: text })))))));

  const makeMaking = () => {
    const numbers = make("dl", { className: "numbers" }, ...report.facts.map(([name, value]) =>
      make("div", {}, make("dt", { textContent: name }), make("dd", { textContent: value }))));
    const plans = [...new Set(report.runs.map((run) => run.plan))].map((plan) => make("pre", { textContent: plan }));
    byId("making-text").append(numbers,
      make("h3", { textContent: "Runs" }),
      tableOf(["started (UTC)", "ended (UTC)", "finished", "rows computed", "threads", "program"],
        report.runs.map((run) => [run.started, run.ended, run.finished ? "yes" : "no", String(run.rows_computed), String(run.threads), run.program_version])),
      make("h3", { textContent: "Plan" }), ...plans,
      make("h3", { textContent: "Reading the numbers" }),
      make("p", { className: "note", textContent: "Energies, pressures and forces are negative where the bodies attract; a well depth is positive. "
        + "Areas are those of the mid radius. The electronic share is the part of the dispersion energy that the bodies' own electrons make, "
        + "against the same bodies with the π electrons of flat graphene. The spread is how many ranks a pair moves when the contact term is "
        + "solved from another published target: pairs closer than that are ties." }));
  };

  const makeSummary = () => {
    const count = report.rows.length.toLocaleString("en");
    const tubes = new Set(report.rows.flatMap((row) => [row.object_1, row.object_2])).size.toLocaleString("en");
    const best = report.rows[0];
    const { order } = report;
    const { unit, label } = fieldOf(order.field);
    byId("title").textContent = report.title || `${count} ${report.arrangement} pairs`;
    byId("summary").textContent = `${count} ${report.arrangement} pairs of ${tubes} tubes. First by ${label}: ${best.pair}, `
      + `${textOf(order.field, best[order.field])} ${unit}${isNumber(best.gap_nm) ? `, at a gap of ${textOf("gap_nm", best.gap_nm)} nm` : ""}.`;
    byId("ranking-note").textContent = `Ranked by ${titleOf(order.field)}, ${order.descending ? "highest" : "lowest"} first. `
      + "Click a head to sort; filter a column by text, or by numbers as in >0.34, <-180 or 0.34..0.35.";
  };

  // Print: light figures, and rows that are there, unlike those of a table that scrolls. -----------

  const fillPrinted = () => {
    const names = gapwright.shownFields(report);
    const head = make("tr", {}, ...names.map((name) => make("th", { textContent: titleOf(name) })));
    const body = ranking.first(printedRows).map((row) => make("tr", {}, ...names.map((name) => make("td", { textContent: textOf(name, row[name]) }))));
    byId("printed").replaceChildren(make("thead", {}, head), make("tbody", {}, ...body));
  };
  const redraw = (withTheme) => { ++turn; for (const entry of slots) drawSlot(entry, withTheme); };
  addEventListener("beforeprint", () => {
    fillPrinted();
    if (theme === "dark" || views.size < slots.length) redraw("light");
  });
  addEventListener("afterprint", () => { if (theme === "dark") redraw(theme); });

  // Start ---------------------------------------------------------------------------------------

  showTheme();
  makeSummary();
  makeParts();
  makePairs();
  makeMaking();
  const counted = (shown) => {
    byId("shown").textContent = `${shown.toLocaleString("en")} of ${report.rows.length.toLocaleString("en")} pairs`;
  };
  ranking = gapwright.makeTable(report, { place: byId("table"), choose, counted });
  counted(report.rows.length);

  const search = byId("search");
  let typing = 0;
  search.addEventListener("input", () => { clearTimeout(typing); typing = setTimeout(() => ranking.search(search.value), 150); });
  byId("csv").addEventListener("click", () => save("pairs.csv", ranking.csv(), "text/csv"));
  byId("fields").addEventListener("click", (event) => {
    const all = event.target.getAttribute("aria-pressed") !== "true";
    event.target.setAttribute("aria-pressed", String(all));
    ranking.showAll(all);
  });
  const setTheme = (next) => { theme = next; showTheme(); drawAll(); };
  byId("theme").addEventListener("click", () => setTheme(theme === "dark" ? "light" : "dark"));
  prefersDark.addEventListener("change", (event) => setTheme(event.matches ? "dark" : "light"));
  let width = document.documentElement.clientWidth, resizing = 0;
  addEventListener("resize", () => {
    if (document.documentElement.clientWidth === width) return;
    width = document.documentElement.clientWidth;
    clearTimeout(resizing);
    resizing = setTimeout(drawAll, 200);
  });

  // How far the page is: with its table it can be used, ready it holds every figure.
  const reached = (state) => {
    document.documentElement.dataset.state = state;
    performance.mark(state);
  };
  ranking.table.on("tableBuilt", async () => {
    reached("table");
    await drawAll();
    reached("ready");
  });
})();
