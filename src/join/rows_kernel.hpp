// Log-determinants between the factors of two bodies at one wave number, per instruction set.
#pragma once

namespace gapwright {

/// F of -X = FFᵀ, block diagonal over frequencies: up to two upper triangles, then diagonal
/// entries.
struct RowFactor {
  int triangles = 0;
  int size[2] = {0, 0};
  const double* upper[2] = {nullptr, nullptr};  ///< packed (i <= k) at [(k(k+1)/2 + i)·stride + ξ]
  long stride = 0;                              ///< frequencies of the triangles' table
  int diagonals = 0;
  const double* const* diagonal = nullptr;  ///< each over frequencies

  int entries() const { return size[0] + size[1] + diagonals; }
};

/// det[1 - GGᵀ], G = F₁ᵀWF₂ with W that does not depend on frequency. Adds weight·ln det,
/// weight·(-trace) and, where coupling_slope is given, their derivatives to the sums.
struct RowBlock {
  RowFactor first, second;  ///< the first one should not be the larger
  int frequencies = 0;
  const double* coupling = nullptr;        ///< W, [first][second]
  const double* coupling_slope = nullptr;  ///< or null
  double weight = 1.0;
  double* log_det = nullptr;
  double* trace = nullptr;
  double* log_det_slope = nullptr;
  double* trace_slope = nullptr;
  double* scratch = nullptr;  ///< row_scratch(first, second) doubles, 64-byte aligned
};

/// Doubles of scratch space a block needs.
constexpr int row_scratch(int rows, int columns) {
  return 8 * (3 * rows * columns + rows * rows);
}

struct RowKernel {
  /// False when a determinant was not positive; the sums are then not to be used.
  bool (*add)(const RowBlock& block);
};

const RowKernel& row_kernel();

namespace portable {
extern const RowKernel row_kernel;
}
namespace avx2 {
extern const RowKernel row_kernel;
}
namespace avx512 {
extern const RowKernel row_kernel;
}

}  // namespace gapwright
