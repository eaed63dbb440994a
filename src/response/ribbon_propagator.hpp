// χ(q, τ) of a ribbon at one imaginary time, from the propagators along it (METHODS §8).
#pragma once

#include "ribbon_pairs.hpp"
#include "ribbon_states_grid.hpp"

#include <gapwright/bands/ribbon_hamiltonian.hpp>

#include <complex>
#include <memory>
#include <vector>

#include <Eigen/Dense>

namespace gapwright {

/// One kind of product of two propagators of a pair of rows, summed along the ribbon.
class RibbonPropagator {
 public:
  virtual ~RibbonPropagator() = default;
  /// Column 0: χ_jj'(0, τ) for every pair; column 1 + j: χ_jj'(q_j, τ) - χ_jj'(0, τ) [1/(eV·nm)].
  virtual Eigen::MatrixXd response(double time) const = 0;
};

/// The states must outlive it; `waves_per_nm` are the q.
std::unique_ptr<RibbonPropagator> ribbon_propagator(const RibbonHamiltonian& hamiltonian,
                                                    const StateGrid& grid,
                                                    const std::vector<double>& waves_per_nm);

}  // namespace gapwright
