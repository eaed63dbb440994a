// The rows of a ribbon as a scatterer, against the plain matrix formulas.
#include "../identity/row_response_reference.hpp"

#include <gapwright/catalog/catalogs.hpp>

#include <boost/math/quadrature/tanh_sinh.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

using Matrix = Eigen::MatrixXd;

Matrix as_matrix(const std::vector<double>& values, int rows) {
  return Eigen::Map<const Matrix>(values.data(), rows, rows).transpose();
}

/// The mirror's vectors as columns, even ones first.
Matrix mirror_vectors(int rows) {
  Matrix vectors = Matrix::Zero(rows, rows);
  for (int i = 0; i < rows / 2; ++i) {
    vectors(i, i) = vectors(rows - 1 - i, i) = std::sqrt(0.5);
    vectors(i, (rows + 1) / 2 + i) = std::sqrt(0.5);
    vectors(rows - 1 - i, (rows + 1) / 2 + i) = -std::sqrt(0.5);
  }
  if (rows % 2) vectors(rows / 2, rows / 2) = 1.0;
  return vectors;
}

}  // namespace

TEST_CASE("Coulomb matrix of strips against quadrature") {
  for (const Ribbon& ribbon :
       {make_ribbon(RibbonEdge::armchair, 5), make_ribbon(RibbonEdge::zigzag, 3)}) {
    const auto rows = ribbon_rows(ribbon);
    const double q = 2.3;
    const auto v = row_coulomb_eV_nm(rows, q);
    static boost::math::quadrature::tanh_sinh<double> rule;
    const auto mean = [&](double y, const RibbonRow& strip) {
      const auto f = [&](double t) { return boost::math::cyl_bessel_k(0, q * std::fabs(t - y)); };
      const double low = strip.strip_low_nm, high = strip.strip_high_nm;
      const double sum = low < y && y < high
                             ? rule.integrate(f, low, y) + rule.integrate(f, y, high)
                             : rule.integrate(f, low, high);
      return sum / (high - low);
    };
    for (std::size_t j = 0; j < rows.size(); ++j)
      for (std::size_t i = 0; i < rows.size(); ++i)
        CHECK(v[j * rows.size() + i] ==
              Approx(1.439964548 * (mean(rows[j].y_nm, rows[i]) + mean(rows[i].y_nm, rows[j])))
                  .epsilon(1e-10));
  }
}

TEST_CASE("screened response of rows by the plain formula") {
  const Nodes nodes = make_nodes(1e-4);
  Window window;
  window.q = {-4, 3};
  window.xi = {-3, 11};
  window.orders = {1, 1, 1};
  const Background background = Catalogs::built_in().background("");
  for (const int lines : {5, 6}) {
    const RowResponseReference response(lines, 32, nodes);
    const auto rows = ribbon_rows(make_ribbon(RibbonEdge::armchair, lines));
    const RowScatterer scatterer = row_scatterer(rows, response, background, nodes, window);
    const Matrix vectors = mirror_vectors(lines);
    const std::size_t count = std::size_t(window.xi.count);
    for (int j = 0; j < window.q.count; ++j) {
      const double q = nodes.q.node(window.q.first + j);
      std::vector<double> chi(rows.size() * rows.size() * count);
      response(window.q.first + j, window.xi, chi);
      const Matrix v = as_matrix(row_coulomb_eV_nm(rows, q), lines);
      const Matrix laplacian = as_matrix(row_background_per_nm(rows, q), lines);
      for (std::size_t k = 0; k < count; ++k) {
        Matrix c(lines, lines);
        for (std::size_t at = 0; at < rows.size() * rows.size(); ++at)
          c(Eigen::Index(at / rows.size()), Eigen::Index(at % rows.size())) = chi[at * count + k];
        const double alpha = background.in_plane_nm(nodes.xi.node(window.xi.first + int(k)));
        c -= alpha / (4 * M_PI * 1.439964548) * laplacian;
        const Matrix x = (Matrix::Identity(lines, lines) - c * v).inverse() * c;
        const Matrix reduced = vectors.transpose() * x * vectors;
        Matrix factor = Matrix::Zero(lines, lines);
        Eigen::Index start = 0;
        for (const Mirror half : {Mirror::even, Mirror::odd}) {
          const int size = scatterer.half_size(half);
          for (int b = 0; b < size; ++b)
            for (int a = 0; a <= b; ++a)
              factor(start + a, start + b) =
                  scatterer.factor(j, half)[std::size_t(b * (b + 1) / 2 + a) * count + k];
          start += size;
        }
        CHECK((factor * factor.transpose() + reduced).norm() < 1e-9 * reduced.norm());
      }
    }
  }
}

TEST_CASE("the background conserves charge") {
  const auto rows = ribbon_rows(make_ribbon(RibbonEdge::zigzag, 4));
  const double q = 0.37;
  const auto values = row_background_per_nm(rows, q);
  double sum = 0.0;
  for (const double value : values) sum += value;
  CHECK(sum == Approx(q * q * make_ribbon(RibbonEdge::zigzag, 4).width_nm()).epsilon(1e-12));
}
