// Transitions of zone-folded tubes, one hopping, flat bonds, in units of the hopping.
#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/candidates.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double pi = std::numbers::pi;

HoppingSet zone_folding(double hopping_eV) {
  HoppingSet set;
  set.hopping_eV = {hopping_eV};
  set.overlap = {0.0};
  set.curvature = false;
  return set;
}

TubeGaps gaps(Chirality c) {
  return tube_gaps(make_tube(c), zone_folding(1));
}

}  // namespace

// Source: the dispersion relation of Saito, Dresselhaus & Dresselhaus (1998), section 4.1, without
// overlap, evaluated apart from this program to five digits.
TEST_CASE("first and second transition of semiconducting tubes", "[transitions]") {
  struct Row {
    Chirality chirality;
    double e11, e22;
  };
  const Row rows[] = {{{6, 5}, 0.37618, 0.74947},  {{7, 5}, 0.34861, 0.67109},
                      {{8, 4}, 0.33621, 0.69449},  {{10, 2}, 0.33294, 0.61500},
                      {{10, 0}, 0.35114, 0.76393}, {{27, 4}, 0.12538, 0.24334}};
  for (const Row& row : rows) {
    INFO(row.chirality.n << "," << row.chirality.m);
    const TubeGaps g = gaps(row.chirality);
    CHECK(g.e11_eV == Approx(row.e11).margin(1e-5).epsilon(0));
    CHECK(g.e22_eV == Approx(row.e22).margin(1e-5).epsilon(0));
    CHECK(g.band_gap_eV == g.e11_eV);
  }
}

TEST_CASE("transitions of metallic tubes leave the crossing sub-bands out", "[transitions]") {
  struct Row {
    Chirality chirality;
    double e11, e22;
  };
  const Row rows[] = {{{9, 0}, 1.06418, 1.30541},
                      {{12, 0}, 0.82843, 0.96472},
                      {{15, 0}, 0.67652, 0.76393},
                      {{18, 15}, 0.37618, 0.37987}};
  for (const Row& row : rows) {
    INFO(row.chirality.n << "," << row.chirality.m);
    const TubeGaps g = gaps(row.chirality);
    CHECK(g.e11_eV == Approx(row.e11).margin(1e-5).epsilon(0));
    CHECK(g.e22_eV == Approx(row.e22).margin(1e-5).epsilon(0));
    CHECK(g.band_gap_eV < 1e-10);
  }
  CHECK(gaps({5, 5}).e11_eV == Approx(1.17557).margin(1e-5).epsilon(0));
  CHECK(gaps({10, 10}).e11_eV == Approx(0.61803).margin(1e-5).epsilon(0));
}

// Exact extrema of the sub-bands: 2 sin(πj/n) for armchair, 2|1 + 2cos(πj/n)| for zigzag tubes
// (the same relation at its stationary points).
TEST_CASE("transitions of armchair and zigzag tubes in closed form", "[transitions]") {
  for (int n = 4; n <= 60; ++n) {
    INFO("n = " << n);
    const TubeGaps armchair = gaps({n, n});
    CHECK(armchair.e11_eV == Approx(2 * std::sin(pi / n)).epsilon(1e-9));
    CHECK(armchair.e22_eV == Approx(2 * std::sin(2 * pi / n)).epsilon(1e-9));

    std::vector<double> levels;
    for (int j = 0; j <= n; ++j) {
      const double level = 2 * std::abs(1 + 2 * std::cos(pi * j / n));
      if (level > 1e-9) levels.push_back(level);
    }
    std::sort(levels.begin(), levels.end());
    const TubeGaps zigzag = gaps({n, 0});
    CHECK(zigzag.e11_eV == Approx(levels[0]).epsilon(1e-9));
    CHECK(zigzag.e22_eV == Approx(levels[1]).epsilon(1e-9));
  }
}

// Sources: Mintmire & White, Phys. Rev. Lett. 81, 2506 (1998): E11 = 2 a_cc t/d, E22 = 4 a_cc t/d,
// metallic 6 a_cc t/d; trigonal warping, Saito, Dresselhaus & Dresselhaus, Phys. Rev. B 61, 2981
// (2000), corrects them to first order in a/d with opposite sign for the two kinds.
TEST_CASE("transitions of wide tubes scale with the inverse diameter", "[transitions]") {
  const HoppingSet set = zone_folding(2.7);
  for (const Tube& tube : candidate_tubes({Interval{1.5, 6}, {}, TubeFilter::Kind::any})) {
    const TubeGaps g = tube_gaps(tube, set);
    const double unit = 2 * 0.142 * 2.7 / tube.diameter_nm();
    const double warping = 0.142 / tube.diameter_nm();
    INFO(tube.label());
    if (tube.metallic()) {
      CHECK(std::abs(g.e11_eV / unit - 3) < 3 * 1.7 * warping);
    } else {
      CHECK(std::abs(g.e11_eV / unit - 1) < 1.0 * warping);
      CHECK(std::abs(g.e22_eV / unit - 2) < 2 * 1.2 * warping);
    }
  }
}
