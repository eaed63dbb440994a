// Retarded walls in their limits: infinite speed of light, and walls of growing radius.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/join/retarded_coaxial.hpp>
#include <gapwright/join/retarded_planar.hpp>
#include <gapwright/lattice/tube.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>
#include <utility>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Walls {
  Nodes nodes;
  Background background = Catalogs::built_in().background();
  Window window;
  ShellResponse inner, outer;

  Walls(Chirality in, Chirality out, double tolerance = 1e-4) : nodes(make_nodes(tolerance)) {
    const Tube one = make_tube(in), two = make_tube(out);
    window = coaxial_window(one.radius_nm, two.radius_nm, nodes);
    const HoppingSet& hopping = Catalogs::built_in().hopping();
    inner = tube_response(one, hopping, {}, nodes, window);
    outer = tube_response(two, hopping, {}, nodes, window);
  }

  Estimate sum(const FrequencyDensity& density) const {
    return frequency_sum(density, nodes, window.xi, {});
  }
  CoaxialDensity usual() const {
    return coaxial_density(shell_scatterer(Channel::outward, inner, background, window),
                           shell_scatterer(Channel::inward, outer, background, window), window,
                           true);
  }
  CoaxialDensity retarded(double light = 1.0) const {
    const RetardedOptions options{light * constants::hbar_c_eV_nm};
    return retarded_coaxial_density(RetardedShell(inner, background, options),
                                    RetardedShell(outer, background, options), window, true);
  }
};

}  // namespace

TEST_CASE("with infinitely fast light retarded walls are the usual ones") {
  const Walls walls({9, 0}, {10, 10});
  const CoaxialDensity usual = walls.usual();
  const double energy = walls.sum(usual.energy).value, slope = walls.sum(usual.gap_slope).value;
  double last_energy = 0.0, last_slope = 0.0;
  for (const double light : {100.0, 300.0, 1000.0}) {
    const CoaxialDensity retarded = walls.retarded(light);
    const double off_energy = walls.sum(retarded.energy).value / energy - 1;
    const double off_slope = walls.sum(retarded.gap_slope).value / slope - 1;
    INFO("c times " << light << ": " << off_energy << " " << off_slope);
    if (last_energy != 0) {
      const double factor = light > 500 ? std::log(1000. / 300) : std::log(3.0);
      CHECK(std::log(last_energy / off_energy) / factor == Approx(2.0).margin(0.02));
      CHECK(std::log(last_slope / off_slope) / factor == Approx(2.0).margin(0.02));
    }
    last_energy = off_energy;
    last_slope = off_slope;
  }
  const CoaxialDensity instant = walls.retarded(1e6);
  CHECK(walls.sum(instant.energy).value == Approx(energy).epsilon(1e-8));
  CHECK(walls.sum(instant.gap_slope).value == Approx(slope).epsilon(1e-8));
  // Frequency by frequency, and with every other wave.
  for (std::size_t k = 0; k < usual.energy.full.size(); ++k) {
    CHECK(instant.energy.full[k] == Approx(usual.energy.full[k]).epsilon(1e-8).margin(1e-12));
    CHECK(instant.energy.halved[k] == Approx(usual.energy.halved[k]).epsilon(1e-8).margin(1e-12));
  }
}

TEST_CASE("errors of retarded walls are true") {
  const auto energy_and_slope = [](double tolerance) {
    const Walls walls({9, 0}, {10, 10}, tolerance);
    const CoaxialDensity density = walls.retarded();
    return std::pair(walls.sum(density.energy), walls.sum(density.gap_slope));
  };
  const auto [energy, slope] = energy_and_slope(1e-6);
  for (const double tolerance : {1e-2, 1e-3, 1e-4}) {
    const auto [rough_energy, rough_slope] = energy_and_slope(tolerance);
    INFO("tolerance " << tolerance);
    CHECK(std::fabs(rough_energy.value - energy.value) <= rough_energy.error);
    CHECK(std::fabs(rough_slope.value - slope.value) <= rough_slope.error);
    CHECK(rough_energy.error <= tolerance * std::fabs(energy.value));
  }
}

// The q range reaches low enough, and a start at ξ = 1 meV is a start at zero.
TEST_CASE("the window of walls serves retarded ones") {
  const Walls walls({5, 5}, {9, 6});
  Walls wide = walls;
  const int lower = 12;
  wide.window.q = {walls.window.q.first - lower, walls.window.q.count + lower};
  wide.window.orders.insert(wide.window.orders.begin(), lower, walls.window.orders.front());
  wide.window.xi = {walls.window.xi.first - lower, walls.window.xi.count + lower};
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  wide.inner = tube_response(make_tube({5, 5}), hopping, {}, wide.nodes, wide.window);
  wide.outer = tube_response(make_tube({9, 6}), hopping, {}, wide.nodes, wide.window);
  CHECK(walls.sum(walls.retarded().energy).value ==
        Approx(wide.sum(wide.retarded().energy).value).epsilon(1e-5));
  CHECK(walls.sum(walls.retarded().gap_slope).value ==
        Approx(wide.sum(wide.retarded().gap_slope).value).epsilon(1e-5));
}

