// Modified Bessel functions of integer order as logarithms and logarithmic derivatives.
#pragma once

#include <vector>

namespace gapwright {

/// ln I_m, ln K_m and the logarithmic derivatives I'_m/I_m > 0, K'_m/K_m < 0 at one argument for
/// the orders 0 … count-1. Logarithms never over- or underflow.
struct BesselLogs {
  std::vector<double> log_i;
  std::vector<double> log_k;
  std::vector<double> slope_i;  ///< I'_m(x)/I_m(x)
  std::vector<double> slope_k;  ///< K'_m(x)/K_m(x)
};

/// Orders 0 … count-1 at x > 0. Ratios of I by downward recurrence, of K by upward recurrence
/// (both stable), I_0, K_0, K_1 by series and expansions. For 1e-12 <= x <= 1e6, count <= 4000 the
/// logarithms are right to 1e-13 or to the last bit, whichever is more, the slopes to 1e-14.
/// About 1 µs and 25 ns an order. Source: Abramowitz & Stegun (1964) §9.6, §9.7.
/// Throws std::domain_error for x <= 0 or not finite, count < 1.
BesselLogs bessel_logs(double x, int count);

/// Exponentially scaled e^{-x} I_m(x) or e^{x} K_m(x), m = 0 or 1, x > 0. Relative accuracy 1e-14.
/// Throws std::domain_error for other arguments or orders.
double scaled_bessel_i(int order, double x);
double scaled_bessel_k(int order, double x);

}  // namespace gapwright
