// Where the walls of a coaxial pair would rest, were their gap free.
#pragma once

#include <gapwright/pair/binder.hpp>

namespace gapwright {

/// Gap of least energy of two coaxial walls at fixed mid radius [nm], to 1e-6 nm: the zero of the
/// pressure, with (αQ²) and α_⊥ of the real walls kept per unit area (METHODS §7). Real walls
/// cannot breathe so far; the value tells what the pair would like. Throws std::domain_error when
/// the placement has not two walls, with retardation, or when there is no minimum within 0.28 …
/// 0.45 nm.
double coaxial_equilibrium_gap_nm(const Binder& binder, const Placement& placement);

}  // namespace gapwright
