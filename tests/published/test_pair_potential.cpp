// The graphitic pair potential of Girifalco, Hodak & Lee, Phys. Rev. B 62, 13104 (2000), between
// surfaces of uniform density, bond 1.42 Å, rigid tubes. Expected values: the published parameters
// integrated with mpmath, tests/reference/pair_potential_reference.py.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/short_range.hpp>

#include <cmath>
#include <functional>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const PairFunction potential = graphitic_pair_potential();
constexpr double J_per_m2 = constants::mJ_per_m2_per_eV_per_nm2 / 1000;

double radius(int n) {
  return std::sqrt(3.0) * n * constants::lattice_nm / (2 * constants::pi);
}

double root(const std::function<double(double)>& f, double low, double high) {
  for (int i = 0; i < 60; ++i) {
    const double mid = (low + high) / 2;
    ((f(mid) > 0) == (f(high) > 0) ? high : low) = mid;
  }
  return low;
}

// Σ_n weight(n)·E₂(n·d) and Σ_n n·E₂'(n·d); what is left beyond the last sheet is below 1e-7.
constexpr int sheets = 3000;

double stack_energy(double d, bool weighted = false) {
  double sum = 0.0;
  for (int n = sheets; n >= 1; --n)
    sum += (weighted ? n : 1) * sheets_energy(potential, n * d).energy;
  return sum;
}

double stack_slope(double d) {
  double sum = 0.0;
  for (int n = sheets; n >= 1; --n) sum += n * sheets_energy(potential, n * d).slope;
  return sum;
}

}  // namespace

TEST_CASE("pair potential: two atoms") {
  const double a = potential.attraction_eV_nmp, b = potential.repulsion_eV_nm12;
  CHECK(std::pow(2 * b / a, 1.0 / 6) == Approx(0.3833).epsilon(2e-4));
  CHECK(a * a / (4 * b) == Approx(2.397e-3).epsilon(2e-4));
}

TEST_CASE("pair potential: two sheets") {
  const double d = root([](double x) { return sheets_energy(potential, x).slope; }, 0.3, 0.4);
  const double energy = sheets_energy(potential, d).energy;
  CHECK(d == Approx(0.34147762).epsilon(1e-7));
  CHECK(energy == Approx(-1.5355664).epsilon(1e-7));
  CHECK(energy * J_per_m2 == Approx(-0.2460).epsilon(1e-3));
  CHECK(1000 * energy * constants::atom_area_nm2 == Approx(-40.22).epsilon(1e-3));
}

TEST_CASE("pair potential: infinite stack") {
  const double d = root(stack_slope, 0.32, 0.36);
  const double curvature = (stack_slope(d + 1e-5) - stack_slope(d - 1e-5)) / 2e-5;
  CHECK(d == Approx(0.33706063).epsilon(1e-7));
  CHECK(1000 * stack_energy(d) * constants::atom_area_nm2 == Approx(-45.860732).epsilon(1e-7));
  CHECK(d * curvature * constants::GPa_per_eV_per_nm3 == Approx(33.289307).epsilon(1e-6));
  CHECK(-stack_energy(d, true) * J_per_m2 == Approx(0.33204375).epsilon(1e-6));
}

TEST_CASE("pair potential: coaxial tubes") {
  const double small = coaxial_energy(potential, radius(5), radius(10)).energy;
  const double large = coaxial_energy(potential, radius(10), radius(15)).energy;
  CHECK(small == Approx(-4.8651563).epsilon(1e-7));
  CHECK(large == Approx(-8.1436579).epsilon(1e-7));
  // The pull-out force is the energy per length.
  CHECK(-small * constants::nN_per_eV_per_nm == Approx(0.7795).epsilon(1e-3));
  CHECK(-large * constants::nN_per_eV_per_nm == Approx(1.3048).epsilon(1e-3));
}

TEST_CASE("pair potential: best gap around a (5,5) tube, per length") {
  const double inner = radius(5), h = 1e-5;
  const auto slope = [&](double gap) {
    return coaxial_energy(potential, inner, inner + gap + h).energy -
           coaxial_energy(potential, inner, inner + gap - h).energy;
  };
  CHECK(root(slope, 0.3, 0.4) == Approx(0.34290773).epsilon(1e-6));
}
