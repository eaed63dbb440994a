// Lines of atoms against each other, shells and sheets: by integrals of the pair function.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/rows.hpp>

#include <array>
#include <cmath>

#include <boost/math/quadrature/exp_sinh.hpp>
#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr PairFunction pair_function = {2.6e-8, 1.2e-6, 8};
constexpr std::array<AtomLine, 2> upper = {{{-0.1, 0.36, 4.0}, {0.2, 0.41, 5.0}}};
constexpr std::array<AtomLine, 3> lower = {{{-0.2, 0.0, 4.7}, {0.05, 0.02, 4.7}, {0.3, 0.0, 3.0}}};

double u(double r2) {
  return pair_function.repulsion_eV_nm12 / std::pow(r2, 6) -
         pair_function.attraction_eV_nmp / std::pow(r2, 4);
}

/// ∫u along a line at distance ρ.
double along(double rho) {
  static boost::math::quadrature::exp_sinh<double> rule;
  return 2 * rule.integrate([&](double x) { return u(rho * rho + x * x); });
}

/// Derivative by moving off, by central differences.
template <typename Energy>
double difference(Energy energy) {
  constexpr double h = 1e-5;
  return (energy(h) - energy(-h)) / (2 * h);
}

}  // namespace

TEST_CASE("lines beside lines") {
  const SmoothEnergy e = lines_energy(pair_function, lower, upper, 0.6, 0.8);
  double expected = 0.0;
  for (const AtomLine& a : lower)
    for (const AtomLine& b : upper)
      expected +=
          a.atoms_per_nm * b.atoms_per_nm * along(std::hypot(a.y_nm - b.y_nm, a.z_nm - b.z_nm));
  CHECK(e.energy == Approx(expected).epsilon(1e-9));
  CHECK(e.slope == Approx(difference([&](double h) {
                     auto moved = upper;
                     for (AtomLine& line : moved) {
                       line.y_nm += 0.6 * h;
                       line.z_nm += 0.8 * h;
                     }
                     return lines_energy(pair_function, lower, moved, 0, 1).energy;
                   })).epsilon(1e-6));
  CHECK_THROWS_AS(lines_energy(pair_function, lower, lower, 0, 1), std::domain_error);
}

TEST_CASE("lines beside a shell") {
  const double radius = 0.68, y = 0.1, z = 1.03;
  const SmoothEnergy e = lines_shell_energy(pair_function, lower, radius, y, z, 0.0, 1.0);
  double expected = 0.0;
  for (const AtomLine& a : lower)
    expected += a.atoms_per_nm * radius / constants::atom_area_nm2 *
                boost::math::quadrature::gauss_kronrod<double, 61>::integrate(
                    [&](double angle) {
                      return along(std::hypot(y + radius * std::cos(angle) - a.y_nm,
                                              z + radius * std::sin(angle) - a.z_nm));
                    },
                    0.0, 2 * M_PI, 8, 1e-10);
  CHECK(e.energy == Approx(expected).epsilon(1e-8));
  CHECK(e.slope == Approx(difference([&](double h) {
                     return lines_shell_energy(pair_function, lower, radius, y, z + h, 0, 1).energy;
                   })).epsilon(1e-6));
  CHECK_THROWS_AS(lines_shell_energy(pair_function, lower, radius, 0.0, 0.5, 0, 1),
                  std::domain_error);
}

TEST_CASE("lines over a sheet and across others") {
  static boost::math::quadrature::exp_sinh<double> rule;
  const double height = 0.33;
  const double plane =
      2 * M_PI * rule.integrate([&](double r) { return r * u(height * height + r * r); });
  CHECK(lines_sheet_energy(pair_function, lower, height).energy ==
        Approx(12.4 / constants::atom_area_nm2 * plane).epsilon(1e-9));
  // Two crossed lines: dx dx' sin γ is the area element of the plane.
  CHECK(crossed_lines_energy_sine(pair_function, 9.0, 12.4, height).energy ==
        Approx(9.0 * 12.4 * plane).epsilon(1e-9));
  // A line across a shell sees the shell's own lines at their heights.
  const double radius = 0.68, distance = radius + height;
  const double expected =
      9.0 * radius / constants::atom_area_nm2 *
      boost::math::quadrature::gauss_kronrod<double, 61>::integrate(
          [&](double angle) {
            const double z = distance - radius * std::cos(angle);
            return 2 * M_PI * rule.integrate([&](double r) { return r * u(z * z + r * r); });
          },
          0.0, 2 * M_PI, 8, 1e-10);
  CHECK(crossed_lines_shell_energy_sine(pair_function, 9.0, radius, distance).energy ==
        Approx(expected).epsilon(1e-8));
}
