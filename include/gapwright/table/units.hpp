// Units of tables: what other programs count in.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright {

/// Powers of energy and length that make a quantity; a plane angle stands apart.
struct Dimension {
  int energy = 0;
  int length = 0;
  bool angle = false;
  bool operator==(const Dimension&) const = default;
};

struct Unit {
  Dimension dimension;
  double size = 1.0;  ///< one of it in eV, nm and degrees
};

/// eV, meV, aJ, kJ/mol, kcal/mol, nN, pN, nm, Å (or A, angstrom), deg, rad, and any of them over
/// lengths: eV/nm, kcal/mol/Å2, nN/nm. Nothing for another word. CODATA 2018.
std::optional<Unit> parse_unit(std::string_view word);

/// Ordinary units of a dimension, for messages.
std::vector<std::string> usual_units(const Dimension& dimension);

}  // namespace gapwright
