#include "../reference/bessel_reference.hpp"

#include <gapwright/math/bessel.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <boost/math/special_functions/bessel.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

// What the interface promises for a logarithm: 1e-13 or the last bit.
double allowed(double logarithm) {
  return std::max(1e-13, 2.3e-16 * std::abs(logarithm));
}

}  // namespace

TEST_CASE("Bessel logarithms agree with mpmath over the whole range") {
  for (const BesselReference& row : bessel_reference) {
    const BesselLogs logs = bessel_logs(row.x, row.order + 1);
    const int m = row.order;
    CAPTURE(row.x, m);
    CHECK(std::abs(logs.log_i[m] - row.log_i) <= allowed(row.log_i));
    CHECK(std::abs(logs.log_k[m] - row.log_k) <= allowed(row.log_k));
    CHECK(logs.slope_i[m] == Approx(row.slope_i).epsilon(1e-14));
    CHECK(logs.slope_k[m] == Approx(row.slope_k).epsilon(1e-14));
  }
}

TEST_CASE("Bessel logarithms agree with Boost.Math") {
  using boost::math::cyl_bessel_i;
  using boost::math::cyl_bessel_k;
  for (double x = 1e-3; x < 300; x *= 1.37) {
    const BesselLogs logs = bessel_logs(x, 40);
    for (int m = 0; m < 40; ++m) {
      const double i = cyl_bessel_i(m, x), k = cyl_bessel_k(m, x);
      CAPTURE(x, m);
      REQUIRE(std::abs(logs.log_i[m] - std::log(i)) < 2e-13);
      REQUIRE(std::abs(logs.log_k[m] - std::log(k)) < 2e-13);
      REQUIRE(logs.slope_i[m] == Approx((cyl_bessel_i(m + 1, x) / i) + m / x).epsilon(1e-13));
      REQUIRE(logs.slope_k[m] == Approx(m / x - cyl_bessel_k(m + 1, x) / k).epsilon(1e-13));
    }
  }
}

TEST_CASE("scaled functions of order 0 and 1 reach 1e-14") {
  for (const BesselReference& row : bessel_reference) {
    if (row.order > 1 || row.x > 100) continue;  // beyond, ln I itself is rounded at this level
    CAPTURE(row.x, row.order);
    CHECK(std::log(scaled_bessel_i(row.order, row.x)) + row.x ==
          Approx(row.log_i).epsilon(5e-16).margin(1e-14));
    CHECK(std::log(scaled_bessel_k(row.order, row.x)) - row.x ==
          Approx(row.log_k).epsilon(5e-16).margin(1e-14));
  }
  using boost::math::cyl_bessel_i;
  using boost::math::cyl_bessel_k;
  for (double x = 1e-9; x < 600; x *= 1.21)
    for (const int order : {0, 1}) {
      CAPTURE(x, order);
      CHECK(scaled_bessel_i(order, x) ==
            Approx(cyl_bessel_i(order, (long double)x) * std::exp(-(long double)x)).epsilon(1e-14));
      CHECK(scaled_bessel_k(order, x) ==
            Approx(cyl_bessel_k(order, (long double)x) * std::exp((long double)x)).epsilon(1e-14));
    }
}

// A&S 9.6.15: the Wronskian x I_m K_m (I'_m/I_m - K'_m/K_m) = 1, for all orders and methods.
TEST_CASE("Bessel functions satisfy their Wronskian") {
  for (double x = 1e-12; x < 1e6; x *= 2.9) {
    const BesselLogs logs = bessel_logs(x, 4000);
    double worst = 0.0;
    for (int m = 0; m < 4000; ++m) {
      const double sum =
          logs.log_i[m] + logs.log_k[m] + std::log(x) + std::log(logs.slope_i[m] - logs.slope_k[m]);
      worst = std::max(worst, std::abs(sum) / (1e-13 + 5e-16 * std::abs(logs.log_i[m])));
    }
    CAPTURE(x);
    CHECK(worst < 1);
  }
}

TEST_CASE("orders do not depend on how many are asked for") {
  for (const double x : {0.01, 3.0, 31.0, 100.0}) {
    const BesselLogs few = bessel_logs(x, 3), many = bessel_logs(x, 300);
    for (int m = 0; m < 3; ++m) {
      CHECK(few.log_i[m] == Approx(many.log_i[m]).epsilon(1e-15).margin(1e-15));
      CHECK(few.slope_i[m] == Approx(many.slope_i[m]).epsilon(1e-15));
      CHECK(few.log_k[m] == many.log_k[m]);
    }
  }
}

TEST_CASE("Bessel functions refuse arguments outside their domain") {
  for (const double x : {0.0, -1.0, HUGE_VAL, std::nan("")}) {
    CHECK_THROWS_AS(bessel_logs(x, 3), std::domain_error);
    CHECK_THROWS_AS(scaled_bessel_i(0, x), std::domain_error);
    CHECK_THROWS_AS(scaled_bessel_k(0, x), std::domain_error);
  }
  CHECK_THROWS_AS(bessel_logs(1.0, 0), std::domain_error);
  CHECK_THROWS_AS(scaled_bessel_i(2, 1.0), std::domain_error);
  CHECK_THROWS_AS(scaled_bessel_k(-1, 1.0), std::domain_error);
}
