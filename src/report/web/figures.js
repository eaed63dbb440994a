// The figures: Vega-Lite specifications and the data they are filled with. The page and the files
// of --svg are drawn from the same ones.
"use strict";

(() => {
  const { titleOf, fieldOf, isNumber } = gapwright;
  const sans = "Inter, 'Helvetica Neue', Helvetica, Arial, 'Liberation Sans', 'DejaVu Sans', sans-serif";

  // Categorical colours that stay apart for colour-blind readers (Okabe and Ito, 2008); shapes say
  // the same again.
  const okabeIto = {
    orange: "#e69f00", sky: "#56b4e9", green: "#009e73", blue: "#0072b2", vermilion: "#d55e00",
    purple: "#cc79a7",
  };
  const inks = {
    light: { ink: "#22262b", soft: "#5d646d", line: "#d9d7d0", faint: "#ebe9e3", paper: "#ffffff",
      blue: okabeIto.blue },
    dark: { ink: "#e9e6df", soft: "#a3a9b0", line: "#3a4047", faint: "#2a2f35", paper: "#1b1f24",
      blue: okabeIto.sky },
  };
  gapwright.inks = inks;

  gapwright.config = (theme) => {
    const { ink, soft, line } = inks[theme];
    const text = { labelFont: sans, titleFont: sans, labelColor: soft, titleColor: ink,
      labelFontSize: 11, titleFontSize: 12, titleFontWeight: 500 };
    return {
      background: "transparent",
      aria: false, // the frame says what a figure shows; thousands of marks need no words
      font: sans,
      view: { stroke: line, strokeWidth: 1 },
      axis: { ...text, gridColor: line, gridOpacity: 0.6, domain: false, tickColor: line,
        titlePadding: 8, labelFlush: false },
      legend: { ...text, symbolSize: 60, gradientThickness: 10, titleLimit: 0, labelLimit: 0,
        titlePadding: 6 },
      title: { font: sans, color: ink, fontSize: 12, fontWeight: 600, anchor: "start", offset: 8 },
      text: { font: sans, color: ink, fontSize: 11 },
      rule: { color: soft },
      line: { strokeWidth: 1.8 },
    };
  };

  const extent = (rows, name) => {
    let low = Infinity, high = -Infinity;
    for (const row of rows) {
      const value = row[name];
      if (!isNumber(value)) continue;
      if (value < low) low = value;
      if (value > high) high = value;
    }
    return low <= high ? [low, high] : [0, 1];
  };
  const padded = ([low, high], share = 0.03) => {
    const room = (high - low || Math.abs(high) || 1) * share;
    return [low - room, high + room];
  };
  const ticksFor = (pixels) => ({ tickCount: Math.max(3, Math.floor(pixels / 90)) });

  // Sequential: the strongest pairs stand out from the paper in either theme. Diverging about zero
  // where a field has both signs.
  const colourScale = (rows, name, theme, strongestLow) => {
    const [low, high] = extent(rows, name);
    if (low < 0 && high > 0 && -low > 0.05 * high && high > -0.05 * low) {
      const most = Math.max(-low, high);
      return { scheme: "purpleorange", domain: [-most, most], domainMid: 0};
    }
    const strongFirst = strongestLow ? low : high;
    const reverse = (strongFirst === low) === (theme === "dark");
    return { scheme: { name: "cividis", extent: [theme === "dark" ? 0.2 : 0, theme === "dark" ? 1 : 0.93] },
      domain: [low, high], reverse };
  };
  const strongestIsLow = (report, name) =>
    name === report.order.field ? !report.order.descending : !/depth|force|stiffness/.test(name);

  // Shift and wheel zoom; a wheel alone scrolls the page.
  const zoomed = (name) => ({
    name,
    select: { type: "interval", zoom: "wheel![event.shiftKey]" },
    bind: "scales",
  });

  const chosenLayer = (theme, encoding) => ({
    data: { name: "chosen" },
    mark: { type: "point", shape: "circle", size: 170, filled: false, stroke: inks[theme].ink,
      strokeWidth: 2, opacity: 1 },
    encoding,
  });

  // Map of all pairs ----------------------------------------------------------------------------

  const indexOf = (label) => {
    const match = /\((\d+),(\d+)\)[^(]*$/.exec(label || "");
    return match ? { n: Number(match[1]), m: Number(match[2]) } : null;
  };
  const indexPlace = (label) => {
    const index = indexOf(label);
    return index ? index.n + index.m / (index.n + 1) : null;
  };

  gapwright.mapAxes = (report) => {
    const axes = { diameters: "diameters", indices: "chiral indices" };
    if (report.coaxial) axes.gap = "inner diameter and gap";
    return axes;
  };

  const mapPlaces = (report, axes) => {
    const [first, second] = report.coaxial ? ["inner wall", "outer wall"] : ["first tube", "second tube"];
    if (axes === "indices") {
      const note = "index n, m rising from tick to tick";
      return {
        x: "outer_index", y: "inner_index",
        xTitle: `${second}: ${note}`, yTitle: `${first}: ${note}`,
        add: (point, row) => {
          point.outer_index = indexPlace(row.object_2);
          point.inner_index = indexPlace(row.object_1);
        },
      };
    }
    if (axes === "gap")
      return { x: "diameter_1_nm", y: "gap_nm", xTitle: titleOf("diameter_1_nm"), yTitle: titleOf("gap_nm"),
        add: () => {} };
    return { x: "diameter_2_nm", y: "diameter_1_nm", xTitle: titleOf("diameter_2_nm"),
      yTitle: titleOf("diameter_1_nm"), add: () => {} };
  };

  gapwright.mapFigure = (report, { width, theme, field, axes }) => {
    const name = field || report.order.field;
    const places = mapPlaces(report, axes);
    const names = [...new Set(["diameter_1_nm", "diameter_2_nm", "gap_nm", name])];
    const rows = [];
    for (const row of report.rows) {
      const point = { id: row.id, pair: row.pair };
      for (const one of names) point[one] = row[one] ?? null;
      places.add(point, row);
      if (isNumber(point[name]) && isNumber(point[places.x]) && isNumber(point[places.y])) rows.push(point);
    }
    rows.sort(strongestIsLow(report, name) ? (a, b) => b[name] - a[name] : (a, b) => a[name] - b[name]);
    const square = axes !== "gap";
    const narrow = width < 560;
    const plotWidth = Math.min(width - (narrow ? 75 : 150), 860);
    const position = {
      x: { field: places.x, type: "quantitative", title: places.xTitle, axis: ticksFor(plotWidth),
        scale: { domain: padded(extent(rows, places.x)), nice: false, zero: false } },
      y: { field: places.y, type: "quantitative", title: places.yTitle,
        scale: { domain: padded(extent(rows, places.y)), nice: false, zero: false } },
    };
    const size = rows.length > 8000 ? 14 : rows.length > 600 ? 30 : 70;
    return {
      id: "map",
      title: report.coaxial ? "Map of inner and outer walls" : "Map of pairs",
      caption: `Every pair as a point, coloured by ${titleOf(name)}. Hover for its numbers, click to `
        + "find it in the table; drag to move, shift and wheel to zoom, double-click to go back.",
      data: { rows, chosen: [] },
      tables: { "": rows },
      spec: {
        width: plotWidth,
        height: Math.max(220, Math.round(plotWidth * (square ? 0.62 : 0.5))),
        layer: [
          {
            data: { name: "rows" },
            params: [zoomed("place")],
            mark: { type: "point", filled: true, size, opacity: 0.95, clip: true },
            encoding: {
              ...position,
              color: { field: name, type: "quantitative", title: legendTitle(name),
                scale: colourScale(rows, name, theme, strongestIsLow(report, name)),
                legend: legendPlace(narrow, plotWidth) },
              tooltip: { field: "pair" },
            },
          },
          chosenLayer(theme, position),
        ],
      },
    };
  };

  const legendPlace = (narrow, plotWidth) => narrow
    ? { orient: "bottom", direction: "horizontal", gradientLength: Math.min(240, plotWidth), tickCount: 5 }
    : { gradientLength: Math.max(90, Math.min(220, plotWidth * 0.4)), tickCount: 5 };

  const legendTitle = (name) => {
    const { label, unit } = fieldOf(name);
    const lines = label.length > 14 ? label.split(" ") : [label];
    return unit ? [...lines, `(${unit})`] : lines;
  };

  // Binding against gap -------------------------------------------------------------------------

  const kindColours = (theme) => [okabeIto.vermilion, okabeIto.orange, okabeIto.green, inks[theme].blue];
  const kindShapes = ["circle", "square", "triangle-up", "diamond"];
  const kindOrder = (rows) => {
    const known = ["M@M", "M@S", "S@M", "S@S", "M M", "M S", "S M", "S S"];
    const present = new Set(rows.map((row) => row.kinds));
    return [...known.filter((k) => present.has(k)), ...[...present].filter((k) => !known.includes(k)).sort()];
  };

  // Local straight lines with tricube weights (Cleveland, J. Am. Stat. Assoc. 74, 829 (1979)), over
  // a sixth of the range to either side.
  const trendOf = (all, x, y, points) => {
    const step = Math.max(1, Math.floor(all.length / 4000)); // of many rows every few say as much
    const rows = step > 1 ? all.filter((row, i) => i % step === 0) : all;
    const [low, high] = extent(all, x);
    const reach = (high - low) / 6 || 1;
    const trend = [];
    for (let i = 0; i <= points; ++i) {
      const at = low + ((high - low) * i) / points;
      let w = 0, wx = 0, wy = 0, wxx = 0, wxy = 0;
      for (const row of rows) {
        const d = row[x] - at, u = Math.abs(d) / reach;
        if (u >= 1 || !isNumber(row[y])) continue;
        const weight = (1 - u * u * u) ** 3;
        w += weight; wx += weight * d; wy += weight * row[y]; wxx += weight * d * d; wxy += weight * d * row[y];
      }
      const spread = w * wxx - wx * wx;
      if (w > 0)
        trend.push({ [x]: at, [y]: spread > 1e-9 * w * w * reach * reach ? (wy * wxx - wx * wxy) / spread : wy / w });
    }
    return trend;
  };

  const harmonicMean = (row) =>
    (2 * row.diameter_1_nm * row.diameter_2_nm) / (row.diameter_1_nm + row.diameter_2_nm);

  gapwright.fields.mean_diameter_nm = { label: "harmonic mean of the diameters", unit: "nm", digits: 4 };

  gapwright.gapFigure = (report, { width, theme }) => {
    const x = report.coaxial ? "gap_nm" : "mean_diameter_nm";
    const y = report.energy;
    const rows = [];
    for (const row of report.rows) {
      const point = { id: row.id, pair: row.pair, kinds: row.kinds, [x]: report.coaxial ? row.gap_nm : harmonicMean(row),
        [y]: row[y], geometric_energy: row.geometric_energy, electronic_energy: row.electronic_energy };
      if (isNumber(point[x]) && isNumber(point[y])) rows.push(point);
    }
    const trend = trendOf(rows, x, "geometric_energy", 60);
    const kinds = kindOrder(rows);
    const narrow = width < 560;
    const plotWidth = Math.min(width - (narrow ? 75 : 150), 860);
    const size = rows.length > 3000 ? 12 : 26;
    const scaleX = { domain: padded(extent(rows, x), 0.02), nice: false, zero: false };
    const kindChannels = {
      color: { field: "kinds", type: "nominal", scale: { domain: kinds, range: kindColours(theme) },
        title: "kinds", legend: { symbolOpacity: 1, ...(narrow ? { orient: "bottom", direction: "horizontal" } : {}) } },
      shape: { field: "kinds", type: "nominal", scale: { domain: kinds, range: kindShapes }, title: "kinds" },
      opacity: { condition: { param: "kind", value: 0.75 }, value: 0.04 },
      tooltip: { field: "pair" },
    };
    const points = (yName, params) => ({
      data: { name: "rows" },
      ...(params ? { params } : {}),
      mark: { type: "point", filled: true, size, strokeWidth: 0, clip: true },
      encoding: {
        x: { field: x, type: "quantitative", title: titleOf(x), scale: scaleX, axis: ticksFor(plotWidth) },
        y: { field: yName, type: "quantitative", title: titleOf(yName),
          scale: { domain: padded(extent(rows, yName), 0.06), nice: false, zero: false } },
        ...kindChannels,
      },
    });
    const place = (yName) => ({
      x: { field: x, type: "quantitative" },
      y: { field: yName, type: "quantitative" },
    });
    const upper = {
      width: plotWidth,
      height: Math.max(200, Math.round(plotWidth * 0.4)),
      layer: [
        points(y, [{ name: "kind", select: { type: "point", fields: ["kinds"] }, bind: "legend" }]),
        {
          data: { name: "trend" },
          mark: { type: "line", color: inks[theme].ink, strokeWidth: 1.8, interpolate: "monotone" },
          encoding: place("geometric_energy"),
        },
        chosenLayer(theme, place(y)),
      ],
    };
    const lower = {
      width: plotWidth,
      height: Math.max(190, Math.round(plotWidth * 0.3)),
      layer: [
        { data: { name: "zero" }, mark: { type: "rule", strokeDash: [4, 3] },
          encoding: { y: { field: "electronic_energy", type: "quantitative" } } },
        points("electronic_energy"),
        chosenLayer(theme, place("electronic_energy")),
      ],
    };
    const what = report.coaxial ? "the gap" : "the size of the tubes";
    return {
      id: "gap",
      title: `Binding against ${what}`,
      caption: "Above, the energy of every pair, and as a line what geometry alone would give: the "
        + "smooth course of energy less electronic share. Below, the electronic deviation from it. Click a kind in "
        + "the legend to see it alone.",
      data: { rows, trend, chosen: [], zero: [{ electronic_energy: 0 }] },
      tables: { "": rows, trend },
      spec: report.electronic
        ? { vconcat: [upper, lower], spacing: 14, resolve: { scale: { x: "shared" } } }
        : { ...upper },
    };
  };

  // Chirality map -------------------------------------------------------------------------------

  const latticeNm = 0.142 * Math.sqrt(3);
  const hexagon = (() => {
    const r = 2 / Math.sqrt(3);
    const corners = [0, 1, 2, 3, 4, 5].map((k) => {
      const angle = (Math.PI / 180) * (60 * k + 30);
      return `${(r * Math.cos(angle)).toFixed(4)},${(r * Math.sin(angle)).toFixed(4)}`;
    });
    return `M${corners.join("L")}Z`;
  })();
  const latticePlace = ({ n, m }) => ({ x: n + m / 2, y: (m * Math.sqrt(3)) / 2 });
  const diameterOf = ({ n, m }) => (latticeNm * Math.sqrt(n * n + n * m + m * m)) / Math.PI;

  gapwright.tubeRoles = (report) => report.coaxial
    ? { either: "in either place", inner: "as inner wall", outer: "as outer wall" }
    : { either: "in any pair" };
  gapwright.tubeColours = (report) => ({
    energy: "energy of its best pair",
    gap: "gap to its best partner",
    partner: "diameter of its best partner",
    kind: "kind of its best partner",
  });

  // Rows come in their order: the first a tube is in is its best.
  const bestOfTubes = (report, role) => {
    const best = new Map();
    for (const row of report.rows) {
      const sides = [];
      if (role !== "outer") sides.push([row.object_1, row.object_2, row.diameter_2_nm, row.kind_2]);
      if (role !== "inner") sides.push([row.object_2, row.object_1, row.diameter_1_nm, row.kind_1]);
      for (const [label, partner, partnerDiameter, partnerKind] of sides) {
        if (!isNumber(row[report.order.field])) continue;
        const known = best.get(label);
        if (known) { known.pairs += 1; continue; }
        const index = indexOf(label);
        if (!index) continue;
        best.set(label, { id: row.id, tube: label, ...index, ...latticePlace(index), pairs: 1,
          best_pair: row.pair, best_partner: partner, partner_kind: partnerKind,
          partner_diameter_nm: partnerDiameter, gap_nm: row.gap_nm,
          [report.order.field]: row[report.order.field] });
      }
    }
    return [...best.values()];
  };

  // All lattice places between the thinnest and the widest tube.
  const placesBetween = (tubes) => {
    const diameters = tubes.map(diameterOf);
    const low = Math.min(...diameters) - 1e-9, high = Math.max(...diameters) + 1e-9;
    const places = [];
    for (let n = 1; n <= (high * Math.PI) / latticeNm + 1; ++n)
      for (let m = 0; m <= n; ++m) {
        const d = diameterOf({ n, m });
        if (d >= low && d <= high) places.push(latticePlace({ n, m }));
      }
    return places;
  };

  // Rays of equal chiral angle and arcs of equal diameter.
  const polarGrid = (low, high) => {
    const lines = [], labels = [];
    const at = (diameter, degrees) => {
      const r = (diameter * Math.PI) / latticeNm, angle = (degrees * Math.PI) / 180;
      return { x: r * Math.cos(angle), y: r * Math.sin(angle) };
    };
    const pad = 0.05 * (high - low) + 0.12;
    const inner = high + 0.3 * pad, outer = high + pad;
    for (const degrees of [0, 10, 20, 30]) {
      lines.push({ line: `r${degrees}`, order: 0, ...at(inner, degrees) },
        { line: `r${degrees}`, order: 1, ...at(outer, degrees) });
      const word = { 0: "0° zigzag", 30: "30° armchair" }[degrees] || `${degrees}°`;
      labels.push({ ...at(outer + 0.012 * outer, degrees), text: word, align: "left" });
    }
    const step = [0.1, 0.2, 0.5, 1, 2, 5].find((s) => (high - low) / s <= 6) || 5;
    for (let k = Math.ceil(low / step); k * step <= high + 1e-9; ++k) {
      for (let degrees = 0; degrees <= 30; degrees += 1)
        lines.push({ line: `a${k}`, order: degrees, ...at(k * step, degrees) });
      const end = at(k * step, 30);
      labels.push({ x: end.x - 0.25, y: end.y + 0.45, text: `${(k * step).toFixed(step < 1 ? 1 : 0)} nm`, align: "right" });
    }
    return { lines, labels };
  };

  gapwright.tubeFigure = (report, { width, theme, role, colour }) => {
    const by = colour || "energy";
    const name = { energy: report.order.field, gap: "gap_nm", partner: "partner_diameter_nm", kind: "partner_kind" }[by];
    const tubes = bestOfTubes(report, role || "either");
    if (tubes.length === 0) return null;
    const diameters = tubes.map(diameterOf);
    const grid = polarGrid(Math.min(...diameters), Math.max(...diameters));
    const places = placesBetween(tubes);
    const everything = [...places, ...grid.lines];
    const [left, right] = extent(everything, "x"), [bottom, top] = extent(everything, "y");
    const roomX = 1.4, roomY = 1.6;
    const across = right - left + 2 * roomX, up = top - bottom + 2 * roomY;
    const aside = width > 560 ? 210 : 24;
    const step = Math.max(2, Math.min(46, (Math.min(width, 1010) - aside) / across));
    const scales = {
      x: { field: "x", type: "quantitative", axis: null, scale: { domain: [left - roomX, right + roomX], nice: false, zero: false } },
      y: { field: "y", type: "quantitative", axis: null, scale: { domain: [bottom - roomY, top + roomY], nice: false, zero: false } },
    };
    const ink = inks[theme];
    const quantity = by !== "kind";
    gapwright.fields.partner_diameter_nm = { label: "partner's diameter", unit: "nm", digits: 4 };
    const colourChannel = quantity
      ? { field: name, type: "quantitative", title: legendTitle(name),
        scale: colourScale(tubes, name, theme, by === "energy" ? strongestIsLow(report, name) : true),
        legend: legendPlace(width <= 560, step * (width > 560 ? up : across)) }
      : { field: name, type: "nominal", title: ["kind of", "best partner"],
        scale: { domain: ["metallic", "semiconducting"], range: [okabeIto.vermilion, ink.blue] } };
    const [low, high] = quantity ? extent(tubes, name) : [0, 1];
    const scale = quantity ? colourChannel.scale : null;
    const size = step * step * 0.9;
    const layer = [
      { data: { name: "places" }, mark: { type: "point", shape: hexagon, size, filled: true, fill: ink.paper, stroke: ink.line, strokeWidth: 0.8, opacity: 1 }, encoding: scales },
      { data: { name: "rows" }, mark: { type: "point", shape: hexagon, size, filled: true, opacity: 1 },
        encoding: { ...scales, color: colourChannel, tooltip: { field: "tube" } } },
      { data: { name: "labels" }, mark: { type: "text", color: ink.soft, baseline: "middle", align: "left", fontSize: 11 },
        encoding: { ...scales, text: { field: "text" } }, transform: [{ filter: "datum.align === 'left'" }], },
      { data: { name: "labels" }, mark: { type: "text", color: ink.soft, baseline: "middle", align: "right", fontSize: 11 },
        encoding: { ...scales, text: { field: "text" } }, transform: [{ filter: "datum.align === 'right'" }] },
      { data: { name: "chosen" }, mark: { type: "point", shape: hexagon, size, filled: false, stroke: ink.ink, strokeWidth: 2.5, opacity: 1 }, encoding: scales },
    ];
    const gridLayers = [[ink.paper, 2.4, 0.35], [ink.soft, 0.9, 0.6]].map(([color, strokeWidth, opacity]) => ({
      data: { name: "lines" }, mark: { type: "line", color, strokeWidth, opacity },
      encoding: { ...scales, detail: { field: "line" }, order: { field: "order" } },
    }));
    layer.splice(2, 0, ...gridLayers);
    if (step >= 24)
      layer.splice(4, 0, {
        data: { name: "rows" },
        mark: { type: "text", fontSize: Math.min(10.5, step * 0.27), baseline: "middle", tooltip: null },
        encoding: { ...scales, text: { field: "short" }, color: { field: "label_ink", type: "nominal", scale: null },
          tooltip: { field: "tube" } },
      });
    const dark = "#14181d", bright = "#ffffff";
    for (const tube of tubes) {
      tube.short = `${tube.n},${tube.m}`;
      if (!quantity) { tube.label_ink = bright; continue; }
      const share = (tube[name] - low) / (high - low || 1);
      const diverging = scale.scheme === "purpleorange";
      const lightness = diverging ? 1 - Math.abs(2 * share - 1) : scale.reverse ? 1 - share : share;
      tube.label_ink = lightness > 0.5 ? dark : bright;
    }
    const clean = tubes.map(({ x, y, short, label_ink, ...rest }) => rest);
    return {
      id: "tubes",
      title: "Tubes on the hexagonal lattice",
      caption: `Each tube at the place of its chiral indices, coloured by the ${gapwright.tubeColours(report)[by]} ${gapwright.tubeRoles(report)[role || "either"]}. `
        + "Arcs are diameters, rays chiral angles. Hover for the partner, click for the pair.",
      data: { rows: tubes, places, lines: grid.lines, labels: grid.labels, chosen: [] },
      tables: { "": clean },
      spec: {
        width: Math.round(step * across),
        height: Math.round(step * up),
        view: { stroke: null },
        layer,
      },
    };
  };

  // One pair ------------------------------------------------------------------------------------

  const bandRows = (tube) => {
    const rows = [];
    tube.bands_eV.forEach((band, b) => band.forEach((energy, i) => {
      rows.push({ tube: tube.label, band: b + 1, k_per_nm: Number((tube.k[i] * tube.zone_edge_per_nm).toPrecision(6)), energy_eV: energy });
    }));
    return rows;
  };
  const stateRows = (tube) => tube.energy_eV.map((energy, i) => ({
    tube: tube.label, energy_eV: energy, states_per_eV_atom: tube.states_per_eV_atom[i],
  }));

  // Peaks of van Hove are cut where they would flatten all else.
  const stateLimit = (tubes) => {
    const all = tubes.flatMap((tube) => tube.states_per_eV_atom).sort((a, b) => a - b);
    return all.length ? Math.max(1e-6, 1.6 * all[Math.floor(0.97 * (all.length - 1))]) : 1;
  };

  const tubePanels = (tube, i, { bandWidth, stateWidth, height, limit, theme, energyTitle }) => {
    const ink = inks[theme];
    const colour = [ink.blue, okabeIto.vermilion, okabeIto.green][i % 3];
    const window = tube.window_eV;
    const y = (title) => ({ field: "energy_eV", type: "quantitative", title,
      scale: { domain: [-window, window], nice: false }, axis: { tickCount: 7, labels: title !== null, ticks: title !== null } });
    const states = { field: "states_per_eV_atom", type: "quantitative", title: "states (1/eV/atom)",
      scale: { domain: [0, limit], nice: false }, axis: { tickCount: 3, labelFlush: true } };
    const fermi = { data: { values: [{ energy_eV: 0 }] }, mark: { type: "rule", strokeDash: [4, 3] },
      encoding: { y: { field: "energy_eV", type: "quantitative" } } };
    return [
      {
        title: `${tube.label}`, width: bandWidth, height,
        layer: [
          { data: { name: `bands_${i}` }, mark: { type: "line", clip: true, strokeWidth: tube.bands_eV.length > 60 ? 0.7 : 1.2, color: colour },
            encoding: { x: { field: "k_per_nm", type: "quantitative", title: "k (nm⁻¹)",
              scale: { domain: [0, tube.zone_edge_per_nm], nice: false }, axis: { tickCount: 4, labelFlush: true } },
            y: y(energyTitle), detail: { field: "band" } } },
          fermi,
        ],
      },
      {
        title: " ", width: stateWidth, height,
        layer: [
          { data: { name: `states_${i}` }, mark: { type: "area", orient: "horizontal", clip: true, color: colour, opacity: 0.3 },
            encoding: { y: y(null), x: states } },
          { data: { name: `states_${i}` }, mark: { type: "line", clip: true, color: colour, strokeWidth: 1 },
            encoding: { y: y(null), x: states, order: { field: "energy_eV" } } },
          fermi,
        ],
      },
    ];
  };

  const bandFigure = (report, pair, row, { width, theme }) => {
    const tubes = pair.tubes.map((label) => report.tubes.find((tube) => tube.label === label)).filter(Boolean);
    if (tubes.length === 0) return null;
    const narrow = width < 640 || tubes.length > 2;
    const across = narrow ? 1 : tubes.length;
    const free = (Math.min(width, 900) - across * 96) / across;
    const sizes = { bandWidth: Math.round(free * 0.58), stateWidth: Math.round(free * 0.42), height: 300, limit: stateLimit(tubes), theme };
    const panels = tubes.map((tube, i) => tubePanels(tube, i, { ...sizes, energyTitle: "energy (eV)" }));
    const spec = narrow
      ? { vconcat: panels.map((two) => ({ hconcat: two, spacing: 10 })), spacing: 24 }
      : { hconcat: panels.map((two) => ({ hconcat: two, spacing: 10 })), spacing: 26 };
    const data = {}, tables = { bands: [], states: [] };
    tubes.forEach((tube, i) => {
      data[`bands_${i}`] = bandRows(tube);
      data[`states_${i}`] = stateRows(tube);
      tables.bands.push(...data[`bands_${i}`]);
      tables.states.push(...data[`states_${i}`]);
    });
    return {
      id: `bands-${fileName(row.pair)}`, title: "Bands and density of states",
      caption: "Sub-bands of the π electrons over half the Brillouin zone, and their states of both spins; "
        + "energies from neutrality. Single-particle: excitons are not in them.",
      data, tables, spec: { ...spec, resolve: { scale: { x: "independent", y: "independent" } } },
    };
  };

  const parts = [
    ["total", "total"], ["dispersion", "dispersion"], ["contact", "contact"], ["pair_potential", "pair potential"],
  ];

  const curveRows = (curve) => {
    const rows = [];
    const add = (part, i, energy, force) => rows.push({ gap_nm: curve.gap_nm[i], part, energy, force });
    curve.gap_nm.forEach((gap, i) => {
      if (curve.contact)
        add("total", i, curve.dispersion.energy[i] + curve.contact.energy[i], curve.dispersion.force[i] + curve.contact.force[i]);
      for (const [key, word] of parts.slice(1))
        if (curve[key]) add(word, i, curve[key].energy[i], curve[key].force[i]);
    });
    return rows;
  };

  // From the deepest value that matters to about as much of the repulsion.
  const wellDomain = (rows, name) => {
    const wells = rows.filter((row) => row.part === "total" || row.part === "pair potential");
    const near = rows.filter((row) => row.part === "dispersion" && row.gap_nm > 0.31);
    const least = Math.min(...[...wells, ...near].map((row) => row[name]));
    return [1.12 * least, -0.55 * least];
  };

  const curveFigure = (report, pair, row, { width, theme }) => {
    const curve = pair.curve;
    if (!curve) return null;
    const ink = inks[theme];
    const rows = curveRows(curve);
    const words = parts.map(([, word]) => word).filter((word) => rows.some((r) => r.part === word));
    const range = { total: ink.ink, dispersion: ink.blue, contact: okabeIto.vermilion, "pair potential": okabeIto.purple };
    const dashes = { total: [1, 0], dispersion: [7, 3], contact: [2, 2], "pair potential": [8, 3, 2, 3] };
    const narrow = width < 640;
    const panelWidth = narrow ? Math.min(width, 520) - 70 : Math.round((Math.min(width, 900) - 250) / 2);
    const mark = isNumber(row.gap_nm) ? [{ gap_nm: row.gap_nm, text: `${row.gap_nm.toFixed(3)} nm` }] : [];
    const units = { energy: `energy (${curve.energy_unit})`, force: `${curve.force_name} (${curve.force_unit})` };
    const label = { data: { name: "mark" }, mark: { type: "text", align: "left", dx: 5, baseline: "top", y: 6, color: ink.soft },
      encoding: { x: { field: "gap_nm", type: "quantitative" }, text: { field: "text" } } };
    const panel = (name) => ({
      width: panelWidth, height: 260,
      layer: [
        { data: { name: "mark" }, mark: { type: "rule", color: ink.soft, strokeWidth: 1 }, encoding: { x: { field: "gap_nm", type: "quantitative" } } },
        { data: { name: "zero" }, mark: { type: "rule", strokeDash: [4, 3], color: ink.soft }, encoding: { y: { field: "value", type: "quantitative" } } },
        { data: { name: "rows" }, mark: { type: "line", clip: true, strokeWidth: 2, interpolate: "monotone" },
          encoding: {
            x: { field: "gap_nm", type: "quantitative", title: "gap (nm)", scale: { domain: extent(rows, "gap_nm"), nice: false, zero: false }, axis: { tickCount: 6 } },
            y: { field: name, type: "quantitative", title: units[name], scale: { domain: wellDomain(rows, name), nice: false } },
            color: { field: "part", type: "nominal", title: null, scale: { domain: words, range: words.map((w) => range[w]) }, legend: { symbolType: "stroke", symbolSize: 260, symbolStrokeWidth: 2, orient: narrow ? "bottom" : "right", columns: narrow ? 2 : 1 } },
            strokeDash: { field: "part", type: "nominal", title: null, scale: { domain: words, range: words.map((w) => dashes[w]) } },
          } },
        ...(name === "energy" ? [label] : []),
      ],
    });
    const both = [panel("energy"), panel("force")];
    const at = report.coaxial ? "at fixed mid radius, as if the walls could breathe" : "against the gap of the two surfaces";
    return {
      id: `curve-${fileName(row.pair)}`, title: `Energy and ${curve.force_name} against the gap`,
      caption: `Dispersion, contact term and their sum ${at}; beside them a pair potential that knows no chirality. Negative values attract. The vertical line is the gap of this pair.`,
      data: { rows, mark, zero: [{ value: 0 }] },
      tables: { "": rows.map(({ energy, force, ...rest }) => ({ ...rest, [`energy_${plainUnit(curve.energy_unit)}`]: energy, [`${curve.force_name}_${plainUnit(curve.force_unit)}`]: force })) },
      spec: narrow ? { vconcat: both, spacing: 18 } : { hconcat: both, spacing: 18 },
    };
  };

  const plainUnit = (unit) => unit.replace("/", "_per_").replace("²", "2");
  const fileName = (label) => label.replace(/@/g, "-in-").replace(/[^0-9A-Za-z-]+/g, "_").replace(/^_|_$/g, "").replace(/_*-in-_*/g, "-in-");

  // Figures of one pair, in order; more kinds of figures of a pair are added here.
  gapwright.pairFigures = (report, pair, options) => {
    const row = report.rows[pair.row];
    return [bandFigure, curveFigure].map((make) => make(report, pair, row, options)).filter(Boolean);
  };

  // All figures with their default choices.
  gapwright.allFigures = (report, options) => {
    const figures = [gapwright.mapFigure(report, options)];
    if (report.energy) figures.push(gapwright.gapFigure(report, options));
    figures.push(gapwright.tubeFigure(report, options));
    for (const pair of report.pairs) figures.push(...gapwright.pairFigures(report, pair, options));
    return figures.filter(Boolean);
  };

  // A complete Vega specification of a figure.
  gapwright.compiled = (figure, theme) => {
    const spec = { $schema: "https://vega.github.io/schema/vega-lite/v5.json", autosize: { type: "pad" },
      padding: 4, ...figure.spec };
    const compiled = vegaLite.compile(spec, { config: gapwright.config(theme) }).spec;
    for (const source of compiled.data)
      if (figure.data[source.name]) source.values = figure.data[source.name];
    return compiled;
  };
})();
