// Retarded walls and sheets against published values: ideal metal, universal conductivity.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/retarded_coaxial.hpp>
#include <gapwright/join/retarded_planar.hpp>
#include <gapwright/lattice/tube.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;
using namespace gapwright::constants;

namespace {

IndexRange frequencies(const Nodes& nodes, double low_eV, double high_eV) {
  const int first = nodes.xi.index_below(low_eV);
  return {first, nodes.xi.index_above(high_eV) - first + 1};
}

struct Energies {
  Estimate energy, slope;
};

/// Coaxial cylinders of ideal metal: energy and derivative by the gap, both per length.
Energies ideal_cylinders(double inner_nm, double outer_nm, double tolerance) {
  Nodes nodes = make_nodes(tolerance);
  const double gap = outer_nm - inner_nm;
  Window window = coaxial_window(inner_nm, outer_nm, nodes);
  // At q = 0 the TM term of m = 0 rises only as a logarithm towards ξ = 0.
  const int lowest = nodes.q.index_below(1e-6 / outer_nm);
  window.orders.insert(window.orders.begin(), std::size_t(window.q.first - lowest),
                       window.orders.front());
  window.q = {lowest, window.q.end() - lowest};
  window.xi = frequencies(nodes, 1e-6 * hbar_c_eV_nm / outer_nm,
                          hbar_c_eV_nm * largest_exponent(tolerance) / (2 * gap));
  const auto metal = [&](double radius) {
    ShellResponse response(radius, nodes, window);
    for (int j = 0; j < window.q.count; ++j) {
      const double q = nodes.q.node(window.q.first + j);
      for (int m = 0; m < window.orders[std::size_t(j)]; ++m)
        for (double& value : response.cell(j, m))
          value = 1e30 * (q * q + m * m / (radius * radius));
    }
    return response;
  };
  const ShellResponse inner = metal(inner_nm), outer = metal(outer_nm);
  const Background none;
  const CoaxialDensity density = retarded_coaxial_density(RetardedShell(inner, none),
                                                          RetardedShell(outer, none), window, true);
  return {frequency_sum(density.energy, nodes, window.xi, {}),
          frequency_sum(density.gap_slope, nodes, window.xi, {})};
}

/// Two sheets of the same α(ξ) at every wave number.
template <typename Strength>
PlanarEnergy sheets(Strength&& strength_nm, double spacing_nm) {
  Nodes nodes = make_nodes(1e-6);
  nodes.q.step *= 0.5;
  RetardedSheet sheet{nodes, planar_waves(spacing_nm, spacing_nm, nodes), {}, {}, {}};
  sheet.xi = frequencies(nodes, 1e-6 * hbar_c_eV_nm / spacing_nm, 12 * hbar_c_eV_nm / spacing_nm);
  sheet.normal_nm.assign(std::size_t(sheet.xi.count), 0.0);
  for (int j = 0; j < sheet.wave.count; ++j)
    for (int k = 0; k < sheet.xi.count; ++k)
      sheet.strength_nm.push_back(strength_nm(nodes.xi.node(sheet.xi.first + k)));
  return retarded_planar_energy(sheet, sheet, spacing_nm, {});
}

}  // namespace

// Exact energy of the geometry of Mazzitelli et al., quant-ph/0610181 (whose expansion by the gap
// the values meet to 1e-5 at b/a = 1.05), units ħcL/a².
TEST_CASE("coaxial cylinders of ideal metal") {
  struct Row {
    double ratio, energy;
  };
  constexpr double inner_nm = 80.0;
  for (const Row& r : {Row{1.05, -705.74},
                       {1.1, -90.182},
                       {1.5, -0.81906},
                       {2.0, -0.112432},
                       {3.0, -0.0157785},
                       {10.0, -2.7975e-4}}) {
    const Estimate energy = ideal_cylinders(inner_nm, r.ratio * inner_nm, 1e-5).energy;
    INFO("b/a " << r.ratio);
    CHECK(energy.value * inner_nm * inner_nm / hbar_c_eV_nm == Approx(r.energy).epsilon(1e-4));
  }
}

// Casimir, Proc. K. Ned. Akad. Wet. 51, 793 (1948): E/A = -π²ħc/720d³, pressure π²ħc/240d⁴. Per
// area of the mid radius walls miss it by the square of gap/R, with the coefficient of Mazzitelli
// et al.: 1 + ε/2 - (2/π² + 1/10)ε² per inner area, ε = gap/inner radius.
TEST_CASE("wide cylinders of ideal metal are ideal plates") {
  constexpr double inner_nm = 50.0;
  for (const double e : {0.05, 0.02}) {
    const double gap = e * inner_nm, mid = inner_nm + gap / 2;
    const Energies walls = ideal_cylinders(inner_nm, inner_nm + gap, 1e-5);
    const double plates = -pi * pi * hbar_c_eV_nm / (720 * gap * gap * gap);
    const double ratio = walls.energy.value / (2 * pi * mid) / plates;
    const double expansion = (1 + e / 2 - (2 / (pi * pi) + 0.1) * e * e) / (1 + e / 2);
    CHECK(ratio == Approx(expansion).margin(e * e * e));
    CHECK(walls.slope.value / (2 * pi * mid) == Approx(-3 * plates / gap).epsilon(2 * e * e));
    // At fixed mid radius E ∝ gap^-3[1 + c(gap/mid)²]: the derivative of the expansion.
    const double c = (expansion - 1) * (mid / gap) * (mid / gap);
    CHECK(walls.slope.value / (2 * pi * mid) ==
          Approx(-3 * plates / gap * (1 + c / 3 * (gap / mid) * (gap / mid))).epsilon(e * e * e));
  }
}

