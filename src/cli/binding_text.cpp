#include "binding_text.hpp"

#include "row_text.hpp"
#include "text_table.hpp"

#include <gapwright/pair/placement.hpp>

#include <cmath>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

constexpr int energy_decimals = 5;

// "  name          value unit ± error   remark"; nothing for an empty field.
std::string line(const std::string& name, std::optional<double> value, int decimals,
                 const std::string& unit, std::optional<double> error = {},
                 const std::string& remark = {}) {
  if (!value) return {};
  // Far bodies: what fixed decimals would round away.
  const bool small = *value != 0 && std::abs(*value) < 1e-2;
  std::string text = fmt::format("  {:<20}{:>12} {}", name,
                                 small ? significant(value, 5) : fixed(value, decimals), unit);
  if (error) text += fmt::format(" ± {}", significant(error, 2));
  if (!remark.empty()) text += "   " + remark;
  return text + "\n";
}

std::string body_line(const char* name, const std::string& object, const std::string& kind,
                      std::optional<double> diameter_nm, std::optional<double> chiral_angle_deg,
                      std::optional<double> band_gap_eV) {
  std::string text = fmt::format("  {:<8}{}, {}", name, object, kind);
  const auto add = [&](const char* name_of, std::optional<double> value, int decimals,
                       const char* unit) {
    if (value) text += fmt::format(", {} {} {}", name_of, fixed(value, decimals), unit);
  };
  add("diameter", diameter_nm, 4, "nm");
  add("chiral angle", chiral_angle_deg, 2, "deg");
  add("gap", band_gap_eV, 4, "eV");
  return text + "\n";
}

bool is(const Binding& row, Arrangement arrangement) {
  return row.arrangement == arrangement_word(arrangement);
}

bool coaxial(const Binding& row) {
  return is(row, Arrangement::coaxial);
}

/// What a row holds of one energy, per length or in all, and its unit.
struct Energy {
  std::optional<double> value;
  const char* unit;
};
Energy either(std::optional<double> per_length, std::optional<double> in_all) {
  return in_all ? Energy{in_all, "eV"} : Energy{per_length, "eV/nm"};
}

std::string geometry_text(const Binding& row) {
  return "geometry\n" +
         body_line(coaxial(row) ? "inner" : "first", row.object_1, row.kind_1, row.diameter_1_nm,
                   row.chiral_angle_1_deg, row.band_gap_1_eV) +
         body_line(coaxial(row)                 ? "outer"
                   : is(row, Arrangement::over) ? "below"
                                                : "second",
                   row.object_2, row.kind_2, row.diameter_2_nm, row.chiral_angle_2_deg,
                   row.band_gap_2_eV) +
         line("gap", row.gap_nm, 4, "nm", row.equilibrium_gap_error,
              row.equilibrium_gap_nm ? "the bottom of the well" : "") +
         line("axis distance", row.axis_distance_nm, 4, "nm", {},
              is(row, Arrangement::over) ? "from the plane" : "") +
         line("angle", row.angle_deg, 2, "deg");
}

std::optional<double> absolute(std::optional<double> relative, std::optional<double> value) {
  if (!relative || !value) return std::nullopt;
  return *relative * std::abs(*value);
}

