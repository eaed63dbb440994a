// Rows of ribbons and wires as the Binder makes them, against reference values of the model
// (METHODS §5, §6) and simple limits.
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;
using Catch::Matchers::Contains;

namespace {

const Binder& binder() {
  static const Binder cold(Catalogs::built_in(), {});
  return cold;
}

Placement placed(Arrangement arrangement, const std::string& first, const std::string& second,
                 std::optional<double> gap = {}) {
  return {arrangement, parse_label(first).object, parse_label(second).object, gap};
}

Binding row(const Placement& placement) {
  return binder().bind(placement);
}

}  // namespace

TEST_CASE("the well of stacked ribbons") {
  const Binding b = row(placed(Arrangement::stacked, "7-AGNR", "7-AGNR"));
  CHECK(b.status == Status::ok);
  CHECK(*b.equilibrium_gap_nm == Approx(0.34743).margin(2e-5));
  CHECK(*b.well_depth_eV_per_nm == Approx(0.76228).margin(5e-5));
  CHECK(*b.stiffness_eV_per_nm3 > 0);
  CHECK(b.arrangement == "stacked");
  CHECK(b.kind_1 == "armchair ribbon");
  CHECK(*b.band_gap_1_eV == Approx(1.53545).epsilon(1e-4));
  CHECK_FALSE(b.electronic_share_eV_per_nm);
  CHECK_FALSE(b.diameter_1_nm);
}

TEST_CASE("ribbons and tubes at a gap") {
  struct Row {
    Placement placement;
    double dispersion, contact;
  };
  for (const Row& r :
       {Row{placed(Arrangement::coplanar, "7-AGNR", "7-AGNR", 0.34), -0.064972, 0.00197},
        Row{placed(Arrangement::edge_on, "7-AGNR", "7-AGNR", 0.34), -0.18013, -0.02274},
        Row{placed(Arrangement::stacked, "13-AGNR", "13-AGNR", 0.34), -1.62668, -0.00048},
        Row{placed(Arrangement::stacked, "6-ZGNR", "6-ZGNR", 0.34), -1.27146, 0.02158},
        Row{placed(Arrangement::stacked, "10,10", "7-AGNR", 0.34), -0.61827, -0.11243},
        Row{placed(Arrangement::stacked, "13-AGNR", "10,10", 0.34), -0.79624, -0.16460}}) {
    const Binding b = row(r.placement);
    INFO(b.object_1 << " " << b.arrangement << " " << b.object_2);
    CHECK(b.status == Status::ok);
    CHECK(*b.dispersion_eV_per_nm == Approx(r.dispersion).epsilon(2e-4));
    CHECK(*b.contact_eV_per_nm == Approx(r.contact).margin(2e-5));
  }
}

TEST_CASE("an offset weakens a stack and is given back") {
  Placement shifted = placed(Arrangement::stacked, "7-AGNR", "7-AGNR", 0.34);
  const double centred = *row(shifted).dispersion_eV_per_nm;
  shifted.offset_nm = 0.4;
  const Binding b = row(shifted);
  CHECK(*b.offset_nm == 0.4);
  CHECK(*b.dispersion_eV_per_nm > centred);
  shifted.offset_nm = -0.4;
  CHECK(*row(shifted).dispersion_eV_per_nm == Approx(*b.dispersion_eV_per_nm).epsilon(1e-10));
}

TEST_CASE("ribbons crossed and over sheets end with the first round trip") {
  Placement crossed = placed(Arrangement::crossed, "7-AGNR", "7-AGNR", 0.34);
  crossed.angle_deg = 90.0;
  const Binding b = row(crossed);
  CHECK(*b.dispersion_eV < 0);
  CHECK(*b.dispersion_eV == *b.first_round_trip_eV);
  CHECK_THAT(b.notes.back(), Contains("first round trip"));
  crossed.second = parse_label("10,10").object;
  CHECK(row(crossed).status == Status::ok);

  const Binding over = row(placed(Arrangement::over, "7-AGNR", "graphene"));
  CHECK(over.status == Status::ok);
  CHECK(*over.equilibrium_gap_nm == Approx(0.344).margin(0.006));
  CHECK_FALSE(over.electronic_share_eV_per_nm);
}

TEST_CASE("plain wires beside, across and over") {
  Placement wires = placed(Arrangement::parallel, "wire:inas-nanowire", "wire:inas-nanowire", 40.0);
  const Binding pair = row(wires);
  CHECK(*pair.dispersion_eV_per_nm < 0);
  CHECK(*pair.axis_distance_nm == Approx(70.0));
  CHECK_FALSE(pair.contact_eV_per_nm);
  CHECK_THAT(pair.notes.back(), Contains("axial share"));
  wires.arrangement = Arrangement::crossed;
  wires.angle_deg = 60.0;
  CHECK(*row(wires).dispersion_eV < 0);
  // A tube adds its own multipoles to what meets the wire's axis.
  CHECK(
      *row(placed(Arrangement::parallel, "wire:inas-nanowire", "10,10", 5.0)).dispersion_eV_per_nm <
      0);
  CHECK(
      *row(placed(Arrangement::over, "wire:inas-nanowire", "graphene", 5.0)).dispersion_eV_per_nm <
      0);
}

TEST_CASE("rows of ribbons and wires that make no sense are refused by name") {
  const auto refusal = [&](Placement placement) -> std::string {
    try {
      row(placement);
    } catch (const InputError& error) {
      return error.what();
    }
    return "accepted";
  };
  CHECK_THAT(refusal(placed(Arrangement::stacked, "10,10", "5,5")), Contains("no ribbons"));
  CHECK_THAT(refusal(placed(Arrangement::parallel, "7-AGNR", "10,10")), Contains("stacked"));
  CHECK_THAT(refusal(placed(Arrangement::stacked, "200-AGNR", "7-AGNR")), Contains("100-AGNR"));
  CHECK_THAT(refusal(placed(Arrangement::stacked, "7-AGNR", "graphene")), Contains("over"));
  CHECK_THAT(refusal(placed(Arrangement::stacked, "7-AGNR", "7-AGNR", 0.1)),
             Contains("out of range"));
  CHECK_THAT(refusal(placed(Arrangement::crossed, "7-AGNR", "7-AGNR", 0.34)), Contains("angle"));
  CHECK_THAT(refusal(placed(Arrangement::stacked, "7-AGNR", "wire:inas-nanowire", 5.0)),
             Contains("not computed"));
  CHECK_THAT(refusal(placed(Arrangement::parallel, "wire:gaas-etched", "wire:inas-nanowire", 5.0)),
             Contains("permittivity"));
  CHECK_THAT(refusal(placed(Arrangement::parallel, "wire:inas-nanowire", "10,10")),
             Contains("no contact term"));
  CHECK_THAT(refusal(placed(Arrangement::parallel, "wire:none", "10,10", 5.0)),
             Contains("unknown wire"));
  Placement shifted = placed(Arrangement::stacked, "7-AGNR", "7-AGNR", 0.34);
  shifted.offset_nm = std::nan("");
  CHECK_THAT(refusal(shifted), Contains("offset"));
  Settings in_water;
  in_water.conditions.medium = "water";
  const Binder wet(Catalogs::built_in(), in_water);
  CHECK_THROWS_WITH(wet.bind(placed(Arrangement::stacked, "7-AGNR", "7-AGNR", 1.0)),
                    Contains("water"));
}
