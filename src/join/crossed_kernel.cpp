// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "crossed_kernel.hpp"

#include <bit>
#include <cstdint>

namespace gapwright::GAPWRIGHT_KERNEL {
namespace {

/// e^y for |y| < 700, relative accuracy 1e-15: y = n·ln 2 + r, |r| <= ½ ln 2, and the series of
/// e^r.
inline double exponential(double y) {
  constexpr double to_integer = 6755399441055744.0;  // 1.5·2^52
  const double shifted = y * 1.4426950408889634 + to_integer;
  const double n = shifted - to_integer;
  const double r = (y - n * 0.693147180369123816490) - n * 1.90821492927058770002e-10;
  const double series =
      1.0 +
      r * (1.0 + r * (1.0 / 2 +
                      r * (1.0 / 6 +
                           r * (1.0 / 24 +
                                r * (1.0 / 120 +
                                     r * (1.0 / 720 +
                                          r * (1.0 / 5040 +
                                               r * (1.0 / 40320 +
                                                    r * (1.0 / 362880 +
                                                         r * (1.0 / 3628800 +
                                                              r * (1.0 / 39916800 +
                                                                   r * (1.0 / 479001600))))))))))));
  const std::uint64_t power = std::bit_cast<std::uint64_t>(shifted) + 1023;
  return series * std::bit_cast<double>(power << 52);
}

void sum(const WaveTerm* terms, int count, long row_stride, int frequencies,
         double* __restrict out) {
  for (int x = 0; x < frequencies; ++x) out[x] = 0.0;
  for (int c = 0; c < count; ++c) {
    const WaveTerm& term = terms[c];
    const double* __restrict rows = term.rows;
    const double* __restrict sign = term.sign;
    const double* __restrict linear = term.linear;
    double w[wave_nodes];
    for (int i = 0; i < wave_nodes; ++i) w[i] = term.weights[i];
    const double factor = term.factor;
#pragma GCC ivdep
    for (int x = 0; x < frequencies; ++x) {
      const double* __restrict at = rows + x;
      double y = w[0] * at[0];
      y += w[1] * at[row_stride];
      y += w[2] * at[2 * row_stride];
      y += w[3] * at[3 * row_stride];
      y += w[4] * at[4 * row_stride];
      y += w[5] * at[5 * row_stride];
      y += w[6] * at[6 * row_stride];
      y += w[7] * at[7 * row_stride];
      y += w[8] * at[8 * row_stride];
      y += w[9] * at[9 * row_stride];
      out[x] += factor * (sign[x] * exponential(y) + linear[x] * y);
    }
  }
}

}  // namespace

extern const CrossedKernel crossed_kernel;
const CrossedKernel crossed_kernel{sum};

}  // namespace gapwright::GAPWRIGHT_KERNEL
