// The ranking as a table.
"use strict";

(() => {
  const { fieldOf, textOf, isNumber } = gapwright;
  const textual = new Set(["pair", "kinds", "object_1", "object_2", "kind_1", "kind_2", "medium",
    "contact_target", "status", "message", "arrangement"]);

  const usual = (report) => report.coaxial
    ? ["rank", "pair", "kinds", "diameter_1_nm", "diameter_2_nm", "gap_nm", "energy_mJ_per_m2", "energy_eV_per_nm",
      "dispersion_eV_per_nm", "electronic_share_eV_per_nm", "contact_eV_per_nm", "pull_out_force_nN", "loss_overlap",
      "rank_spread"]
    : ["rank", "pair", "kinds", "diameter_1_nm", "diameter_2_nm", "gap_nm", "well_depth_eV_per_nm", "energy_eV_per_nm",
      "energy_eV", "dispersion_eV_per_nm", "electronic_share_eV_per_nm", "contact_eV_per_nm", "stiffness_eV_per_nm3",
      "loss_overlap", "rank_spread"];

  const present = (report, names) =>
    names.filter((name) => name === "pair" || name === "kinds" || name in report.packed.columns);

  // "<-180", ">= 0.34", "0.33..0.35", "0.34" (as shown), with any blanks and either minus.
  const numberTest = (typed) => {
    const text = typed.replace(/[\s−]/g, (c) => (c === "−" ? "-" : ""));
    const range = /^([-+.\de]+)(?:\.\.|:|…)([-+.\de]+)$/i.exec(text);
    if (range && range[1] !== "" && Number.isFinite(Number(range[1])) && Number.isFinite(Number(range[2])))
      return (value) => value >= Number(range[1]) && value <= Number(range[2]);
    const bound = /^(<=|>=|<|>|=)?([-+.\de]+)$/i.exec(text);
    if (!bound || !Number.isFinite(Number(bound[2]))) return () => false;
    const limit = Number(bound[2]);
    switch (bound[1]) {
      case "<": return (value) => value < limit;
      case "<=": return (value) => value <= limit;
      case ">": return (value) => value > limit;
      case ">=": return (value) => value >= limit;
      default: {
        const digits = (bound[2].split(".")[1] || "").length;
        return (value) => Math.abs(value - limit) <= 0.5 * 10 ** -digits;
      }
    }
  };

  let lastTyped = null, lastTest = null;
  const numberFilter = (typed, value) => {
    if (!isNumber(value)) return false;
    if (typed !== lastTyped) { lastTyped = typed; lastTest = numberTest(typed); }
    return lastTest(value);
  };
  const bare = (text) => String(text).toLowerCase().replace(/[\s()]/g, "");
  const textFilter = (typed, value) => bare(value ?? "").includes(bare(typed));

  const headerOf = (name) => {
    const { label, unit } = fieldOf(name);
    const box = document.createElement("span");
    box.textContent = label;
    const small = document.createElement("span");
    small.className = "unit";
    small.textContent = unit || "\u00a0";
    box.append(small);
    return box;
  };

  const widthOf = (name) => ({ rank: 66, pair: 150, kinds: 72, message: 260, rank_spread: 76, gap_nm: 84 })[name]
    || Math.max(92, Math.max(...fieldOf(name).label.split(/[ -]/).map((word) => word.length)) * 8.5 + 30);

  const columnOf = (name) => ({
    field: name,
    title: fieldOf(name).label,
    titleFormatter: () => headerOf(name),
    headerTooltip: fieldOf(name).about || false,
    formatter: (cell) => document.createTextNode(textOf(name, cell.getValue())),
    hozAlign: textual.has(name) ? "left" : "right",
    headerHozAlign: textual.has(name) ? "left" : "right",
    sorter: textual.has(name) ? "string" : "number",
    sorterParams: { alignEmptyValues: "bottom" },
    headerFilter: "input",
    headerFilterPlaceholder: name === "pair" ? "10,10" : "",
    headerFilterFunc: textual.has(name) ? textFilter : numberFilter,
    frozen: name === "rank" || name === "pair",
    width: widthOf(name),
  });

  const allNames = (report) => [...new Set([...present(report, ["rank", "pair", "kinds"]), ...Object.keys(report.packed.columns)])];

  gapwright.shownFields = (report) => present(report, usual(report));

  gapwright.makeTable = (report, { place, choose, counted }) => {
    const figured = new Set(report.pairs.map((pair) => pair.row));
    let chosen = -1;
    const paint = (row) => {
      const element = row.getElement(), id = row.getData().id;
      element.classList.toggle("is-chosen", id === chosen);
      element.classList.toggle("has-figures", figured.has(id));
    };
    const table = new Tabulator(place, {
      data: report.rows,
      index: "id",
      height: Math.min(560, 120 + 27 * report.rows.length),
      columns: gapwright.shownFields(report).map(columnOf),
      columnDefaults: { resizable: "header" },
      layout: "fitDataStretch",
      movableColumns: true,
      selectableRows: false,
      placeholder: "No pair passes the filters",
      rowFormatter: paint,
    });
    table.on("rowClick", (event, row) => choose(row.getData().id, "table"));
    table.on("dataFiltered", (filters, rows) => counted(rows.length));

    return {
      table,
      search(text) {
        const words = text.trim().split(/\s+/).filter(Boolean).map(bare);
        if (words.length === 0) return table.clearFilter(false);
        table.setFilter((row) => {
          const where = bare(`${row.pair} ${row.kinds} ${row.status} ${row.message || ""}`);
          return words.every((word) => where.includes(word));
        });
      },
      showAll(all) {
        table.setColumns((all ? allNames(report) : gapwright.shownFields(report)).map(columnOf));
      },
      mark(id, scroll) {
        const before = chosen;
        chosen = id;
        for (const row of [before, id]) {
          const known = row >= 0 && table.getRow(row);
          if (known) paint(known);
        }
        const target = scroll && table.getRow(id);
        if (target && target.getPosition()) table.scrollToRow(target, "center", true); // not filtered away
      },
      // All fields of the rows that pass, in the order shown.
      csv() {
        const names = allNames(report);
        return gapwright.csv(table.getData("active").map((row) => Object.fromEntries(names.map((name) => [name, row[name]]))));
      },
      first: (count) => table.getData("active").slice(0, count),
    };
  };
})();
