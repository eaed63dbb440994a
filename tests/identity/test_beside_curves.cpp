// Curves and rows of bodies across, over and in a liquid: exchange, derivatives, wells, limits.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>
#include <filesystem>
#include <fstream>
#include <memory>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

Object object(const char* label) {
  return parse_label(label).object;
}

Settings in(const char* medium, double tolerance = 1e-4) {
  Settings settings;
  settings.conditions.medium = medium;
  settings.tolerance = tolerance;
  return settings;
}

const Binder& vacuum() {
  static const Binder binder(Catalogs::built_in(), {});
  return binder;
}

const Binder& water() {
  static const Binder binder(Catalogs::built_in(), in("water"));
  return binder;
}

Placement parallel(const char* a, const char* b, double gap) {
  return {Arrangement::parallel, object(a), object(b), gap};
}
Placement crossed(const char* a, const char* b, std::optional<double> gap, double degrees) {
  return {Arrangement::crossed, object(a), object(b), gap, degrees};
}
Placement over(const char* tube, const Object& below, std::optional<double> gap) {
  return {Arrangement::over, object(tube), below, gap};
}

/// The slope of the dispersion against a difference of four points.
void check_slope(const Binder& binder, const Placement& placement, RoundTrips trips, double step,
                 double tolerance) {
  const auto curve = binder.curve(placement);
  const double gap = *placement.gap_nm;
  curve->announce(gap - 2 * step);
  const auto energy = [&](double shift) {
    return curve->dispersion(gap + shift, false, trips).energy.value;
  };
  const double difference =
      (8 * (energy(step) - energy(-step)) - energy(2 * step) + energy(-2 * step)) / (12 * step);
  const CurvePoint point = curve->dispersion(gap, true, trips);
  CHECK(point.slope.value == Approx(difference).epsilon(tolerance));
  CHECK(point.energy.value == Approx(energy(0)).epsilon(1e-12));
}

}  // namespace

TEST_CASE("exchanging two objects changes no row") {
  const auto same = [](const Binding& a, const Binding& b, double tolerance) {
    CHECK(a.object_1 == b.object_2);
    CHECK(*a.diameter_1_nm == *b.diameter_2_nm);
    for (const auto field : {&Binding::dispersion_eV_per_nm, &Binding::dispersion_eV,
                             &Binding::contact_eV, &Binding::exponent}) {
      REQUIRE((a.*field).has_value() == (b.*field).has_value());
      if (a.*field) CHECK(*(a.*field) == Approx(*(b.*field)).epsilon(tolerance));
    }
  };
  same(water().bind(parallel("5,5@10,10", "8,4", 0.7)),
       water().bind(parallel("8,4", "5,5@10,10", 0.7)), 1e-9);
  // The two orders leave out other rows of the coupling of further round trips.
  same(vacuum().bind(crossed("9,0", "8,4", 0.4, 70)), vacuum().bind(crossed("8,4", "9,0", 0.4, 70)),
       1e-4);
}

TEST_CASE("slopes of curves are derivatives by the gap") {
  const Binder fine(Catalogs::built_in(), in("vacuum", 1e-5));
  const Binder wet(Catalogs::built_in(), in("water", 1e-5));
  const Object silica = HalfSpaceObject{"silica"};
  SECTION("crossed, all round trips") {
    check_slope(vacuum(), crossed("10,10", "9,0", 0.4, 90), RoundTrips::all, 6e-3, 5e-4);
  }
  SECTION("crossed, two walls, first round trip") {
    check_slope(fine, crossed("5,5@10,10", "9,0", 0.4, 20), RoundTrips::first, 2e-3, 2e-5);
  }
  SECTION("crossed in water") {
    check_slope(wet, crossed("6,5", "6,5", 0.8, 50), RoundTrips::first, 4e-3, 2e-5);
  }
  SECTION("over graphene") {
    check_slope(fine, over("5,5@10,10", SheetObject{}, 0.35), RoundTrips::all, 2e-3, 2e-5);
  }
  SECTION("over silica, in vacuum and in water") {
    check_slope(fine, over("10,10", silica, 0.6), RoundTrips::all, 3e-3, 2e-5);
    check_slope(wet, over("10,10", silica, 0.6), RoundTrips::all, 3e-3, 2e-5);
  }
  SECTION("parallel in water") {
    check_slope(wet, parallel("5,5@10,10", "8,4", 0.7), RoundTrips::all, 3e-3, 2e-5);
  }
}

TEST_CASE("a crossing times its sine tends to parallel tubes over their lateral offset") {
  // Tubes of two walls: all walls answer, and all pairs of walls touch.
  const char *a = "5,5@10,10", *b = "9,0";
  const double gap = 0.45;
  const auto beside = vacuum().curve(parallel(a, b, gap));
  const auto across = vacuum().curve(crossed(a, b, gap, 1.0));
  const PairFunction pair = vacuum().contact_term("");
  const double distance = beside->touching_nm() + gap, step = 0.2;
  CHECK(across->touching_nm() == beside->touching_nm());
  double dispersion = 0.0, contact = 0.0;
  for (int i = 0; i < 36; ++i) {
    const double y = gap * std::sinh(i * step);
    const double dy = (i == 0 ? 1 : 2) * step * gap * std::cosh(i * step);
    const double here = std::hypot(distance, y) - beside->touching_nm();
    dispersion += dy * beside->dispersion(here, false, RoundTrips::first).energy.value;
    contact += dy * beside->contact(pair, here).energy;
  }
  const double sine = std::sin(constants::pi / 180);
  CHECK(sine * across->dispersion(gap, false, RoundTrips::first).energy.value ==
        Approx(dispersion).epsilon(3e-4));
  CHECK(sine * across->contact(pair, gap).energy == Approx(contact).epsilon(1e-6));
}

