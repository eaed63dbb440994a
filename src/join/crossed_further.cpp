#include "crossed_further.hpp"

#include "crossed_grid.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/math/parallel.hpp>

#include <algorithm>
#include <array>
#include <cmath>

namespace gapwright {
namespace {

/// Step of the grid in steps of the lattice and per radian: the two axes tell waves apart only by
/// their angle, near 90° by less than the waves themselves vary. A round wall smears a wave it
/// reflects by about 1/√(kR): wide bodies need more. Further round trips are a fiftieth of the
/// energy, so that the grid may be coarser than the lattice.
constexpr double step_per_radian = 0.9, widest_step = 1.0, narrow_body = 2.2;
/// Lowest wave number in lowest ones of the window: the rest is continued as a constant.
constexpr double lowest_factor = 10.0;
/// Of the coupling, rows below this share of what the mirrors neglect are left out; their part of a
/// determinant without its trace is of second order.
constexpr double least_share = 0.1;
/// What the limit of static sums is off by, as a share of the part it adds.
constexpr double limit_precision = 1.0;

/// ln det + trace at one frequency, and its derivative by the distance.
struct Further {
  double energy = 0.0, slope = 0.0;
  bool positive = true;
};

/// C = left·rightᵀ with orthonormal columns of right; what is left of each row squares to less than
/// `neglected`.
struct LowRank {
  Eigen::MatrixXd left, right;
};

LowRank low_rank(const Eigen::MatrixXd& c, double neglected) {
  Eigen::VectorXd remaining = c.rowwise().squaredNorm();
  const Eigen::Index most = std::min(c.rows(), c.cols());
  LowRank low{Eigen::MatrixXd(c.rows(), most), Eigen::MatrixXd(c.cols(), most)};
  Eigen::Index rank = 0;
  for (; rank < most; ++rank) {
    Eigen::Index pivot = 0;
    if (!(remaining.maxCoeff(&pivot) > neglected)) break;
    const auto known = low.right.leftCols(rank);
    Eigen::VectorXd next = c.row(pivot).transpose();
    next -= known * low.left.row(pivot).head(rank).transpose();
    next -= known * (known.transpose() * next);
    low.right.col(rank) = next.normalized();
    low.left.col(rank).noalias() = c * low.right.col(rank);
    remaining -= low.left.col(rank).cwiseAbs2();
  }
  return {low.left.leftCols(rank), low.right.leftCols(rank)};
}

class GridDeterminant {
 public:
  GridDeterminant(const Crossing& row, const WaveTable& a, const WaveTable& b,
                  const CrossedGrid& grid)
      : grid_(grid),
        neglected_(row.first.nodes().tolerance),
        first_(a, row.first.nodes().q.step, grid, row.depth_1()),
        second_(b, row.first.nodes().q.step, grid, row.depth_2()) {}

  Further at(int x, bool with_slope) const {
    const Factors a = factors(first_, x), b = factors(second_, x);
    Further sum;
    // q₁, q₂ → -q₁, -q₂ leaves all as it is: even and odd halves.
    for (const double parity : {1.0, -1.0}) add(a, b, parity, with_slope, sum);
    return sum;
  }

 private:
  struct Factors {
    std::vector<GridMirror::Factor> nodes;
    std::vector<Eigen::Index> offsets;
    Eigen::VectorXd sign;
    Eigen::Index size() const { return offsets.back(); }
  };

  Factors factors(const GridMirror& mirror, int x) const {
    Factors all;
    all.offsets.push_back(0);
    for (int i = 0; i < grid_.count(); ++i) {
      all.nodes.push_back(mirror.factor(i, x, neglected_));
      all.offsets.push_back(all.offsets.back() + all.nodes.back().sign.size());
    }
    all.sign.resize(all.size());
    for (std::size_t i = 0; i < all.nodes.size(); ++i)
      all.sign.segment(all.offsets[i], all.nodes[i].sign.size()) = all.nodes[i].sign;
    return all;
  }

