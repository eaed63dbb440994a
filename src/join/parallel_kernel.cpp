// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "parallel_kernel.hpp"

#include <cmath>

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

/// The frequencies of one group of lanes.
struct Group {
  const MultipoleBlock& block;
  int start, used;
  Vector* g;       // √|T₁|·c, [rows][columns]
  Vector* h;       // g·T₂, later L⁻¹g
  Vector* slope;   // √|T₁|·c'
  Vector* s;       // σ₁ - g T₂ gᵀ, then its LDLᵀ factors
  Vector* root;    // √|T₁|
  Vector* sign;    // of T₁
  Vector* second;  // T₂

  Vector load(const double* values) const {
    Vector v{};
    for (int l = 0; l < used; ++l) v[l] = values[start + l];
    return v;
  }
  void add(double* sums, Vector v) const {
    for (int l = 0; l < used; ++l) sums[start + l] += block.weight * v[l];
  }

  void scale_coupling() {
    const int rows = block.rows, columns = block.columns;
    for (int i = 0; i < rows; ++i) {
      const Vector t = load(block.first[i]);
      for (int l = 0; l < lanes; ++l) {
        root[i][l] = std::sqrt(std::fabs(t[l]));
        sign[i][l] = t[l] < 0 ? -1.0 : 1.0;
      }
    }
    for (int k = 0; k < columns; ++k) second[k] = load(block.second[k]);
    for (int i = 0; i < rows; ++i)
      for (int k = 0; k < columns; ++k) {
        g[i * columns + k] = root[i] * block.coupling[i * columns + k];
        h[i * columns + k] = g[i * columns + k] * second[k];
        if (block.coupling_slope)
          slope[i * columns + k] = root[i] * block.coupling_slope[i * columns + k];
      }
  }

  Vector trace() const {
    Vector sum{};
    for (int i = 0; i < block.rows; ++i) {
      Vector row{};
      for (int k = 0; k < block.columns; ++k)
        row += g[i * block.columns + k] * h[i * block.columns + k];
      sum += sign[i] * row;
    }
    return sum;
  }

  Vector trace_slope() const {
    Vector sum{};
    for (int i = 0; i < block.rows; ++i) {
      Vector row{};
      for (int k = 0; k < block.columns; ++k)
        row += slope[i * block.columns + k] * h[i * block.columns + k];
      sum += 2.0 * sign[i] * row;
    }
    return sum;
  }

  /// S = σ₁ - g T₂ gᵀ, lower triangle; returns Tr (1 - σ₁S)².
  Vector form_matrix() {
    const int rows = block.rows, columns = block.columns;
    const auto put = [&](int i, int j, Vector v) { s[i * rows + j] = i == j ? sign[i] - v : -v; };
    Vector square{};
    for (int i = 0; i < rows; i += 2) {
      const Vector* g0 = g + i * columns;
      const Vector* g1 = i + 1 < rows ? g0 + columns : g0;
      for (int j = 0; j <= i; j += 2) {
        const Vector* h0 = h + j * columns;
        const Vector* h1 = j + 1 < rows ? h0 + columns : h0;
        Vector a00{}, a01{}, a10{}, a11{};
        for (int k = 0; k < columns; ++k) {
          a00 += g0[k] * h0[k];
          a01 += g0[k] * h1[k];
          a10 += g1[k] * h0[k];
          a11 += g1[k] * h1[k];
        }
        put(i, j, a00);
        square += (i == j ? 1.0 : 2.0) * sign[i] * sign[j] * a00 * a00;
        if (j + 1 < i) {
          put(i, j + 1, a01);
          square += 2.0 * sign[i] * sign[j + 1] * a01 * a01;
        }
        if (i + 1 < rows) {
          put(i + 1, j, a10);
          square += 2.0 * sign[i + 1] * sign[j] * a10 * a10;
          if (j + 1 <= i + 1 && j + 1 < rows) {
            put(i + 1, j + 1, a11);
            square += (j == i ? 1.0 : 2.0) * sign[i + 1] * sign[j + 1] * a11 * a11;
          }
        }
      }
    }
    return square;
  }

