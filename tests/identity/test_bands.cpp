// Bands by zone folding against the same matrices built otherwise.
#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include <Eigen/Dense>
#include <catch2/catch.hpp>

using namespace gapwright;
using Complex = std::complex<double>;

namespace {

constexpr double pi = std::numbers::pi;

HoppingSet make_set(std::vector<double> hopping, std::vector<double> overlap, bool curvature) {
  HoppingSet set;
  set.hopping_eV = std::move(hopping);
  set.overlap = std::move(overlap);
  set.curvature = curvature;
  return set;
}

HoppingSet simple_set() {
  return make_set({2.7}, {0}, true);
}
HoppingSet overlap_set() {
  return make_set({-3.033}, {0.129}, true);
}
HoppingSet far_set() {
  HoppingSet set = make_set({-2.97, -0.073, -0.33}, {0.073, 0.018, 0.026}, true);
  set.onsite_eV = -0.28;
  return set;
}

const std::vector<HoppingSet>& all_sets() {
  static const std::vector<HoppingSet> sets{simple_set(), make_set({2.7}, {0}, false),
                                            make_set({-2.7}, {}, true), overlap_set(), far_set()};
  return sets;
}

const std::vector<Chirality> some_tubes{{5, 5}, {9, 0}, {6, 5}, {8, 4}, {4, 2}, {10, 4}};

std::vector<PlaneVector> some_points() {
  return {{0, 0}, {3.1, -7.7}, {-11.3, 0.4}, {17, 5}, {0.01, 9.6}, {40, -80}};
}

std::vector<double> sorted_bands(const Tube& tube, const HoppingSet& set, double k) {
  std::vector<double> energies;
  for (const auto& band : tube_band_energies(tube, set, k))
    energies.insert(energies.end(), band.begin(), band.end());
  std::sort(energies.begin(), energies.end());
  return energies;
}

/// The atoms of one cell of a tube, rolled out: (c, z) in [0, 2πR) × [0, T), from the orientation
/// a1,2 = a(√3/2, ±1/2) and by projection on C_h, not by the program's rotated lattice.
std::vector<PlaneVector> atoms_of_cell(const Tube& tube) {
  const double a = constants::lattice_nm;
  const Eigen::Vector2d a1(a * std::numbers::sqrt3 / 2, a / 2), a2(a1.x(), -a1.y());
  const Eigen::Vector2d to_b(constants::bond_nm, 0);
  const Eigen::Vector2d chiral = tube.chirality.n * a1 + tube.chirality.m * a2;
  const Eigen::Vector2d around = chiral.normalized(), along(-around.y(), around.x());
  const int reach = static_cast<int>((chiral.norm() + tube.period_nm) / a) + 3;
  const auto within = [](double x, double length) { return x > -1e-6 && x < length - 1e-6; };
  std::vector<PlaneVector> atoms;
  for (int i = -reach; i <= reach; ++i)
    for (int j = -reach; j <= reach; ++j)
      for (const double b : {0.0, 1.0}) {
        const Eigen::Vector2d place = i * a1 + j * a2 + b * to_b;
        const double c = place.dot(around), z = place.dot(along);
        if (within(c, chiral.norm()) && within(z, tube.period_nm)) atoms.push_back({c, z});
      }
  return atoms;
}

/// Shell 0, 1, 2 of a displacement on the sheet, or 3 for none.
std::size_t shell_of(double length) {
  const double lengths[] = {constants::bond_nm, constants::lattice_nm, 2 * constants::bond_nm};
  return std::find_if(lengths, lengths + 3, [&](double l) { return std::abs(length - l) < 1e-4; }) -
         lengths;
}

/// Energies of the 2N-atom cell at k from H and S over all pairs of atoms.
std::vector<double> direct_bands(const Tube& tube, const HoppingSet& set, double k) {
  const auto atoms = atoms_of_cell(tube);
  const auto size = static_cast<Eigen::Index>(atoms.size());
  const double around = 2 * pi * tube.radius_nm;
  const int cells = static_cast<int>(0.3 / tube.period_nm) + 1;
  Eigen::MatrixXcd H = set.onsite_eV * Eigen::MatrixXcd::Identity(size, size);
  Eigen::MatrixXcd S = Eigen::MatrixXcd::Identity(size, size);
  for (Eigen::Index i = 0; i < size; ++i)
    for (Eigen::Index j = 0; j < size; ++j)
      for (int turn = -1; turn <= 1; ++turn)
        for (int cell = -cells; cell <= cells; ++cell) {
          const double c = atoms[j].c - atoms[i].c + turn * around;
          const double z = atoms[j].z - atoms[i].z + cell * tube.period_nm;
          const std::size_t shell = shell_of(std::hypot(c, z));
          if (shell >= set.hopping_eV.size()) continue;
          const double bent = set.curvature ? 1 - std::pow(c / tube.radius_nm, 2) / 8 : 1;
          const Complex factor = bent * std::polar(1.0, k * z);
          H(i, j) += set.hopping_eV[shell] * factor;
          if (!set.overlap.empty()) S(i, j) += set.overlap[shell] * factor;
        }
  const Eigen::GeneralizedSelfAdjointEigenSolver<Eigen::MatrixXcd> solver(H, S);
  const Eigen::VectorXd values = solver.eigenvalues();
  return {values.begin(), values.end()};
}

/// H and S at k from the bonds of the flat or rolled sheet, each with its own phase.
struct TwoByTwo {
  Eigen::Matrix2cd H, S;
  TwoByTwo(const HoppingSet& set, const RotatedLattice& lattice, double radius_nm, PlaneVector k) {
    H = set.onsite_eV * Eigen::Matrix2cd::Identity();
    S = Eigen::Matrix2cd::Identity();
    const auto add = [&](int from, int to, PlaneVector d, std::size_t shell) {
      if (shell >= set.hopping_eV.size()) return;
      const double turn = radius_nm > 0 && set.curvature ? d.c / radius_nm : 0;
      const Complex factor = (1 - turn * turn / 8) * std::polar(1.0, k.c * d.c + k.z * d.z);
      H(from, to) += set.hopping_eV[shell] * factor;
      if (!set.overlap.empty()) S(from, to) += set.overlap[shell] * factor;
    };
    for (std::size_t i = 0; i < 3; ++i) {
      const PlaneVector d = lattice.neighbours[i];
      for (const double sign : {1.0, -1.0}) {
        add(sign > 0 ? 0 : 1, sign > 0 ? 1 : 0, d * sign, 0);
        add(sign > 0 ? 0 : 1, sign > 0 ? 1 : 0, d * (-2 * sign), 2);
      }
      for (std::size_t j = 0; j < 3; ++j)
        if (i != j)
          for (const int site : {0, 1}) add(site, site, d - lattice.neighbours[j], 1);
    }
  }
};

void check_equal(const std::vector<double>& found, const std::vector<double>& expected,
                 double shift = 0, double margin = 1e-9) {
  REQUIRE(found.size() == expected.size());
  double worst = 0;
  for (std::size_t i = 0; i < found.size(); ++i)
    worst = std::max(worst, std::abs(found[i] - expected[i] + shift));
  CHECK(worst < margin);
}

/// Energy of the Dirac point before it is made the zero.
double neutrality_eV(const HoppingSet& set, const Tube& tube) {
  const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, set);
  const TwoByTwo m(set, hamiltonian.lattice(), tube.radius_nm, hamiltonian.dirac_point());
  return (m.S.inverse() * m.H).trace().real() / 2;
}

}  // namespace

