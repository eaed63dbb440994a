// Gaps of nanoribbons. Source: Son, Cohen & Louie, Phys. Rev. Lett. 97, 216803 (2006), formulas
// and the local-density fit from memory.
#include "../reference/ribbon_atoms.hpp"

#include <gapwright/bands/ribbon_bands.hpp>
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/input_error.hpp>

#include <numbers>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double t = 2.7;

RibbonHamiltonian hamiltonian(RibbonEdge edge, int lines, const std::string& edges = {}) {
  const Catalogs& catalogs = Catalogs::built_in();
  return {make_ribbon(edge, lines), catalogs.hopping(), catalogs.ribbon_edges(edges)};
}

double gap_eV(RibbonEdge edge, int lines, const std::string& edges = {}) {
  return ribbon_gaps(hamiltonian(edge, lines, edges)).band_gap_eV;
}

/// First order in δ = 0.12.
double published_eV(int lines, double delta) {
  const double pi = std::numbers::pi;
  const int p = lines / 3;
  if (lines % 3 == 0) {
    const double s = std::sin(p * pi / (3 * p + 1));
    return t * (4 * std::cos(p * pi / (3 * p + 1)) - 2) - 8 * delta * t / (3 * p + 1) * s * s;
  }
  if (lines % 3 == 1) {
    const double s = std::sin((p + 1) * pi / (3 * p + 2));
    return t * (2 - 4 * std::cos((p + 1) * pi / (3 * p + 2))) + 8 * delta * t / (3 * p + 2) * s * s;
  }
  return 2 * delta * t / (p + 1);
}

/// The least gap on a fine grid by the independent Hamiltonian.
double slow_gap_eV(const Ribbon& ribbon, double edge) {
  double least = 1e9;
  for (int i = 0; i <= 400; ++i) {
    const double k = std::numbers::pi * i / (400 * ribbon.period_nm());
    const auto e = ribbon_atoms::states(ribbon_atoms::hamiltonian(ribbon, t, edge, k)).energies;
    least = std::min(least, e[ribbon.atoms_per_cell() / 2] - e[ribbon.atoms_per_cell() / 2 - 1]);
  }
  return least;
}

}  // namespace

TEST_CASE("armchair gaps without edge term are the published ones", "[ribbon]") {
  for (int lines = 3; lines <= 40; ++lines) {
    INFO(lines);
    CHECK(gap_eV(RibbonEdge::armchair, lines, "uniform") ==
          Approx(published_eV(lines, 0)).margin(1e-7));
  }
}

TEST_CASE("armchair gaps with edge term: the formula within its order, and diagonalised",
          "[ribbon]") {
  for (int lines = 5; lines <= 40; ++lines) {
    INFO(lines);
    const double published = published_eV(lines, 0.12);
    CHECK(std::abs(gap_eV(RibbonEdge::armchair, lines) - published) < 0.12 * published);
    // What first order leaves out falls as δ².
    const auto error = [&](double delta) {
      const RibbonEdges edges{"test", "", 1 + delta, 0, ""};
      const RibbonHamiltonian h(make_ribbon(RibbonEdge::armchair, lines),
                                Catalogs::built_in().hopping(), edges);
      return ribbon_gaps(h).band_gap_eV - published_eV(lines, delta);
    };
    CHECK(std::log2(std::abs(error(0.02) / error(0.01))) == Approx(2).margin(0.25));
  }
  // Exact diagonalisation of the published model, 1e-5 eV.
  const double exact[] = {0.31429, 1.11684, 1.53545, 0.20738, 0.78665};
  for (int lines = 5; lines <= 9; ++lines)
    CHECK(gap_eV(RibbonEdge::armchair, lines) == Approx(exact[lines - 5]).margin(1e-4));
  CHECK(gap_eV(RibbonEdge::armchair, 13) == Approx(0.85812).margin(1e-4));
  for (const int lines : {3, 4, 5, 8, 12, 17})
    CHECK(gap_eV(RibbonEdge::armchair, lines) ==
          Approx(slow_gap_eV(make_ribbon(RibbonEdge::armchair, lines), 1.12)).margin(1e-6));
}

TEST_CASE("the three families of armchair ribbons stay ordered", "[ribbon]") {
  double last[3] = {10, 10, 10};
  for (int p = 2; p <= 13; ++p) {
    double gap[3];
    for (int r = 0; r < 3; ++r) gap[r] = gap_eV(RibbonEdge::armchair, 3 * p + r);
    CHECK(gap[1] > gap[0]);
    CHECK(gap[0] > gap[2]);
    for (int r = 0; r < 3; ++r) {
      CHECK(gap[r] < last[r]);
      last[r] = gap[r];
    }
  }
}

