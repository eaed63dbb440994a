// Gaps, transitions and band curves of a tube by zone folding (METHODS §2).
#pragma once

#include <gapwright/bands/hamiltonian.hpp>

#include <vector>

namespace gapwright {

/// Single-particle band data of a tube.
struct TubeGaps {
  double band_gap_eV = 0.0;  ///< least direct gap, 0 for armchair
  double e11_eV = 0.0;       ///< first transition between mirrored van Hove singularities
  double e22_eV = 0.0;  ///< next distinct one: for a metallic tube the upper of the two branches
                        ///< split by warping, or where symmetry lets them coincide (armchair)
                        ///< the next pair; NaN where there is none, as for (3,3)
};

/// Minima of the direct gap 2|F| along the cutting lines; a minimum at a zone boundary is not a van
/// Hove singularity and does not appear because the lines are followed without boundary. In a
/// metallic tube (n-m a multiple of 3) the sub-bands through the Dirac points give the gap and are
/// left out of E11, E22. Energies that agree to 1e-7 count as one. Accuracy 1e-9 relative.
TubeGaps tube_gaps(const Tube& tube, const HoppingSet& hopping);

/// Energies E_-, E_+ [eV] of every sub-band mu = 0 … N-1 at k (-π/T … π/T), [mu][2].
std::vector<std::array<double, 2>> tube_band_energies(const Tube& tube, const HoppingSet& hopping,
                                                      double k_per_nm);

/// The curvature gap of a quasi-metallic tube to lowest order, 3·t·a_cc²|cos 3θ|/(16R²) [eV].
/// Source: Kane & Mele, Phys. Rev. Lett. 78, 1932 (1997).
double curvature_gap_eV(const Tube& tube, double hopping_eV);

}  // namespace gapwright