TEST_CASE("zone folding gives the bands of the whole cell", "[bands]") {
  for (const Chirality c : {Chirality{5, 5}, {9, 0}, {4, 2}, {6, 3}, {8, 2}})
    for (const HoppingSet& set : all_sets()) {
      const Tube tube = make_tube(c);
      INFO(tube.label() << " with " << set.hopping_eV.size() << " hoppings");
      REQUIRE(static_cast<int>(atoms_of_cell(tube).size()) == tube.atoms_per_cell());
      const double zero = neutrality_eV(set, tube);
      for (const double share : {0.0, 0.37, 0.93}) {
        const double k = share * pi / tube.period_nm;
        check_equal(sorted_bands(tube, set, k), direct_bands(tube, set, k), zero);
      }
    }
}

TEST_CASE("helical lines carry the same states as zone folding", "[bands]") {
  for (const Chirality c : some_tubes)
    for (const HoppingSet& set : all_sets()) {
      const Tube tube = make_tube(c);
      const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, set);
      const double k = 0.3 * pi / tube.period_nm;
      std::vector<double> helical;
      for (int line = 0; line < tube.symmetry; ++line)
        for (int j = 0; j < tube.hexagons / tube.symmetry; ++j) {
          const double z = k + 2 * pi * j / tube.period_nm;
          const BandState state = hamiltonian.at({line / tube.radius_nm, z});
          helical.push_back(state.midpoint_eV - std::abs(state.coupling_eV));
          helical.push_back(state.midpoint_eV + std::abs(state.coupling_eV));
        }
      std::sort(helical.begin(), helical.end());
      check_equal(helical, sorted_bands(tube, set, k));
    }
}

