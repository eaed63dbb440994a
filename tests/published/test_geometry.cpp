// Source: Saito, Dresselhaus & Dresselhaus, Physical Properties of Carbon Nanotubes (Imperial
// College Press, 1998), chapter 3, from memory. The table is for a = 0.246 nm; with
// a_cc = 0.142 nm lengths are shorter by √3·0.142/0.246 = 0.999802.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/tube.hpp>

#include <numbers>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double rescaling = 0.142 * std::numbers::sqrt3 / 0.246;

struct Row {
  Chirality chirality;
  double diameter_nm, angle_deg;
  int atoms;
  double period_nm;
  int remainder;
};

double gap_nm(Chirality inner, Chirality outer) {
  return make_tube(outer).radius_nm - make_tube(inner).radius_nm;
}

}  // namespace

TEST_CASE("diameter, chiral angle, atoms per cell and period of tubes", "[geometry]") {
  const Row rows[] = {
      {{5, 5}, 0.67813, 30, 20, 0.24600, 0},          {{10, 10}, 1.35627, 30, 40, 0.24600, 0},
      {{9, 0}, 0.70474, 0, 36, 0.42608, 0},           {{12, 0}, 0.93965, 0, 48, 0.42608, 0},
      {{6, 5}, 0.74697, 26.9955, 364, 4.06459, 1},    {{7, 5}, 0.81752, 24.5036, 436, 4.44845, 2},
      {{8, 4}, 0.82869, 19.1066, 112, 1.12731, 1},    {{10, 2}, 0.87196, 8.9483, 248, 2.37234, 2},
      {{18, 15}, 2.24092, 26.9955, 1092, 4.06459, 0}, {{27, 4}, 2.28697, 6.8118, 3412, 12.44429, 2},
  };
  for (const Row& row : rows) {
    const Tube tube = make_tube(row.chirality);
    INFO(tube.label());
    CHECK(tube.diameter_nm() == Approx(row.diameter_nm * rescaling).margin(1e-5).epsilon(0));
    CHECK(tube.chiral_angle_deg() == Approx(row.angle_deg).margin(1e-4).epsilon(0));
    CHECK(tube.atoms_per_cell() == row.atoms);
    CHECK(tube.period_nm == Approx(row.period_nm * rescaling).margin(1e-5).epsilon(0));
    CHECK((tube.chirality.n - tube.chirality.m) % 3 == row.remainder);
    CHECK(tube.metallic() == (row.remainder == 0));
  }
}

TEST_CASE("gaps of the usual double walls", "[geometry]") {
  for (int n = 4; n < 20; ++n) {
    CHECK(gap_nm({n, n}, {n + 5, n + 5}) == Approx(0.33907 * rescaling).margin(1e-5).epsilon(0));
    CHECK(gap_nm({n, 0}, {n + 9, 0}) == Approx(0.35237 * rescaling).margin(1e-5).epsilon(0));
    CHECK(gap_nm({n, 0}, {n + 8, 0}) == Approx(0.31322 * rescaling).margin(1e-5).epsilon(0));
  }
}

TEST_CASE("atoms cover the wall at the density of the sheet", "[geometry]") {
  for (const Chirality c : {Chirality{5, 5}, {9, 0}, {6, 5}, {27, 4}}) {
    const Tube tube = make_tube(c);
    const double area_per_nm = 2 * std::numbers::pi * tube.radius_nm;
    CHECK(tube.atoms_per_nm() / area_per_nm == Approx(38.177).margin(2e-3).epsilon(0));
  }
  // 12.011 g/mol over Avogadro's number, 6.02214076e23: 1.99447e-23 g an atom.
  const Tube tube = make_tube({10, 10});
  CHECK(tube.mass_per_nm_zg() / tube.atoms_per_nm() == Approx(12.011 / 602.214076).epsilon(1e-8));
}

TEST_CASE("shape and symmetry follow from the indices", "[geometry]") {
  CHECK(make_tube({7, 7}).shape == TubeKind::armchair);
  CHECK(make_tube({7, 0}).shape == TubeKind::zigzag);
  CHECK(make_tube({7, 1}).shape == TubeKind::chiral);
  CHECK(make_tube({18, 15}).symmetry == 3);
  CHECK(make_tube({7, 0}).symmetry == 7);
  for (const Chirality c : {Chirality{0, 0}, {3, 4}, {3, -1}, {-3, -3}, {2000000000, 1}})
    CHECK_THROWS_AS(make_tube(c), std::domain_error);
}
