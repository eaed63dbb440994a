// Where two bodies stand to each other.
#pragma once

#include <gapwright/lattice/label.hpp>

#include <optional>
#include <string>
#include <string_view>

namespace gapwright {

enum class Arrangement {
  coaxial,   ///< walls in walls, one object
  parallel,  ///< axes side by side
  crossed,   ///< axes at an angle, in parallel planes
  over,      ///< lying over the flat sheet, or over the plane surface of a medium
  stacked,   ///< a ribbon face to face with another one, or a tube over its face
  coplanar,  ///< a ribbon and another body side by side in its plane
  edge_on,   ///< the second ribbon upright on the face of the first, or a ribbon on a tube
};

/// The names above as words and back; throws InputError for another word.
std::string arrangement_word(Arrangement arrangement);
Arrangement parse_arrangement(std::string_view word);

/// Bodies and how they are placed: what one row is about.
struct Placement {
  Arrangement arrangement = Arrangement::coaxial;
  Object first{};                     ///< coaxial: all walls of the row
  std::optional<Object> second{};     ///< beside, across or under it; none for coaxial
  std::optional<double> gap_nm{};     ///< between the surfaces; none: the equilibrium
  std::optional<double> angle_deg{};  ///< between the axes, crossed only
  std::optional<double> offset_nm{};  ///< sideways, of the arrangements of ribbons; none: centred
};

/// The tube of an object that must be one. Throws InputError otherwise.
const TubeObject& tubes_of(const Object& object);

}  // namespace gapwright