std::string energy_text(const Binding& row) {
  const Energy dispersion = either(row.dispersion_eV_per_nm, row.dispersion_eV);
  const Energy share = either(row.electronic_share_eV_per_nm, row.electronic_share_eV);
  const char* unit = dispersion.unit;
  std::optional<double> geometric;
  if (dispersion.value && share.value) geometric = *dispersion.value - *share.value;
  return "energy (negative: attraction)\n" +
         line("dispersion", dispersion.value, energy_decimals, unit,
              absolute(row.relative_error, dispersion.value)) +
         line("  retardation", row.retardation_factor, 6, "", {}, "times the non-retarded one") +
         line("  by geometry", geometric, energy_decimals, unit, {},
              "the same walls with the π electrons of flat graphene") +
         line("  by electrons", share.value, energy_decimals, unit, row.electronic_share_error,
              "what the walls' own bands change") +
         line("  first round trip",
              either(row.first_round_trip_eV_per_nm, row.first_round_trip_eV).value,
              energy_decimals, unit, {}, "of the dispersion") +
         line("contact", either(row.contact_eV_per_nm, row.contact_eV).value, energy_decimals, unit,
              {}, "target " + row.contact_target) +
         line("total", either(row.energy_eV_per_nm, row.energy_eV).value, energy_decimals, unit,
              row.energy_error) +
         line("", row.energy_mJ_per_m2, 3, "mJ/m2", {}, "of the mid radius") +
         line("", row.energy_meV_per_atom, 4, "meV/atom", {}, "of that area") +
         line("exponent", row.exponent, 3, "", {},
              "the dispersion falls as (axis distance)^-exponent");
}

std::string force_text(const Binding& row) {
  std::string text;
  if (row.pressure_GPa)
    text += "pressure (negative: the walls attract)\n" +
            line("dispersion", row.pressure_dispersion_GPa, 4, "GPa") +
            line("total", row.pressure_GPa, 4, "GPa", row.pressure_error);
  if (row.pull_out_force_nN)
    text += "pulling the inner wall out\n" + line("force", row.pull_out_force_nN, 4, "nN");
  return text;
}

std::string well_text(const Binding& row) {
  if (!row.equilibrium_gap_nm) return {};
  const Energy depth = either(row.well_depth_eV_per_nm, row.well_depth_eV);
  return "well\n" + line("depth", depth.value, energy_decimals, depth.unit, row.well_depth_error) +
         line("stiffness", row.stiffness_eV_per_nm3, 2, "eV/nm3") +
         line("stiffness", row.stiffness_eV_per_nm2, 2, "eV/nm2");
}

std::string interfaces_text(const Binding& row) {
  if (row.interfaces.size() < 2) return {};  // the row itself says it
  TextTable table({{"  cut between", "", true},
                   {"gap", "nm"},
                   {"cut energy", "eV/nm"},
                   {"pull-out force", "nN"}});
  for (const Interface& cut : row.interfaces)
    table.add({"  " + cut.inside + " and " + cut.outside, fixed(cut.gap_nm, 4),
               fixed(cut.cut_energy_eV_per_nm, energy_decimals), fixed(cut.pull_out_force_nN, 4)});
  return "interfaces\n" + table.text();
}

std::string beside_text(const Binding& row) {
  const Energy estimate = either(row.pair_potential_eV_per_nm, row.pair_potential_eV);
  if (!estimate.value) return {};
  return "beside it\n" + line("pair potential", estimate.value, energy_decimals, estimate.unit, {},
                              "a published estimate that knows no chirality");
}

}  // namespace

std::string heading_text(const Binding& row) {
  std::string text = pair_name(row) + "   ";
  if (!is(row, Arrangement::over)) text += row.arrangement;
  if (row.angle_deg) text += fmt::format(" at {} deg", *row.angle_deg);
  if (!is(row, Arrangement::over)) text += ", ";
  text += fmt::format("{} K, {}", row.temperature_K, row.medium);
  if (row.chemical_potential_eV != 0)
    text += fmt::format(", chemical potential {} eV", row.chemical_potential_eV);
  return text;
}

std::string gap_text(const Binding& row) {
  return "at a gap of " + significant(row.gap_nm, 5) + " nm";
}

std::string binding_text(const Binding& row) {
  std::string text = heading_text(row);
  if (row.retardation_factor) text += ", retarded";
  text += "\n\n" + geometry_text(row) + energy_text(row) + well_text(row) + interfaces_text(row) +
          force_text(row) + beside_text(row) + fmt::format("status {}", status_word(row.status));
  if (row.relative_error)
    text +=
        fmt::format(", relative error of the dispersion {}", significant(row.relative_error, 2));
  if (!row.message.empty()) text += ": " + row.message;
  return text + "\n";
}

}  // namespace gapwright::cli
