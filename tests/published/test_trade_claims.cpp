// "Armchair in armchair attracts most": common practice in the trade, held against the electronic
// share of every pair that fits. What holds: metallic walls attract, most of all two of them. What
// does not: that armchair tubes among the metallic ones are special; the narrowest pair wins.
#include <gapwright/lattice/candidates.hpp>
#include <gapwright/pair/binder.hpp>

#include <algorithm>
#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Pair {
  Tube inner, outer;
  Binding row;

  bool both(TubeKind kind) const { return inner.shape == kind && outer.shape == kind; }
  double share() const { return *row.electronic_share_eV_per_nm; }
  double error() const { return *row.electronic_share_error; }
  double share_per_area() const { return share() / (inner.radius_nm + outer.radius_nm); }
};

/// Gaps of 0.334 to 0.346 nm around inner walls of 0.6 to 0.8 nm, by rising share.
std::vector<Pair> pairs_that_fit() {
  const Binder binder(Catalogs::built_in(), {});
  TubeFilter filter;
  filter.diameter_nm = Interval{0.6, 0.8};
  const std::vector<Tube> inner = candidate_tubes(filter);
  filter.diameter_nm = Interval{1.2, 1.6};
  std::vector<Pair> pairs;
  for (const Tube& outside : candidate_tubes(filter))
    for (const Tube& inside : inner) {
      const double gap = outside.radius_nm - inside.radius_nm;
      if (gap >= 0.334 && gap <= 0.346)
        pairs.push_back(
            {inside, outside, binder.bind({Arrangement::coaxial, TubeObject{{inside, outside}}})});
    }
  std::sort(pairs.begin(), pairs.end(),
            [](const Pair& a, const Pair& b) { return a.share() < b.share(); });
  return pairs;
}

}  // namespace

TEST_CASE("which double walls attract most by their electrons") {
  const std::vector<Pair> pairs = pairs_that_fit();
  REQUIRE(pairs.size() > 50);
  const Pair* armchair = nullptr;
  int metallic = 0;
  for (const Pair& pair : pairs) {
    INFO(pair.inner.label() << "@" << pair.outer.label() << " share " << pair.share());
    // The inner wall decides the sign.
    if (pair.inner.metallic())
      CHECK(pair.share() < -10 * pair.error());
    else
      CHECK(pair.share() > 10 * pair.error());
    // Geometry decides the rest: the share is a small part of the attraction.
    CHECK(std::fabs(pair.share()) < 0.01 * std::fabs(*pair.row.dispersion_eV_per_nm));
    if (pair.inner.metallic() && pair.outer.metallic()) ++metallic;
    if (pair.both(TubeKind::armchair)) armchair = &pair;
  }

  // Metallic in metallic comes before all others.
  for (int k = 0; k < metallic; ++k) {
    INFO(k << ": " << pairs[std::size_t(k)].inner.label());
    CHECK(pairs[std::size_t(k)].inner.metallic());
    CHECK(pairs[std::size_t(k)].outer.metallic());
  }
  CHECK(metallic >= 8);

  // (5,5)@(10,10) is beaten by (6,3) in its metallic partners, per length and per area.
  REQUIRE(armchair != nullptr);
  const Pair& strongest = pairs.front();
  CHECK(strongest.inner.label() == "(6,3)");
  CHECK(strongest.inner.shape == TubeKind::chiral);
  CHECK(strongest.share() < armchair->share() - 10 * (strongest.error() + armchair->error()));
  CHECK(strongest.share_per_area() < 1.05 * armchair->share_per_area());
  CHECK(strongest.inner.radius_nm < armchair->inner.radius_nm);

  // By the whole energy per area neither is the strongest.
  const auto best = std::min_element(pairs.begin(), pairs.end(), [](const Pair& a, const Pair& b) {
    return *a.row.energy_mJ_per_m2 < *b.row.energy_mJ_per_m2;
  });
  CHECK_FALSE(best->both(TubeKind::armchair));
  CHECK(best->inner.label() != strongest.inner.label());
}
