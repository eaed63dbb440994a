#include <gapwright/math/slope_spline.hpp>

#include <cmath>
#include <stdexcept>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

// Largest error of value and slope of a spline through e^x sin 2x on equal steps.
std::pair<double, double> errors(int knots) {
  const auto f = [](double x) { return std::exp(x) * std::sin(2 * x); };
  const auto d = [](double x) { return std::exp(x) * (std::sin(2 * x) + 2 * std::cos(2 * x)); };
  std::vector<double> x, y, s;
  for (int i = 0; i < knots; ++i) {
    x.push_back(2.0 * i / (knots - 1));
    y.push_back(f(x.back()));
    s.push_back(d(x.back()));
  }
  const SlopeSpline spline(x, y, s);
  std::pair<double, double> worst{0, 0};
  for (int i = 0; i <= 1000; ++i) {
    const double t = 0.002 * i;
    worst.first = std::max(worst.first, std::fabs(spline.at(t).value - f(t)));
    worst.second = std::max(worst.second, std::fabs(spline.at(t).slope - d(t)));
  }
  return worst;
}

}  // namespace

TEST_CASE("a slope spline is exact for polynomials of degree five") {
  const auto f = [](double x) { return 1 - x * (2 - x * (3 - x * (1 - x * (0.5 - 0.25 * x)))); };
  const auto d = [](double x) { return -2 + x * (6 - x * (3 - x * (2 - 1.25 * x))); };
  const std::vector<double> x = {-1.0, -0.3, 0.1, 1.1, 1.7};
  std::vector<double> y, s;
  for (const double t : x) {
    y.push_back(f(t));
    s.push_back(d(t));
  }
  const SlopeSpline spline(x, y, s);
  for (double t = -1.0; t <= 1.7; t += 0.05) {
    CHECK(spline.at(t).value == Approx(f(t)).margin(1e-13));
    CHECK(spline.at(t).slope == Approx(d(t)).margin(1e-12));
    CHECK(spline.at(t).curvature == Approx(6 + t * (-6 + t * (6 - 5 * t))).margin(1e-11));
  }
}

TEST_CASE("a slope spline converges as the sixth power, its slope as the fifth") {
  const auto coarse = errors(21), fine = errors(41);
  CHECK(std::log2(coarse.first / fine.first) > 5.5);
  CHECK(std::log2(coarse.second / fine.second) > 4.5);
  CHECK(fine.first < 1e-8);
}

TEST_CASE("a slope spline goes on as a straight line and refuses what is no curve") {
  const std::vector<double> x = {0, 1, 2}, y = {0, 1, 4}, s = {0, 2, 4};
  const SlopeSpline spline(x, y, s);
  CHECK(spline.at(3).value == Approx(8));
  CHECK(spline.at(3).slope == Approx(4));
  CHECK(spline.at(-1).value == Approx(0).margin(1e-14));
  CHECK_THROWS_AS(SlopeSpline({0, 1}, y, s), std::domain_error);
  CHECK_THROWS_AS(SlopeSpline({0, 1, 1}, y, s), std::domain_error);
}
