#include "table_readings.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/pair/potential.hpp>
#include <gapwright/table/beads.hpp>
#include <gapwright/table/outer_cut.hpp>
#include <gapwright/table/table.hpp>

#include <cmath>
#include <random>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

Object tube(const char* label) {
  return parse_label(label).object;
}

const Binder& binder() {
  static const Binder shared(Catalogs::built_in(), {});
  return shared;
}

TableRequest request(TableKind kind, const char* first, const char* second) {
  TableRequest wanted;
  wanted.kind = kind;
  wanted.first = tube(first);
  wanted.second = tube(second);
  return wanted;
}

readings::Columns columns_of(const Table& table, double angle_deg = -1) {
  readings::Columns columns;
  for (const TableRow& row : table.rows) {
    if (angle_deg >= 0 && row.angle_deg != angle_deg) continue;
    columns.x.push_back(row.distance_nm);
    columns.energy.push_back(row.energy ? *row.energy : *row.energy_sine);
    columns.force.push_back(row.force ? *row.force : *row.force_sine);
  }
  return columns;
}

// Steep repulsion and a long tail, of known derivatives.
Jet model_energy(double x) {
  const double a = std::pow(1.7 / x, 30), b = std::pow(1.7 / x, 6);
  return {a - 2 * b, (-30 * a + 12 * b) / x, (930 * a - 84 * b) / (x * x)};
}

double strongest_pull(const readings::Columns& c) {
  return -*std::min_element(c.force.begin(), c.force.end());
}
double deepest(const readings::Columns& c) {
  return -*std::min_element(c.energy.begin(), c.energy.end());
}

}  // namespace

TEST_CASE("placed points can be read by cubics to the tolerance") {
  for (const double tolerance : {1e-2, 1e-3, 1e-4, 1e-6}) {
    const TableScale scale = table_scale(model_energy, 1.5, 9.0);
    const PlacedPoints placed = place_points(model_energy, 1.5, 9.0, scale, tolerance);
    readings::Columns c;
    for (const TablePoint& p : placed.points) {
      c.x.push_back(p.distance_nm);
      c.energy.push_back(p.energy);
      c.force.push_back(p.force);
    }
    REQUIRE(c.x.front() == 1.5);
    REQUIRE(c.x.back() == 9.0);
    const readings::Spline energies(c.x, c.energy), forces(c.x, c.force);
    double worst = 0.0;
    std::mt19937 random(7);
    std::uniform_real_distribution<double> share(0, 1);
    for (int i = 0; i < 2000; ++i) {
      const double x = 1.5 * std::pow(6.0, share(random));
      const Jet exact = model_energy(x);
      const double e = std::max(std::fabs(exact.value), 1e-3 * deepest(c));
      const double f = std::max(std::fabs(exact.slope), 1e-3 * strongest_pull(c));
      worst = std::max({worst, std::fabs(readings::hermite(c, x) - exact.value) / e,
                        std::fabs(readings::hermite_force(c, x) + exact.slope) / f,
                        std::fabs(energies.at(x) - exact.value) / e,
                        std::fabs(forces.at(x) + exact.slope) / f});
    }
    CAPTURE(tolerance, placed.points.size());
    CHECK(worst <= 1.05 * tolerance);  // checked between points, not everywhere
    CHECK(worst >= 0.02 * tolerance);  // and not by waste
    if (tolerance == 1e-4) CHECK(placed.points.size() < 250);
  }
}

TEST_CASE("a parallel table returns direct energies and forces", "[table]") {
  const Table table = make_table(binder(), request(TableKind::parallel, "10,10", "17,0"));
  REQUIRE(table.status == Status::ok);
  CHECK(table.rows.size() < 250);
  const readings::Columns c = columns_of(table);
  const auto curve =
      binder().curve({Arrangement::parallel, tube("10,10"), tube("17,0"), std::nullopt});
  const PairFunction contact = binder().contact_term(binder().settings().contact_target);
  const readings::Spline energies(c.x, c.energy), forces(c.x, c.force);
  std::mt19937 random(3);
  std::uniform_real_distribution<double> share(0, 1);
  for (int i = 0; i < 40; ++i) {
    const double gap = 0.2001 * std::pow(49.9, share(random)), x = table.touching_nm + gap;
    const CurvePoint direct = curve->dispersion(gap, true);
    const SmoothEnergy near = curve->contact(contact, gap);
    const double e = direct.energy.value + near.energy, f = -direct.slope.value - near.slope;
    const double e_allowed = table.tolerance * std::max(std::fabs(e), 1e-3 * deepest(c)) +
                             table.dispersion_error * std::fabs(direct.energy.value);
    const double f_allowed = table.tolerance * std::max(std::fabs(f), 1e-3 * strongest_pull(c)) +
                             table.slope_error * std::fabs(direct.slope.value);
    CAPTURE(gap);
    CHECK(std::fabs(readings::hermite(c, x) - e) < e_allowed);
    CHECK(std::fabs(energies.at(x) - e) < e_allowed);
    CHECK(std::fabs(readings::hermite_force(c, x) - f) < f_allowed);
    CHECK(std::fabs(forces.at(x) - f) < f_allowed);
  }
}

