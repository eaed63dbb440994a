#include <gapwright/math/matsubara.hpp>
#include <gapwright/math/quadrature.hpp>
#include <gapwright/math/spline.hpp>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>
#include <vector>

#include <fmt/format.h>

namespace gapwright {
namespace {

// Terms summed one by one; what Euler and Maclaurin's formula leaves out beyond is below 1e-8.
constexpr int explicit_terms = 32;
constexpr int interval_nodes = 4;
constexpr std::size_t least_values = 8;

/// F over u = ln(ξ/ξ₁) between the nodes, a power beyond the last one.
class Curve {
 public:
  Curve(double step, std::span<const double> values, double power) : power_(power) {
    sign_ = values.front() < 0 ? -1.0 : 1.0;
    logs_ = std::all_of(values.begin(), values.end(), [&](double f) { return sign_ * f > 0; });
    std::vector<double> ordinates(values.begin(), values.end());
    if (logs_)
      for (double& f : ordinates) f = std::log(std::fabs(f));
    last_value_ = values.back();
    spline_ = UniformSplines(0.0, step, 1, std::move(ordinates));
  }

  double last() const { return spline_.last(); }
  double operator()(double u) const {
    if (u > last()) return last_value_ * std::exp(-power_ * (u - last()));
    return logs_ ? sign_ * std::exp(spline_.value(u)) : spline_.value(u);
  }
  /// dF/du.
  double slope(double u) const {
    if (u > last()) return -power_ * (*this)(u);
    return logs_ ? (*this)(u)*spline_.slope(u) : spline_.slope(u);
  }

 private:
  UniformSplines spline_;
  double power_, sign_, last_value_;
  bool logs_;
};

/// ∫F dξ/ξ₁ from u to infinity.
double integral_from(const Curve& curve, double u, double step, double power) {
  const double end = curve.last();
  if (u >= end) return curve(u) * std::exp(u) / (power - 1);
  const GaussRule& gauss = gauss_legendre(interval_nodes);
  double sum = curve(end) * std::exp(end) / (power - 1);
  for (double left = u; left < end - 1e-12 * end;) {
    const double right = std::min(end, (std::floor(left / step + 1e-9) + 1) * step);
    const double half = 0.5 * (right - left);
    for (std::size_t i = 0; i < gauss.nodes.size(); ++i) {
      const double at = left + half * (1 + gauss.nodes[i]);
      sum += half * gauss.weights[i] * curve(at) * std::exp(at);
    }
    left = right;
  }
  return sum;
}

/// Σ_{n>=1} F(ξ_n).
double sum_from_first(double step, std::span<const double> values, double power) {
  const Curve curve(step, values, power);
  double sum = values.front();
  for (int n = 2; n < explicit_terms; ++n) sum += curve(std::log(double(n)));
  // Σ_{n>=N} f = ∫ + ½f - f′/12 + f‴/720, f a power of n near N; Abramowitz & Stegun 23.1.30.
  constexpr double N = explicit_terms;
  const double u = std::log(N), f = curve(u), slope = curve.slope(u);
  const double p = f != 0 ? std::clamp(-slope / f, 0.0, 6.0) : 0.0;
  const double third = -p * (p + 1) * (p + 2) * f / (N * N * N);
  return sum + integral_from(curve, u, step, power) + 0.5 * f - slope / (12 * N) + third / 720;
}

}  // namespace

MatsubaraSum matsubara_sum(const LogLattice& lattice, double at_zero,
                           std::span<const double> values, double power_above) {
  if (!lattice.from_zero || !(lattice.origin > 0) || !(power_above > 1) ||
      values.size() < least_values)
    throw std::domain_error(
        fmt::format("matsubara_sum: {} values from {}, power {}, required: at least {} values from "
                    "a positive first frequency, a power above 1",
                    values.size(), lattice.origin, power_above, least_values));
  std::vector<double> coarse;
  for (std::size_t i = 0; i < values.size(); i += 2) coarse.push_back(values[i]);
  const double kT = lattice.origin / (2 * std::numbers::pi);
  const double rest = kT * sum_from_first(lattice.step, values, power_above);
  MatsubaraSum sum;
  sum.static_part = 0.5 * kT * at_zero;
  sum.value = sum.static_part + rest;
  // The spline's error falls as step^4 only where the curve is well resolved: a quarter, not a
  // fifteenth, of the difference bounds it.
  sum.error = std::fabs(rest - kT * sum_from_first(2 * lattice.step, coarse, power_above)) / 4;
  return sum;
}

}  // namespace gapwright
