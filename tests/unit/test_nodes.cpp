#include <gapwright/math/nodes.hpp>

#include <cmath>
#include <random>
#include <stdexcept>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Sums {
  double full = 0.0;
  double halved = 0.0;
};

template <typename Function>
Sums integrate(double step, const IndexRange& range, const Continuation& continuation,
               const Function& f) {
  const LogLattice lattice{step};
  const AxisWeights weights = trapezoid_weights(lattice, range, continuation);
  Sums sums;
  for (int j = 0; j < range.count; ++j) {
    const double value = f(lattice.node(range.first + j));
    sums.full += weights.full[j] * value;
    sums.halved += weights.halved[j] * value;
  }
  return sums;
}

IndexRange range_of(double step, double low, double high) {
  const LogLattice lattice{step};
  const int first = lattice.index_below(low);
  return {first, lattice.index_above(high) - first + 1};
}

}  // namespace

TEST_CASE("the step follows from the tolerance alone") {
  CHECK(make_nodes(1e-4).q.step == Approx(0.5).epsilon(1e-3));
  CHECK(make_nodes(1e-4).q.step == make_nodes(1e-4).xi.step);
  CHECK(make_nodes(1e-2).q.step == 0.55);
  CHECK(make_nodes(1e-8).q.step < make_nodes(1e-7).q.step);
  CHECK(make_nodes(1e-4) == make_nodes(1e-4));
  for (const double tolerance : {0.0, 9e-9, 0.011, -1.0, std::nan("")})
    CHECK_THROWS_AS(make_nodes(tolerance), std::domain_error);
}

TEST_CASE("indices are exact at lattice points and bracket everything else") {
  std::mt19937_64 random(7);
  std::uniform_real_distribution<double> exponent(-20, 20);
  for (const double step : {0.6, 0.5, make_nodes(1e-4).q.step, 0.285, 0.1}) {
    const LogLattice lattice{step};
    for (int index = -400; index <= 400; ++index) {
      const double x = lattice.node(index);
      REQUIRE(lattice.index_below(x) == index);
      REQUIRE(lattice.index_above(x) == index);
      REQUIRE(lattice.index_below(std::nextafter(x, 0.0)) == index - 1);
      REQUIRE(lattice.index_above(std::nextafter(x, 1e300)) == index + 1);
    }
    for (int i = 0; i < 1000; ++i) {
      const double x = std::exp(exponent(random));
      REQUIRE(lattice.node(lattice.index_below(x)) <= x);
      REQUIRE(lattice.node(lattice.index_below(x) + 1) > x);
      REQUIRE(lattice.node(lattice.index_above(x)) >= x);
      REQUIRE(lattice.node(lattice.index_above(x) - 1) < x);
    }
    for (const double x : {0.0, -1.0, HUGE_VAL, std::nan("")})
      CHECK_THROWS_AS(lattice.index_below(x), std::domain_error);
  }
}

// ∫_0^∞ e^{-x} dx = 1 and ∫_0^∞ dx/(1 + x²) = π/2, whose poles lie at |Im ln x| = π/2: the error
// falls as e^{-2π·(π/2)/step}.
TEST_CASE("the trapezoid converges exponentially in 1/step") {
  const auto lorentz = [](double x) { return 1 / (1 + x * x); };
  const Continuation continuation{.constant_below = true, .power_above = 2};
  double previous_log = 0.0;
  for (const double step : {1.6, 0.8, 0.4}) {
    const double sum = integrate(step, range_of(step, 1e-9, 1e9), continuation, lorentz).full;
    const double error = std::abs(sum - M_PI_2);
    const double expected = 2 * M_PI * std::exp(-M_PI * M_PI / step);
    CAPTURE(step, error, expected);
    CHECK(error < 1.1 * expected + 1e-14);
    // Halving the step squares the error, up to its constant.
    if (previous_log != 0 && error > 1e-13)
      CHECK(std::log(error / (2 * M_PI)) == Approx(2 * previous_log).epsilon(0.05));
    previous_log = std::log(error / (2 * M_PI));
  }
  const auto decay = [](double x) { return std::exp(-x); };
  CHECK(integrate(0.25, range_of(0.25, 1e-9, 60), {}, decay).full == Approx(1).epsilon(1e-8));
}