TEST_CASE("tabulated forces are the derivatives of tabulated energies", "[table]") {
  const auto curve =
      binder().curve({Arrangement::parallel, tube("10,10"), tube("17,0"), std::nullopt});
  const PairFunction contact = binder().contact_term(binder().settings().contact_target);
  const Potential total = pair_potential(*curve, contact, 0.2, 10.0, 1e-4).total;
  const double touching = curve->touching_nm();
  const OuterCut cut([&](double x) { return total.at(x); }, touching + 6.0);
  for (const double gap : {0.21, 0.28, 0.32, 0.5, 1.3, 4.0, 4.6, 5.5, 5.9}) {
    const double x = touching + gap, h = 2e-5;
    for (const bool with_cut : {false, true}) {
      const auto at = [&](double d) { return with_cut ? cut.at(d) : total.at(d); };
      const double slope =
          (8 * (at(x + h).value - at(x - h).value) - (at(x + 2 * h).value - at(x - 2 * h).value)) /
          (12 * h);
      const double bend = (at(x + h).slope - at(x - h).slope) / (2 * h);
      CAPTURE(gap, with_cut);
      CHECK(at(x).slope == Approx(slope).epsilon(1e-6).margin(1e-9));
      CHECK(at(x).curvature == Approx(bend).epsilon(1e-4).margin(1e-6));
    }
  }
  CHECK(cut.at(touching + 6.0).value == 0.0);
  CHECK(std::fabs(cut.at(touching + 5.999).value) < 1e-12);
  // Below the switch: the same forces, energies moved by the shift.
  const double x = touching + 1.0;
  CHECK(cut.at(x).slope == total.at(x).slope);
  CHECK(cut.at(x).value - total.at(x).value == Approx(cut.shift()).epsilon(1e-9));
}

TEST_CASE("beads summed back return the energy of the tubes", "[table]") {
  TableRequest wanted = request(TableKind::beads, "10,10", "17,0");
  wanted.outer_cut_nm = 6.0;
  wanted.spacing_nm = 0.3;
  const Table table = make_table(binder(), wanted);
  REQUIRE(table.status == Status::ok);
  CHECK(*table.bead_sum_error < table.tolerance);
  // Two chains of the table's beads, read by cubics, averaged over how they lie: an integral by the
  // trapezoidal rule along the chain.
  const readings::Columns c = columns_of(table);
  const Table parallel = [&] {
    TableRequest same = request(TableKind::parallel, "10,10", "17,0");
    same.outer_cut_nm = 6.0;
    return make_table(binder(), same);
  }();
  const readings::Columns u = columns_of(parallel);
  CHECK(*parallel.shift == Approx(*table.shift).epsilon(1e-3));
  for (const double gap : {0.25, 0.32, 0.5, 1.0, 2.5}) {
    const double x = table.touching_nm + gap, step = 1e-3;
    double sum = 0.5 * readings::hermite(c, x);
    for (int j = 1; std::hypot(x, step * j) < 6.0; ++j)
      sum += readings::hermite(c, std::hypot(x, step * j));
    const double back = 2 * step * sum / (0.3 * 0.3), exact = readings::hermite(u, x);
    CAPTURE(gap);
    CHECK(std::fabs(back - exact) < 3e-4 * std::max(std::fabs(exact), 1e-3 * deepest(u)));
  }
  // Discrete chains at the well slide by no more than the corrugation.
  const double x = *table.well_distance_nm;
  double lowest = 1e9, highest = -1e9;
  for (int phase = 0; phase < 8; ++phase) {
    double sum = 0.0;
    for (int j = -20; j <= 20; ++j) {
      const double r = std::hypot(x, 0.3 * (j + phase / 8.0));
      if (r < 6.0) sum += readings::hermite(c, r);
    }
    lowest = std::min(lowest, sum / 0.3);
    highest = std::max(highest, sum / 0.3);
  }
  double corrugation = 0.0;
  for (const SlidingRow& row : table.sliding)
    if (row.spacing_nm == 0.3) corrugation = row.corrugation;
  REQUIRE(corrugation > 0);
  // The sum over a chain is the energy of one bead, spacing times that per length.
  CHECK(0.5 * (lowest + highest) == Approx(*table.well_energy).epsilon(1e-3));
  CHECK((highest - lowest) / -*table.well_energy == Approx(corrugation).epsilon(0.1));
}

