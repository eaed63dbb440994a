// Multipole sums of plane waves over frequencies, one copy per instruction set.
#pragma once

namespace gapwright {

/// Nodes of the interpolation in ln q.
inline constexpr int wave_nodes = 10;

/// One multipole: the interpolated curve is y = Σ_i weights[i]·rows[i·row_stride + x]; it is
/// ln|T| where sign is not zero, T itself where linear is one.
struct WaveTerm {
  const double* rows;
  const double* weights;
  const double* sign;
  const double* linear;
  double factor;
};

struct CrossedKernel {
  /// out[x] = Σ_terms factor·(sign[x]·e^{y[x]} + linear[x]·y[x]).
  void (*sum)(const WaveTerm* terms, int count, long row_stride, int frequencies, double* out);
};

const CrossedKernel& crossed_kernel();

namespace portable {
extern const CrossedKernel crossed_kernel;
}
namespace avx2 {
extern const CrossedKernel crossed_kernel;
}
namespace avx512 {
extern const CrossedKernel crossed_kernel;
}

}  // namespace gapwright
