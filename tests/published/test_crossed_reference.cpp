// Reference values of the model for crossed tubes and tubes over a sheet: made once with an
// independent implementation of the same equations. The first round trip was given to five digits;
// the ratio of the full form to it stems from a coarse grid of some 30² wave numbers.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/join/over_sheet.hpp>

#include <cmath>
#include <memory>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Crossed {
  Crossed(Chirality kind, double gap, double tolerance)
      : nodes(make_nodes(tolerance)),
        tube(make_tube(kind)),
        distance(2 * tube.radius_nm + gap),
        window(crossed_window(tube.radius_nm, tube.radius_nm, distance, nodes)),
        body(shell_scatterer(Channel::outward,
                             tube_response(tube, Catalogs::built_in().hopping(), {},
                                           nodes_on(window, nodes), window),
                             Catalogs::built_in().background(), window)) {}

  Estimate sum(const FrequencyDensity& density) const {
    return frequency_sum(density, nodes, window.xi, {});
  }
  CrossedDensity first(double degrees, bool with_slope = false) const {
    return crossed_density(body, body, distance, degrees, window, with_slope);
  }
  CrossedFurther further(double degrees) const {
    return crossed_further(body, body, distance, degrees, window, false);
  }

  Nodes nodes;
  Tube tube;
  double distance;
  Window window;
  Scatterer body;
};

struct OverGraphene {
  OverGraphene(Chirality kind, double gap, double tolerance)
      : nodes(make_nodes(tolerance)),
        window(over_sheet_window(make_tube(kind).radius_nm, gap, nodes)) {
    const Catalogs& catalogs = Catalogs::built_in();
    const Tube tube = make_tube(kind);
    const Scatterer body = shell_scatterer(
        Channel::outward,
        tube_response(tube, catalogs.hopping(), {}, nodes_on(window, nodes), window),
        catalogs.background(), window);
    const double highest = 1.01 * largest_exponent(tolerance) / (2 * gap);
    const CarbonReflector sheet(
        std::make_shared<const FlatResponse>(catalogs.hopping(), Conditions{}, nodes, window.xi,
                                             1e-5, highest),
        catalogs.background(), nodes);
    density = over_sheet_density(body, sheet, tube.radius_nm + gap, window, true);
  }
  Estimate sum(const FrequencyDensity& part) const {
    return frequency_sum(part, nodes, window.xi, {});
  }

  Nodes nodes;
  Window window;
  OverSheetDensity density;
};

}  // namespace

TEST_CASE("crossed tubes, first round trip") {
  struct Row {
    double gap, degrees, energy, rounding;
  };
  for (const Row& r : {Row{0.32, 90, -0.87443, 5e-6},
                       {0.32, 60, -1.01245, 5e-6},
                       {1.0, 90, -0.076403, 3e-6},
                       {1.0, 60, -0.089396, 4e-6}}) {
    const Crossed row({10, 10}, r.gap, 1e-4);
    const Estimate ours = row.sum(row.first(r.degrees).first_round_trip);
    INFO("gap " << r.gap << " at " << r.degrees << " degrees");
    CHECK(ours.value == Approx(r.energy).epsilon(1e-4));
    CHECK(std::fabs(ours.value - r.energy) < ours.error + r.rounding);
    CHECK(ours.error < 1e-4 * std::fabs(ours.value));
  }
}

TEST_CASE("crossed tubes, full form over the first round trip") {
  struct Row {
    double gap, ratio;
  };
  for (const Row& r : {Row{0.32, 1.0200}, {1.0, 1.0111}}) {
    const Crossed row({10, 10}, r.gap, 1e-4);
    const CrossedFurther further = row.further(90);
    CHECK(further.positive);
    const double first = row.sum(row.first(90).first_round_trip).value;
    CHECK(1 + row.sum(further.energy).value / first == Approx(r.ratio).margin(4e-4));
  }
}

TEST_CASE("a tube over graphene") {
  struct Row {
    double gap, full, first;
  };
  for (const Row& r : {Row{0.34, -0.888823, -0.865617}, {1.0, -0.0482805, -0.0476054}}) {
    const OverGraphene row({10, 10}, r.gap, 1e-4);
    const Estimate full = row.sum(row.density.energy),
                   first = row.sum(row.density.first_round_trip);
    INFO("gap " << r.gap);
    CHECK(row.density.positive);
    CHECK(full.value == Approx(r.full).epsilon(3e-5));
    CHECK(first.value == Approx(r.first).epsilon(3e-5));
    CHECK(std::fabs(full.value - r.full) < full.error + 3e-5 * std::fabs(r.full));
    CHECK(full.error < 1e-4 * std::fabs(full.value));
  }
}

TEST_CASE("error estimates of crossed tubes bound the difference to a far finer run") {
  struct Row {
    Chirality kind;
    double gap;
  };
  for (const Row& r : {Row{{10, 10}, 0.34}, {{7, 2}, 0.34}, {{9, 0}, 1.0}, {{10, 10}, 5.0}}) {
    const Crossed fine(r.kind, r.gap, 1e-7);
    for (const double tolerance : {1e-3, 1e-4, 1e-5}) {
      const Crossed row(r.kind, r.gap, tolerance);
      for (const double degrees : {90.0, 40.0, 3.0}) {
        const CrossedDensity ours = row.first(degrees, true), exact = fine.first(degrees, true);
        const Estimate energy = row.sum(ours.first_round_trip), slope = row.sum(ours.first_slope);
        INFO(row.tube.label() << " gap " << r.gap << " at " << degrees << " degrees, tolerance "
                              << tolerance);
        CHECK(std::fabs(energy.value - fine.sum(exact.first_round_trip).value) < energy.error);
        CHECK(std::fabs(slope.value - fine.sum(exact.first_slope).value) < slope.error);
        CHECK(std::fabs(energy.value - fine.sum(exact.first_round_trip).value) <
              0.5 * tolerance * std::fabs(energy.value));
      }
    }
  }
}

TEST_CASE("error estimates of further round trips bound the difference to a finer run") {
  for (const double gap : {0.34, 2.0}) {
    const Crossed fine({5, 5}, gap, 1e-5), row({5, 5}, gap, 1e-4);
    for (const double degrees : {90.0, 35.0}) {
      const Estimate ours = row.sum(row.further(degrees).energy);
      const double exact = fine.sum(fine.further(degrees).energy).value;
      const double first = row.sum(row.first(degrees).first_round_trip).value;
      INFO("gap " << gap << " at " << degrees << " degrees");
      CHECK(std::fabs(ours.value - exact) < ours.error + 0.3 * 1e-4 * std::fabs(first));
    }
  }
}

TEST_CASE("error estimates over a sheet bound the difference to a far finer run") {
  struct Row {
    Chirality kind;
    double gap;
  };
  for (const Row& r : {Row{{10, 10}, 0.34}, {{7, 2}, 0.34}, {{9, 0}, 1.0}, {{10, 10}, 5.0}}) {
    const OverGraphene fine(r.kind, r.gap, 1e-7);
    for (const double tolerance : {1e-3, 1e-4, 1e-5}) {
      const OverGraphene row(r.kind, r.gap, tolerance);
      for (const auto part : {&OverSheetDensity::energy, &OverSheetDensity::first_round_trip,
                              &OverSheetDensity::distance_slope, &OverSheetDensity::first_slope}) {
        const Estimate ours = row.sum(row.density.*part);
        INFO("gap " << r.gap << ", tolerance " << tolerance);
        CHECK(std::fabs(ours.value - fine.sum(fine.density.*part).value) < ours.error);
      }
    }
  }
}
