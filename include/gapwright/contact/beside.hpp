// The short-range term of tubes beside each other, crossed, or over a flat sheet (METHODS §6).
#pragma once

#include <gapwright/contact/short_range.hpp>

namespace gapwright {

/// Two parallel shells at an axis distance D > R₁ + R₂: energy per length [eV/nm] and its
/// derivative by D [eV/nm²]. Circle against cylinder in closed form, the other circle by a
/// trapezoid whose step follows from the nearest pole; 1e-11. Throws std::domain_error when the
/// shells touch.
SmoothEnergy parallel_energy(const PairFunction& pair, double radius_1_nm, double radius_2_nm,
                             double distance_nm);

/// A shell over a flat sheet at a gap > 0: per length, and by the gap [eV/nm, eV/nm²].
SmoothEnergy over_sheet_energy(const PairFunction& pair, double radius_nm, double gap_nm);

/// Two crossed shells: energy times sin γ, which does not depend on the angle, and its derivative
/// by the distance of the axes [eV, eV/nm]: ∫ U(√(D² + y²)) dy of the parallel energy U.
SmoothEnergy crossed_energy_sine(const PairFunction& pair, double radius_1_nm, double radius_2_nm,
                                 double distance_nm);

}  // namespace gapwright