TEST_CASE("rows rest where their energy is least") {
  for (const Placement& placement :
       {over("10,10", SheetObject{}, {}), over("6,5@14,7", SheetObject{}, {}),
        crossed("10,10", "8,4", {}, 60)}) {
    const Binding row = vacuum().bind(placement);
    INFO(row.object_1 << " " << row.object_2);
    REQUIRE(row.status == Status::ok);
    const auto depth = row.well_depth_eV ? row.well_depth_eV : row.well_depth_eV_per_nm;
    const auto stiffness =
        row.stiffness_eV_per_nm2 ? row.stiffness_eV_per_nm2 : row.stiffness_eV_per_nm3;
    const auto curve = vacuum().curve(placement);
    const PairFunction pair = vacuum().contact_term("");
    const auto energy = [&](double shift) {
      const double gap = *row.equilibrium_gap_nm + shift;
      return curve->dispersion(gap, false).energy.value + curve->contact(pair, gap).energy;
    };
    const double step = 2e-3, here = energy(0), more = energy(step), less = energy(-step);
    CHECK(*depth == Approx(-here).epsilon(1e-9));
    CHECK(more > here);
    CHECK(less > here);
    CHECK((more - less) / (2 * step * *stiffness) == Approx(0.0).margin(5e-5));
    CHECK((more + less - 2 * here) / (step * step) == Approx(*stiffness).epsilon(0.01));
  }
}

TEST_CASE("a liquid that is next to nothing is vacuum") {
  const std::filesystem::path folder =
      std::filesystem::temp_directory_path() / "gapwright-thin-liquid";
  std::filesystem::create_directories(folder);
  std::ofstream(folder / "media.toml") << R"([[medium]]
name = "thin"
title = "Next to nothing"
kind = "liquid"
oscillator_energy.value = [10]
oscillator_energy.unit = "eV"
oscillator_energy.range = [1, 20]
oscillator_energy.source = "invented"
oscillator_strength.value = [1e-9]
oscillator_strength.unit = "1"
oscillator_strength.range = [0, 1]
oscillator_strength.source = "invented"
)";
  const Binder thin(Catalogs::from_folder(folder), in("thin"));
  std::filesystem::remove_all(folder);
  for (const Placement& placement :
       {parallel("5,5@10,10", "8,4", 0.7), crossed("5,5@10,10", "8,4", 0.7, 90)}) {
    const CurvePoint there = thin.curve(placement)->dispersion(0.7, false);
    const CurvePoint here = vacuum().curve(placement)->dispersion(0.7, false);
    // Of further round trips between crossed tubes, which rows are left out may change.
    CHECK(there.energy.value == Approx(here.energy.value).epsilon(1e-5));
    CHECK(there.first_round_trip == Approx(here.first_round_trip).epsilon(1e-7));
  }
  // The other side of the surface is as thin.
  const Binding row = thin.bind(over("10,10", HalfSpaceObject{"vacuum"}, 0.7));
  CHECK(std::fabs(*row.dispersion_eV_per_nm) < 1e-8);
}

TEST_CASE("in a liquid and over a half-space there is dispersion alone") {
  for (const Binding& row : {water().bind(parallel("10,10", "10,10", 0.5)),
                             vacuum().bind(over("10,10", HalfSpaceObject{"silica"}, 0.5))}) {
    CHECK(*row.energy_eV_per_nm == *row.dispersion_eV_per_nm);
    CHECK_FALSE(row.contact_eV_per_nm);
    CHECK_FALSE(row.pair_potential_eV_per_nm);
    CHECK_FALSE(row.well_depth_eV_per_nm);
    CHECK(row.contact_target.empty());
  }
  // Water takes away from what holds tubes together; all of it counts for air over water.
  CHECK(*water().bind(parallel("10,10", "10,10", 0.5)).dispersion_eV_per_nm >
        *vacuum().bind(parallel("10,10", "10,10", 0.5)).dispersion_eV_per_nm);
  CHECK(*water().bind(over("10,10", HalfSpaceObject{"vacuum"}, 1.0)).dispersion_eV_per_nm > 0);
}

TEST_CASE(
    "crossed metallic tubes at 300 K: the error bounds what finer nodes and a new window change") {
  const auto at = [](double gap, double tolerance) {
    Settings settings = in("vacuum", tolerance);
    settings.conditions.temperature_K = 300.0;
    const Binder binder(Catalogs::built_in(), settings);
    return binder.curve(crossed("5,5", "5,5", gap, 90))->dispersion(gap, false);
  };
  const CurvePoint below = at(1.999, 1e-4), above = at(2.001, 1e-4), finer = at(2.001, 1e-5);
  CHECK(std::fabs(above.energy.value - finer.energy.value) <=
        above.energy.error + finer.energy.error);
  // The window changes at a gap of 2 nm; E itself falls as D^-1.92 there.
  const double ratio = below.energy.value / above.energy.value;
  CHECK(ratio == Approx(std::pow(2.679 / 2.677, 1.92)).margin(2e-5));
}
