#include "readers.hpp"

#include <algorithm>
#include <array>
#include <limits>

namespace gapwright {
namespace {

struct KnownQuantity {
  const char* name;
  const char* unit;
};

constexpr std::array<KnownQuantity, 18> known_quantities{{
    {"diameter_nm", "nm"},
    {"chiral_angle_deg", "deg"},
    {"period_nm", "nm"},
    {"atoms_per_cell", "1"},
    {"band_gap_eV", "eV"},
    {"e11_over_hopping", "1"},
    {"e22_over_hopping", "1"},
    {"curvature_gap_eV", "eV"},
    {"sheet_conductivity_ratio", "1"},
    {"flat_c3_eV_nm", "eV nm"},
    {"two_sheet_c33_GPa", "GPa"},
    {"stack_c33_GPa", "GPa"},
    {"pull_out_force_nN", "nN"},
    {"energy_mJ_per_m2", "mJ/m2"},
    {"pair_potential_sheet_spacing_nm", "nm"},
    {"pair_potential_sheet_energy_eV_per_nm2", "eV/nm2"},
    {"pair_potential_coaxial_eV_per_nm", "eV/nm"},
    {"equilibrium_gap_nm", "nm"},
}};

std::vector<std::string> quantity_names() {
  std::vector<std::string> names;
  for (const KnownQuantity& known : known_quantities) names.emplace_back(known.name);
  return names;
}

std::string unit_of(const std::string& quantity) {
  const auto same = [&](const KnownQuantity& known) { return known.name == quantity; };
  return std::find_if(known_quantities.begin(), known_quantities.end(), same)->unit;
}

CheckWeight read_weight(const TomlReader& entry) {
  const std::string word = entry.word("weight", {"gated", "informative", "from-memory"});
  if (word == "gated") return CheckWeight::gated;
  return word == "informative" ? CheckWeight::informative : CheckWeight::from_memory;
}

CheckRow read_row(const TomlReader& entry, const std::vector<std::string>& hopping_names) {
  constexpr double any = std::numeric_limits<double>::max();
  CheckRow row;
  row.name = entry.text("name");
  row.quantity = entry.word("quantity", quantity_names());
  row.object = entry.optional_text("object").value_or("");
  row.condition = entry.optional_text("condition").value_or("");
  row.unit = entry.word("unit", {unit_of(row.quantity)});
  row.value = entry.number("value", {-any, any, row.unit});
  row.uncertainty = entry.number("uncertainty", {0.0, any, row.unit});
  row.weight = read_weight(entry);
  row.hopping = entry.optional_word("hopping", hopping_names).value_or("");
  row.source = entry.text("source");
  row.remark = entry.optional_text("remark").value_or("");
  entry.finish();
  if (row.weight == CheckWeight::gated && row.uncertainty == 0.0)
    throw entry.error("uncertainty", "a gated row needs an uncertainty",
                      "what the row must stay within, above 0 " + row.unit);
  return row;
}

}  // namespace

std::vector<CheckRow> read_checks(const TomlReader& file,
                                  const std::vector<std::string>& hopping_names) {
  std::vector<CheckRow> rows;
  for (const TomlReader& entry : file.tables("check")) {
    CheckRow row = read_row(entry, hopping_names);
    for (const CheckRow& other : rows)
      if (other.name == row.name)
        throw entry.error("name", "the name '" + row.name + "' is used twice", "a name of its own");
    rows.push_back(std::move(row));
  }
  file.finish();
  return rows;
}

}  // namespace gapwright
