// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "multipole_group.hpp"

#include <cmath>

namespace gapwright::GAPWRIGHT_KERNEL {
namespace {

/// Below this trace -tr - tr₂/2 is ln det to a relative 3e-9.
constexpr double series_trace = 1e-4;

/// Products are formed in square tiles of this side: nine sums live in registers.
constexpr int side = 3;
constexpr int padded(int n) {
  return (n + side - 1) / side * side;
}

struct Tile {
  Vector at[side][side];

  void clear() {
    for (auto& row : at)
      for (Vector& v : row) v = Vector{};
  }
  /// at[a][b] += or -= Σ_p x[a·x_row + p] y[b·y_row + p·y_step]
  template <bool plus>
  void add_products(const Vector* x, int x_row, const Vector* y, int y_row, int y_step, int count) {
    Vector sum[side][side];
    for (int a = 0; a < side; ++a)
      for (int b = 0; b < side; ++b) sum[a][b] = at[a][b];
    for (int p = 0; p < count; ++p) {
      const Vector y0 = y[p * y_step], y1 = y[y_row + p * y_step], y2 = y[2 * y_row + p * y_step];
      for (int a = 0; a < side; ++a) {
        const Vector factor = x[a * x_row + p];
        sum[a][0] = plus ? sum[a][0] + factor * y0 : sum[a][0] - factor * y0;
        sum[a][1] = plus ? sum[a][1] + factor * y1 : sum[a][1] - factor * y1;
        sum[a][2] = plus ? sum[a][2] + factor * y2 : sum[a][2] - factor * y2;
      }
    }
    for (int a = 0; a < side; ++a)
      for (int b = 0; b < side; ++b) at[a][b] = sum[a][b];
  }
};

/// ln det[σ₁ - g T₂ gᵀ] with g = √|T₁| c, padded with empty rows and columns to whole tiles.
struct Determinant {
  explicit Determinant(const MultipoleBlock& wanted)
      : block(wanted), rows(padded(wanted.rows)), columns(padded(wanted.columns)) {
    Vector* at = reinterpret_cast<Vector*>(block.scratch);
    const auto take = [&](int count) {
      Vector* result = at;
      at += count;
      return result;
    };
    g = take(rows * columns);
    h = take(rows * columns);
    l = take(rows * rows);
    u = take(rows * rows);
    root = take(rows);
    sign = take(rows);
    inverse = take(rows);
    second = take(columns);
    y = take(side * rows);
    z = take(side * rows);
  }

  const MultipoleBlock& block;
  int rows, columns;
  Vector* g;  // [rows][columns]
  Vector* h;  // g·T₂
  Vector* l;  // L, unit lower triangle
  Vector* u;  // L·D, with D on the diagonal
  Vector *root, *sign, *inverse;
  Vector* second;
  Vector *y, *z;  // a strip of columns of L⁻¹g and L⁻¹g'

  void scale(const Group& group) {
    for (int i = 0; i < rows; ++i) {
      root[i] = Vector{};
      sign[i] = Vector{} + 1.0;
      if (i >= block.rows) continue;
      const Vector t = group.load(block.first[i]);
      for (int lane = 0; lane < lanes; ++lane) {
        root[i][lane] = std::sqrt(std::fabs(t[lane]));
        sign[i][lane] = t[lane] < 0 ? -1.0 : 1.0;
      }
    }
    for (int k = 0; k < columns; ++k)
      second[k] = k < block.columns ? group.load(block.second[k]) : Vector{};
    for (int i = 0; i < rows; ++i)
      for (int k = 0; k < columns; ++k) {
        const bool inside = i < block.rows && k < block.columns;
        g[i * columns + k] = inside ? root[i] * block.coupling[i * block.stride + k] : Vector{};
        h[i * columns + k] = g[i * columns + k] * second[k];
      }
  }

