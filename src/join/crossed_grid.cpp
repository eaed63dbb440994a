#include "crossed_grid.hpp"

#include <cmath>

namespace gapwright {

CrossedGrid::CrossedGrid(double step, double lowest, double highest, double angle_rad)
    : lattice_{step}, sine_(std::sin(angle_rad)), cosine_(std::cos(angle_rad)) {
  range_.first = lattice_.index_below(lowest);
  range_.count = lattice_.index_above(highest) - range_.first + 1;
  weights_ = trapezoid_weights(lattice_, range_, {}).full;
}

double CrossedGrid::across(int along, int other, double sign) const {
  return (sign * node(other) - node(along) * cosine_) / sine_;
}

double CrossedGrid::wave(int along, int other, double sign) const {
  return std::hypot(node(along), across(along, other, sign));
}

GridMirror::GridMirror(const WaveTable& table, double lattice_step, const CrossedGrid& grid,
                       double depth)
    : frequencies_(table.frequencies()) {
  std::vector<double> scale;
  for (int i = 0; i < grid.count(); ++i) {
    const double q = grid.node(i);
    Node node;
    const int orders =
        table.multipoles(WavePlace(std::log(q), lattice_step), q, node.reduced, scale);
    node.waves.resize(2 * grid.count(), std::max(0, 2 * orders - 1));
    for (int row = 0; row < 2 * grid.count(); ++row) {
      const int other = row % grid.count();
      const double sign = row < grid.count() ? 1.0 : -1.0;
      const double across = grid.across(i, other, sign), k = grid.wave(i, other, sign);
      const double eta = std::asinh(std::fabs(across) / q);
      const double measure = std::sqrt(grid.weight(other) / (2 * grid.sine() * k));
      for (int m = 0; m < orders; ++m) {
        // Σ_±m τ^m τ′^m = 2 cosh mη cosh mη′ + 2 sinh mη sinh mη′, τ = e^η.
        const double most = measure * std::exp(0.5 * scale[std::size_t(m)] + m * eta - k * depth);
        const double rest = std::exp(-2 * m * eta);
        if (m == 0) {
          node.waves(row, 0) = most;
          continue;
        }
        node.waves(row, 2 * m - 1) = std::sqrt(0.5) * most * (1 + rest);
        node.waves(row, 2 * m) = std::copysign(std::sqrt(0.5) * most * (1 - rest), across);
      }
    }
    nodes_.push_back(std::move(node));
  }
}

namespace {

/// Cholesky factor of V·Vᵀ with the largest pivot first.
Eigen::MatrixXd pivoted_factor(const Eigen::MatrixXd& v, double neglected) {
  Eigen::VectorXd left = v.rowwise().squaredNorm();
  Eigen::MatrixXd factor(v.rows(), std::min(v.rows(), v.cols()));
  Eigen::Index rank = 0;
  while (rank < factor.cols()) {
    Eigen::Index pivot = 0;
    const double largest = left.maxCoeff(&pivot);
    if (!(largest > neglected)) break;
    auto column = factor.col(rank);
    column.noalias() = v * v.row(pivot).transpose();
    column.noalias() -= factor.leftCols(rank) * factor.row(pivot).head(rank).transpose();
    column /= std::sqrt(largest);
    left -= column.cwiseAbs2();
    ++rank;
  }
  return factor.leftCols(rank);
}

}  // namespace

GridMirror::Factor GridMirror::factor(int i, int x, double neglected) const {
  const Node& node = nodes_[std::size_t(i)];
  Factor result;
  result.rows.resize(node.waves.rows(), 0);
  // Multipoles that attract and those that repel (in a liquid) apart.
  for (const double sign : {1.0, -1.0}) {
    Eigen::MatrixXd part(node.waves.rows(), node.waves.cols());
    Eigen::Index columns = 0;
    for (Eigen::Index c = 0; c < node.waves.cols(); ++c) {
      const std::size_t m = std::size_t((c + 1) / 2);
      const double t = sign * node.reduced[m * std::size_t(frequencies_) + std::size_t(x)];
      if (t > 0) part.col(columns++) = std::sqrt(t) * node.waves.col(c);
    }
    if (columns == 0) continue;
    const Eigen::MatrixXd more = pivoted_factor(part.leftCols(columns), neglected);
    const Eigen::Index before = result.rows.cols();
    result.rows.conservativeResize(Eigen::NoChange, before + more.cols());
    result.rows.rightCols(more.cols()) = more;
    result.sign.conservativeResize(before + more.cols());
    result.sign.tail(more.cols()).setConstant(sign);
  }
  return result;
}

}  // namespace gapwright