TEST_CASE("ideal plates") {
  const double d = 100.0;
  const PlanarEnergy plates = sheets([](double) { return 1e30; }, d);
  CHECK(plates.energy_eV_per_nm2.value ==
        Approx(-pi * pi * hbar_c_eV_nm / (720 * d * d * d)).epsilon(1e-5));
  CHECK(plates.slope_eV_per_nm3.value ==
        Approx(pi * pi * hbar_c_eV_nm / (240 * d * d * d * d)).epsilon(1e-5));
  // 13.0013 Pa at 100 nm.
  CHECK(plates.slope_eV_per_nm3.value * GPa_per_eV_per_nm3 * 1e9 == Approx(13.0013).epsilon(2e-5));
}

// 0.00538 of the ideal metal's pressure at any distance: Drosdoff & Woods, Phys. Rev. B 82, 155459
// (2010), from memory; 0.0053833 from the integral itself.
TEST_CASE("sheets of the universal conductivity far apart") {
  for (const double d : {10.0, 1000.0}) {
    const PlanarEnergy graphene = sheets([](double xi) { return pi * coulomb_eV_nm / xi; }, d);
    const double ideal = pi * pi * hbar_c_eV_nm / (240 * d * d * d * d);
    CHECK(graphene.slope_eV_per_nm3.value / ideal == Approx(0.0053833).epsilon(2e-5));
    CHECK(graphene.energy_eV_per_nm2.value * -3 / d ==
          Approx(graphene.slope_eV_per_nm3.value).epsilon(1e-5));
  }
}

// Reference values of the model (METHODS §9): retarded over non-retarded.
TEST_CASE("retardation of flat carbon sheets") {
  struct Row {
    double spacing, ratio;
  };
  for (const Row& r :
       {Row{0.34, 0.998756}, {20.0, 0.968925}, {100.0, 0.966901}, {500.0, 0.98060}}) {
    Nodes nodes = make_nodes(1e-5);
    const IndexRange waves = [&] {
      nodes.q.step *= 0.5;
      return planar_waves(r.spacing, r.spacing, nodes);
    }();
    const IndexRange xi = frequencies(nodes, 1e-3 * std::min(1.0, 1 / r.spacing), 1000.0);
    const FlatResponse flat(Catalogs::built_in().hopping(), {}, nodes, xi,
                            nodes.q.node(waves.first), nodes.q.node(waves.end() - 1));
    const Background& background = Catalogs::built_in().background();
    const SheetScatterer usual = carbon_sheet(flat, background, nodes, waves);
    const RetardedSheet sheet = retarded_carbon_sheet(flat, background, nodes, waves);
    const double before = planar_energy(usual, usual, r.spacing, {}).energy_eV_per_nm2.value;
    const double after =
        retarded_planar_energy(sheet, sheet, r.spacing, {}).energy_eV_per_nm2.value;
    INFO("spacing " << r.spacing);
    CHECK(after / before == Approx(r.ratio).margin(1e-5));
  }
}

TEST_CASE("retardation of (5,5) in (10,10)") {
  const Nodes nodes = make_nodes(1e-5);
  const Tube inner = make_tube({5, 5}), outer = make_tube({10, 10});
  const Window window = coaxial_window(inner.radius_nm, outer.radius_nm, nodes);
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  const ShellResponse one = tube_response(inner, hopping, {}, nodes, window);
  const ShellResponse two = tube_response(outer, hopping, {}, nodes, window);
  for (const bool dipoles : {true, false}) {
    Background background = Catalogs::built_in().background();
    if (!dipoles) background.normal_strength_nm = 0.0;
    const double before =
        frequency_sum(coaxial_density(shell_scatterer(Channel::outward, one, background, window),
                                      shell_scatterer(Channel::inward, two, background, window),
                                      window, false)
                          .energy,
                      nodes, window.xi, {})
            .value;
    const double after =
        frequency_sum(retarded_coaxial_density(RetardedShell(one, background),
                                               RetardedShell(two, background), window, false)
                          .energy,
                      nodes, window.xi, {})
            .value;
    INFO("normal dipoles " << dipoles);
    CHECK(after / before == Approx(dipoles ? 0.998763 : 1.000438).margin(1e-5));
  }
}
