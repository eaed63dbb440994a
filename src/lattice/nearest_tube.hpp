// The tube nearest to one that cannot be used, for messages.
#pragma once

#include <gapwright/lattice/tube.hpp>

#include <optional>

namespace gapwright {

/// Diameter [nm] of any index pair, also where make_tube refuses it.
double diameter_nm_of(long n, long m);

/// The accepted tube nearest in direction, then in width, to n >= m >= 0 outside the limits.
Tube nearest_tube_in_range(long n, long m);

/// The tube with the fewest index steps from `outer` that leaves room around `inner`, if any.
std::optional<Tube> nearest_outer_wall(const Tube& inner, const Tube& outer);

}  // namespace gapwright
