// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "coaxial_kernel.hpp"

#include <bit>
#include <cstdint>

namespace gapwright::GAPWRIGHT_KERNEL {
namespace {

/// ln(1 - p) for p < 1, relative accuracy 1e-15 down to tiny p: mantissa in [√½, √2), then
/// 2 artanh((u-1)/(u+1)) by its series, and the rounding of 1 - p put back.
inline double log_one_minus(double p) {
  const double u = 1.0 - p;
  const double lost = (1.0 - u) - p;
  constexpr std::uint64_t root_half = 0x3fe6a09e667f3bcdULL;
  constexpr std::uint64_t bias = 1023ULL << 52;
  const std::uint64_t bits = std::bit_cast<std::uint64_t>(u);
  const std::uint64_t biased = (bits - root_half + bias) >> 52;  // exponent + 1023
  const double exponent =
      std::bit_cast<double>(biased | 0x4330000000000000ULL) - (4503599627370496.0 + 1023.0);
  const double mantissa = std::bit_cast<double>(bits - (biased << 52) + bias);
  const double f = (mantissa - 1.0) / (mantissa + 1.0);
  const double s = f * f;
  const double series =
      1.0 +
      s * (1.0 / 3 +
           s * (1.0 / 5 +
                s * (1.0 / 7 + s * (1.0 / 9 + s * (1.0 / 11 +
                                                   s * (1.0 / 13 +
                                                        s * (1.0 / 15 +
                                                             s * (1.0 / 17 + s * (1.0 / 19)))))))));
  return exponent * 0.6931471805599453 + 2.0 * f * series + lost / u;
}

void energy_only(const double* __restrict inside, const double* __restrict around, double factor,
                 double weight, int count, double* __restrict energy) {
#pragma GCC ivdep
  for (int x = 0; x < count; ++x)
    energy[x] += weight * log_one_minus(factor * inside[x] * around[x]);
}

void energy_and_slope(const double* __restrict inside, const double* __restrict inside_slope,
                      const double* __restrict around, const double* __restrict around_slope,
                      double factor, double weight, int count, double* __restrict energy,
                      double* __restrict slope) {
#pragma GCC ivdep
  for (int x = 0; x < count; ++x) {
    const double p = factor * inside[x] * around[x];
    energy[x] += weight * log_one_minus(p);
    slope[x] -= weight * (p / (1.0 - p)) * 0.5 * (around_slope[x] - inside_slope[x]);
  }
}

}  // namespace

extern const InterfaceKernel interface_kernel;
const InterfaceKernel interface_kernel{energy_only, energy_and_slope};

}  // namespace gapwright::GAPWRIGHT_KERNEL
