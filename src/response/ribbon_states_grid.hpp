// Eigenvectors of a ribbon on a uniform grid of k.
#pragma once

#include <gapwright/bands/ribbon_hamiltonian.hpp>

#include <vector>

#include <Eigen/Dense>

namespace gapwright {

/// Conduction states of one sector at one k, energies rising.
struct ConductionStates {
  Eigen::VectorXd energies_eV;
  Eigen::MatrixXd vectors;  ///< a column a state
};

/// k_i = 2πi/(waves·period) for i = 0 … waves/2; the others are their complex conjugates.
struct StateGrid {
  int waves = 0;
  std::vector<std::vector<ConductionStates>> states;  ///< [i][sector]
  double largest_energy_eV = 0.0;
  double static_polarisability = 0.0;  ///< c of Σχ → -c q² at ξ = 0 [nm/eV]
  double relative_error = 0.0;         ///< of c, from half as many waves
};

/// Doubles the grid until c has settled to the error, at most to `most_waves`.
StateGrid settled_states(const RibbonHamiltonian& hamiltonian, double relative_error,
                         int most_waves);

/// Electrons and holes per nm at kT > 0 in the limit of few, the chemical potential from mid-gap;
/// an upper bound: 2 Σ_n ∫dk/2π 2e^{-(E_n - |μ|)/kT}.
double few_carriers_per_nm(const StateGrid& grid, double period_nm, double thermal_energy_eV,
                           double chemical_potential_eV);

}  // namespace gapwright
