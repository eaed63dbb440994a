// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "rows_kernel.hpp"

#include <cmath>
#include <cstring>

namespace gapwright::GAPWRIGHT_KERNEL {
namespace {

#if defined(__AVX512F__)
constexpr int lanes = 8;
#elif defined(__AVX2__)
constexpr int lanes = 4;
#else
constexpr int lanes = 2;
#endif
typedef double Vector __attribute__((vector_size(8 * lanes)));

/// Below this trace ln det is -tr - tr₂/2 to a relative 3e-9, and below the second one -tr.
constexpr double series_trace = 1e-4;
constexpr double first_trace = 1e-7;
/// Sums of one pass over a factor.
constexpr int pass = 6;

/// The frequencies of one group of lanes.
struct Group {
  const RowBlock& block;
  int rows, columns;
  int start, used;
  Vector* half;   // WF₂, [column][row], and later products
  Vector* g;      // F₁ᵀWF₂, [row][column]
  Vector* slope;  // F₁ᵀW'F₂
  Vector* s;      // 1 - GGᵀ, then its LDLᵀ factors

  Vector load(const double* values) const {
    Vector v{};
    if (used == lanes)
      std::memcpy(&v, values + start, sizeof v);
    else
      for (int l = 0; l < used; ++l) v[l] = values[start + l];
    return v;
  }
  void add(double* sums, Vector v) const {
    for (int l = 0; l < used; ++l) sums[start + l] += block.weight * v[l];
  }

  /// half[k][·] = Σ_{j<=k} W[·][j] U[j][k] for the columns of one triangle.
  void times_triangle(const double* w, const double* upper, int first, int size) {
    for (int k = 0; k < size; ++k) {
      const double* column = upper + long(k) * (k + 1) / 2 * block.second.stride;
      for (int i = 0; i < rows; i += pass) {
        const int count = rows - i < pass ? rows - i : pass;
        Vector sum[pass] = {};
        const double* at = w + long(i) * columns + first;
        for (int j = 0; j <= k; ++j) {
          const Vector u = load(column + long(j) * block.second.stride);
          for (int b = 0; b < count; ++b) sum[b] += u * at[long(b) * columns + j];
        }
        for (int b = 0; b < count; ++b) half[long(first + k) * rows + i + b] = sum[b];
      }
    }
  }

  /// out[r][·] = Σ_{i<=r} U[i][r] half[·][i] for the rows of one triangle.
  void triangle_times(const double* upper, int first, int size, Vector* out) const {
    for (int r = 0; r < size; ++r) {
      const double* column = upper + long(r) * (r + 1) / 2 * block.first.stride;
      for (int k = 0; k < columns; k += pass) {
        const int count = columns - k < pass ? columns - k : pass;
        Vector sum[pass] = {};
        const Vector* at = half + long(k) * rows + first;
        for (int i = 0; i <= r; ++i) {
          const Vector u = load(column + long(i) * block.first.stride);
          for (int b = 0; b < count; ++b) sum[b] += u * at[long(b) * rows + i];
        }
        for (int b = 0; b < count; ++b) out[long(first + r) * columns + k + b] = sum[b];
      }
    }
  }

  void product(const double* w, Vector* out) {
    int at = 0;
    for (int t = 0; t < block.second.triangles; at += block.second.size[t++])
      times_triangle(w, block.second.upper[t], at, block.second.size[t]);
    for (int k = 0; k < block.second.diagonals; ++k, ++at) {
      const Vector d = load(block.second.diagonal[k]);
      for (int i = 0; i < rows; ++i) half[long(at) * rows + i] = d * w[long(i) * columns + at];
    }
    at = 0;
    for (int t = 0; t < block.first.triangles; at += block.first.size[t++])
      triangle_times(block.first.upper[t], at, block.first.size[t], out);
    for (int k = 0; k < block.first.diagonals; ++k, ++at) {
      const Vector d = load(block.first.diagonal[k]);
      for (int i = 0; i < columns; ++i) out[long(at) * columns + i] = d * half[long(i) * rows + at];
    }
  }

  Vector contract(const Vector* a, const Vector* b) const {
    Vector sum{};
    for (long i = 0; i < long(rows) * columns; ++i) sum += a[i] * b[i];
    return sum;
  }