  /// LDLᵀ in place (unit L below the diagonal, D on it); returns ∏ σ_i d_i.
  Vector factor() {
    const int rows = block.rows;
    Vector product = Vector{} + 1.0;
    for (int j = 0; j < rows; ++j) {
      const Vector pivot = s[j * rows + j];
      product *= sign[j] * pivot;
      const Vector inverse = 1.0 / pivot;
      for (int i = j + 1; i < rows; ++i) {
        const Vector factor_ij = s[i * rows + j] * inverse;
        for (int k = j + 1; k <= i; ++k) s[i * rows + k] -= factor_ij * s[k * rows + j];
      }
      for (int i = j + 1; i < rows; ++i) s[i * rows + j] *= inverse;
    }
    return product;
  }

  void solve_lower(Vector* x) const {
    const int rows = block.rows, columns = block.columns;
    for (int i = 1; i < rows; ++i)
      for (int j = 0; j < i; ++j) {
        const Vector l = s[i * rows + j];
        for (int k = 0; k < columns; ++k) x[i * columns + k] -= l * x[j * columns + k];
      }
  }

  /// d ln det = -2 Tr[S⁻¹ g' T₂ gᵀ], from the factors.
  Vector log_det_slope() {
    const int rows = block.rows, columns = block.columns;
    solve_lower(g);
    solve_lower(slope);
    Vector sum{};
    for (int i = 0; i < rows; ++i) {
      Vector row{};
      for (int k = 0; k < columns; ++k)
        row += g[i * columns + k] * slope[i * columns + k] * second[k];
      sum += row / s[i * rows + i];
    }
    return -2.0 * sum;
  }

  bool run() {
    scale_coupling();
    const Vector tr = trace();
    add(block.trace, -tr);
    Vector tr_slope{};
    if (block.coupling_slope) {
      tr_slope = trace_slope();
      add(block.trace_slope, -tr_slope);
    }
    double largest = 0.0;
    for (int l = 0; l < used; ++l) largest = std::fmax(largest, std::fabs(tr[l]));
    if (largest < first_trace) {
      add(block.log_det, -tr);
      if (block.coupling_slope) add(block.log_det_slope, -tr_slope);
      return true;
    }
    const Vector square = form_matrix();
    const Vector product = factor();
    Vector value;
    bool positive = true;
    for (int l = 0; l < lanes; ++l) {
      if (l < used && !(product[l] > 0)) positive = false;
      value[l] = std::fabs(tr[l]) < series_trace ? -tr[l] - 0.5 * square[l] : std::log(product[l]);
    }
    add(block.log_det, value);
    if (block.coupling_slope) add(block.log_det_slope, log_det_slope());
    return positive;
  }
};

bool add(const MultipoleBlock& block) {
  Vector* at = reinterpret_cast<Vector*>(block.scratch);
  const auto take = [&](int count) {
    Vector* result = at;
    at += count;
    return result;
  };
  const int area = block.rows * block.columns;
  Vector* const g = take(area);
  Vector* const h = take(area);
  Vector* const slope = take(area);
  Vector* const s = take(block.rows * block.rows);
  Vector* const root = take(block.rows);
  Vector* const sign = take(block.rows);
  Vector* const second = take(block.columns);
  bool positive = true;
  for (int start = 0; start < block.frequencies; start += lanes) {
    const int left = block.frequencies - start;
    Group group{block, start, left < lanes ? left : lanes, g, h, slope, s, root, sign, second};
    positive = group.run() && positive;
  }
  return positive;
}

}  // namespace

extern const ParallelKernel parallel_kernel;
const ParallelKernel parallel_kernel{add};

}  // namespace gapwright::GAPWRIGHT_KERNEL
