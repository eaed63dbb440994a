// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "multipole_group.hpp"

namespace gapwright::GAPWRIGHT_KERNEL {
namespace {

/// Σ_i T₁ c² T₂ of a strip of rows, and the shares of their columns.
template <int count, bool slopes, bool shares>
void add_rows(const Group& group, int i, const double* squares, const Vector* second, Vector* share,
              Vector& trace, Vector& trace_slope) {
  const int rows = group.block.rows, columns = group.block.columns;
  const double* const c = squares + i * columns;
  const double* const s = c + rows * columns;
  Vector first[count], sum[count] = {}, slope[count] = {};
  for (int a = 0; a < count; ++a) first[a] = group.load(group.block.first[i + a]);
  for (int k = 0; k < columns; ++k) {
    const Vector t = second[k];
    Vector own = shares ? share[k] : Vector{};
    for (int a = 0; a < count; ++a) {
      sum[a] += c[a * columns + k] * t;
      if (shares) own += c[a * columns + k] * first[a];
      if (slopes) slope[a] += s[a * columns + k] * t;
    }
    if (shares) share[k] = own;
  }
  for (int a = 0; a < count; ++a) {
    const Vector row = first[a] * sum[a];
    trace += row;
    trace_slope += first[a] * slope[a];
    if (shares) group.store(group.block.row_share + (i + a) * group.block.share_stride, row);
  }
}

template <bool slopes, bool shares>
void first_trip_of(const MultipoleBlock& block, const double* squares, Vector* second) {
  const int rows = block.rows, columns = block.columns;
  Vector* const share = second + columns;
  each_group(block, [&](const Group& group) {
    for (int k = 0; k < columns; ++k) {
      second[k] = group.load(block.second[k]);
      share[k] = Vector{};
    }
    Vector trace{}, trace_slope{};
    int i = 0;
    for (; i + 3 < rows; i += 4)
      add_rows<4, slopes, shares>(group, i, squares, second, share, trace, trace_slope);
    for (; i < rows; ++i)
      add_rows<1, slopes, shares>(group, i, squares, second, share, trace, trace_slope);
    group.add(block.trace, -trace);
    if (slopes) group.add(block.trace_slope, -trace_slope);
    for (int k = 0; shares && k < columns; ++k)
      group.store(block.column_share + k * block.share_stride, share[k] * second[k]);
    return true;
  });
}

}  // namespace

void first_trip(const MultipoleBlock& block) {
  const int rows = block.rows, columns = block.columns;
  double* const squares = block.scratch;
  double* const slopes = squares + rows * columns;
  for (int i = 0; i < rows; ++i)
    for (int k = 0; k < columns; ++k) {
      const double c = block.coupling[i * block.stride + k];
      squares[i * columns + k] = c * c;
      if (block.coupling_slope)
        slopes[i * columns + k] = 2 * c * block.coupling_slope[i * block.stride + k];
    }
  Vector* const second =
      reinterpret_cast<Vector*>(block.scratch + (2 * rows * columns + 7) / 8 * 8);
  if (block.coupling_slope)
    (block.row_share ? first_trip_of<true, true> : first_trip_of<true, false>)(block, squares,
                                                                               second);
  else
    (block.row_share ? first_trip_of<false, true> : first_trip_of<false, false>)(block, squares,
                                                                                 second);
}

}  // namespace gapwright::GAPWRIGHT_KERNEL