  /// S = 1 - GGᵀ, lower triangle; returns Tr (GGᵀ)².
  Vector form_matrix() {
    Vector square{};
    const auto put = [&](int i, int j, Vector v) {
      s[i * rows + j] = i == j ? 1.0 - v : -v;
      square += (i == j ? 1.0 : 2.0) * v * v;
    };
    for (int i = 0; i < rows; i += 2) {
      const Vector* g0 = g + long(i) * columns;
      const Vector* g1 = i + 1 < rows ? g0 + columns : g0;
      for (int j = 0; j <= i; j += 2) {
        const Vector* h0 = g + long(j) * columns;
        const Vector* h1 = j + 1 < rows ? h0 + columns : h0;
        Vector a00{}, a01{}, a10{}, a11{};
        for (int k = 0; k < columns; ++k) {
          a00 += g0[k] * h0[k];
          a01 += g0[k] * h1[k];
          a10 += g1[k] * h0[k];
          a11 += g1[k] * h1[k];
        }
        put(i, j, a00);
        if (j + 1 < i) put(i, j + 1, a01);
        if (i + 1 < rows) {
          put(i + 1, j, a10);
          if (j + 1 < rows) put(i + 1, j + 1, a11);
        }
      }
    }
    return square;
  }

  /// LDLᵀ in place (unit L below the diagonal, D on it); returns ∏ d_i, or a number that is not
  /// positive when one of them is not.
  Vector factor() {
    Vector result = Vector{} + 1.0;
    for (int j = 0; j < rows; ++j) {
      const Vector pivot = s[j * rows + j];
      for (int l = 0; l < lanes; ++l) result[l] = pivot[l] > 0 ? result[l] * pivot[l] : -1.0;
      const Vector inverse = 1.0 / pivot;
      for (int i = j + 1; i < rows; ++i) {
        const Vector share = s[i * rows + j] * inverse;
        for (int k = j + 1; k <= i; ++k) s[i * rows + k] -= share * s[k * rows + j];
      }
      for (int i = j + 1; i < rows; ++i) s[i * rows + j] *= inverse;
    }
    return result;
  }

  void solve_lower(Vector* x) const {
    for (int i = 1; i < rows; ++i)
      for (int j = 0; j < i; ++j) {
        const Vector l = s[i * rows + j];
        for (int k = 0; k < columns; ++k) x[long(i) * columns + k] -= l * x[long(j) * columns + k];
      }
  }

  /// d ln det = -2 Tr[S⁻¹ G'Gᵀ], from the factors.
  Vector log_det_slope() {
    solve_lower(g);
    solve_lower(slope);
    Vector sum{};
    for (int i = 0; i < rows; ++i) {
      Vector row{};
      for (int k = 0; k < columns; ++k)
        row += g[long(i) * columns + k] * slope[long(i) * columns + k];
      sum += row / s[i * rows + i];
    }
    return -2.0 * sum;
  }

  bool run() {
    product(block.coupling, g);
    const Vector tr = contract(g, g);
    add(block.trace, -tr);
    Vector tr_slope{};
    if (block.coupling_slope) {
      product(block.coupling_slope, slope);
      tr_slope = 2.0 * contract(g, slope);
      add(block.trace_slope, -tr_slope);
    }
    double largest = 0.0;
    for (int l = 0; l < used; ++l) largest = std::fmax(largest, tr[l]);
    if (largest < first_trace) {
      add(block.log_det, -tr);
      if (block.coupling_slope) add(block.log_det_slope, -tr_slope);
      return true;
    }
    const Vector square = form_matrix();
    const Vector determinant = factor();
    Vector value;
    bool positive = true;
    for (int l = 0; l < lanes; ++l) {
      if (l < used && !(determinant[l] > 0)) positive = false;
      value[l] =
          tr[l] < series_trace ? -tr[l] - 0.5 * square[l] : std::log(std::fabs(determinant[l]));
    }
    add(block.log_det, value);
    if (block.coupling_slope) add(block.log_det_slope, log_det_slope());
    return positive;
  }
};

bool add(const RowBlock& block) {
  const int rows = block.first.entries(), columns = block.second.entries();
  const long area = long(rows) * columns;
  Vector* const memory = reinterpret_cast<Vector*>(block.scratch);
  bool positive = true;
  for (int start = 0; start < block.frequencies; start += lanes) {
    const int left = block.frequencies - start;
    Group group{block,
                rows,
                columns,
                start,
                left < lanes ? left : lanes,
                memory,
                memory + area,
                memory + 2 * area,
                memory + 3 * area};
    positive = group.run() && positive;
  }
  return positive;
}

}  // namespace

extern const RowKernel row_kernel;
const RowKernel row_kernel{add};

}  // namespace gapwright::GAPWRIGHT_KERNEL
