// Log-determinants of one wave number and one parity, all frequencies, per instruction set.
#pragma once

namespace gapwright {

/// det[1 - T₁ c T₂ cᵀ] with diagonal T (of either sign) that depend on frequency and a coupling c
/// that does not. Adds weight·ln det, weight·(-trace) and, where coupling_slope is given, their
/// derivatives to the sums.
struct MultipoleBlock {
  int rows = 0, columns = 0, frequencies = 0;
  const double* coupling = nullptr;        ///< [rows][columns]
  const double* coupling_slope = nullptr;  ///< or null
  const double* const* first = nullptr;    ///< T₁ of each row over frequencies
  const double* const* second = nullptr;   ///< T₂ of each column over frequencies
  double weight = 1.0;
  double* log_det = nullptr;
  double* trace = nullptr;
  double* log_det_slope = nullptr;
  double* trace_slope = nullptr;
  double* scratch = nullptr;  ///< multipole_scratch(rows, columns) doubles, 64-byte aligned
};

/// Doubles of scratch space a block needs.
constexpr int multipole_scratch(int rows, int columns) {
  return 8 * (3 * rows * columns + rows * rows + 4 * rows + 2 * columns);
}

struct ParallelKernel {
  /// False when a determinant was not positive; the sums are then not to be used.
  bool (*add)(const MultipoleBlock& block);
};

const ParallelKernel& parallel_kernel();

namespace portable {
extern const ParallelKernel parallel_kernel;
}
namespace avx2 {
extern const ParallelKernel parallel_kernel;
}
namespace avx512 {
extern const ParallelKernel parallel_kernel;
}

}  // namespace gapwright
