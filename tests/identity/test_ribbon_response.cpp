// The row-resolved response of ribbons: against the plain product sum, and what it must obey.
#include "../reference/ribbon_atoms.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/response/conditions.hpp>
#include <gapwright/response/ribbon_response.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Catalogs& catalogs() {
  return Catalogs::built_in();
}

RibbonHamiltonian usual(RibbonEdge edge, int lines) {
  return {make_ribbon(edge, lines), catalogs().hopping(), catalogs().ribbon_edges()};
}

/// A lattice whose nodes 1 and -1 are the number asked for and its inverse.
LogLattice through(double value) {
  return {std::abs(std::log(value))};
}

int index_of(double value) {
  return value < 1 ? -1 : 1;
}

RibbonResponse at_node(const RibbonHamiltonian& hamiltonian, double q, double xi,
                       double tolerance) {
  Nodes nodes = make_nodes(tolerance);
  nodes.q = through(q);
  nodes.xi = through(xi);
  return ribbon_response(hamiltonian, {}, nodes, {index_of(q), 1}, {index_of(xi), 1});
}

Eigen::MatrixXd matrix(const RibbonResponse& response, int i, int k) {
  Eigen::MatrixXd out(response.rows(), response.rows());
  response.matrix(i, k, {out.data(), std::size_t(out.size())});
  return out;
}

double charge(const RibbonHamiltonian& hamiltonian, double q, double xi, double tolerance = 1e-5) {
  return -matrix(at_node(hamiltonian, q, xi, tolerance), 0, 0).sum() / (q * q);
}

}  // namespace

TEST_CASE("the time method meets the plain product sum", "[ribbon]") {
  struct Case {
    RibbonEdge edge;
    int lines, waves;
  };
  for (const auto& [edge, lines, waves] :
       {Case{RibbonEdge::armchair, 3, 60}, Case{RibbonEdge::armchair, 4, 60},
        Case{RibbonEdge::armchair, 7, 80}, Case{RibbonEdge::armchair, 8, 256},
        Case{RibbonEdge::armchair, 9, 120}, Case{RibbonEdge::zigzag, 2, 200},
        Case{RibbonEdge::zigzag, 5, 200}}) {
    const RibbonHamiltonian hamiltonian = usual(edge, lines);
    const Nodes nodes = make_nodes(1e-6);
    const IndexRange q{nodes.q.index_below(0.3), 14}, xi{nodes.xi.index_below(0.01), 38};
    const RibbonResponse response = ribbon_response(hamiltonian, {}, nodes, q, xi);
    CHECK(response.relative_error < 1e-6);
    for (const int i : {0, 13}) {
      std::vector<double> frequencies;
      for (int k = 0; k < xi.count; k += 4) frequencies.push_back(nodes.xi.node(xi.first + k));
      const auto slow =
          ribbon_atoms::response(hamiltonian.ribbon(), 2.7, 1.12, hamiltonian.potential_eV(),
                                 nodes.q.node(q.first + i), frequencies, waves);
      for (int k = 0; k < xi.count; k += 4) {
        INFO(hamiltonian.ribbon().label() << " q " << i << " xi " << k);
        const Eigen::MatrixXd fast = matrix(response, i, k);
        CHECK((fast - slow[k / 4]).norm() < 1e-6 * slow[k / 4].norm());
      }
    }
  }
}

TEST_CASE("charge is conserved: the sum over the rows falls as q squared", "[ribbon]") {
  const RibbonHamiltonian seven = usual(RibbonEdge::armchair, 7);
  // Reference values of the model (METHODS §3), 7-AGNR, q = 0.001 nm^-1 [nm/eV].
  CHECK(charge(seven, 0.001, 1e-3) == Approx(0.19338).epsilon(5e-5));
  CHECK(charge(seven, 0.001, 0.3) == Approx(0.18911).epsilon(5e-5));
  CHECK(charge(seven, 0.001, 5.0) == Approx(0.037118).epsilon(5e-5));
  for (const RibbonHamiltonian& hamiltonian : {seven, usual(RibbonEdge::zigzag, 4)})
    CHECK(charge(hamiltonian, 1e-3, 0.1) == Approx(charge(hamiltonian, 1e-4, 0.1)).epsilon(1e-5));
}

TEST_CASE("minus χ is positive, and falls with the frequency", "[ribbon]") {
  for (const RibbonHamiltonian& hamiltonian :
       {usual(RibbonEdge::armchair, 10), usual(RibbonEdge::armchair, 11),
        usual(RibbonEdge::zigzag, 6)}) {
    const Nodes nodes = make_nodes(1e-4);
    const IndexRange q{nodes.q.index_below(0.003), 17}, xi{nodes.xi.index_below(0.001), 27};
    const RibbonResponse response = ribbon_response(hamiltonian, {}, nodes, q, xi);
    for (int i = 0; i < q.count; ++i)
      for (int k = 0; k < xi.count; ++k) {
        const Eigen::MatrixXd chi = matrix(response, i, k);
        CHECK(chi == chi.transpose());
        const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver(-chi);
        CHECK(solver.eigenvalues().minCoeff() > -1e-5 * solver.eigenvalues().maxCoeff());
        if (k > 0) CHECK(-chi.trace() < -matrix(response, i, k - 1).trace());
      }
  }
}

