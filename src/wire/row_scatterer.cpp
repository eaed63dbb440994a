#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/bessel_integral.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/wire/row_scatterer.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <Eigen/Dense>
#include <fmt/format.h>

namespace gapwright {

RowScatterer::RowScatterer(std::vector<RibbonRow> rows, Nodes nodes, Window window)
    : rows_(std::move(rows)), nodes_(nodes), window_(std::move(window)) {
  factors_.assign(start(window_.q.count, Mirror::even), 0.0);
  dipole_.assign(std::size_t(window_.xi.count), 0.0);
}

std::size_t RowScatterer::length(Mirror half) const {
  const std::size_t n = std::size_t(half_size(half));
  return n * (n + 1) / 2 * std::size_t(window_.xi.count);
}

std::size_t RowScatterer::start(int j, Mirror half) const {
  const std::size_t even = length(Mirror::even);
  return std::size_t(j) * (even + length(Mirror::odd)) + (half == Mirror::odd ? even : 0);
}

std::span<double> RowScatterer::factor(int j, Mirror half) {
  return {factors_.data() + start(j, half), length(half)};
}

std::span<const double> RowScatterer::factor(int j, Mirror half) const {
  return {factors_.data() + start(j, half), length(half)};
}

std::size_t RowScatterer::bytes() const {
  return sizeof(double) * (factors_.size() + dipole_.size()) + sizeof(RibbonRow) * rows_.size() +
         sizeof(RowScatterer);
}

std::vector<double> row_coulomb_eV_nm(const std::vector<RibbonRow>& rows, double q_per_nm) {
  const std::size_t n = rows.size();
  std::vector<double> mean(n * n), coulomb(n * n);
  for (std::size_t j = 0; j < n; ++j)
    for (std::size_t i = 0; i < n; ++i)
      mean[j * n + i] = mean_k0(q_per_nm, rows[i].strip_low_nm - rows[j].y_nm,
                                rows[i].strip_high_nm - rows[j].y_nm);
  for (std::size_t j = 0; j < n; ++j)
    for (std::size_t i = 0; i < n; ++i)
      coulomb[j * n + i] = constants::coulomb_eV_nm * (mean[j * n + i] + mean[i * n + j]);
  return coulomb;
}

std::vector<double> row_background_per_nm(const std::vector<RibbonRow>& rows, double q_per_nm) {
  const std::size_t n = rows.size();
  std::vector<double> matrix(n * n, 0.0);
  const std::vector<double> conductance = row_conductances_per_nm(rows);
  for (std::size_t j = 0; j < n; ++j) {
    const double width = rows[j].strip_high_nm - rows[j].strip_low_nm;
    matrix[j * n + j] += q_per_nm * q_per_nm * width;
    if (j + 1 == n) break;
    matrix[j * n + j] += conductance[j];
    matrix[(j + 1) * n + j + 1] += conductance[j];
    matrix[j * n + j + 1] -= conductance[j];
    matrix[(j + 1) * n + j] -= conductance[j];
  }
  return matrix;
}

namespace {

using Matrix = Eigen::MatrixXd;

/// A matrix between rows in one half of the mirror.
Matrix half_of(const double* matrix, std::size_t stride, int rows, Mirror half) {
  const int size = half == Mirror::even ? (rows + 1) / 2 : rows / 2;
  const double sign = half == Mirror::even ? 1.0 : -1.0;
  const auto at = [&](int j, int i) { return matrix[std::size_t(j * rows + i) * stride]; };
  Matrix reduced(size, size);
  for (int j = 0; j < size; ++j)
    for (int i = 0; i < size; ++i) {
      const int other_j = rows - 1 - j, other_i = rows - 1 - i;
      // The mean over the mirror image of the whole matrix makes it exactly symmetric.
      const double sum =
          0.5 * (at(j, i) + at(other_j, other_i) + sign * (at(j, other_i) + at(other_j, i)));
      const double middle =
          (other_j == j ? std::sqrt(0.5) : 1.0) * (other_i == i ? std::sqrt(0.5) : 1.0);
      reduced(j, i) = middle * sum;
    }
  return 0.5 * (reduced + reduced.transpose());
}

/// C upper triangular with CCᵀ = matrix, from the last column on; pivots that are not positive are
/// left out.
Matrix upper_factor(Matrix matrix) {
  const Eigen::Index n = matrix.rows();
  Matrix c = Matrix::Zero(n, n);
  for (Eigen::Index k = n - 1; k >= 0; --k) {
    if (!(matrix(k, k) > 0)) continue;
    const double root = std::sqrt(matrix(k, k));
    c(k, k) = root;
    c.col(k).head(k) = matrix.col(k).head(k) / root;
    matrix.topLeftCorner(k, k).triangularView<Eigen::Upper>() -=
        c.col(k).head(k) * c.col(k).head(k).transpose();
  }
  return c;
}

/// U with UUᵀ = C(1 + CᵀVC)^{-1}Cᵀ: C upper and M lower triangular, 1 + CᵀVC = MMᵀ, U = CM^{-T}.
Matrix screened(const Matrix& c, const Matrix& coulomb) {
  const Eigen::Index n = c.rows();
  const Matrix middle = Matrix::Identity(n, n) + c.transpose() * coulomb * c;
  const Eigen::LLT<Matrix> root(middle);
  return root.matrixL().solve(c.transpose()).transpose();
}

/// All nodes of one wave number.
void fill_wave(const std::vector<RibbonRow>& rows, const RowResponseSource& response,
               const Background& background, int j, RowScatterer& scatterer) {
  const Window& window = scatterer.window();
  const int count = int(rows.size());
  const std::size_t frequencies = std::size_t(window.xi.count);
  const double q = scatterer.nodes().q.node(window.q.first + j);
  const std::vector<double> coulomb = row_coulomb_eV_nm(rows, q);
  const std::vector<double> in_plane = row_background_per_nm(rows, q);
  std::vector<double> chi(rows.size() * rows.size() * frequencies);
  response(window.q.first + j, window.xi, chi);
  for (const Mirror half : {Mirror::even, Mirror::odd}) {
    const Matrix v = half_of(coulomb.data(), 1, count, half);
    const Matrix s = half_of(in_plane.data(), 1, count, half);
    const std::span<double> packed = scatterer.factor(j, half);
    for (std::size_t k = 0; k < frequencies; ++k) {
      const double xi = scatterer.nodes().xi.node(window.xi.first + int(k));
      const double share =
          background.in_plane_nm(xi) / (4 * constants::pi * constants::coulomb_eV_nm);
      const Matrix u =
          screened(upper_factor(share * s - half_of(chi.data() + k, frequencies, count, half)), v);
      std::size_t at = k;
      for (Eigen::Index column = 0; column < u.cols(); ++column)
        for (Eigen::Index row = 0; row <= column; ++row, at += frequencies)
          packed[at] = u(row, column);
    }
  }
}

}  // namespace

RowScatterer row_scatterer(const std::vector<RibbonRow>& rows, const RowResponseSource& response,
                           const Background& background, const Nodes& nodes, const Window& window) {
  if (rows.size() < 2)
    throw std::domain_error(
        fmt::format("row_scatterer: {} rows, required: two or more", rows.size()));
  RowScatterer scatterer(rows, nodes, window);
  const double width = rows[0].strip_high_nm - rows[0].strip_low_nm;
  for (int k = 0; k < window.xi.count; ++k) {
    const double normal = background.normal_nm(nodes.xi.node(window.xi.first + k));
    scatterer.dipole()[std::size_t(k)] =
        std::sqrt(normal * width / (4 * constants::pi * constants::coulomb_eV_nm));
  }
#pragma omp parallel for schedule(dynamic) num_threads(inner_threads())
  for (int j = 0; j < window.q.count; ++j) fill_wave(rows, response, background, j, scatterer);
  return scatterer;
}

RowScatterer row_scatterer(const RibbonResponse& response, const Background& background,
                           const Window& window) {
  if (!response.q().contains(window.q) || !response.xi().contains(window.xi))
    throw std::invalid_argument("row_scatterer: the response does not cover the window");
  const auto source = [&](int q_index, IndexRange xi, std::span<double> chi) {
    const std::size_t cells = std::size_t(response.rows()) * std::size_t(response.rows());
    const std::size_t frequencies = std::size_t(xi.count);
    std::vector<double> matrix(cells);
    for (int k = 0; k < xi.count; ++k) {
      response.matrix(q_index - response.q().first, xi.first + k - response.xi().first, matrix);
      for (std::size_t at = 0; at < cells; ++at)
        chi[at * frequencies + std::size_t(k)] = matrix[at];
    }
  };
  return row_scatterer(ribbon_rows(response.ribbon()), source, background, response.nodes(),
                       window);
}

}  // namespace gapwright
