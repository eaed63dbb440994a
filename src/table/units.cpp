#include <gapwright/catalog/constants.hpp>
#include <gapwright/table/units.hpp>

#include <algorithm>
#include <array>

namespace gapwright {
namespace {

constexpr double avogadro_per_mol = 6.02214076e23;  // exact
constexpr double eV_J = constants::elementary_charge_C;

struct Known {
  std::string_view name;
  Unit unit;
};

constexpr Dimension energy{1, 0}, length{0, 1}, force{1, -1}, plane_angle{0, 0, true};

const std::array known = {
    Known{"kcal/mol", {energy, 4184 / avogadro_per_mol / eV_J}},
    Known{"kJ/mol", {energy, 1000 / avogadro_per_mol / eV_J}},
    Known{"eV", {energy, 1.0}},
    Known{"meV", {energy, 1e-3}},
    Known{"aJ", {energy, 1e-18 / eV_J}},
    Known{"nN", {force, 1 / constants::nN_per_eV_per_nm}},
    Known{"pN", {force, 1e-3 / constants::nN_per_eV_per_nm}},
    Known{"nm", {length, 1.0}},
    Known{"Å", {length, 0.1}},
    Known{"A", {length, 0.1}},
    Known{"angstrom", {length, 0.1}},
    Known{"deg", {plane_angle, 1.0}},
    Known{"rad", {plane_angle, 180 / constants::pi}},
};

// The known unit a text is, or begins with in front of a "/".
const Known* leading(std::string_view text) {
  for (const Known& entry : known)
    if (text.starts_with(entry.name) &&
        (text.size() == entry.name.size() || text[entry.name.size()] == '/'))
      return &entry;
  return nullptr;
}

// "nm", "nm2", "Å²": a length and its power.
bool divide_by_length(std::string_view word, Unit& unit) {
  int power = 1;
  for (const std::string_view square : {"2", "²"})
    if (word.ends_with(square)) {
      power = 2;
      word.remove_suffix(square.size());
      break;
    }
  const Known* entry = leading(word);
  if (!entry || entry->name != word || entry->unit.dimension != length) return false;
  for (int i = 0; i < power; ++i) unit.size /= entry->unit.size;
  unit.dimension.length -= power;
  return true;
}

}  // namespace

std::optional<Unit> parse_unit(std::string_view word) {
  const Known* entry = leading(word);
  if (!entry) return std::nullopt;
  Unit unit = entry->unit;
  word.remove_prefix(entry->name.size());
  while (!word.empty()) {
    word.remove_prefix(1);  // the "/"
    const std::size_t end = std::min(word.find('/'), word.size());
    if (!divide_by_length(word.substr(0, end), unit)) return std::nullopt;
    word.remove_prefix(end);
  }
  return unit;
}

std::vector<std::string> usual_units(const Dimension& dimension) {
  static const std::array words = {
      "eV",          "meV",    "kJ/mol", "kcal/mol", "aJ",     "eV/nm", "eV/Å",       "kJ/mol/nm",
      "kcal/mol/Å",  "aJ/nm",  "nN",     "pN",       "eV/nm2", "eV/Å2", "kJ/mol/nm2", "nN/nm",
      "kcal/mol/Å2", "aJ/nm2", "nm",     "Å",        "deg",    "rad"};
  std::vector<std::string> fitting;
  for (const char* word : words)
    if (parse_unit(word)->dimension == dimension) fitting.emplace_back(word);
  return fitting;
}

}  // namespace gapwright
