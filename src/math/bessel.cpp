#include <gapwright/math/bessel.hpp>

#include <algorithm>
#include <array>
#include <bit>
#include <cmath>
#include <cstdint>
#include <numbers>
#include <span>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

constexpr double pi = std::numbers::pi;
constexpr double rounding = 1e-17;      // terms below this share of a sum are dropped
constexpr double series_end = 20.0;     // power series below, large-argument expansions above
constexpr double log_series_end = 1.0;  // ln x series of K_0 below: no cancellation there

// I_order by its power series, A&S 9.6.10; all terms positive.
double i_series(int order, double x) {
  const double quarter = x * x / 4;
  double term = order == 0 ? 1.0 : x / 2;
  double sum = term;
  for (int k = 1; term > rounding * sum; ++k) {
    term *= quarter / (double(k) * (k + order));
    sum += term;
  }
  return sum;
}

// sqrt(2πx)·e^{-x}·I (sign = -1) or sqrt(2x/π)·e^{x}·K (sign = +1): A&S 9.7.1, 9.7.2. From
// x = series_end on the smallest term is below e^{-40}.
double large_argument_sum(int order, double x, double sign) {
  const double mu = 4.0 * order * order;
  double term = 1.0;
  double sum = term;
  for (int k = 1; std::abs(term) > rounding; ++k) {
    const double odd = 2 * k - 1;
    term *= sign * (mu - odd * odd) / (8 * k * x);
    sum += term;
  }
  return sum;
}

struct PairOfK {
  double k0;  // e^x K_0
  double k1;  // e^x K_1
};

// A&S 9.6.13 for K_0, the Wronskian 9.6.15 for K_1.
PairOfK k_log_series(double x) {
  const double quarter = x * x / 4;
  double term = 1.0, harmonic = 0.0, sum = 0.0;
  for (int k = 1; term > rounding; ++k) {
    term *= quarter / (double(k) * k);
    harmonic += 1.0 / k;
    sum += term * harmonic;
  }
  const double i0 = i_series(0, x);
  const double k0 = sum - (std::log(x / 2) + std::numbers::egamma) * i0;
  const double k1 = (1 / x - i_series(1, x) * k0) / i0;
  return {std::exp(x) * k0, std::exp(x) * k1};
}

// e^x K_m = ∫_0^∞ e^{-x(cosh t - 1)} cosh(mt) dt by the trapezoid rule. The integrand is analytic
// for |Im t| < π/2 and near Gaussian of width 1/√x, so the error is about
// max(e^{x-π²/h}, e^{-2π²/(h²x)}): below e^{-37} with this step.
PairOfK k_integral(double x) {
  constexpr double exponent = 37.0;
  const double step = std::min(pi * pi / (exponent + x), pi * std::sqrt(2 / (exponent * x)));
  PairOfK sum{0.5, 0.5};
  for (int k = 1;; ++k) {
    const double sinh_half = std::sinh(0.5 * k * step);
    const double rise = 2 * sinh_half * sinh_half;  // cosh t - 1
    const double term = std::exp(-x * rise);
    sum.k0 += term;
    sum.k1 += term * (1 + rise);
    if (term * (1 + rise) < rounding) break;
  }
  return {step * sum.k0, step * sum.k1};
}

PairOfK scaled_k(double x) {
  if (x <= log_series_end) return k_log_series(x);
  if (x < series_end) return k_integral(x);
  const double front = std::sqrt(pi / (2 * x));
  return {front * large_argument_sum(0, x, 1), front * large_argument_sum(1, x, 1)};
}

double scaled_i(int order, double x) {
  if (x < series_end) return std::exp(-x) * i_series(order, x);
  return large_argument_sum(order, x, -1) / std::sqrt(2 * pi * x);
}

// With t = ln x and s = d ln I_ν/dt, Bessel's equation is s' + s² = λ², λ² = x² + ν². Its solution
// in falling powers of λ, s = λ + Σ_n λ^{-n} Q_n(y), y = (ν/λ)², is the logarithmic derivative of
// Debye's uniform expansion (A&S 9.7.7, 9.7.9). Row n holds the coefficients of Q_n, from
// Q_{n+1} = ½[n(1-y)Q_n + 2y(1-y)Q_n' - Σ_{i+j=n} Q_i Q_j].
constexpr int debye_terms = 16;
constexpr double debye_start = 32.0;  // λ from which the terms kept reach rounding: n!/(2λ)^n
using DebyeTable = std::array<std::array<double, debye_terms + 1>, debye_terms>;

constexpr DebyeTable make_debye_table() {
  DebyeTable q{};
  q[0][0] = -0.5;
  q[0][1] = 0.5;
  for (int n = 0; n + 1 < debye_terms; ++n) {
    auto& next = q[n + 1];
    for (int k = 0; k <= n + 1; ++k) {
      const double part = (n + 2.0 * k) * q[n][k] / 2;
      next[k] += part;
      next[k + 1] -= part;
    }
    for (int i = 0; i <= n; ++i)
      for (int k = 0; k <= i + 1; ++k)
        for (int l = 0; l <= n - i + 1; ++l) next[k + l] -= q[i][k] * q[n - i][l] / 2;
  }
  return q;
}

constexpr DebyeTable debye_table = make_debye_table();

// x·I_{ν+1}/I_ν = s - ν for λ >= debye_start; absolute accuracy rounding·λ.
double debye_ratio(double order, double x) {
  const double lambda = std::hypot(order, x);
  const double y = (order / lambda) * (order / lambda);
  double sum = 0.0;
  for (int n = debye_terms - 1; n >= 0; --n) {
    double q = 0.0;
    for (int k = n + 1; k >= 0; --k) q = q * y + debye_table[n][k];
    sum = sum / lambda + q;
  }
  return (lambda - order) + sum;
}