  /// C of (q₁, a), (q₂, b): the two meet in one plane wave only, of each sign of q₂.
  void couple(const Factors& a, const Factors& b, double parity, Eigen::MatrixXd& c,
              Eigen::MatrixXd* slope) const {
    const int n = grid_.count();
    for (int j = 0; j < n; ++j)
      for (int i = 0; i < n; ++i) {
        const auto &rows_a = a.nodes[std::size_t(i)].rows, &rows_b = b.nodes[std::size_t(j)].rows;
        if (rows_a.cols() == 0 || rows_b.cols() == 0) continue;
        const auto same = rows_a.row(j).transpose() * rows_b.row(i);
        const auto opposite = parity * rows_a.row(n + j).transpose() * rows_b.row(n + i);
        const auto place = [&](Eigen::MatrixXd& m) {
          return m.block(a.offsets[std::size_t(i)], b.offsets[std::size_t(j)], rows_a.cols(),
                         rows_b.cols());
        };
        place(c) = same + opposite;
        if (slope)
          place(*slope) = -grid_.wave(i, j, 1.0) * same - grid_.wave(i, j, -1.0) * opposite;
      }
  }

  void add(const Factors& a, const Factors& b, double parity, bool with_slope, Further& sum) const {
    Eigen::MatrixXd c(a.size(), b.size()), c_slope;
    if (with_slope) c_slope.resize(a.size(), b.size());
    if (c.size() == 0) return;
    couple(a, b, parity, c, with_slope ? &c_slope : nullptr);
    const LowRank low = low_rank(c, least_share * neglected_);
    // X = S₁CS₂Cᵀ has the eigenvalues of inner·outer.
    const Eigen::MatrixXd signed_left = a.sign.asDiagonal() * low.left;
    const Eigen::MatrixXd inner = low.left.transpose() * signed_left;
    const Eigen::MatrixXd outer = low.right.transpose() * b.sign.asDiagonal() * low.right;
    const Eigen::MatrixXd product = inner * outer;
    const Eigen::PartialPivLU<Eigen::MatrixXd> lu(
        Eigen::MatrixXd::Identity(product.rows(), product.cols()) - product);
    sum.energy += lu.matrixLU().diagonal().array().abs().log().sum() + product.trace();
    sum.positive = sum.positive && lu.determinant() > 0;
    if (!with_slope || !sum.positive) return;
    // d[ln det(1 - X) + Tr X] = -Tr[(1 - X)⁻¹X dX], dX = S₁(C′S₂Cᵀ + CS₂C′ᵀ).
    const Eigen::MatrixXd moved = signed_left.transpose() * c_slope * b.sign.asDiagonal();
    const Eigen::MatrixXd still = signed_left.transpose() * c;
    const Eigen::MatrixXd change = moved * still.transpose();
    sum.slope -= 2 * (outer * lu.solve(change)).trace();
  }