TEST_CASE("crossed tables hold angles and their limit", "[table]") {
  TableRequest wanted = request(TableKind::crossed, "10,10", "10,10");
  wanted.angles_deg = {60, 90};
  const Table table = make_table(binder(), wanted);
  REQUIRE(table.status == Status::ok);
  // Reference values of the model (METHODS §5): first round trip, full over first, contact·sin γ.
  const readings::Columns at_90 = columns_of(table, 90);
  CHECK(readings::hermite(at_90, 1.356 + 0.32) ==
        Approx(-0.87443 * 1.0200 - 0.155752).epsilon(3e-4));
  CHECK(readings::hermite(at_90, 1.356 + 1.0) ==
        Approx(-0.076403 * 1.0111 - 0.0017637).epsilon(5e-4));
  // The limit of γ → 0 beside the first round trip at 1°, both of the first round trip.
  const auto parallel =
      binder().curve({Arrangement::parallel, wanted.first, wanted.second, std::nullopt});
  const auto crossed =
      binder().curve({Arrangement::crossed, wanted.first, wanted.second, std::nullopt, 1.0});
  const Potential first =
      pair_potential(*parallel, {}, 0.2, 100.0, 1e-4, RoundTrips::first).dispersion;
  for (const double gap : {0.32, 1.0, 5.0}) {
    const Jet limit = crossing_limit([&](double x) { return first.at(x); }, 1.356 + gap);
    const CurvePoint point = crossed->dispersion(gap, true, RoundTrips::first);
    const double sine = std::sin(std::acos(-1.0) / 180);
    CAPTURE(gap);
    CHECK(point.energy.value * sine == Approx(limit.value).epsilon(3e-4));
    CHECK(point.slope.value * sine == Approx(limit.slope).epsilon(5e-4));
  }
  // Rows of the limit have no energy, and stand beside the angles smoothly.
  const readings::Columns limit = columns_of(table, 0);
  CHECK(limit.x == at_90.x);
  CHECK_FALSE(table.rows.front().energy);
  const double ratio = readings::hermite(limit, 1.676) / readings::hermite(at_90, 1.676);
  CHECK(ratio > 1.005);
  CHECK(ratio < 1.02);
}

TEST_CASE("tables are the same bits for any number of threads", "[table]") {
  const auto rows = [](int threads) {
    set_inner_threads(threads);
    const Binder own(Catalogs::built_in(), {});
    return columns_of(make_table(own, request(TableKind::parallel, "8,2", "10,0")));
  };
  const readings::Columns one = rows(1), three = rows(3);
  set_inner_threads(0);
  CHECK(one.x == three.x);
  CHECK(one.energy == three.energy);
  CHECK(one.force == three.force);
}

TEST_CASE("requests that cannot be met are refused by the member that is wrong") {
  const auto member = [](auto change) {
    TableRequest wanted = request(TableKind::parallel, "10,10", "10,10");
    change(wanted);
    try {
      check_request(wanted);
    } catch (const InputError& error) {
      return error.parts().where;
    }
    return std::string("accepted");
  };
  CHECK(member([](TableRequest&) {}) == "accepted");
  CHECK(member([](TableRequest& r) { r.inner_cut_nm = 1.3; }) == "inner_cut_nm");
  CHECK(member([](TableRequest& r) { r.inner_cut_nm = 1.5; }) == "inner_cut_nm");
  CHECK(member([](TableRequest& r) { r.outer_cut_nm = 2.0; }) == "outer_cut_nm");
  CHECK(member([](TableRequest& r) { r.outer_cut_nm = 1e5; }) == "outer_cut_nm");
  CHECK(member([](TableRequest& r) { r.kind = TableKind::crossed; }) == "angles_deg");
  CHECK(member([](TableRequest& r) { r.angles_deg = {0.5}; }) == "angles_deg");
  CHECK(member([](TableRequest& r) { r.angles_deg = {30, 30}; }) == "angles_deg");
  CHECK(member([](TableRequest& r) { r.spacing_nm = 1.4; }) == "spacing_nm");
  CHECK(member([](TableRequest& r) { r.spacing_nm = 0.0; }) == "spacing_nm");
}
