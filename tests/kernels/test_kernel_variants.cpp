// The kernels of every instruction set this machine has agree to rounding. A program of its own: it
// changes the variant as it goes.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/kernel.hpp>
#include <gapwright/response/shell_response.hpp>

#include <algorithm>
#include <cmath>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

/// Everything that goes through the kernels for one double wall.
struct Results {
  ShellResponse inner, outer;
  CoaxialDensity density;  // with slope
  FrequencyDensity energy_only;
  Estimate energy;
};

Results computed(const Tube& inner, const Tube& outer, const HoppingSet& hopping,
                 double tolerance) {
  const Background& background = Catalogs::built_in().background();
  const Nodes nodes = make_nodes(tolerance);
  const Window window = coaxial_window(inner.radius_nm, outer.radius_nm, nodes);
  Results results;
  results.inner = tube_response(inner, hopping, {}, nodes, window);
  results.outer = tube_response(outer, hopping, {}, nodes, window);
  const Scatterer inside = shell_scatterer(Channel::outward, results.inner, background, window);
  const Scatterer around = shell_scatterer(Channel::inward, results.outer, background, window);
  results.density = coaxial_density(inside, around, window, true);
  results.energy_only = coaxial_density(inside, around, window, false).energy;
  results.energy = frequency_sum(results.density.energy, nodes, window.xi, {});
  return results;
}

/// The largest relative difference.
double difference(const std::vector<double>& a, const std::vector<double>& b) {
  REQUIRE(a.size() == b.size());
  double worst = 0.0;
  for (std::size_t i = 0; i < a.size(); ++i)
    worst = std::max(worst, std::fabs(a[i] - b[i]) / std::fabs(a[i]));
  return worst;
}

double difference(const ShellResponse& a, const ShellResponse& b) {
  double worst = 0.0;
  for (int j = 0; j < a.window().q.count; ++j)
    for (int m = 0; m < a.window().orders[std::size_t(j)]; ++m) {
      const auto x = a.cell(j, m), y = b.cell(j, m);
      worst = std::max(worst, difference({x.begin(), x.end()}, {y.begin(), y.end()}));
    }
  return worst;
}

}  // namespace

TEST_CASE("kernel variants agree to rounding") {
  REQUIRE(kernel_available(KernelVariant::portable));
  int compared = 0;
  for (const KernelVariant variant : {KernelVariant::avx2, KernelVariant::avx512}) {
    if (!kernel_available(variant)) continue;
    ++compared;
    for (const char* set : {"nearest-neighbour", "third-neighbour-overlap"})
      for (const double tolerance : {1e-4, 1e-6}) {
        const HoppingSet& hopping = Catalogs::built_in().hopping(set);
        const Tube inner = make_tube({6, 4}), outer = make_tube({10, 10});
        select_kernel(KernelVariant::portable);
        CHECK(kernel_variant() == KernelVariant::portable);
        const Results plain = computed(inner, outer, hopping, tolerance);
        select_kernel(variant);
        CHECK(kernel_variant() == variant);
        const Results fast = computed(inner, outer, hopping, tolerance);
        // Sums over ξ are in single precision at 1e-4.
        const double bound = tolerance < 1e-5 ? 1e-12 : 3e-7;
        INFO(kernel_word(variant) << ", " << set << ", tolerance " << tolerance);
        CHECK(difference(plain.inner, fast.inner) < bound);
        CHECK(difference(plain.outer, fast.outer) < bound);
        CHECK(difference(plain.density.energy.full, fast.density.energy.full) < bound);
        CHECK(difference(plain.density.gap_slope.full, fast.density.gap_slope.full) < bound);
        CHECK(difference(plain.energy_only.full, fast.energy_only.full) < bound);
        CHECK(fast.energy.value == Approx(plain.energy.value).epsilon(bound));
      }
  }
  if (compared == 0) WARN("this machine has the portable kernels alone");
}

TEST_CASE("kernel variants agree on tubes side by side") {
  const Catalogs& catalogs = Catalogs::built_in();
  const Tube a = make_tube({6, 4}), b = make_tube({9, 1});
  const Nodes nodes = make_nodes(1e-5);
  const double distance = a.radius_nm + b.radius_nm + 0.3;
  const Window window = parallel_window(a.radius_nm, b.radius_nm, distance, nodes);
  select_kernel(KernelVariant::portable);
  const auto scatterer = [&](const Tube& tube) {
    return shell_scatterer(Channel::outward,
                           tube_response(tube, catalogs.hopping(), {}, nodes, window),
                           catalogs.background(), window);
  };
  const Scatterer one = scatterer(a), other = scatterer(b);
  const ParallelDensity plain = parallel_density(one, other, distance, window, true);
  for (const KernelVariant variant : {KernelVariant::avx2, KernelVariant::avx512}) {
    if (!kernel_available(variant)) continue;
    select_kernel(variant);
    const ParallelDensity fast = parallel_density(one, other, distance, window, true);
    INFO(kernel_word(variant));
    CHECK(fast.positive);
    CHECK(difference(plain.energy.full, fast.energy.full) < 1e-10);
    CHECK(difference(plain.first_round_trip.full, fast.first_round_trip.full) < 1e-12);
    CHECK(difference(plain.distance_slope.full, fast.distance_slope.full) < 1e-10);
    CHECK(difference(plain.first_slope.full, fast.first_slope.full) < 1e-12);
  }
}

TEST_CASE("a variant that is missing is refused") {
  for (const KernelVariant variant : {KernelVariant::avx2, KernelVariant::avx512})
    if (!kernel_available(variant)) CHECK_THROWS_AS(select_kernel(variant), std::invalid_argument);
}
