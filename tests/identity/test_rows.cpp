// Ribbons beside ribbons and tubes: what must hold whatever the numbers are.
#include "row_response_reference.hpp"
#include "synthetic_shell.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/rows_tube.hpp>
#include <gapwright/math/parallel.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double gap = 0.34;

/// Ribbons of 5 and 8 lines on a coarse lattice.
struct Bodies {
  Nodes nodes = make_nodes(1e-2);
  Background background = Catalogs::built_in().background("");
  Window window = rows_tube_window(0.7, gap, nodes);
  Ribbon narrow = make_ribbon(RibbonEdge::armchair, 5);
  Ribbon wide = make_ribbon(RibbonEdge::armchair, 8);
  RowScatterer first = scatterer(narrow);
  RowScatterer second = scatterer(wide);
  Scatterer tube = SyntheticShell{0.7, 1.5, 0.2}.scatterer(nodes, window);

  RowScatterer scatterer(const Ribbon& ribbon) const {
    return row_scatterer(ribbon_rows(ribbon), RowResponseReference(ribbon.lines, 12, nodes),
                         background, nodes, window);
  }
};

const Bodies& bodies() {
  static const Bodies all;
  return all;
}

/// Sum over frequencies: any fixed weights serve.
double sum(const FrequencyDensity& density) {
  double total = 0.0;
  for (const double value : density.full) total += value;
  return total;
}

RowDensity ribbons(const RowPose& pose, bool with_slope = false) {
  const Bodies& b = bodies();
  return rows_density(b.first, b.second, pose, b.window, with_slope);
}

RowDensity with_tube(const RowPose& pose, bool with_slope = false) {
  const Bodies& b = bodies();
  return rows_tube_density(b.first, b.tube, pose, b.window, with_slope);
}

/// The pose moved off by h.
RowPose moved(RowPose pose, double h) {
  pose.y_nm += h * pose.away_y;
  pose.z_nm += h * pose.away_z;
  return pose;
}

template <typename Density>
void check_slope(Density density, const RowPose& pose) {
  constexpr double h = 2e-5;
  const RowDensity here = density(pose, true);
  const RowDensity up = density(moved(pose, h), false), down = density(moved(pose, -h), false);
  CHECK(sum(here.distance_slope) ==
        Approx((sum(up.energy) - sum(down.energy)) / (2 * h)).epsilon(1e-7));
  CHECK(sum(here.first_slope) ==
        Approx((sum(up.first_round_trip) - sum(down.first_round_trip)) / (2 * h)).epsilon(1e-7));
  CHECK(here.positive);
}

}  // namespace

TEST_CASE("forces between rows are derivatives of the energy") {
  const Bodies& b = bodies();
  for (const RowPose& pose :
       {stacked_pose(gap), stacked_pose(gap, 0.3), coplanar_pose(b.narrow, b.wide, gap, 0.1),
        edge_on_pose(b.wide, gap, -0.2), RowPose{0.2, 0.9, 35.0, 0.6, 0.8}})
    check_slope([](const RowPose& p, bool s) { return ribbons(p, s); }, pose);
  for (const RowPose& pose : {tube_over_pose(0.7, gap), tube_over_pose(0.7, gap, 0.25),
                              tube_beside_pose(b.narrow, 0.7, gap, 0.05)})
    check_slope([](const RowPose& p, bool s) { return with_tube(p, s); }, pose);
}

TEST_CASE("the two halves of a centred pair make the whole") {
  // A tiny shift takes the general way, without the mirror; small traces end a series at 3e-9.
  CHECK(sum(ribbons(stacked_pose(gap)).energy) ==
        Approx(sum(ribbons(stacked_pose(gap, 1e-9)).energy)).epsilon(1e-9));
  CHECK(sum(with_tube(tube_over_pose(0.7, gap)).energy) ==
        Approx(sum(with_tube(tube_over_pose(0.7, gap, 1e-9)).energy)).epsilon(1e-9));
}

TEST_CASE("either ribbon may come first") {
  const Bodies& b = bodies();
  const auto exchanged = [&](const RowPose& pose) {
    return sum(rows_density(b.second, b.first, pose, b.window, false).energy);
  };
  CHECK(exchanged(stacked_pose(gap)) == Approx(sum(ribbons(stacked_pose(gap)).energy)));
  CHECK(exchanged(stacked_pose(gap, 0.3)) ==
        Approx(sum(ribbons(stacked_pose(gap, 0.3)).energy)).epsilon(1e-12));
  CHECK(exchanged(coplanar_pose(b.wide, b.narrow, gap)) ==
        Approx(sum(ribbons(coplanar_pose(b.narrow, b.wide, gap)).energy)).epsilon(1e-12));
}

TEST_CASE("rows at an angle are the rows of the turned pair") {
  // The second ribbon upright over the first, seen from the second: the first one upright.
  const Bodies& b = bodies();
  const double height = gap + 0.5 * b.wide.nuclei_width_nm();
  const RowPose seen{height, 0.0, 90.0, 1.0, 0.0};
  CHECK(sum(ribbons(edge_on_pose(b.wide, gap)).energy) ==
        Approx(sum(rows_density(b.second, b.first, seen, b.window, false).energy)).epsilon(1e-12));
}

TEST_CASE("rows with one and two threads agree in every bit") {
  set_inner_threads(1);
  const double one = sum(ribbons(stacked_pose(gap), true).distance_slope);
  set_inner_threads(2);
  CHECK(sum(ribbons(stacked_pose(gap), true).distance_slope) == one);
  set_inner_threads(0);
}

TEST_CASE("ribbons that cut through what is beside them are refused") {
  const Bodies& b = bodies();
  CHECK(least_axis_distance_nm(b.first.rows(), tube_over_pose(0.7, gap)) == Approx(1.04));
  CHECK_THROWS_AS(with_tube(RowPose{0.0, 0.5}), std::domain_error);
  CHECK_THROWS_AS(with_tube(RowPose{0.8, 0.0}), std::domain_error);
  CHECK_THROWS_AS(rows_density(b.first, b.first, RowPose{}, b.window, false), std::domain_error);
  CHECK_THROWS_AS(rows_window(0.0, b.nodes), std::domain_error);
  Window wider = b.window;
  ++wider.q.count;
  wider.orders.push_back(1);
  CHECK_THROWS_AS(rows_density(b.first, b.second, stacked_pose(gap), wider, false),
                  std::invalid_argument);
}
