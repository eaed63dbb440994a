// Solving the short-range term from a contact target (METHODS §6).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/contact/short_range.hpp>

#include <functional>

namespace gapwright {

/// Dispersion energy per area of two flat sheets and its derivative at a spacing [nm].
using SheetDispersion = std::function<SmoothEnergy(double spacing_nm)>;

/// B and C such that dispersion plus contact meets the target's energy at its spacing d₀: two
/// sheets (pair), Σ_n E₂(n·d₀) (stack) or Σ_n n·E₂(n·d₀) (cleavage), in equilibrium: zero
/// derivative of the pair, or of the stack, Σ_n n·E₂'(n·d₀) = 0. One call of the dispersion for a
/// pair, else 30, out to about 1,700 d₀; the sums are right to 1e-7 for a dispersion whose d³·E is
/// smooth in 1/d. Throws std::domain_error when the target asks for B <= 0.
PairFunction calibrate(const ContactTarget& target, const SheetDispersion& dispersion);

}  // namespace gapwright
