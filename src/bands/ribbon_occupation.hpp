// Occupations of the rows of a zigzag ribbon in a given potential (METHODS §8).
#pragma once

#include <vector>

namespace gapwright {

/// How finely the occupations are summed.
struct OccupationGrid {
  double energy_eV;  ///< the least |E| of a band that is resolved
  int order;         ///< Gauss nodes in a panel of k
  double step;       ///< of ln ω
};

/// n_j = 1/2 + (1/π)∫₀^∞dω Re G_jj(iω), averaged over k, of the rows of `chains` chains (METHODS
/// 8.9). Panels of k shrink towards the Dirac point 2π/3a, where bands of a wide ribbon bend most.
std::vector<double> row_occupations(int chains, double hopping_eV,
                                    const std::vector<double>& potential_eV,
                                    const OccupationGrid& grid);

}  // namespace gapwright
