// Coaxial walls of growing radius become two flat sheets.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/planar.hpp>

#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Walls {
  double mid_radius_nm;
  Estimate energy_eV_per_nm2, slope_eV_per_nm3;  // per area of the mid radius
};

/// Walls (n,n)@(n+5,n+5), all of the same gap, with the π electrons of the flat sheet.
Walls walls_of_flat_electrons(int n, const FlatResponse& flat, const Nodes& nodes) {
  const Background& background = Catalogs::built_in().background();
  const double inner = make_tube({n, n}).radius_nm, outer = make_tube({n + 5, n + 5}).radius_nm;
  const Window window = coaxial_window(inner, outer, nodes);
  const auto shell = [&](Channel channel, double radius) {
    return shell_scatterer(channel, flat_shell_response(flat, radius, nodes, window), background,
                           window);
  };
  const CoaxialDensity density =
      coaxial_density(shell(Channel::outward, inner), shell(Channel::inward, outer), window, true);
  const double area = constants::pi * (inner + outer);
  const auto per_area = [&](const FrequencyDensity& part) {
    const Estimate sum = frequency_sum(part, nodes, window.xi, {});
    return Estimate{sum.value / area, sum.error / area};
  };
  return {0.5 * (inner + outer), per_area(density.energy), per_area(density.gap_slope)};
}

/// The order p of deviation ∝ R^-p between neighbours.
double order(double deviation, double radius, double next_deviation, double next_radius) {
  return std::log(deviation / next_deviation) / std::log(next_radius / radius);
}

}  // namespace

// Per area of the mid radius the first power of gap/R drops out, as for perfect cylinders:
// Mazzitelli et al., quant-ph/0610181: ε⁻³(1 + ε/2 + …) per inner area, ε = gap/inner radius.
TEST_CASE("walls with flat electrons tend to two sheets as 1/R²") {
  const Nodes nodes = make_nodes(1e-5);
  Nodes fine = nodes;
  fine.q.step *= 0.5;
  const FlatResponse flat(Catalogs::built_in().hopping(), {}, nodes, contact_frequencies(nodes),
                          5e-4, 4 * largest_exponent(nodes.tolerance));
  const double gap = make_tube({10, 10}).radius_nm - make_tube({5, 5}).radius_nm;
  const SheetScatterer sheet =
      carbon_sheet(flat, Catalogs::built_in().background(), fine, planar_waves(gap, gap, fine));
  const PlanarEnergy sheets = planar_energy(sheet, sheet, gap, {});

  double last_radius = 0.0, last_energy = 0.0, last_slope = 0.0;
  for (const int n : {10, 14, 20, 28, 40, 56}) {
    const Walls walls = walls_of_flat_electrons(n, flat, nodes);
    const double energy = walls.energy_eV_per_nm2.value / sheets.energy_eV_per_nm2.value - 1;
    const double slope = walls.slope_eV_per_nm3.value / sheets.slope_eV_per_nm3.value - 1;
    INFO("(" << n << "," << n << "), R " << walls.mid_radius_nm);
    CHECK(walls.energy_eV_per_nm2.error <= 1e-5 * std::fabs(walls.energy_eV_per_nm2.value));
    if (last_radius > 1.0) {
      CHECK(order(last_energy, last_radius, energy, walls.mid_radius_nm) ==
            Approx(2.0).margin(0.08));
      CHECK(order(last_slope, last_radius, slope, walls.mid_radius_nm) == Approx(2.0).margin(0.2));
    }
    last_radius = walls.mid_radius_nm;
    last_energy = energy;
    last_slope = slope;
  }
  // (56,56)@(61,61), 8 nm wide, is a sheet to a thousandth.
  CHECK(std::fabs(last_energy) < 1e-3);
  CHECK(std::fabs(last_slope) < 1e-4);
}