TEST_CASE("more waves and times bring the response nearer its limit", "[ribbon]") {
  const RibbonHamiltonian hamiltonian = usual(RibbonEdge::armchair, 8);
  const double exact = charge(hamiltonian, 0.01, 0.02, 1e-8);
  double error_before = 1;
  int waves_before = 0, times_before = 0;
  for (const double tolerance : {1e-2, 1e-4, 1e-6}) {
    const RibbonResponse response = at_node(hamiltonian, 0.01, 0.02, tolerance);
    const double error = std::abs(-matrix(response, 0, 0).sum() / (0.01 * 0.01) / exact - 1);
    INFO("tolerance " << tolerance);
    CHECK(error < response.relative_error + 1e-9);
    CHECK(error < error_before);
    CHECK(response.waves >= waves_before);
    CHECK(response.times > times_before);
    error_before = error;
    waves_before = response.waves;
    times_before = response.times;
  }
}

TEST_CASE("a value does not depend on the ranges it is computed with", "[ribbon]") {
  const RibbonHamiltonian hamiltonian = usual(RibbonEdge::armchair, 6);
  const Nodes nodes = make_nodes(1e-4);
  const RibbonResponse wide = ribbon_response(hamiltonian, {}, nodes, {-4, 9}, {-6, 20});
  const RibbonResponse narrow = ribbon_response(hamiltonian, {}, nodes, {-1, 3}, {2, 5});
  for (int i = 0; i < 3; ++i)
    for (int k = 0; k < 5; ++k) CHECK(matrix(narrow, i, k) == matrix(wide, i + 3, k + 8));
}

TEST_CASE("ribbons that are not computed are refused by name", "[ribbon]") {
  const Nodes nodes = make_nodes(1e-4);
  const RibbonEdges& uniform = catalogs().ribbon_edges("uniform");
  for (const Ribbon& ribbon :
       {make_ribbon(RibbonEdge::zigzag, 6), make_ribbon(RibbonEdge::armchair, 8)}) {
    const RibbonHamiltonian gapless(ribbon, catalogs().hopping(), uniform);
    CHECK_THROWS_AS(ribbon_response(gapless, {}, nodes, {0, 1}, {0, 1}), InputError);
  }
  const RibbonHamiltonian wide(make_ribbon(RibbonEdge::armchair, 101), catalogs().hopping(),
                               uniform);
  CHECK_THROWS_AS(ribbon_response(wide, {}, nodes, {0, 1}, {0, 1}), InputError);
}

TEST_CASE("free carriers are refused, carriers that do not count are passed over", "[ribbon]") {
  const Nodes nodes = make_nodes(1e-4);
  const IndexRange q{nodes.q.index_below(0.003), 2}, xi{0, 2};
  const auto response = [&](int lines, double temperature_K, double mu_eV) {
    Conditions conditions;
    conditions.temperature_K = temperature_K;
    conditions.chemical_potential_eV = mu_eV;
    return ribbon_response(usual(RibbonEdge::armchair, lines), conditions, nodes, q, xi);
  };
  // Gaps: 7-AGNR 1.535 eV, 8-AGNR 0.207 eV; kT = 0.0259 eV at 300 K.
  CHECK_THROWS_AS(response(8, 300, 0), InputError);
  CHECK_THROWS_AS(response(7, 1000, 0), InputError);
  CHECK_THROWS_AS(response(7, 300, 0.2), InputError);
  CHECK_THROWS_AS(response(7, 0, 0.8), InputError);
  CHECK_THROWS_AS(response(7, 0, -0.8), InputError);
  const RibbonResponse cold = response(7, 0, 0), inside = response(7, 0, 0.7);
  const RibbonResponse warm = response(7, 300, 0);
  CHECK(matrix(cold, 0, 0) == matrix(inside, 0, 0));
  CHECK(matrix(cold, 0, 0) == matrix(warm, 0, 0));
  CHECK(warm.relative_error > cold.relative_error);
}

TEST_CASE("the static response is the limit of low frequencies", "[ribbon]") {
  const RibbonHamiltonian hamiltonian = usual(RibbonEdge::armchair, 7);
  const Nodes warm = make_nodes(1e-6, 0.16);
  const RibbonResponse still = ribbon_response(hamiltonian, {}, warm, {-2, 1}, {-1, 1});
  const RibbonResponse slow = at_node(hamiltonian, warm.q.node(-2), 1e-4, 1e-6);
  CHECK((matrix(still, 0, 0) - matrix(slow, 0, 0)).norm() < 1e-6 * matrix(still, 0, 0).norm());
}
