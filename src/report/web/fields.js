// Names, units and digits of the fields of a row.
"use strict";

var gapwright = {};

(() => {
  const field = (label, unit, digits, about) => ({ label, unit, digits, about });

  gapwright.fields = {
    rank: field("rank", "", 0, "place by the field the store is ranked by"),
    pair: field("pair", "", null, "inner wall @ outer wall, or two objects beside each other"),
    kinds: field("kinds", "", null, "M metallic, S semiconducting, in the order of the pair"),
    object_1: field("first object", "", null),
    object_2: field("second object", "", null),
    kind_1: field("kind of the first", "", null),
    kind_2: field("kind of the second", "", null),
    diameter_1_nm: field("first diameter", "nm", 4),
    diameter_2_nm: field("second diameter", "nm", 4),
    chiral_angle_1_deg: field("first chiral angle", "°", 2, "0 zigzag, 30 armchair"),
    chiral_angle_2_deg: field("second chiral angle", "°", 2, "0 zigzag, 30 armchair"),
    band_gap_1_eV: field("first band gap", "eV", 4, "single-particle"),
    band_gap_2_eV: field("second band gap", "eV", 4, "single-particle"),
    gap_nm: field("gap", "nm", 4, "between the shells of carbon"),
    axis_distance_nm: field("axis distance", "nm", 4),
    offset_nm: field("offset", "nm", 4),
    angle_deg: field("crossing angle", "°", 2),
    temperature_K: field("temperature", "K", 1),
    chemical_potential_eV: field("chemical potential", "eV", 3, "from neutrality"),
    dispersion_eV_per_nm: field("dispersion", "eV/nm", 4, "by the length of the pair"),
    contact_eV_per_nm: field("contact", "eV/nm", 4, "short-range term, by length"),
    energy_eV_per_nm: field("energy", "eV/nm", 4, "dispersion plus contact, by length"),
    energy_mJ_per_m2: field("energy", "mJ/m²", 2, "by the area of the mid radius"),
    energy_meV_per_atom: field("energy", "meV/atom", 3, "by atoms of the mid radius"),
    pressure_dispersion_GPa: field("pressure, dispersion", "GPa", 4, "negative draws together"),
    pressure_GPa: field("pressure", "GPa", 4, "negative draws together"),
    electronic_share_eV_per_nm: field("electronic share", "eV/nm", 5,
      "what the own electrons add to those of flat graphene"),
    thermal_share: field("thermal share", "", 4, "zero-frequency part of the dispersion"),
    retardation_factor: field("retardation factor", "", 4),
    pull_out_force_nN: field("pull-out force", "nN", 4),
    cut_energy_eV_per_nm: field("cut energy", "eV/nm", 4),
    pair_potential_eV_per_nm: field("pair potential", "eV/nm", 4,
      "a chirality-blind pair potential, for comparison"),
    equilibrium_gap_nm: field("equilibrium gap", "nm", 4),
    well_depth_eV_per_nm: field("well depth", "eV/nm", 4),
    stiffness_eV_per_nm3: field("stiffness", "eV/nm³", 2),
    first_round_trip_eV_per_nm: field("first round trip", "eV/nm", 4),
    dispersion_eV: field("dispersion", "eV", 4),
    contact_eV: field("contact", "eV", 4),
    energy_eV: field("energy", "eV", 4),
    loss_overlap: field("overlap of loss spectra", "", 4),
    relative_error: field("relative error", "", null, "of the dispersion energy"),
    energy_error: field("error of energy", "eV/nm", null),
    pressure_error: field("error of pressure", "GPa", null),
    electronic_share_error: field("error of electronic share", "eV/nm", null),
    equilibrium_gap_error: field("error of equilibrium gap", "nm", null),
    well_depth_error: field("error of well depth", "eV/nm", null),
    geometric_energy: field("geometric energy", "", 2, "energy less electronic share"),
    electronic_energy: field("electronic deviation", "", 4, "electronic share in units of energy"),
    rank_spread: field("spread", "ranks", 0, "ranks a pair moves between contact targets"),
    status: field("status", "", null),
    message: field("message", "", null),
  };

  // Fields nobody has named here: a newer store.
  gapwright.fieldOf = (name) =>
    gapwright.fields[name] || { label: name.replace(/_/g, " "), unit: "", digits: null };

  gapwright.titleOf = (name) => {
    const { label, unit } = gapwright.fieldOf(name);
    return unit ? `${label} (${unit})` : label;
  };

  const minus = (text) => text.replace(/^-/, "−");

  gapwright.textOf = (name, value) => {
    if (value === null || value === undefined) return "";
    if (typeof value !== "number") return String(value);
    const { digits } = gapwright.fieldOf(name);
    if (digits === null) {
      const text = value !== 0 && Math.abs(value) < 0.01 ? value.toExponential(2) : value.toPrecision(3);
      return minus(text.replace("e-", "e−"));
    }
    return minus(value.toFixed(digits));
  };
})();
