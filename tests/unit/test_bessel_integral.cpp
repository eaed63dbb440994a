#include <gapwright/math/bessel_integral.hpp>

#include <cmath>
#include <limits>

#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <boost/math/quadrature/tanh_sinh.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

double k0(double x) {
  return boost::math::cyl_bessel_k(0, x);
}

/// By Boost.Math quadrature of Boost.Math's K_0.
double integral(double low, double high) {
  static boost::math::quadrature::tanh_sinh<double> rule;
  return rule.integrate(k0, low, high, 1e-14);
}

}  // namespace

TEST_CASE("the integral of K_0 from zero") {
  CHECK(k0_integral(0.0) == 0.0);
  for (const double x : {1e-12, 1e-6, 0.01, 0.3, 1.0, 1.999, 2.001, 3.0, 7.0, 20.0})
    CHECK(k0_integral(x) == Approx(integral(0.0, x)).epsilon(2e-13));
  // Abramowitz & Stegun (1964) 11.4.22: the whole is π/2.
  CHECK(k0_integral(60.0) == Approx(M_PI / 2).epsilon(1e-15));
  CHECK(k0_integral(1.5) + k0_tail(1.5) == Approx(M_PI / 2).epsilon(1e-15));
}

TEST_CASE("the tail of the integral of K_0") {
  for (const double x : {0.5, 2.001, 5.0, 12.0, 40.0, 100.0, 500.0}) {
    // e^{-x} taken out, so that nothing underflows.
    if (x <= 100)
      CHECK(k0_tail(x) * std::exp(x) ==
            Approx(boost::math::quadrature::gauss_kronrod<double, 61>::integrate(
                       [&](double t) { return std::exp(x) * k0(x + t); }, 0.0, 40.0, 12, 1e-14))
                .epsilon(1e-12));
    // For large x: √(π/2x) e^{-x}(1 - 5/8x + 129/128x²), K_0 of A&S 9.7.2 integrated by parts.
    if (x >= 100)
      CHECK(k0_tail(x) * std::exp(x) * std::sqrt(2 * x / M_PI) ==
            Approx(1 - 5 / (8 * x) + 129 / (128 * x * x)).epsilon(3 / (x * x * x)));
  }
  CHECK(k0_tail(1e4) == 0.0);
}

TEST_CASE("the mean of K_0 over a strip") {
  for (const double q : {1e-3, 0.1, 3.0, 40.0})
    for (const double low : {-0.08, -0.0615, 0.0, 0.06, 1.3, 9.0}) {
      const double high = low + 0.123;
      if (q * low > 300) continue;
      const auto f = [&](double y) { return k0(q * std::fabs(y)); };
      static boost::math::quadrature::tanh_sinh<double> rule;
      const double expected = low < 0 ? rule.integrate(f, low, 0.0) + rule.integrate(f, 0.0, high)
                                      : rule.integrate(f, low, high);
      INFO(q << " " << low);
      CHECK(mean_k0(q, low, high) == Approx(expected / 0.123).epsilon(1e-11));
      CHECK(mean_k0(q, -high, -low) == Approx(mean_k0(q, low, high)).epsilon(1e-13));
    }
}

TEST_CASE("arguments the integrals of K_0 refuse") {
  CHECK_THROWS_AS(k0_integral(-1.0), std::domain_error);
  CHECK_THROWS_AS(k0_tail(std::numeric_limits<double>::quiet_NaN()), std::domain_error);
  CHECK_THROWS_AS(mean_k0(0.0, 0.0, 1.0), std::domain_error);
  CHECK_THROWS_AS(mean_k0(1.0, 1.0, 1.0), std::domain_error);
}
