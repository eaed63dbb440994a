// A tube of one or more walls as one scatterer.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/lattice/label.hpp>

#include <memory>

namespace gapwright {

/// The outward scatterer of all walls of an object, with a window that covers the one given. The
/// medium of the cache stands outside the outermost wall, vacuum inside it.
std::shared_ptr<const Scatterer> body_scatterer(const TubeObject& object, Electrons electrons,
                                                const Window& window, TubeCache& cache);

inline double outer_radius_nm(const TubeObject& object) {
  return object.walls.back().radius_nm;
}

}  // namespace gapwright
