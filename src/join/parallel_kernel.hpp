// Log-determinants of one wave number and one parity, many frequencies, per instruction set.
#pragma once

namespace gapwright {

/// det[1 - X], X = T₁ c T₂ cᵀ with diagonal T (of either sign) that depend on frequency and a
/// coupling c that does not. Sums are added to; derivatives where coupling_slope is given.
struct MultipoleBlock {
  int rows = 0, columns = 0;               ///< of c that take part: the leading ones
  int stride = 0;                          ///< from one row of c to the next
  int start = 0, frequencies = 0;          ///< which frequencies
  const double* coupling = nullptr;        ///< [rows][stride]
  const double* coupling_slope = nullptr;  ///< or null
  const double* const* first = nullptr;    ///< T₁ of each row over frequencies
  const double* const* second = nullptr;   ///< T₂ of each column over frequencies
  double weight = 1.0;
  double* scratch = nullptr;  ///< multipole_scratch(rows, columns) doubles, 64-byte aligned

  double* trace = nullptr;  ///< weight·(-Tr X)
  double* trace_slope = nullptr;
  double* further = nullptr;  ///< weight·(ln det + Tr X)
  double* further_slope = nullptr;
  double* row_share = nullptr;     ///< part of each row in Tr X, [rows][share_stride]; or null,
  double* column_share = nullptr;  ///< part of each column; null with it
  int share_stride = 0;            ///< from one row of shares to the next
};

/// Doubles of scratch space a block needs.
constexpr int multipole_scratch(int rows, int columns) {
  const int r = rows + 2, c = columns + 2;  // padded to whole tiles
  return 8 * (2 * r * c + 2 * r * r + 9 * r + 2 * c + 1);
}

struct ParallelKernel {
  /// trace, trace_slope and the shares.
  void (*first_trip)(const MultipoleBlock& block);
  /// further, further_slope. False when a determinant was not positive; the sums are then not to
  /// be used.
  bool (*further_trips)(const MultipoleBlock& block);
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
