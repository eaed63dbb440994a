// Flat graphene against what is known of it exactly: universal conductivity, Dirac cones, the f-sum
// rule and the attraction of two undoped sheets.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/planar.hpp>
#include <gapwright/response/flat_response.hpp>

#include <cmath>
#include <complex>
#include <vector>

#include <boost/math/quadrature/exp_sinh.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;
using namespace gapwright::constants;

namespace {

constexpr double hopping_eV = 2.7;
constexpr double velocity_eV_nm = 1.5 * hopping_eV * bond_nm;

const HoppingSet& usual() {
  return Catalogs::built_in().hopping();
}

IndexRange frequencies(const Nodes& nodes, double low_eV, double high_eV) {
  const int first = nodes.xi.index_below(low_eV);
  return {first, nodes.xi.index_above(high_eV) - first + 1};
}

/// α_π of one wave number at every frequency of the table.
std::vector<double> strength(const FlatResponse& flat, double wave_per_nm) {
  std::vector<double> values(std::size_t(flat.xi().count));
  flat.strength_nm(wave_per_nm, values);
  return values;
}

/// Mean of |f|/t over the reciprocal cell, f = 1 + e^{ix} + e^{iy}.
double mean_band_energy() {
  constexpr int points = 600;
  double sum = 0.0;
  for (int i = 0; i < points; ++i)
    for (int j = 0; j < points; ++j) {
      const double x = (i + 0.5) * 2 * pi / points, y = (j + 0.5) * 2 * pi / points;
      sum += std::abs(1.0 + std::polar(1.0, x) + std::polar(1.0, y));
    }
  return sum / points / points;
}

/// -E·d³ of two sheets of π electrons alone [eV·nm], with its error.
Estimate far_coefficient(double spacing_nm) {
  Nodes nodes = make_nodes(1e-4);
  const IndexRange xi = frequencies(nodes, 1e-3 * velocity_eV_nm / spacing_nm, 600.0);
  nodes.q.step *= 0.5;
  const IndexRange waves = planar_waves(spacing_nm, spacing_nm, nodes);
  const FlatResponse flat(usual(), {}, nodes, xi, nodes.q.node(waves.first),
                          nodes.q.node(waves.end() - 1));
  const SheetScatterer sheet = carbon_sheet(flat, Background{}, nodes, waves);
  const PlanarEnergy energy = planar_energy(sheet, sheet, spacing_nm, {});
  const double volume = spacing_nm * spacing_nm * spacing_nm;
  // The slope of a d^-3 law is -3E/d.
  const double exponent =
      -energy.slope_eV_per_nm3.value * spacing_nm / energy.energy_eV_per_nm2.value;
  CHECK(exponent == Approx(3.0).margin(0.8 / spacing_nm));
  return {-energy.energy_eV_per_nm2.value * volume, energy.energy_eV_per_nm2.error * volume};
}

/// C₃ of METHODS (5.5), by quadrature and the series of the polylogarithm.
double dirac_coefficient() {
  const double g = pi * coulomb_eV_nm / (2 * velocity_eV_nm);
  const auto polylog4 = [](double z) {
    double sum = 0.0, power = 1.0;
    for (int n = 1; n <= 200; ++n) sum += (power *= z) / (double(n) * n * n * n);
    return sum;
  };
  boost::math::quadrature::exp_sinh<double> integrate;
  const double integral = integrate.integrate([&](double u) {
    const double r = g / (std::sqrt(1 + u * u) + g);
    return polylog4(r * r);
  });
  return velocity_eV_nm / (16 * pi * pi) * integral;
}

}  // namespace

// e²/4ħ of optical graphene: Nair et al., Science 320, 1308 (2008), measured; theory Ando, Zheng &
// Suzuura, J. Phys. Soc. Jpn. 71, 1318 (2002), from memory.
TEST_CASE("a flat sheet has the universal conductivity") {
  const Nodes nodes = make_nodes(1e-6);
  const double wave = 1e-7;  // ħvQ = 6e-8 eV, far below every ξ here
  const FlatResponse flat(usual(), {}, nodes, frequencies(nodes, 2e-3, 0.03), wave, 1.1 * wave);
  const std::vector<double> values = strength(flat, wave);
  double previous = 0.0;
  for (int k = 0; k < flat.xi().count; ++k) {
    const double xi = nodes.xi.node(flat.xi().first + k);
    const double excess = values[std::size_t(k)] * xi / (pi * coulomb_eV_nm) - 1;
    INFO("xi " << xi);
    CHECK(std::fabs(excess) < 0.012 * xi);
    // What is left of the band structure falls as ξ.
    if (k > 0) CHECK(std::log(excess / previous) / nodes.xi.step == Approx(1.0).margin(0.06));
    previous = excess;
  }
}

