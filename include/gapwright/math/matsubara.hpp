// Sums over Matsubara frequencies from values on a logarithmic grid.
#pragma once

#include <gapwright/math/nodes.hpp>

#include <span>

namespace gapwright {

/// kT Σ'_{n>=0} F(ξ_n), its error and its n = 0 term ½kT·F(0), all in the unit of F times that of
/// ξ.
struct MatsubaraSum {
  double value = 0.0;
  double error = 0.0;
  double static_part = 0.0;
};

/// The sum over ξ_n = n·ξ₁, the n = 0 term halved, kT = ξ₁/2π, of a function known at zero and at
/// lattice.node(0) = ξ₁, lattice.node(1), …; it falls as ξ^-power_above beyond the last node.
/// ln|F| is splined in ln ξ where F keeps its sign, F itself where it changes it. The first terms
/// are summed one by one, the rest by Euler and Maclaurin's formula. METHODS (8.10); relative error
/// 1.5e-6 at step 0.25. Throws std::domain_error for fewer than eight values, a lattice that does
/// not start from zero, or power_above <= 1.
MatsubaraSum matsubara_sum(const LogLattice& lattice, double at_zero,
                           std::span<const double> values, double power_above);

}  // namespace gapwright