// The two ratios of neighbouring orders, m = 0 … size-1. I_{m+1}/I_m by ρ_{m-1} = 1/(2m/x + ρ_m)
// from an order high enough for the uniform expansion, K_{m+1}/K_m by r_m = 2m/x + 1/r_{m-1}; every
// term is positive and both damp errors. Side by side, because each waits for its own division.
void fill_ratios(double x, double first_k, std::span<double> ratios_i, std::span<double> ratios_k) {
  const int count = static_cast<int>(ratios_i.size());
  int order = count;
  if (x < debye_start)
    order = std::max(order, 1 + static_cast<int>(std::sqrt(debye_start * debye_start - x * x)));
  double ratio_i = debye_ratio(order, x) / x;
  for (; order >= count; --order) ratio_i = 1 / (2 * order / x + ratio_i);
  double ratio_k = first_k;
  ratios_i[count - 1] = ratio_i;
  ratios_k[0] = ratio_k;
  for (int m = 1; m < count; ++m) {
    ratios_i[count - 1 - m] = ratio_i = 1 / (2 * (count - m) / x + ratio_i);
    ratios_k[m] = ratio_k = 2 * m / x + 1 / ratio_k;
  }
}

// Natural logarithm of a positive normal number, branch-free so that loops over it vectorise.
// x = 2^e·f with f in [√½, √2), ln f = 2 artanh(s), s = (f - 1)/(f + 1), to one unit of rounding.
inline double plain_log(double x) {
  constexpr std::uint64_t lowest = 0x3fe6a09e667f3bcd;  // √½
  constexpr std::uint64_t one = 0x3ff0000000000000;
  constexpr std::uint64_t two_to_52 = 0x4330000000000000;
  constexpr double ln2_high = 0x1.62e42feep-1, ln2_low = 0x1.a39ef35793c76p-33;
  const auto bits = std::bit_cast<std::uint64_t>(x);
  const std::uint64_t biased = (bits + (one - lowest)) >> 52;
  const double exponent = std::bit_cast<double>(biased | two_to_52) - (0x1p52 + 1023);
  const double f = std::bit_cast<double>(bits - (biased << 52) + one) - 1;
  const double s = f / (2 + f), z = s * s;
  double sum = 1.0 / 19;
  for (const double odd : {17., 15., 13., 11., 9., 7., 5., 3.}) sum = sum * z + 1 / odd;
  // 2s = f - f·s
  const double tail = 2 * s * z * sum - f * s;
  return exponent * ln2_high + (f + (tail + exponent * ln2_low));
}

// logs[m] = high + low + Σ_{k<m} ln ratios[k]. Products of eight ratios stay within the range of
// double, and their logarithms are added with the rounding carried along, so that the error does
// not grow.
void accumulate_logs(double high, double low, std::span<const double> ratios,
                     std::span<double> logs) {
  constexpr std::size_t chunk = 8;
  const std::size_t count = ratios.size();
  double product = 1.0;
  for (std::size_t m = 0; m < count; ++m) {
    if (m % chunk == 0) product = 1.0;
    logs[m] = product *= ratios[m];
  }
  for (std::size_t m = 0; m < count; ++m) logs[m] = plain_log(logs[m]);

  // logs[m] is now the sum from the start of the chunk of m to m; shift by one order.
  double before = 0.0;
  for (std::size_t m = 0; m < count; ++m) {
    if (m % chunk == 0) {
      const double sum = high + before;
      const double back = sum - high;
      low += (high - (sum - back)) + (before - back);
      high = sum;
      before = 0.0;
    }
    const double here = logs[m];
    logs[m] = high + (low + before);
    before = here;
  }
}

void require_argument(const char* function, double x) {
  if (!(x > 0) || !std::isfinite(x))
    throw std::domain_error(fmt::format("{}: x = {}, required: 0 < x < infinity", function, x));
}

void require_order(const char* function, int order) {
  if (order != 0 && order != 1)
    throw std::domain_error(fmt::format("{}: order = {}, required: 0 or 1", function, order));
}

}  // namespace

BesselLogs bessel_logs(double x, int count) {
  require_argument("bessel_logs", x);
  if (count < 1)
    throw std::domain_error(fmt::format("bessel_logs: count = {}, required: >= 1", count));
  const auto size = static_cast<std::size_t>(count);
  BesselLogs logs{std::vector<double>(size), std::vector<double>(size), std::vector<double>(size),
                  std::vector<double>(size)};
  const PairOfK k = scaled_k(x);

  // The slopes hold the ratios of neighbouring orders first.
  fill_ratios(x, k.k1 / k.k0, logs.slope_i, logs.slope_k);
  accumulate_logs(x, std::log(scaled_i(0, x)), logs.slope_i, logs.log_i);
  accumulate_logs(-x, std::log(k.k0), logs.slope_k, logs.log_k);

  // I'_m/I_m = I_{m+1}/I_m + m/x;  K'_m/K_m = -(K_{m-1}/K_m + m/x) = -(K_{m+1}/K_m - m/x).
  for (int m = 0; m < count; ++m) {
    logs.slope_i[m] += m / x;
    logs.slope_k[m] = m / x - logs.slope_k[m];
  }
  return logs;
}

double scaled_bessel_i(int order, double x) {
  require_argument("scaled_bessel_i", x);
  require_order("scaled_bessel_i", order);
  return scaled_i(order, x);
}

double scaled_bessel_k(int order, double x) {
  require_argument("scaled_bessel_k", x);
  require_order("scaled_bessel_k", order);
  const PairOfK k = scaled_k(x);
  return order == 0 ? k.k0 : k.k1;
}

}  // namespace gapwright