// χ = -Q²/4√(ξ² + (ħvQ)²) of two Dirac cones with spin: González, Guinea & Vozmediano, Nucl. Phys.
// B 424, 595 (1994), from memory.
TEST_CASE("a flat sheet has the response of Dirac cones at small wave numbers") {
  const Nodes nodes = make_nodes(1e-6);
  const FlatResponse flat(usual(), {}, nodes, frequencies(nodes, 2e-4, 0.2), 1e-3, 0.1);
  for (const int shift : {-5, 0, 3}) {  // ξ well below, at and above ħvQ
    double previous = 0.0;
    for (int k = nodes.xi.index_above(0.003); k < nodes.xi.index_above(0.02); k += 2) {
      const double xi = nodes.xi.node(k + shift), vq = nodes.xi.node(k);
      const double ours =
          strength(flat, vq / velocity_eV_nm)[std::size_t(k + shift - flat.xi().first)];
      const double scale = std::sqrt(xi * xi + vq * vq);
      const double excess = ours * scale / (pi * coulomb_eV_nm) - 1;
      INFO("xi/vQ " << xi / vq << " vQ " << vq);
      CHECK(std::fabs(excess) < 0.012 * scale);
      if (previous != 0)
        CHECK(std::log(excess / previous) / (2 * nodes.xi.step) == Approx(1.0).margin(0.1));
      previous = excess;
    }
  }
}

// Exact at any Q for nearest-neighbour hopping: ½⟨[[H, ρ], ρ†]⟩ counts 1 - cos Q·δ of every bond
// with its band energy, ē/3 in units of t; the mean over directions of the cosine is J₀(Qa_cc).
TEST_CASE("the response of a flat sheet obeys the f-sum rule") {
  const double band_energy = mean_band_energy();
  CHECK(band_energy ==
        Approx(1.574597).epsilon(1e-6));  // π energy an atom of graphene, from memory
  const auto expected = [&](double wave) {
    return 4 * pi * coulomb_eV_nm / (2 * atom_area_nm2) * 4 * hopping_eV * band_energy *
           (1 - boost::math::cyl_bessel_j(0, wave * bond_nm)) / (wave * wave);
  };
  for (const double tolerance : {1e-4, 1e-6}) {
    const bool fine = tolerance < 1e-5;
    const Nodes nodes = make_nodes(tolerance);
    const FlatResponse flat(usual(), {}, nodes, frequencies(nodes, 1e5, 1e5), 1e-3, 40.0);
    const double xi = nodes.xi.node(flat.xi().first);
    for (const int step : {-56, -16, 0, 8, 16, 22, 28}) {
      const double on_grid = std::exp(step / 8.0);  // a point of the table
      INFO("Q " << on_grid << " tolerance " << tolerance);
      CHECK(strength(flat, on_grid)[0] * xi * xi ==
            Approx(expected(on_grid)).epsilon(fine ? 2e-8 : 1e-6));
      const double between = on_grid * (fine ? std::exp(1.0 / 32) : std::exp(1.0 / 16));
      if (between < 9)
        CHECK(strength(flat, between)[0] * xi * xi ==
              Approx(expected(between)).epsilon(fine ? 1e-7 : 2e-6));
    }
  }
}

// Values at finite spacing: reference values of the model, made once with an independent
// implementation of the same equations.
TEST_CASE("two undoped sheets of π electrons attract as d^-3") {
  struct Row {
    double spacing_nm, coefficient;
  };
  const double limit = dirac_coefficient();
  CHECK(limit == Approx(0.0134555).epsilon(1e-5));
  double last_spacing = 0.0, last_excess = 0.0;
  for (const Row& row :
       {Row{1, 0.009216}, {5, 0.011984}, {20, 0.013010}, {100, 0.013366}, {500, 0.013440}}) {
    const Estimate ours = far_coefficient(row.spacing_nm);
    INFO("d " << row.spacing_nm);
    CHECK(ours.value == Approx(row.coefficient).epsilon(1e-3));
    const double known_to = 3e-5 * row.coefficient + 5e-7;  // half of the last digit
    CHECK(std::fabs(ours.value - row.coefficient) < ours.error + known_to);
    CHECK(ours.error < 1e-4 * ours.value);
    // The rest of the band structure falls as 1/d.
    const double excess = 1 - ours.value / limit;
    if (last_spacing >= 20)
      CHECK(std::log(last_excess / excess) / std::log(row.spacing_nm / last_spacing) ==
            Approx(1.0).margin(0.15));
    last_spacing = row.spacing_nm;
    last_excess = excess;
  }
  CHECK(last_excess > 0);
  CHECK(last_excess < 0.01);
}
