// The mean field of the Hubbard term of a zigzag ribbon (METHODS §2, §8).
#pragma once

#include <vector>

namespace gapwright {

struct MeanField {
  std::vector<double> potential_eV;  ///< U(n_down - 1/2) on each row, what the up spin feels
  double error_eV = 0.0;  ///< of the potential: last change, and that by a finer quadrature
  bool converged = false;
  int iterations = 0;
};

/// Half filling, T = 0, antiferromagnetic across the ribbon of `chains` chains, hopping t > 0,
/// U > 0 [eV]. The cost is linear in the width.
MeanField ribbon_mean_field(int chains, double hopping_eV, double repulsion_eV);

}  // namespace gapwright
