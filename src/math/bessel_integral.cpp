#include <gapwright/math/bessel_integral.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

/// Up to here the series, whose terms reach I_0(x), loses less than a digit.
constexpr double series_end = 2.0;

double series(double x) {
  if (x == 0) return 0.0;
  const double start = -std::log(0.5 * x) - std::numbers::egamma;
  const double quarter = 0.25 * x * x;
  double power = x, harmonic = 0.0, sum = 0.0;
  for (int k = 0; k < 40; ++k) {
    const double odd = 2 * k + 1;
    const double term = power / odd * (start + harmonic + 1 / odd);
    sum += term;
    if (k > 0 && std::fabs(term) < 1e-17 * std::fabs(sum)) break;
    power *= quarter / ((k + 1.0) * (k + 1.0));
    harmonic += 1.0 / (k + 1);
  }
  return sum;
}

/// Trapezoid in t. The integrand is analytic for |Im t| < π/2 and near Gaussian of width 1/√x: the
/// error is about max(e^{x-π²/h}, e^{-2π²/(h²x)}), below e^{-37} with this step.
double tail(double x) {
  constexpr double pi = std::numbers::pi, exponent = 37.0;
  const double step = std::min(pi * pi / (exponent + x), pi * std::sqrt(2 / (exponent * x)));
  double sum = 0.5;
  for (int i = 1;; ++i) {
    const double half = std::sinh(0.5 * i * step);
    const double rise = 2 * half * half;  // cosh t - 1
    const double term = std::exp(-x * rise) / (1 + rise);
    sum += term;
    if (term < 1e-17 * sum) break;
  }
  return step * sum * std::exp(-x);
}

void require(const char* function, double x) {
  if (!(x >= 0) || !std::isfinite(x))
    throw std::domain_error(fmt::format("{}: x = {}, required: 0 <= x < infinity", function, x));
}

}  // namespace

double k0_integral(double x) {
  require("k0_integral", x);
  return x <= series_end ? series(x) : std::numbers::pi / 2 - tail(x);
}

double k0_tail(double x) {
  require("k0_tail", x);
  return x <= series_end ? std::numbers::pi / 2 - series(x) : tail(x);
}

double mean_k0(double q_per_nm, double low_nm, double high_nm) {
  if (!(q_per_nm > 0) || !(low_nm < high_nm))
    throw std::domain_error(
        fmt::format("mean_k0: q = {}, strip {} … {} nm, required: q > 0 and "
                    "low < high",
                    q_per_nm, low_nm, high_nm));
  const double length = q_per_nm * (high_nm - low_nm);
  if (low_nm < 0 && high_nm > 0)
    return (k0_integral(-q_per_nm * low_nm) + k0_integral(q_per_nm * high_nm)) / length;
  const double near = q_per_nm * std::min(std::fabs(low_nm), std::fabs(high_nm));
  const double far = q_per_nm * std::max(std::fabs(low_nm), std::fabs(high_nm));
  const double integral =
      near > series_end ? k0_tail(near) - k0_tail(far) : k0_integral(far) - k0_integral(near);
  return integral / length;
}

}  // namespace gapwright