  /// LDLᵀ tile by tile, each formed when it is needed.
  void factor(Vector& product, Vector& trace, Vector& square) {
    product = Vector{} + 1.0;
    trace = square = Vector{};
    Tile tile;
    for (int i = 0; i < rows; i += side)
      for (int j = 0; j <= i; j += side) {
        tile.clear();
        tile.add_products<true>(g + i * columns, columns, h + j * columns, columns, 1, columns);
        for (int a = 0; a < side; ++a)
          for (int b = 0; b < side; ++b) {
            Vector& v = tile.at[a][b];
            square += (i == j ? 1.0 : 2.0) * sign[i + a] * sign[j + b] * v * v;
            if (i == j && a == b) trace += sign[i + a] * v;
            v = i == j && a == b ? sign[i + a] - v : -v;
          }
        tile.add_products<false>(l + i * rows, rows, u + j * rows, rows, 1, j);
        if (i == j)
          finish_diagonal(tile, i, product);
        else
          finish_below(tile, i, j);
      }
  }

  void finish_diagonal(Tile& tile, int i, Vector& product) {
    for (int b = 0; b < side; ++b) {
      for (int a = b; a < side; ++a) {
        Vector v = tile.at[a][b];
        for (int p = 0; p < b; ++p) v -= l[(i + a) * rows + i + p] * u[(i + b) * rows + i + p];
        u[(i + a) * rows + i + b] = v;
        if (a == b) {
          product *= sign[i + a] * v;
          inverse[i + a] = 1.0 / v;
        } else {
          l[(i + a) * rows + i + b] = v * inverse[i + b];
        }
      }
    }
  }

  void finish_below(Tile& tile, int i, int j) {
    for (int a = 0; a < side; ++a)
      for (int b = 0; b < side; ++b) {
        Vector v = tile.at[a][b];
        for (int p = 0; p < b; ++p) v -= l[(i + a) * rows + j + p] * u[(j + b) * rows + j + p];
        u[(i + a) * rows + j + b] = v;
        l[(i + a) * rows + j + b] = v * inverse[j + b];
      }
  }

  /// A strip x becomes L⁻¹x.
  void solve(Vector* x) const {
    Tile tile;
    for (int i = 0; i < rows; i += side) {
      for (int a = 0; a < side; ++a)
        for (int b = 0; b < side; ++b) tile.at[a][b] = x[(i + a) * side + b];
      tile.add_products<false>(l + i * rows, rows, x, 1, side, i);
      for (int a = 0; a < side; ++a)
        for (int b = 0; b < side; ++b) {
          Vector v = tile.at[a][b];
          for (int p = 0; p < a; ++p) v -= l[(i + a) * rows + i + p] * x[(i + p) * side + b];
          x[(i + a) * side + b] = v;
        }
    }
  }

  /// d ln det = -2 Tr[S⁻¹ g' T₂ gᵀ], and what of it is not of the first round trip.
  Vector further_slope() {
    Vector sum{};
    for (int k = 0; k < columns; k += side) {
      Vector first{};
      for (int i = 0; i < rows; ++i)
        for (int b = 0; b < side; ++b) {
          const bool inside = i < block.rows && k + b < block.columns;
          y[i * side + b] = g[i * columns + k + b];
          z[i * side + b] =
              inside ? root[i] * block.coupling_slope[i * block.stride + k + b] : Vector{};
          first += sign[i] * y[i * side + b] * z[i * side + b] * second[k + b];
        }
      solve(y);
      solve(z);
      Vector all{};
      for (int i = 0; i < rows; ++i) {
        Vector row{};
        for (int b = 0; b < side; ++b) row += y[i * side + b] * z[i * side + b] * second[k + b];
        all += row * inverse[i];
      }
      sum += first - all;
    }
    return 2.0 * sum;
  }
};

bool further_trips(const MultipoleBlock& block) {
  Determinant determinant(block);
  return each_group(block, [&](const Group& group) {
    determinant.scale(group);
    Vector product, trace, square;
    determinant.factor(product, trace, square);
    bool positive = true;
    Vector value;
    for (int lane = 0; lane < lanes; ++lane) {
      if (lane < group.used && !(product[lane] > 0)) positive = false;
      value[lane] = std::fabs(trace[lane]) < series_trace ? -0.5 * square[lane]
                                                          : std::log(product[lane]) + trace[lane];
    }
    group.add(block.further, value);
    if (block.coupling_slope) group.add(block.further_slope, determinant.further_slope());
    return positive;
  });
}

}  // namespace

extern const ParallelKernel parallel_kernel;
const ParallelKernel parallel_kernel{first_trip, further_trips};

}  // namespace gapwright::GAPWRIGHT_KERNEL
