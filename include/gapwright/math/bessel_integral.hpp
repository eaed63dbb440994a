// Integrals of K_0.
#pragma once

namespace gapwright {

/// ∫_0^x K_0(t) dt for x >= 0. Relative accuracy 1e-14; π/2 in the limit.
/// Source: series of Abramowitz & Stegun (1964) 9.6.13, integrated by terms.
/// Throws std::domain_error for x < 0 or not finite; so does k0_tail.
double k0_integral(double x);

/// ∫_x^∞ K_0(t) dt = ∫_0^∞ e^{-x cosh t}/cosh t dt (A&S 11.2.8 … 11.2.10), relative accuracy 1e-13
/// down to the smallest numbers.
double k0_tail(double x);

/// Mean of K_0(q|y|) over low <= y <= high, which may hold the origin [q: nm^-1, y: nm].
/// Relative accuracy 1e-13 and that of the difference of the ends. Throws std::domain_error unless
/// q > 0 and low < high.
double mean_k0(double q_per_nm, double low_nm, double high_nm);

}  // namespace gapwright
