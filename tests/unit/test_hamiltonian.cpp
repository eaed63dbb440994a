#include <gapwright/bands/hamiltonian.hpp>
#include <gapwright/catalog/constants.hpp>

#include <cmath>
#include <numbers>

#include <catch2/catch.hpp>

using namespace gapwright;
using Complex = std::complex<double>;

namespace {

constexpr double pi = std::numbers::pi;

HoppingSet make_set(std::vector<double> hopping, std::vector<double> overlap) {
  HoppingSet set;
  set.hopping_eV = std::move(hopping);
  set.overlap = std::move(overlap);
  return set;
}

}  // namespace

TEST_CASE("the rotated lattice puts C_h along c", "[lattice]") {
  for (int n = 1; n <= 200; n += 3)
    for (int m = 0; m <= n; m += 2) {
      const Tube tube = make_tube({n, m});
      const RotatedLattice lattice = rotated_lattice(tube.chiral_angle_rad);
      const auto& [a1, a2] = lattice.primitive;
      const auto& [b1, b2] = lattice.reciprocal;
      const PlaneVector chiral = a1 * n + a2 * m;
      const double around = 2 * pi * tube.radius_nm;
      CHECK(std::abs(chiral.c - around) < 1e-14 * around);
      CHECK(std::abs(chiral.z) < 1e-14 * around);
      const auto dot = [](PlaneVector a, PlaneVector b) { return a.c * b.c + a.z * b.z; };
      CHECK(dot(a1, b1) == Approx(2 * pi));
      CHECK(dot(a2, b2) == Approx(2 * pi));
      CHECK(std::abs(dot(a1, b2)) + std::abs(dot(a2, b1)) < 1e-13);
      Complex sum = 0;
      PlaneVector total;
      for (const PlaneVector d : lattice.neighbours) {
        CHECK(std::hypot(d.c, d.z) == Approx(constants::bond_nm));
        sum += std::polar(1.0, dot(lattice.dirac, d));
        total = total + d;
      }
      CHECK(std::abs(sum) < 1e-13);
      CHECK(std::hypot(total.c, total.z) < 1e-15);
    }
}

TEST_CASE("sets that describe no sheet are refused", "[bands]") {
  const RotatedLattice lattice = rotated_lattice(0.2);
  const auto make = [&](const HoppingSet& set) { return SheetHamiltonian(set, lattice, 0); };
  CHECK_THROWS_AS(make(make_set({}, {})), std::invalid_argument);
  CHECK_THROWS_AS(make(make_set({1, 1, 1, 1}, {})), std::invalid_argument);
  CHECK_THROWS_AS(make(make_set({2.7}, {0, 0.1})), std::invalid_argument);
  CHECK_THROWS_AS(make(make_set({0, 1}, {0, 0})), std::invalid_argument);
  CHECK_THROWS_AS(make(make_set({-2.7}, {0.34})), std::domain_error);
  CHECK_NOTHROW(make(make_set({-2.7}, {0.32})));
}
