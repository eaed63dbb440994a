#include "binding_text.hpp"

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
  return fmt::format("  {:<8}{}, {}, diameter {} nm, chiral angle {} deg, gap {} eV\n", name,
                     object, kind, fixed(diameter_nm, 4), fixed(chiral_angle_deg, 2),
                     fixed(band_gap_eV, 4));
}

bool coaxial(const Binding& row) {
  return row.arrangement == arrangement_word(Arrangement::coaxial);
}

std::string geometry_text(const Binding& row) {
  return "geometry\n" +
         body_line(coaxial(row) ? "inner" : "first", row.object_1, row.kind_1, row.diameter_1_nm,
                   row.chiral_angle_1_deg, row.band_gap_1_eV) +
         body_line(coaxial(row) ? "outer" : "second", row.object_2, row.kind_2, row.diameter_2_nm,
                   row.chiral_angle_2_deg, row.band_gap_2_eV) +
         line("gap", row.gap_nm, 4, "nm", row.equilibrium_gap_error,
              row.equilibrium_gap_nm ? "the bottom of the well" : "") +
         line("axis distance", row.axis_distance_nm, 4, "nm");
}

std::optional<double> absolute(std::optional<double> relative, std::optional<double> value) {
  if (!relative || !value) return std::nullopt;
  return *relative * std::abs(*value);
}

std::string energy_text(const Binding& row) {
  std::optional<double> geometric;
  if (row.dispersion_eV_per_nm && row.electronic_share_eV_per_nm)
    geometric = *row.dispersion_eV_per_nm - *row.electronic_share_eV_per_nm;
  const char* unit = "eV/nm";
  return "energy (negative: attraction)\n" +
         line("dispersion", row.dispersion_eV_per_nm, energy_decimals, unit,
              absolute(row.relative_error, row.dispersion_eV_per_nm)) +
         line("  retardation", row.retardation_factor, 6, "", {}, "times the non-retarded one") +
         line("  by geometry", geometric, energy_decimals, unit, {},
              "the same walls with the π electrons of flat graphene") +
         line("  by electrons", row.electronic_share_eV_per_nm, energy_decimals, unit,
              row.electronic_share_error, "what the walls' own bands change") +
         line("  first round trip", row.first_round_trip_eV_per_nm, energy_decimals, unit, {},
              "of the dispersion") +
         line("contact", row.contact_eV_per_nm, energy_decimals, unit, {},
              "target " + row.contact_target) +
         line("total", row.energy_eV_per_nm, energy_decimals, unit, row.energy_error) +
         line("", row.energy_mJ_per_m2, 3, "mJ/m2", {}, "of the mid radius") +
         line("", row.energy_meV_per_atom, 4, "meV/atom", {}, "of that area");
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
  if (!row.well_depth_eV_per_nm) return {};
  return "well\n" +
         line("depth", row.well_depth_eV_per_nm, energy_decimals, "eV/nm", row.well_depth_error) +
         line("stiffness", row.stiffness_eV_per_nm3, 2, "eV/nm3");
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
  return "beside it\n" + line("pair potential", row.pair_potential_eV_per_nm, energy_decimals,
                              "eV/nm", {}, "a published estimate that knows no chirality");
}

}  // namespace

std::string pair_text(const Binding& row) {
  return row.object_1 + (coaxial(row) ? "@" : " ") + row.object_2;
}

std::string binding_text(const Binding& row) {
  std::string text = fmt::format("{}   {}, {} K, {}", pair_text(row), row.arrangement,
                                 row.temperature_K, row.medium);
  if (row.chemical_potential_eV != 0)
    text += fmt::format(", chemical potential {} eV", row.chemical_potential_eV);
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
