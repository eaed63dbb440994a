// Gaps, transitions and band curves of a nanoribbon (METHODS §2, §8).
#pragma once

#include <gapwright/bands/ribbon_hamiltonian.hpp>

#include <vector>

namespace gapwright {

struct RibbonGaps {
  double band_gap_eV = 0.0;      ///< least direct gap, 0 where the bands touch
  double gap_wave_per_nm = 0.0;  ///< where it is, 0 … π/period
  double e11_eV = 0.0;  ///< first transition between a sub-band and its mirror image about 0
  double e22_eV = 0.0;  ///< next distinct one
};

/// Minima of 2E(k) of the lowest two sub-bands of every sector; energies that agree to 1e-7 count
/// as one. Accuracy 1e-8 eV beside that of the mean field, at any width: narrow ribbons by dense
/// eigenvalues, wide ones by a few states about 0 of the sparse matrix.
RibbonGaps ribbon_gaps(const RibbonHamiltonian& hamiltonian);

/// How the eigenvalues about 0 are found.
enum class EigenMethod { automatic, dense, sparse };

/// The `count` lowest positive energies [eV] of a sector at k, rising. Sparse: shift-and-invert
/// Lanczos at 0, relative accuracy 1e-10; dense: 1e-15 of the band width. Automatic takes the
/// faster by size. Throws std::domain_error unless 1 <= count <= half the sector's size.
std::vector<double> conduction_energies_eV(const RibbonHamiltonian& hamiltonian, int sector,
                                           double k_per_nm, int count,
                                           EigenMethod method = EigenMethod::automatic);

/// All energies [eV] at k, rising, of the spin of RibbonHamiltonian::matrix (the other has the
/// same).
std::vector<double> ribbon_band_energies(const RibbonHamiltonian& hamiltonian, double k_per_nm);

}  // namespace gapwright
