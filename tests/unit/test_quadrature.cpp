#include <gapwright/math/quadrature.hpp>

#include <cmath>
#include <stdexcept>
#include <thread>
#include <vector>

#include <boost/math/quadrature/gauss.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

// Boost.Math holds the non-negative nodes in rising order; some of its weights are off by 2e-15.
template <int Count>
void compare_with_boost() {
  using Boost = boost::math::quadrature::gauss<double, Count>;
  const GaussRule& rule = gauss_legendre(Count);
  REQUIRE(rule.nodes.size() == Count);
  const auto& nodes = Boost::abscissa();
  const auto& weights = Boost::weights();
  for (std::size_t i = 0; i < nodes.size(); ++i) {
    const std::size_t right = Count / 2 + i;
    CAPTURE(Count, i);
    CHECK(std::abs(rule.nodes[right] - nodes[i]) <= 2e-16);
    CHECK(std::abs(rule.nodes[Count - 1 - right] + nodes[i]) <= 2e-16);
    CHECK(rule.weights[right] == Approx(weights[i]).epsilon(4e-15));
  }
}

TEST_CASE("Gauss-Legendre rules agree with Boost.Math") {
  compare_with_boost<7>();
  compare_with_boost<8>();
  compare_with_boost<15>();
  compare_with_boost<20>();
  compare_with_boost<25>();
  compare_with_boost<30>();
}

TEST_CASE("Gauss-Legendre rules are exact for polynomials up to degree 2n - 1") {
  for (const int count : {1, 2, 3, 8, 20, 101}) {
    const GaussRule& rule = gauss_legendre(count);
    for (int degree = 0; degree < 2 * count; ++degree) {
      double sum = 0.0;
      for (int i = 0; i < count; ++i) sum += rule.weights[i] * std::pow(rule.nodes[i], degree);
      const double exact = degree % 2 == 0 ? 2.0 / (degree + 1) : 0.0;
      CAPTURE(count, degree);
      REQUIRE(std::abs(sum - exact) < 5e-15);
    }
    for (int i = 1; i < count; ++i) REQUIRE(rule.nodes[i] > rule.nodes[i - 1]);
  }
  CHECK(gauss_legendre(5).nodes[2] == 0);
  CHECK_THROWS_AS(gauss_legendre(0), std::domain_error);
}

TEST_CASE("Gauss-Legendre rules are cached for all threads") {
  std::vector<const GaussRule*> seen(8);
  std::vector<std::thread> threads;
  for (std::size_t i = 0; i < seen.size(); ++i)
    threads.emplace_back([&seen, i] { seen[i] = &gauss_legendre(64); });
  for (std::thread& thread : threads) thread.join();
  for (const GaussRule* rule : seen) CHECK(rule == seen[0]);
}
