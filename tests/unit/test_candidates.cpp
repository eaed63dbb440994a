#include <gapwright/catalog/input_error.hpp>
#include <gapwright/lattice/candidates.hpp>

#include <algorithm>
#include <limits>

#include <catch2/catch.hpp>

using namespace gapwright;
using Kind = TubeFilter::Kind;

namespace {

/// Plain enumeration of every index pair that could matter.
std::vector<Tube> enumerated(Interval diameter_nm, Interval index, Kind kind) {
  std::vector<Tube> tubes;
  for (int n = 1; n <= 300; ++n)
    for (int m = 0; m <= n; ++m) {
      const Tube tube = make_tube({n, m});
      const bool wanted = kind == Kind::any || (kind == Kind::metallic && tube.metallic()) ||
                          (kind == Kind::semiconducting && !tube.metallic()) ||
                          (kind == Kind::armchair && tube.shape == TubeKind::armchair) ||
                          (kind == Kind::zigzag && tube.shape == TubeKind::zigzag) ||
                          (kind == Kind::chiral && tube.shape == TubeKind::chiral);
      if (wanted && diameter_nm.contains(tube.diameter_nm()) && index.contains(n))
        tubes.push_back(tube);
    }
  return tubes;
}

}  // namespace

TEST_CASE("candidates are all tubes that pass and no other", "[candidates]") {
  const std::vector<Interval> diameters{{0.3, 20}, {0.3, 0.5}, {0.7, 1.4}, {1.3, 1.31}, {15, 15.1}};
  for (const Kind kind : {Kind::any, Kind::metallic, Kind::semiconducting, Kind::armchair,
                          Kind::zigzag, Kind::chiral})
    for (const Interval& diameter : diameters)
      for (const Interval& index : {Interval{0, 1000}, Interval{8, 12}, Interval{9.5, 10.5}}) {
        const auto expected = enumerated(diameter, index, kind);
        const auto tubes = candidate_tubes({diameter, index, kind});
        REQUIRE(tubes.size() == expected.size());
        for (const Tube& tube : expected)
          if (std::none_of(tubes.begin(), tubes.end(),
                           [&](const Tube& t) { return t.chirality == tube.chirality; }))
            FAIL(tube.label() << " is missing");
      }
}

TEST_CASE("candidates come by diameter, then n", "[candidates]") {
  const auto tubes = candidate_tubes({});
  REQUIRE(tubes.size() > 10000);
  CHECK(tubes.front().diameter_nm() >= min_diameter_nm);
  CHECK(tubes.back().diameter_nm() <= max_diameter_nm);
  for (std::size_t i = 1; i < tubes.size(); ++i) {
    const Tube &a = tubes[i - 1], &b = tubes[i];
    // (7,0) and (5,3) share n² + nm + m² = 49: their diameters are equal.
    const bool in_order =
        a.radius_nm < b.radius_nm || (a.radius_nm == b.radius_nm && a.chirality.n < b.chirality.n);
    if (!in_order) FAIL(a.label() << " before " << b.label());
  }
}

TEST_CASE("limits of a range are inclusive, tubes outside 0.3 to 20 nm never pass",
          "[candidates]") {
  const double d = make_tube({10, 10}).diameter_nm();
  const auto only = candidate_tubes({Interval{d, d}, {}, Kind::any});
  REQUIRE(only.size() == 1);
  CHECK(only[0].chirality == Chirality{10, 10});
  CHECK(candidate_tubes({Interval{0, 1000}, {}, Kind::any}).size() == candidate_tubes({}).size());
  CHECK(candidate_tubes({{}, Interval{1, 3}, Kind::any}).size() == 2);  // (3,2) and (3,3)
}

TEST_CASE("an empty range gives no tubes", "[candidates]") {
  const double nan = std::numeric_limits<double>::quiet_NaN();
  CHECK(candidate_tubes({Interval{2, 1}, {}, Kind::any}).empty());
  CHECK(candidate_tubes({Interval{21, 30}, {}, Kind::any}).empty());
  CHECK(candidate_tubes({Interval{nan, 1}, {}, Kind::any}).empty());
  CHECK(candidate_tubes({Interval{0.3, 0.31}, {}, Kind::any}).empty());
  CHECK(candidate_tubes({{}, Interval{5, 4}, Kind::any}).empty());
}

TEST_CASE("words for kinds", "[candidates]") {
  for (const Kind kind : {Kind::any, Kind::metallic, Kind::semiconducting, Kind::armchair,
                          Kind::zigzag, Kind::chiral})
    CHECK(parse_kind(kind_word(kind)) == kind);
  try {
    parse_kind("metalic");
    FAIL("accepted");
  } catch (const InputError& error) {
    CHECK(error.parts().nearest == "metallic");
  }
}
