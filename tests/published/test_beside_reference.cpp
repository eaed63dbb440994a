// Reference values of the model for rows across and over others: made once with an independent
// implementation of the same equations (METHODS §5, §6); relative error below 3e-5, of the full
// form of crossed tubes 4e-4.
#include <gapwright/pair/binder.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Binder& binder() {
  static const Binder all(Catalogs::built_in(), {});
  return all;
}

Binding crossed(double gap, double degrees) {
  const Object tube = parse_label("10,10").object;
  return binder().bind({Arrangement::crossed, tube, tube, gap, degrees});
}

}  // namespace

TEST_CASE("rows of crossed tubes") {
  struct Row {
    double gap, degrees, first, ratio, contact_sine;
  };
  for (const Row& r :
       {Row{0.32, 90, -0.87443, 1.0200, -0.155752}, {1.0, 60, -0.089396, 1.0111, -0.0017637}}) {
    const Binding b = crossed(r.gap, r.degrees);
    INFO("gap " << r.gap << " at " << r.degrees << " degrees");
    CHECK(b.status == Status::ok);
    CHECK(*b.first_round_trip_eV == Approx(r.first).epsilon(1e-4));
    CHECK(*b.dispersion_eV == Approx(r.first * r.ratio).epsilon(2e-3));
    CHECK(*b.contact_eV * std::sin(r.degrees * std::acos(-1.0) / 180) ==
          Approx(r.contact_sine).epsilon(1e-3));
    CHECK(*b.energy_eV == *b.dispersion_eV + *b.contact_eV);
    CHECK(*b.axis_distance_nm == Approx(*b.diameter_1_nm + r.gap));
    CHECK_FALSE(b.dispersion_eV_per_nm);
    CHECK_FALSE(b.energy_eV_per_nm);
    CHECK(b.notes.size() == 1);
  }
}

TEST_CASE("rows over graphene") {
  struct Row {
    double gap, full, first;
  };
  for (const Row& r : {Row{0.34, -0.888823, -0.865617}, {1.0, -0.0482805, -0.0476054}}) {
    const Binding b =
        binder().bind({Arrangement::over, parse_label("10,10").object, SheetObject{}, r.gap});
    INFO("gap " << r.gap);
    CHECK(b.status == Status::ok);
    CHECK(*b.dispersion_eV_per_nm == Approx(r.full).epsilon(3e-5));
    CHECK(*b.first_round_trip_eV_per_nm == Approx(r.first).epsilon(3e-5));
    CHECK(*b.axis_distance_nm == Approx(*b.diameter_1_nm / 2 + r.gap));
    CHECK(b.object_2 == "graphene");
    CHECK(b.kind_2 == "sheet");
    CHECK_FALSE(b.diameter_2_nm);
    CHECK_FALSE(b.chiral_angle_2_deg);
  }
}