TEST_CASE("continuations are the sums over the nodes left out") {
  const auto lorentz = [](double x) { return 1 / (1 + x * x); };
  const auto power = [](double x) { return std::pow(x, -2.5); };
  for (const int first : {-9, -8}) {
    const double step = 0.5;
    const Continuation above{.constant_below = false, .power_above = 2.5};
    const Sums part = integrate(step, {first, 20}, above, power);
    const Sums whole =
        integrate(step, {first, 400}, {.constant_below = false, .power_above = 0}, power);
    CHECK(part.full == Approx(whole.full).epsilon(1e-14));
    CHECK(part.halved == Approx(whole.halved).epsilon(1e-14));

    const auto one = [](double) { return 1.0; };
    const Sums low = integrate(step, {first, 12}, {}, one);
    const Sums long_low = integrate(step, {first - 90, 102}, {.constant_below = false}, one);
    CHECK(low.full == Approx(long_low.full).epsilon(1e-14));
    CHECK(low.halved == Approx(long_low.halved).epsilon(1e-14));

    // A narrow range with continuations against a wide one.
    const Continuation both{.constant_below = true, .power_above = 2};
    CHECK(integrate(step, {-20, 41}, both, lorentz).full == Approx(M_PI_2).epsilon(1e-7));
  }
}

TEST_CASE("the halved rule is the rule of twice the step") {
  const auto f = [](double x) { return x / (1 + x * x * x); };
  const Continuation continuation{.constant_below = true, .power_above = 2};
  for (const IndexRange range : {IndexRange{-30, 61}, IndexRange{-31, 62}, IndexRange{-31, 63}}) {
    const Sums fine = integrate(0.4, range, continuation, f);
    const int first = (range.first + 31) / 2 - 15;
    const int last = (range.end() - 1 + 40) / 2 - 20;
    const Sums coarse = integrate(0.8, {first, last - first + 1}, continuation, f);
    CHECK(fine.halved == Approx(coarse.full).epsilon(1e-14));
    const AxisWeights weights = trapezoid_weights({0.4}, range, continuation);
    for (int j = 0; j < range.count; ++j)
      CHECK((weights.halved[j] == 0) == ((range.first + j) % 2 != 0));
  }
}

TEST_CASE("short and empty ranges") {
  CHECK(trapezoid_weights({0.5}, {0, 0}, {}).full.empty());
  const AxisWeights one = trapezoid_weights({0.5}, {0, 1}, {true, 3});
  CHECK(one.full[0] == Approx(0.5 * (1 + 1 / std::expm1(0.5) + 1 / std::expm1(1.0))));
  CHECK(trapezoid_weights({0.5}, {3, 1}, {}).halved[0] == 0);
  CHECK_THROWS_AS(trapezoid_weights({0.5}, {0, -1}, {}), std::domain_error);
  CHECK_THROWS_AS(trapezoid_weights({0.5}, {0, 3}, {true, 1.0}), std::domain_error);
}

TEST_CASE("the error estimate is between the true error and the difference") {
  const auto lorentz = [](double x) { return 1 / (1 + x * x); };
  const Continuation continuation{.constant_below = true, .power_above = 2};
  for (const double step : {1.0, 0.8, 0.6, 0.5}) {
    const Sums sums = integrate(step, range_of(step, 1e-9, 1e9), continuation, lorentz);
    const double estimate = trapezoid_error(sums.full, sums.halved);
    CAPTURE(step);
    CHECK(estimate >= std::abs(sums.full - M_PI_2));
    CHECK(estimate <= std::abs(sums.full - sums.halved) + 1e-14);
  }
  CHECK(trapezoid_error(0, 0) == 0);
  CHECK(trapezoid_error(0, 2) == 2);
  CHECK(trapezoid_error(-3, -3) == Approx(3e-15));
}

TEST_CASE("windows unite and cover") {
  const Window low{{-5, 4}, {9, 7, 5, 3}, {-3, 10}};
  const Window high{{-3, 6}, {8, 8, 4, 2, 2, 1}, {0, 12}};
  const Window both = united(low, high);
  CHECK(both == united(high, low));
  CHECK(both.q == IndexRange{-5, 8});
  CHECK(both.xi == IndexRange{-3, 15});
  CHECK(both.orders == std::vector<int>{9, 8, 8, 8, 4, 2, 2, 1});
  CHECK(both.covers(low));
  CHECK(both.covers(high));
  CHECK(!low.covers(high));
  CHECK(!low.covers(both));
  CHECK(both.cells() == 42);
  CHECK(both.max_order() == 9);

  const Window empty;
  CHECK(united(low, empty) == low);
  CHECK(united(empty, low) == low);
  CHECK(low.covers(empty));
  CHECK(!empty.covers(low));
  CHECK(empty.cells() == 0);

  const Window far{{4, 1}, {6}, {0, 1}};
  CHECK(united(low, far).orders == std::vector<int>{9, 7, 6, 6, 6, 6, 6, 6, 6, 6});

  // Fewer multipoles at one wave number are enough not to be covered.
  Window greedy = low;
  greedy.orders[2] = 6;
  CHECK(!low.covers(greedy));
  CHECK(greedy.covers(low));
}
