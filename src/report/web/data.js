// The packed report, unpacked.
"use strict";

(() => {
  const letter = (kind) => ({ metallic: "M", semiconducting: "S" })[kind] || "–";

  // One shape for all rows, what they share in their prototype: quick to make and to read.
  const unpackRows = (packed) => {
    const names = Object.keys(packed.columns), columns = Object.values(packed.columns);
    const shared = { electronic_energy: null, geometric_energy: null };
    const lines = ["this.id = i;"];
    names.forEach((name, c) => {
      if ("same" in columns[c]) shared[name] = columns[c].same;
      else if ("words" in columns[c])
        lines.push(`this[${JSON.stringify(name)}] = columns[${c}].words[columns[${c}].index[i]];`);
      else lines.push(`this[${JSON.stringify(name)}] = columns[${c}].numbers[i];`);
    });
    lines.push("this.pair = this.object_1 + between + this.object_2;",
      "this.kinds = letter(this.kind_1) + between + letter(this.kind_2);");
    const Row = new Function("columns", "i", "between", "letter", lines.join("\n"));
    Row.prototype = shared;
    const between = packed.arrangement === "coaxial" ? "@" : " ";
    const rows = new Array(packed.count);
    for (let i = 0; i < packed.count; ++i) rows[i] = new Row(columns, i, between, letter);
    return rows;
  };

  // The electronic share in the unit of the energy that pairs are compared by.
  const splitEnergy = (rows, unit) => {
    for (const row of rows) {
      const { electronic_share_eV_per_nm: share, energy_eV_per_nm: energy } = row;
      const compared = row[unit];
      if (typeof share !== "number" || typeof compared !== "number" || !energy) continue;
      row.electronic_energy = (share / energy) * compared;
      row.geometric_energy = compared - row.electronic_energy;
    }
  };

  const isNumber = (value) => typeof value === "number" && Number.isFinite(value);

  // Numeric fields that differ between rows, the field of the order first.
  const varyingFields = (report) => {
    const skipped = new Set(["id", "rank", "electronic_energy", "geometric_energy"]);
    const names = new Set([report.order.field]);
    for (const name of Object.keys(report.packed.columns)) {
      const column = report.packed.columns[name];
      if ("numbers" in column && !skipped.has(name)) names.add(name);
    }
    return [...names].filter((name) => report.rows.some((row) => isNumber(row[name])));
  };

  gapwright.isNumber = isNumber;

  gapwright.unpack = (packed) => {
    const report = { ...packed, packed, rows: unpackRows(packed) };
    report.coaxial = packed.arrangement === "coaxial";
    const has = (name) => report.rows.some((row) => isNumber(row[name]));
    report.energy = ["energy_mJ_per_m2", "energy_eV_per_nm", "energy_eV"].find(has) || null;
    if (report.energy) splitEnergy(report.rows, report.energy);
    report.electronic = has("electronic_energy");
    const unit = report.energy ? gapwright.fieldOf(report.energy).unit : "";
    gapwright.fields.geometric_energy.unit = unit;
    gapwright.fields.electronic_energy.unit = unit;
    if (report.coaxial)
      for (const known of Object.values(gapwright.fields))
        known.label = known.label.replace(/^first object$/, "inner wall").replace(/^second object$/, "outer wall")
          .replace(/\bthe first$/, "inner wall").replace(/\bthe second$/, "outer wall")
          .replace(/^first (?!round)/, "inner ").replace(/^second /, "outer ");
    report.varying = varyingFields(report);
    return report;
  };

  const quoted = (value) => {
    const text = value === null || value === undefined ? "" : String(value);
    return /[",\n]/.test(text) ? `"${text.replace(/"/g, '""')}"` : text;
  };

  // Rows of objects as CSV; every name that any of them has, but the internal id.
  gapwright.csv = (rows) => {
    const names = [...new Set(rows.flatMap((row) => Object.keys(row)))].filter((n) => n !== "id");
    const lines = rows.map((row) => names.map((name) => quoted(row[name])).join(","));
    return [names.join(","), ...lines].join("\n") + "\n";
  };
})();
