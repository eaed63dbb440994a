#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/short_range.hpp>

#include <cmath>
#include <stdexcept>

#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double density = 1 / constants::atom_area_nm2;
const PairFunction contact{.repulsion_eV_nm12 = 2.6e-8, .attraction_eV_nmp = 1.2e-6, .power = 8};

double pair_energy(const PairFunction& pair, double squared) {
  return pair.repulsion_eV_nm12 * std::pow(squared, -6) -
         pair.attraction_eV_nmp * std::pow(squared, -0.5 * pair.power);
}

// Outer integral over one variable of inner integral over another, both adaptive.
template <typename Function>
double integrate(const Function& f, double low, double high) {
  return boost::math::quadrature::gauss_kronrod<double, 61>::integrate(f, low, high, 12, 1e-13);
}

// The definition: all atoms of one sheet seen from a point of the other.
double brute_force_sheets(const PairFunction& pair, double d) {
  const auto ring = [&](double s) {  // r = d·s/(1 - s)
    const double r = d * s / (1 - s);
    return 2 * M_PI * r * pair_energy(pair, r * r + d * d) * d / ((1 - s) * (1 - s));
  };
  return density * density * integrate(ring, 0.0, 1.0);
}

// The definition: a ring of the inner shell with the whole outer shell.
double brute_force_coaxial(const PairFunction& pair, double r1, double r2) {
  const auto angle = [&](double phi) {
    const double across = r1 * r1 + r2 * r2 - 2 * r1 * r2 * std::cos(phi);
    const auto along = [&](double s) {
      const double z = (r2 - r1) * s / (1 - s);
      return pair_energy(pair, across + z * z) * (r2 - r1) / ((1 - s) * (1 - s));
    };
    return 2 * integrate(along, 0.0, 1.0);
  };
  return density * density * r1 * r2 * 2 * M_PI * 2 * integrate(angle, 0.0, M_PI);
}

PairFunction repulsion_only() {
  return {.repulsion_eV_nm12 = 1, .power = 8};
}
PairFunction attraction_only(int power) {
  return {.repulsion_eV_nm12 = 0, .attraction_eV_nmp = 1, .power = power};
}

}  // namespace

TEST_CASE("two sheets: closed form against direct integration") {
  for (const PairFunction& pair : {contact, graphitic_pair_potential(), repulsion_only(),
                                   attraction_only(7), attraction_only(6)})
    for (const double d : {0.2, 0.344, 1.0, 10.0})
      CHECK(sheets_energy(pair, d).energy == Approx(brute_force_sheets(pair, d)).epsilon(1e-10));
}

TEST_CASE("coaxial shells: closed form against direct integration") {
  for (const PairFunction& pair :
       {repulsion_only(), attraction_only(8), attraction_only(7), attraction_only(6)})
    for (const auto& [r1, r2] : {std::pair{0.339, 0.678}, std::pair{0.15, 2.0}, std::pair{1.0, 1.2},
                                 std::pair{4.66, 5.0}}) {
      CAPTURE(pair.power, r1, r2);
      CHECK(coaxial_energy(pair, r1, r2).energy ==
            Approx(brute_force_coaxial(pair, r1, r2)).epsilon(1e-9));
    }
}

// dE/dg at fixed mid radius by central differences of sixth order.
TEST_CASE("slopes are the derivatives of the energies") {
  const auto slope = [](const auto& f, double x, double h) {
    return (45 * (f(x + h) - f(x - h)) - 9 * (f(x + 2 * h) - f(x - 2 * h)) +
            (f(x + 3 * h) - f(x - 3 * h))) /
           (60 * h);
  };
  for (const PairFunction& pair : {repulsion_only(), attraction_only(8), attraction_only(7),
                                   attraction_only(6), graphitic_pair_potential()}) {
    for (const double d : {0.25, 0.344, 2.0})
      CHECK(sheets_energy(pair, d).slope ==
            Approx(slope([&](double x) { return sheets_energy(pair, x).energy; }, d, 1e-3 * d))
                .epsilon(1e-9));
    for (const double mid : {0.5, 1.0, 8.0})
      for (const double gap : {0.2, 0.344, 0.9}) {
        const auto energy = [&](double g) {
          return coaxial_energy(pair, mid - g / 2, mid + g / 2).energy;
        };
        CAPTURE(pair.power, mid, gap);
        CHECK(coaxial_energy(pair, mid - gap / 2, mid + gap / 2).slope ==
              Approx(slope(energy, gap, 1e-3 * gap)).epsilon(1e-8));
      }
  }
}

// Wide tubes are sheets: E/L over 2π·R_mid tends to E/A as (g/R)².
TEST_CASE("wide shells become flat sheets") {
  const double gap = 0.344;
  const SmoothEnergy flat = sheets_energy(contact, gap);
  double before = 0.0;
  for (const double mid : {5.0, 10.0, 20.0, 40.0}) {
    const SmoothEnergy round = coaxial_energy(contact, mid - gap / 2, mid + gap / 2);
    const double error = std::abs(round.energy / (2 * M_PI * mid * flat.energy) - 1);
    CHECK(error < 2 * gap * gap / (mid * mid));
    if (before != 0) CHECK(std::log2(before / error) == Approx(2).margin(0.1));
    before = error;
  }
}

TEST_CASE("short-range energies refuse impossible geometry") {
  CHECK_THROWS_AS(sheets_energy(contact, 0.0), std::domain_error);
  CHECK_THROWS_AS(sheets_energy(contact, -0.3), std::domain_error);
  CHECK_THROWS_AS(coaxial_energy(contact, 0.5, 0.5), std::domain_error);
  CHECK_THROWS_AS(coaxial_energy(contact, 0.6, 0.5), std::domain_error);
  CHECK_THROWS_AS(coaxial_energy(contact, 0.0, 0.5), std::domain_error);
  CHECK_THROWS_AS(coaxial_energy(contact, 0.3, std::nan("")), std::domain_error);
  CHECK_THROWS_AS(sheets_energy({.power = 2}, 0.3), std::domain_error);
}