TEST_CASE("with infinitely fast light retarded sheets are the usual ones") {
  Nodes nodes = make_nodes(1e-4);
  nodes.q.step *= 0.5;
  const FlatResponse flat(Catalogs::built_in().hopping(), {}, nodes, contact_frequencies(nodes),
                          5e-4, 4 * largest_exponent(nodes.tolerance));
  const Background& background = Catalogs::built_in().background();
  const IndexRange waves = planar_waves(0.34, 1.0, nodes);
  const SheetScatterer usual = carbon_sheet(flat, background, nodes, waves);
  const RetardedSheet sheet = retarded_carbon_sheet(flat, background, nodes, waves);
  for (const double d : {0.34, 1.0}) {
    const PlanarEnergy a = planar_energy(usual, usual, d, {});
    const PlanarEnergy b =
        retarded_planar_energy(sheet, sheet, d, {}, {1e6 * constants::hbar_c_eV_nm});
    CHECK(b.energy_eV_per_nm2.value == Approx(a.energy_eV_per_nm2.value).epsilon(1e-9));
    CHECK(b.slope_eV_per_nm3.value == Approx(a.slope_eV_per_nm3.value).epsilon(1e-9));
  }
}

// Per area of the mid radius the first power of gap/R drops out, as without retardation.
TEST_CASE("retarded walls with flat electrons tend to two retarded sheets as 1/R²") {
  const Nodes nodes = make_nodes(1e-5);
  Nodes fine = nodes;
  fine.q.step *= 0.5;
  const FlatResponse flat(Catalogs::built_in().hopping(), {}, nodes, contact_frequencies(nodes),
                          5e-4, 4 * largest_exponent(nodes.tolerance));
  const Background& background = Catalogs::built_in().background();
  const double gap = 0.35;
  // Light as slow as this makes retardation a large part.
  const RetardedOptions slow{8.0};
  const RetardedSheet sheet =
      retarded_carbon_sheet(flat, background, fine, planar_waves(gap, gap, fine));
  const PlanarEnergy sheets = retarded_planar_energy(sheet, sheet, gap, {}, slow);
  const PlanarEnergy fast = retarded_planar_energy(sheet, sheet, gap, {}, {1e6});
  CHECK(std::fabs(sheets.energy_eV_per_nm2.value / fast.energy_eV_per_nm2.value - 1) > 0.15);
  double last_energy = 0.0, last_slope = 0.0;
  for (const double radius : {2.0, 4.0, 8.0}) {
    const double inner = radius - gap / 2, outer = radius + gap / 2;
    const Window window = coaxial_window(inner, outer, nodes);
    const ShellResponse one = flat_shell_response(flat, inner, nodes, window);
    const ShellResponse two = flat_shell_response(flat, outer, nodes, window);
    const CoaxialDensity density = retarded_coaxial_density(
        RetardedShell(one, background, slow), RetardedShell(two, background, slow), window, true);
    const double area = 2 * constants::pi * radius;
    const auto off = [&](const FrequencyDensity& part, const Estimate& flat_value) {
      return frequency_sum(part, nodes, window.xi, {}).value / area / flat_value.value - 1;
    };
    const double energy = off(density.energy, sheets.energy_eV_per_nm2);
    const double slope = off(density.gap_slope, sheets.slope_eV_per_nm3);
    INFO("R " << radius << ": " << energy << " " << slope);
    if (last_energy != 0) {
      CHECK(std::log2(last_energy / energy) == Approx(2.0).margin(0.1));
      CHECK(std::log2(last_slope / slope) == Approx(2.0).margin(0.2));
    }
    last_energy = energy;
    last_slope = slope;
  }
  CHECK(std::fabs(last_energy) < 1e-3);
  CHECK(std::fabs(last_slope) < 1e-3);
}

TEST_CASE("a retarded row of two walls") {
  const auto placed = [](const char* label) {
    return Placement{Arrangement::coaxial, parse_label(label).object};
  };
  Settings settings;
  const Binder usual(Catalogs::built_in(), settings);
  settings.conditions.retarded = true;
  const Binder retarded(Catalogs::built_in(), settings);
  CHECK(usual.settings_key() != retarded.settings_key());
  const Binding before = usual.bind(placed("9,0@10,10")),
                after = retarded.bind(placed("9,0@10,10"));
  REQUIRE(after.retardation_factor);
  CHECK(!before.retardation_factor);
  CHECK(*after.dispersion_eV_per_nm ==
        Approx(*before.dispersion_eV_per_nm * *after.retardation_factor).epsilon(1e-13));
  CHECK(*after.energy_eV_per_nm ==
        Approx(*after.dispersion_eV_per_nm + *after.contact_eV_per_nm).epsilon(1e-13));
  CHECK(*after.pull_out_force_nN > 0);
  // Retardation takes about a thousandth of everything.
  CHECK(*after.retardation_factor == Approx(0.9988).margin(3e-4));
  CHECK(*after.pressure_dispersion_GPa / *before.pressure_dispersion_GPa ==
        Approx(0.9990).margin(5e-4));
  CHECK(*after.electronic_share_eV_per_nm / *before.electronic_share_eV_per_nm ==
        Approx(1.0).margin(5e-3));

  // A row's bits do not depend on what else is computed.
  const Binder busy(Catalogs::built_in(), settings);
  busy.announce({placed("9,0@9,9"), placed("9,0@10,10"), placed("8,0@10,10")});
  busy.bind(placed("9,0@9,9"));
  const Binding again = busy.bind(placed("9,0@10,10"));
  CHECK(*again.dispersion_eV_per_nm == *after.dispersion_eV_per_nm);
  CHECK(*again.pressure_GPa == *after.pressure_GPa);
  CHECK(*again.electronic_share_eV_per_nm == *after.electronic_share_eV_per_nm);

  CHECK_THROWS_AS(retarded.bind(placed("5,5@10,10@15,15")), InputError);
  const Object tube = parse_label("10,10").object;
  CHECK_THROWS_AS(retarded.bind({Arrangement::parallel, tube, tube, 0.34}), InputError);
  CHECK_THROWS_AS(retarded.announce({{Arrangement::parallel, tube, tube, 0.34}}), InputError);
}
