// Where two bodies stand to each other.
#pragma once

#include <gapwright/lattice/label.hpp>

#include <string>

namespace gapwright {

enum class Arrangement { coaxial };

/// "coaxial" and back; throws InputError for another word.
std::string arrangement_word(Arrangement arrangement);
Arrangement parse_arrangement(std::string_view word);

/// Bodies and how they are placed: what one row is about.
struct Placement {
  Arrangement arrangement = Arrangement::coaxial;
  TubeObject walls;  ///< all walls, innermost first
};

}  // namespace gapwright
