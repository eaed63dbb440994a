// Densities of one row put together before they are summed over frequencies.
#pragma once

#include <gapwright/join/density.hpp>

#include <cstddef>

namespace gapwright {

/// Adds `factor` times another density of the same frequencies.
inline void add_density(FrequencyDensity& to, const FrequencyDensity& other, double factor = 1.0) {
  for (std::size_t k = 0; k < to.full.size(); ++k) {
    to.full[k] += factor * other.full[k];
    to.halved[k] += factor * other.halved[k];
  }
}

}  // namespace gapwright
