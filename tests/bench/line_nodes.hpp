// How many points of the reciprocal plane a tube's response visits.
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/lattice/tube.hpp>
#include <gapwright/math/nodes.hpp>

#include <cstddef>

namespace gapwright::bench {

/// Gauss nodes on all helical lines of all cells of the window, both signs of m for chiral tubes:
/// each costs a transition and one division a frequency.
std::size_t line_nodes(const Tube& tube, const HoppingSet& hopping, const Nodes& nodes,
                       const Window& window);

}  // namespace gapwright::bench