TEST_CASE("midpoint and coupling solve the generalised eigenproblem", "[bands]") {
  for (const Chirality c : some_tubes)
    for (const HoppingSet& set : all_sets())
      for (const PlaneVector k : some_points()) {
        const Tube tube = make_tube(c);
        const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, set);
        const BandState state = hamiltonian.at(k);
        const double zero = neutrality_eV(set, tube);
        const TwoByTwo m(set, hamiltonian.lattice(), tube.radius_nm, k);
        const Eigen::GeneralizedSelfAdjointEigenSolver<Eigen::Matrix2cd> solver(m.H, m.S);
        const double half = std::abs(state.coupling_eV);
        CHECK(std::abs(solver.eigenvalues()[0] - zero - (state.midpoint_eV - half)) < 1e-11);
        CHECK(std::abs(solver.eigenvalues()[1] - zero - (state.midpoint_eV + half)) < 1e-11);
        // The phase too: S^{-1/2} H S^{-1/2} itself.
        const Eigen::Matrix2cd root =
            Eigen::SelfAdjointEigenSolver<Eigen::Matrix2cd>(m.S).operatorInverseSqrt();
        const Eigen::Matrix2cd orthogonal = root * m.H * root;
        CHECK(std::abs(orthogonal(0, 1) - state.coupling_eV) < 1e-11);
        CHECK(std::abs(orthogonal(0, 0) - zero - state.midpoint_eV) < 1e-11);
      }
}

TEST_CASE("one hopping: electrons and holes are mirror images", "[bands]") {
  const Tube tube = make_tube({7, 3});
  for (const auto& [low, high] : tube_band_energies(tube, simple_set(), 1.234)) CHECK(low == -high);
}

TEST_CASE("the general path with one hopping equals the fast path", "[bands]") {
  HoppingSet general = make_set({2.7, 1e-200}, {0, 0}, true);
  general.onsite_eV = 0.4;
  for (const Chirality c : some_tubes) {
    const SheetHamiltonian fast = tube_hamiltonian(make_tube(c), simple_set());
    const SheetHamiltonian slow = tube_hamiltonian(make_tube(c), general);
    REQUIRE(fast.nearest_neighbour_only());
    REQUIRE_FALSE(slow.nearest_neighbour_only());
    for (const PlaneVector k : some_points()) {
      CHECK(std::abs(fast.at(k).coupling_eV - slow.at(k).coupling_eV) < 1e-13);
      CHECK(std::abs(slow.at(k).midpoint_eV) < 1e-13);
    }
    CHECK(std::abs(fast.dirac_point().z - slow.dirac_point().z) < 1e-10);
  }
}

TEST_CASE("the Dirac points are zeros of the coupling and of energy", "[bands]") {
  for (const Chirality c : some_tubes)
    for (const HoppingSet& set : all_sets()) {
      const SheetHamiltonian hamiltonian = tube_hamiltonian(make_tube(c), set);
      const PlaneVector K = hamiltonian.dirac_point();
      for (const double valley : {1.0, -1.0}) {
        CHECK(std::abs(hamiltonian.at(K * valley).coupling_eV) < 1e-12);
        CHECK(std::abs(hamiltonian.at(K * valley).midpoint_eV) < 1e-12);
      }
      const SheetHamiltonian flat(set, hamiltonian.lattice(), 0);
      const PlaneVector shift = flat.dirac_point() - flat.lattice().dirac;
      CHECK(std::hypot(shift.c, shift.z) < 1e-11);
    }
}

TEST_CASE("on-site energy moves nothing but the zero of an orthogonal set", "[bands]") {
  HoppingSet shifted = make_set({-2.7, -0.1}, {0, 0}, true);
  const HoppingSet plain = shifted;
  shifted.onsite_eV = 1.7;
  const Tube tube = make_tube({8, 3});
  check_equal(sorted_bands(tube, shifted, 0.4), sorted_bands(tube, plain, 0.4), 0, 1e-12);
}

// Every sub-band of the first zone followed on a grid fine against 1/R, minima by golden section.
TEST_CASE("the band gap is the least gap of all sub-bands", "[bands]") {
  for (const Chirality c : {Chirality{5, 5}, {9, 0}, {6, 5}, {8, 4}, {4, 2}, {7, 1}, {10, 0}})
    for (const HoppingSet& set : all_sets()) {
      const Tube tube = make_tube(c);
      const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, set);
      double least = 1e9;
      for (int mu = 0; mu < tube.hexagons; ++mu) {
        const auto gap = [&](double k) {
          return 2 * std::abs(hamiltonian.at({mu / tube.radius_nm, k}).coupling_eV);
        };
        const int steps = static_cast<int>(2 * pi / tube.period_nm * tube.radius_nm * 20) + 20;
        const double step = 2 * pi / tube.period_nm / steps;
        for (int i = 0; i < steps; ++i) {
          double low = (i - 1) * step, high = (i + 1) * step;
          if (gap(i * step) > std::min(gap(low), gap(high))) continue;
          for (int j = 0; j < 70; ++j) {
            const double third = (high - low) / 3;
            (gap(low + third) < gap(high - third) ? high : low) =
                gap(low + third) < gap(high - third) ? high - third : low + third;
          }
          least = std::min(least, gap((low + high) / 2));
        }
      }
      INFO(tube.label());
      CHECK(std::abs(tube_gaps(tube, set).band_gap_eV - least) < 1e-9);
    }
}
