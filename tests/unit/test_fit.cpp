// What a Binder takes: bodies, arrangements, gaps, angles, media.
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/binder.hpp>

#include <algorithm>
#include <cmath>
#include <limits>

#include <catch2/catch.hpp>

using namespace gapwright;
using Catch::Matchers::Contains;

namespace {

const Object tube = parse_label("10,10").object;
const Object sheet = SheetObject{};
const Object silica = HalfSpaceObject{"silica"};

Settings in(const char* medium) {
  Settings settings;
  settings.conditions.medium = medium;
  return settings;
}

}  // namespace

TEST_CASE("bodies that do not fit an arrangement are refused") {
  const Binder binder(Catalogs::built_in(), {});
  const auto refused = [&](const Placement& placement, const char* part) {
    CHECK_THROWS_WITH(binder.bind(placement), Contains(part));
    CHECK_THROWS_AS(binder.bind(placement), InputError);
    CHECK_THROWS_AS(binder.announce({placement}), InputError);
  };
  const double nan = std::numeric_limits<double>::quiet_NaN();
  refused({Arrangement::coaxial, tube}, "one wall");
  refused({Arrangement::parallel, tube}, "nothing beside it");
  refused({Arrangement::parallel, tube, sheet, 1.0}, "no tube");
  refused({Arrangement::parallel, sheet, tube, 1.0}, "no tube");
  refused({Arrangement::parallel, tube, tube, 0.1}, "0.2 to 10000");
  refused({Arrangement::parallel, tube, tube, nan}, "0.2 to 10000");
  refused({Arrangement::parallel, tube, tube, 1.0, 30.0}, "an angle is for crossed");
  refused({Arrangement::crossed, tube, tube, 1.0}, "need an angle");
  refused({Arrangement::crossed, tube, silica, 1.0, 30.0}, "no tube");
  for (const double angle : {0.5, 91.0, -30.0, nan})
    refused({Arrangement::crossed, tube, tube, 1.0, angle}, "1 to 90 degrees");
  refused({Arrangement::over, tube, tube, 1.0}, "no flat body");
  refused({Arrangement::over, tube, HalfSpaceObject{"silca"}, 1.0}, "nearest: silica");
  refused({Arrangement::over, tube, HalfSpaceObject{"vacuum"}, 1.0}, "no surface");
  refused({Arrangement::over, tube, silica}, "no contact term");
  CHECK_NOTHROW(binder.curve({Arrangement::over, tube, silica}));
  CHECK_THROWS_AS(binder.curve({Arrangement::coaxial, parse_label("5,5@10,10").object}),
                  std::invalid_argument);
}

TEST_CASE("liquids hold where the model does") {
  CHECK_THROWS_WITH(Binder(Catalogs::built_in(), in("watr")), Contains("nearest: water"));
  CHECK_THROWS_WITH(Binder(Catalogs::built_in(), in("silica")), Contains("no liquid"));
  CHECK(Binder(Catalogs::built_in(), in("")).settings().conditions.medium == "vacuum");
  const Binder binder(Catalogs::built_in(), in("water"));
  CHECK_THROWS_WITH(binder.bind({Arrangement::coaxial, parse_label("5,5@10,10").object}),
                    Contains("between its walls"));
  CHECK_THROWS_WITH(binder.bind({Arrangement::over, tube, sheet, 1.0}),
                    Contains("graphene in water is not computed"));
  CHECK_THROWS_WITH(binder.bind({Arrangement::over, tube, HalfSpaceObject{"water"}, 1.0}),
                    Contains("no surface"));
  CHECK_THROWS_WITH(binder.bind({Arrangement::parallel, tube, tube}),
                    Contains("no contact term exists for (10,10) and (10,10) in water"));
  CHECK(binder.settings_key() != Binder(Catalogs::built_in(), {}).settings_key());
}

TEST_CASE("notes say what limits a row") {
  const Binder binder(Catalogs::built_in(), in("water"));
  const auto has = [&](const Placement& placement, const char* part) {
    const auto notes = binder.bind(placement).notes;
    return std::any_of(notes.begin(), notes.end(), [&](const std::string& note) {
      return note.find(part) != std::string::npos;
    });
  };
  const Placement close{Arrangement::parallel, tube, tube, 0.5};
  const Placement middle{Arrangement::parallel, tube, tube, 5.0};
  const Placement far{Arrangement::parallel, tube, tube, 11.0};
  const Placement across{Arrangement::crossed, tube, tube, 5.0, 90.0};
  CHECK(has(close, "continuum"));
  CHECK_FALSE(has(middle, "continuum"));
  CHECK_FALSE(has(middle, "non-retarded"));
  CHECK(has(far, "non-retarded"));
  CHECK(has(across, "beyond its first round trip"));
  CHECK_FALSE(has(across, "salt"));  // its static term counts above T = 0
}
