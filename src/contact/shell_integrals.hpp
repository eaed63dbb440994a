// Integrals of inverse powers over lines and circles of carbon.
#pragma once

#include <gapwright/catalog/constants.hpp>

namespace gapwright {

inline constexpr double carbon_density_per_nm2 = 1 / constants::atom_area_nm2;
inline constexpr int repulsive_power = 12;

/// Throws std::domain_error unless power >= 3.
void require_power(const char* function, int power);

/// c_p with ∫ r^{-p} along an infinite line at distance ρ equal to c_p ρ^{1-p}:
/// c_p = √π Γ((p-1)/2)/Γ(p/2), from c_2 = π, c_3 = 2 by c_{p+2} = c_p (p-1)/p.
double line_factor(int power);

/// F(1-s, 1-s; 1; z) and its derivative by z, 0 <= z < 1. Terms are positive and fall as
/// k^{-2s} z^k, so the sum converges for every z < 1.
struct CircleSeries {
  double value = 1.0;
  double slope = 0.0;
};
CircleSeries circle_series(double s, double z);

}  // namespace gapwright
