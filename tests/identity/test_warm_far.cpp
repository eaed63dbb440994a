// Static waves of metallic tubes reach to any length: what lies below the lowest node.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/join/over_sheet.hpp>
#include <gapwright/response/shell_response.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

/// The same window with `more` wave numbers below.
Window lower(Window window, int more) {
  window.q.first -= more;
  window.q.count += more;
  window.orders.insert(window.orders.begin(), std::size_t(more), window.orders.front());
  return window;
}

Scatterer tube_scatterer(const Tube& tube, const Conditions& at, const Nodes& nodes,
                         const Window& window) {
  const Catalogs& catalogs = Catalogs::built_in();
  return shell_scatterer(
      Channel::outward,
      tube_response(tube, catalogs.hopping(), at, nodes_on(window, nodes), window),
      catalogs.background(), window);
}

Conditions room() {
  Conditions at;
  at.temperature_K = 300;
  return at;
}

}  // namespace

TEST_CASE("crossed metallic tubes at T > 0 do not depend on the lowest wave number") {
  const Tube tube = make_tube({10, 10});
  const Nodes nodes = make_nodes(1e-4, room());
  for (const double gap : {0.32, 20.0})
    for (const double angle : {90.0, 30.0}) {
      const double distance = 2 * tube.radius_nm + gap;
      const Window window = crossed_window(tube.radius_nm, tube.radius_nm, distance, nodes);
      const auto sum = [&](const Window& on) {
        const Scatterer body = tube_scatterer(tube, room(), nodes, on);
        return frequency_sum(
            crossed_density(body, body, distance, angle, on, false).first_round_trip, nodes, on.xi,
            room());
      };
      const FrequencySum usual = sum(window), wider = sum(lower(window, gap < 1 ? 20 : 40));
      INFO("gap " << gap << " angle " << angle << ": " << usual.value << ", n = 0 "
                  << usual.static_part);
      CHECK(usual.value < 0);
      CHECK(std::fabs(usual.value / wider.value - 1) < (gap < 1 ? 1e-5 : 3e-5));
    }
}

TEST_CASE(
    "a metallic tube over a metallic sheet at T > 0 does not depend on the lowest wave number") {
  const Tube tube = make_tube({10, 10});
  const Nodes nodes = make_nodes(1e-4, room());
  const Catalogs& catalogs = Catalogs::built_in();
  for (const double gap : {0.34, 50.0}) {
    const Window window = over_sheet_window(tube.radius_nm, gap, nodes);
    const auto flat = std::make_shared<const FlatResponse>(catalogs.hopping(), room(), nodes,
                                                           window.xi, 1e-9, 100.0);
    const CarbonReflector sheet(flat, catalogs.background(), nodes);
    const auto sum = [&](const Window& on) {
      const Scatterer body = tube_scatterer(tube, room(), nodes, on);
      return frequency_sum(over_sheet_density(body, sheet, tube.radius_nm + gap, on, false).energy,
                           nodes, on.xi, room());
    };
    const FrequencySum usual = sum(window), wider = sum(lower(window, 12));
    INFO("gap " << gap << ": " << usual.value << ", n = 0 " << usual.static_part);
    CHECK(std::fabs(usual.value / wider.value - 1) < 3e-5);
  }
}