  const CrossedGrid& grid_;
  double neglected_;
  GridMirror first_, second_;
};

/// Static waves at T > 0: each metallic mirror answers as 1/L, L = ln 1/q, and further round trips,
/// four mirrors at least, gather down to the longest waves as L^-4 in L. The limit of sums down to
/// `lowest`, a tenth and a hundredth of it by that law, and the part it adds.
struct StaticLimit {
  double value = 0.0, tail = 0.0;
};
StaticLimit static_limit(const std::array<double, 3>& sums) {
  const double before = sums[1] - sums[0], last = sums[2] - sums[1];
  const double ratio = before != 0 ? last / before : 0.0;
  if (!(ratio > 0 && ratio < 1)) return {sums[2], std::fabs(last)};
  // Increments A/(n + c)^4 over decades n: the rest of them by the integral from the next middle.
  const double root = std::pow(ratio, 0.25), c = root / (1 - root);
  const double tail = last * std::pow(c + 1, 4) / (3 * std::pow(c + 1.5, 3));
  return {sums[2] + tail, std::fabs(tail)};
}

/// Replaces the static frequency of further round trips by the limit of long waves.
void follow_static_waves(const Crossing& row, double step, double highest, double angle,
                         bool with_slope, CrossedFurther& further) {
  const Nodes& nodes = row.first.nodes();
  std::array<double, 3> energy{}, slope{};
  for (std::size_t i = 0; i < energy.size(); ++i) {
    const double lowest = nodes.q.node(row.window.q.first) * 1.5 * std::pow(10.0, 2.0 - double(i));
    const CrossedGrid grid(step, lowest, highest, angle);
    const int lowest_index = nodes.q.index_below(grid.node(0));
    const WaveTable a(row.first, row.window, lowest_index), b(row.second, row.window, lowest_index);
    const Further sum = GridDeterminant(row, a, b, grid).at(0, with_slope);
    energy[i] = sum.energy;
    slope[i] = sum.slope;
    further.positive = further.positive && sum.positive;
  }
  const auto replace = [](FrequencyDensity& density, const StaticLimit& limit) {
    density.halved[0] += limit.value - density.full[0];
    density.full[0] = limit.value;
  };
  const StaticLimit limit = static_limit(energy);
  replace(further.energy, limit);
  further.static_error = limit_precision * limit.tail;
  if (!with_slope) return;
  const StaticLimit slope_limit = static_limit(slope);
  replace(further.slope, slope_limit);
  further.static_slope_error = limit_precision * slope_limit.tail;
}

/// Fills values and slopes of every frequency.
bool fill(const Crossing& row, const WaveTable& a, const WaveTable& b, const CrossedGrid& grid,
          bool with_slope, std::vector<double>& energy, std::vector<double>& slope) {
  const GridDeterminant determinant(row, a, b, grid);
  const int frequencies = a.frequencies();
  energy.assign(std::size_t(frequencies), 0.0);
  if (with_slope) slope.assign(std::size_t(frequencies), 0.0);
  std::vector<char> positive(std::size_t(frequencies), 1);
#pragma omp parallel for num_threads(inner_threads()) schedule(dynamic, 1)
  for (int x = 0; x < frequencies; ++x) {
    const Further further = determinant.at(x, with_slope);
    energy[std::size_t(x)] = further.energy;
    if (with_slope) slope[std::size_t(x)] = further.slope;
    positive[std::size_t(x)] = further.positive;
  }
  return std::all_of(positive.begin(), positive.end(), [](char p) { return p != 0; });
}

}  // namespace

CrossedFurther further_on_grid(const Crossing& row, bool with_slope) {
  const Nodes& nodes = row.first.nodes();
  const double angle = row.angle_deg * constants::pi / 180;
  const double step = make_nodes(nodes.tolerance).q.step *
                      std::min(step_per_radian * angle, widest_step) *
                      std::sqrt(std::min(1.0, narrow_body * row.gap() / row.wider_radius()));
  const double lowest =
      lowest_factor * (nodes.warm()
                           ? lowest_charge_wave(row.gap(), row.distance_nm, nodes.tolerance)
                           : nodes.q.node(row.window.q.first));
  const double highest = largest_exponent(nodes.tolerance) / (4 * row.gap());
  const CrossedGrid grid(step, lowest, highest, angle), coarse(2 * step, lowest, highest, angle);
  const int lowest_index = nodes.q.index_below(coarse.node(0));
  const WaveTable a(row.first, row.window, lowest_index), b(row.second, row.window, lowest_index);
  CrossedFurther further;
  further.slope.derivatives = 1;
  further.positive =
      fill(row, a, b, grid, with_slope, further.energy.full, further.slope.full) &&
      fill(row, a, b, coarse, with_slope, further.energy.halved, further.slope.halved);
  if (nodes.warm()) follow_static_waves(row, step, highest, angle, with_slope, further);
  return further;
}

}  // namespace gapwright