TEST_CASE("zigzag gaps follow the published local-density fit", "[ribbon]") {
  // Reference values of the model (METHODS §2), 1e-4 eV.
  const double reference[] = {0.3618, 0.3590, 0.3449, 0.3272, 0.3089, 0.2913, 0.2750,
                              0.2599, 0.2462, 0.2337, 0.2222, 0.2118, 0.2022};
  for (int lines = 4; lines <= 16; ++lines) {
    INFO(lines);
    const double gap = gap_eV(RibbonEdge::zigzag, lines);
    const double published = 9.33 / ((1.5 * lines - 1) * 1.42 + 15);
    CHECK(std::abs(gap / published - 1) < (lines == 4 ? 0.15 : 0.07));
    CHECK(gap == Approx(reference[lines - 4]).margin(1e-4));
  }
}

TEST_CASE("the mean field is its own: occupations summed plainly give it back", "[ribbon]") {
  for (const int lines : {2, 6}) {
    const RibbonHamiltonian h = hamiltonian(RibbonEdge::zigzag, lines);
    const auto& potential = h.potential_eV();
    const Ribbon& ribbon = h.ribbon();
    const int waves = 600;
    std::vector<double> down(ribbon.rows(), 0.0);
    for (int i = 0; i < waves; ++i) {
      const double k = 2 * std::numbers::pi * (i + 0.5) / (waves * ribbon.period_nm());
      Eigen::MatrixXcd matrix = ribbon_atoms::hamiltonian(ribbon, t, 1, k);
      for (int j = 0; j < ribbon.rows(); ++j) matrix(j, j) += potential[ribbon.rows() - 1 - j];
      const auto states = ribbon_atoms::states(matrix);
      for (int j = 0; j < ribbon.rows(); ++j)
        down[j] += states.vectors.row(j).head(lines).squaredNorm() / waves;
    }
    for (int j = 0; j < ribbon.rows(); ++j)
      CHECK(1.94 * (down[j] - 0.5) == Approx(potential[j]).margin(1e-7));
    CHECK(h.potential_error_eV() < 1e-7);
  }
}

TEST_CASE("a few sparse states are the dense ones", "[ribbon]") {
  for (const RibbonHamiltonian& h :
       {hamiltonian(RibbonEdge::armchair, 40), hamiltonian(RibbonEdge::armchair, 151),
        hamiltonian(RibbonEdge::zigzag, 40), hamiltonian(RibbonEdge::zigzag, 150, "uniform")})
    for (int sector = 0; sector < h.sectors(); ++sector)
      for (const double k : {0.01, 0.5, 8.6}) {
        INFO(h.ribbon().label() << " k " << k);
        const auto dense = conduction_energies_eV(h, sector, k, 2, EigenMethod::dense);
        const auto sparse = conduction_energies_eV(h, sector, k, 2, EigenMethod::sparse);
        for (int i = 0; i < 2; ++i) CHECK(sparse[i] == Approx(dense[i]).margin(1e-8));
      }
}

TEST_CASE("wide ribbons: gaps of hundreds of nm", "[ribbon]") {
  // Without edge term the formula is exact at any width.
  for (const int lines : {300, 1000, 2998})
    CHECK(gap_eV(RibbonEdge::armchair, lines, "uniform") ==
          Approx(published_eV(lines, 0)).margin(1e-6));
  CHECK(gap_eV(RibbonEdge::armchair, 2999, "uniform") < 1e-6);
  CHECK(gap_eV(RibbonEdge::armchair, 2999) == Approx(published_eV(2999, 0.12)).epsilon(0.1));
}

TEST_CASE("ribbon energies are those of atoms in the plane", "[ribbon]") {
  for (const Ribbon& ribbon :
       {make_ribbon(RibbonEdge::armchair, 6), make_ribbon(RibbonEdge::armchair, 7),
        make_ribbon(RibbonEdge::zigzag, 3)})
    for (const double k : {0.0, 1.3, 5.1}) {
      const RibbonHamiltonian h = hamiltonian(ribbon.edge, ribbon.lines, "uniform");
      const auto energies = ribbon_band_energies(h, k);
      const auto slow = ribbon_atoms::states(ribbon_atoms::hamiltonian(ribbon, t, 1, k)).energies;
      for (int i = 0; i < slow.size(); ++i) CHECK(energies[i] == Approx(slow[i]).margin(1e-12));
    }
}

TEST_CASE("hopping sets that ribbons do not take are refused by name", "[ribbon]") {
  const Catalogs& catalogs = Catalogs::built_in();
  for (const char* name : {"nearest-neighbour-overlap", "third-neighbour-overlap"})
    CHECK_THROWS_AS(RibbonHamiltonian(make_ribbon(RibbonEdge::armchair, 7), catalogs.hopping(name),
                                      catalogs.ribbon_edges()),
                    InputError);
}
