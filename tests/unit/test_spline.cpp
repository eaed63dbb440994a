#include <gapwright/math/spline.hpp>

#include <cmath>
#include <stdexcept>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

double smooth(double x) {
  return std::sin(3 * x) + std::exp(-x);
}
double smooth_slope(double x) {
  return 3 * std::cos(3 * x) - std::exp(-x);
}
double cubic(double x) {
  return 2 + x * (-1 + x * (0.5 + x * 0.25));
}

template <typename Function>
UniformSplines through(const Function& f, double first, double last, int count) {
  const double step = (last - first) / (count - 1);
  std::vector<double> values;
  for (int i = 0; i < count; ++i) values.push_back(f(first + i * step));
  return {first, step, 1, values};
}

struct Errors {
  double value = 0.0;
  double slope = 0.0;
};

Errors worst(int count) {
  const UniformSplines spline = through(smooth, -1, 2, count);
  Errors errors;
  for (int i = 0; i <= 20000; ++i) {
    const double x = -1 + 0.00015 * i;
    errors.value = std::max(errors.value, std::abs(spline.value(x) - smooth(x)));
    errors.slope = std::max(errors.slope, std::abs(spline.slope(x) - smooth_slope(x)));
  }
  return errors;
}

}  // namespace

TEST_CASE("splines reproduce cubics, beyond the ends too") {
  for (const int count : {4, 5, 6, 7, 30}) {
    const UniformSplines spline = through(cubic, -1, 2, count);
    CHECK(spline.first() == -1);
    CHECK(spline.last() == Approx(2));
    for (const double x : {-1.5, -1.0, -0.3, 0.0, 0.77, 1.9, 2.0, 2.4}) {
      CAPTURE(count, x);
      CHECK(spline.value(x) == Approx(cubic(x)).epsilon(1e-13));
      CHECK(spline.slope(x) == Approx(-1 + x + 0.75 * x * x).margin(1e-12));
    }
  }
}

TEST_CASE("the error of splines falls as step^4, of their slope as step^3") {
  Errors before = worst(121);
  for (const int count : {241, 481, 961}) {
    const Errors now = worst(count);
    CAPTURE(count);
    CHECK(std::log2(before.value / now.value) == Approx(4).margin(0.25));
    CHECK(std::log2(before.slope / now.slope) == Approx(3).margin(0.25));
    before = now;
  }
}

TEST_CASE("splines meet their nodes and are smooth across them") {
  const UniformSplines spline = through(smooth, 0, 3, 13);
  for (int i = 0; i < 13; ++i) CHECK(spline.value(0.25 * i) == Approx(smooth(0.25 * i)));
  for (int i = 1; i < 12; ++i) {
    const double x = 0.25 * i;
    CHECK(spline.slope(x - 1e-9) == Approx(spline.slope(x + 1e-9)).margin(1e-7));
    const auto curvature = [&](double at) {
      return (spline.slope(at + 1e-5) - spline.slope(at - 1e-5)) / 2e-5;
    };
    CHECK(curvature(x - 2e-5) == Approx(curvature(x + 2e-5)).margin(1e-2));
  }
}

TEST_CASE("many curves at once equal one at a time") {
  const int curves = 5, count = 9;
  std::vector<double> values;
  for (int i = 0; i < count; ++i)
    for (int c = 0; c < curves; ++c) values.push_back(std::cos((c + 1) * 0.3 * i));
  const UniformSplines all(2.0, 0.3, curves, values);
  CHECK(all.curves() == curves);
  std::vector<double> out(curves);
  for (const double x : {1.5, 2.0, 2.17, 3.3, 4.4, 5.0}) {
    all.evaluate(x, out);
    for (int c = 0; c < curves; ++c) {
      const UniformSplines one = through([&](double at) { return std::cos((c + 1) * (at - 2.0)); },
                                         2.0, 2.0 + 0.3 * 8, count);
      CHECK(out[c] == Approx(one.value(x)).margin(1e-13));
      CHECK(out[c] == Approx(all.value(x, c)).margin(1e-14));
      CHECK(all.slope(x, c) == Approx(one.slope(x)).margin(1e-12));
    }
  }
}

TEST_CASE("splines refuse what they cannot hold") {
  CHECK_THROWS_AS(UniformSplines(0, 1, 1, {1, 2, 3}), std::domain_error);
  CHECK_THROWS_AS(UniformSplines(0, 0, 1, {1, 2, 3, 4}), std::domain_error);
  CHECK_THROWS_AS(UniformSplines(0, -1, 1, {1, 2, 3, 4}), std::domain_error);
  CHECK_THROWS_AS(UniformSplines(0, std::nan(""), 1, {1, 2, 3, 4}), std::domain_error);
  CHECK_THROWS_AS(UniformSplines(0, 1, 0, {1, 2, 3, 4}), std::domain_error);
  CHECK_THROWS_AS(UniformSplines(0, 1, 2, {1, 2, 3, 4, 5, 6, 7, 8, 9}), std::domain_error);
  const UniformSplines spline(0, 1, 1, {1, 2, 3, 4});
  std::vector<double> out(2);
  CHECK_THROWS_AS(spline.evaluate(1, out), std::domain_error);
  CHECK(std::isnan(spline.value(std::nan(""))));
}
