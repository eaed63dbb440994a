// Matsubara sums against sums known in closed form and against term-by-term sums.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/matsubara.hpp>

#include <cmath>
#include <functional>
#include <stdexcept>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

using Function = std::function<double(double)>;

MatsubaraSum grid_sum(const Function& f, double kelvin, double tolerance, double power) {
  const double first = 2 * constants::pi * constants::boltzmann_eV_per_K * kelvin;
  const LogLattice lattice = make_nodes(tolerance, first).xi;
  std::vector<double> values;
  for (int k = 0; lattice.node(k) < 3e3; ++k) values.push_back(f(lattice.node(k)));
  return matsubara_sum(lattice, f(0.0), values, power);
}

}  // namespace

TEST_CASE("a Matsubara sum of 1/(1 + (xi/a)^2) is a hyperbolic cotangent") {
  // kT Σ'_{n>=0} a²/(a² + ξ_n²) = (a/4) coth(a/2kT): Gradshteyn & Ryzhik, 1.421.4.
  for (const double kelvin : {1.0, 77.0, 300.0, 1000.0, 3000.0})
    for (const double a : {0.02, 0.6, 13.0}) {
      const double kT = constants::boltzmann_eV_per_K * kelvin;
      const double exact = 0.25 * a / std::tanh(a / (2 * kT));
      const MatsubaraSum sum =
          grid_sum([a](double xi) { return -1 / (1 + xi * xi / (a * a)); }, kelvin, 1e-4, 2.0);
      INFO(kelvin << " K, a = " << a);
      CHECK(sum.value == Approx(-exact).epsilon(1e-4));
      CHECK(std::fabs(sum.value + exact) <= sum.error + 1e-8 * exact);
      CHECK(sum.static_part == Approx(-0.5 * kT).epsilon(1e-14));
      const MatsubaraSum finer =
          grid_sum([a](double xi) { return -1 / (1 + xi * xi / (a * a)); }, kelvin, 1e-7, 2.0);
      CHECK(finer.value == Approx(-exact).epsilon(3e-6));
    }
}

TEST_CASE("a Matsubara sum of an energy density is the sum of its terms") {
  // The shape of a pair: falls slowly, then as ξ^-4 above the plasmons.
  const Function smooth = [](double xi) {
    return -std::log1p(3 / ((1 + xi) * (1 + std::pow(xi / 12, 3))));
  };
  const Function changing = [&](double xi) { return smooth(xi) * (1 - xi / 2.0) / (1 + xi * xi); };
  for (const double kelvin : {77.0, 300.0, 1000.0})
    for (const bool sign_changes : {false, true}) {
      const Function& f = sign_changes ? changing : smooth;
      const double kT = constants::boltzmann_eV_per_K * kelvin;
      double exact = 0.5 * f(0.0), size = exact;
      for (int n = 1; n < 400000; ++n) {
        exact += f(2 * constants::pi * n * kT);
        size += std::fabs(f(2 * constants::pi * n * kT));
      }
      INFO(kelvin << " K, sign changes " << sign_changes);
      const MatsubaraSum sum = grid_sum(f, kelvin, 1e-4, sign_changes ? 5.0 : 4.0);
      CHECK(std::fabs(sum.value - kT * exact) < 3e-5 * kT * std::fabs(size));
      CHECK(std::fabs(sum.value - kT * exact) <= sum.error + 1e-8 * kT * std::fabs(size));
    }
}

TEST_CASE("a Matsubara sum refuses what is not its grid") {
  const LogLattice warm = make_nodes(1e-4, 0.16).xi;
  const std::vector<double> values(20, 1.0);
  CHECK_NOTHROW(matsubara_sum(warm, 1.0, values, 4.0));
  CHECK_THROWS_AS(matsubara_sum(make_nodes(1e-4).xi, 1.0, values, 4.0), std::domain_error);
  CHECK_THROWS_AS(matsubara_sum(warm, 1.0, values, 1.0), std::domain_error);
  CHECK_THROWS_AS(matsubara_sum(warm, 1.0, {values.data(), 7}, 4.0), std::domain_error);
}

TEST_CASE("the lattice of T > 0 starts from zero and the first Matsubara frequency") {
  const Nodes nodes = make_nodes(1e-4, 0.1624);
  CHECK(nodes.warm());
  CHECK(nodes.xi.node(-1) == 0.0);
  CHECK(nodes.xi.node(0) == 0.1624);
  CHECK(nodes.xi.index_below(0.1) == -1);
  CHECK(nodes.xi.index_above(0.1) == 0);
  for (int k = 0; k < 40; ++k) {
    CHECK(nodes.xi.index_below(nodes.xi.node(k)) == k);
    CHECK(nodes.xi.index_above(nodes.xi.node(k)) == k);
  }
  CHECK_FALSE(nodes == make_nodes(1e-4));
  CHECK(nodes.q.step == make_nodes(1e-4).q.step);
  CHECK_THROWS_AS(make_nodes(1e-4, -0.1), std::domain_error);
}
