// A coaxial pair whose gap is thought free: its curve, and where it would rest.
#pragma once

#include <gapwright/pair/binder.hpp>
#include <gapwright/pair/curve.hpp>

#include <vector>

namespace gapwright {

/// Gap of least energy of two coaxial walls at fixed mid radius [nm], to 1e-6 nm: the zero of the
/// pressure, with (αQ²) and α_⊥ of the real walls kept per unit area (METHODS §7). Real walls
/// cannot breathe so far; the value tells what the pair would like. Throws std::domain_error when
/// the placement has not two walls, with retardation, or when there is no minimum within 0.28 …
/// 0.45 nm.
double coaxial_equilibrium_gap_nm(const Binder& binder, const Placement& placement);

/// Dispersion of two coaxial walls against the gap at fixed mid radius, by the same displacement
/// [eV/nm; slope: by the gap, eV/nm²]; at the gap of the real walls that of their row to the
/// tolerance. Throws std::domain_error when the placement has not two walls, with retardation, or
/// for a gap outside 0.2 nm … twice the mid radius.
std::vector<CurvePoint> coaxial_curve(const Binder& binder, const Placement& placement,
                                      const std::vector<double>& gaps_nm);

}  // namespace gapwright
