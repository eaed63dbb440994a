// Symmetries of parallel rows: exchange, force against energy, walls inside.
#include <gapwright/join/parallel.hpp>
#include <gapwright/pair/binder.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Binder& binder() {
  static const Binder usual(Catalogs::built_in(), {});
  return usual;
}

Binding row(const std::string& first, const std::string& second, std::optional<double> gap) {
  return binder().bind(
      {Arrangement::parallel, parse_label(first).object, parse_label(second).object, gap});
}

}  // namespace

TEST_CASE("exchanging the two objects changes nothing") {
  for (const auto& [a, b] : {std::pair{"8,0", "6,5"}, {"10,10", "5,4"}, {"5,5@10,10", "9,1"}})
    for (const std::optional<double> gap : {std::optional<double>(), {0.34}, {3.0}}) {
      const Binding one = row(a, b, gap), other = row(b, a, gap);
      INFO(a << " " << b << " " << gap.value_or(0));
      CHECK(*one.dispersion_eV_per_nm == Approx(*other.dispersion_eV_per_nm).epsilon(1e-9));
      CHECK(*one.contact_eV_per_nm == Approx(*other.contact_eV_per_nm).epsilon(1e-9));
      CHECK(*one.gap_nm == Approx(*other.gap_nm).epsilon(1e-6));
    }
}

TEST_CASE("the distance slope is the derivative of the energy") {
  const Catalogs& catalogs = Catalogs::built_in();
  const Tube a = make_tube({8, 2}), b = make_tube({7, 7});
  for (const double gap : {0.25, 0.34, 1.0, 20.0}) {
    const double distance = a.radius_nm + b.radius_nm + gap, step = 1e-4 * gap;
    const Window window = parallel_window(a.radius_nm, b.radius_nm, distance, make_nodes(1e-4));
    const Nodes nodes = nodes_on(window.xi, make_nodes(1e-4));
    const auto scatterer = [&](const Tube& tube) {
      return shell_scatterer(Channel::outward,
                             tube_response(tube, catalogs.hopping(), {}, nodes, window),
                             catalogs.background(), window);
    };
    const Scatterer one = scatterer(a), other = scatterer(b);
    const auto at = [&](double d, bool slope) {
      return parallel_density(one, other, d, window, slope);
    };
    const ParallelDensity here = at(distance, true), less = at(distance - step, false),
                          more = at(distance + step, false);
    const auto sum = [&](const FrequencyDensity& d) {
      return frequency_sum(d, nodes, window.xi, {}).value;
    };
    INFO("gap " << gap);
    CHECK(sum(here.distance_slope) ==
          Approx((sum(more.energy) - sum(less.energy)) / (2 * step)).epsilon(1e-5));
    CHECK(sum(here.first_slope) ==
          Approx((sum(more.first_round_trip) - sum(less.first_round_trip)) / (2 * step))
              .epsilon(1e-5));
    CHECK(sum(here.energy) == Approx(sum(at(distance, false).energy)).epsilon(1e-13));
    // Round trips beyond the first add to the attraction.
    CHECK(sum(here.energy) < sum(here.first_round_trip));
  }
}

TEST_CASE("a wall inside binds more") {
  for (const double gap : {0.34, 1.0})
    CHECK(*row("5,5@10,10", "17,0", gap).energy_eV_per_nm <
          *row("10,10", "17,0", gap).energy_eV_per_nm);
}

TEST_CASE("the bottom of the well is where bind at that gap finds no force") {
  const Binding well = row("10,10", "8,3", {});
  const double gap = *well.equilibrium_gap_nm, step = 2e-3;
  const double below = *row("10,10", "8,3", gap - step).energy_eV_per_nm;
  const double above = *row("10,10", "8,3", gap + step).energy_eV_per_nm;
  const double here = *row("10,10", "8,3", gap).energy_eV_per_nm;
  CHECK(here == Approx(-*well.well_depth_eV_per_nm).epsilon(1e-5));
  CHECK((above - 2 * here + below) / (step * step) ==
        Approx(*well.stiffness_eV_per_nm3).epsilon(0.02));
  CHECK(here < below);
  CHECK(here < above);
}
