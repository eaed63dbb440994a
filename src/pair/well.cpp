#include "well.hpp"

#include <algorithm>
#include <cmath>
#include <vector>

namespace gapwright {
namespace {

/// ln(-E) over ln g, a cubic on each interval between known points.
class LogCurve {
 public:
  void add(double gap, const CurvePoint& point) {
    const double e = point.energy.value;
    const Knot knot{std::log(gap), std::log(-e), gap * point.slope.value / e};
    knots_.insert(std::upper_bound(knots_.begin(), knots_.end(), knot,
                                   [](const Knot& a, const Knot& b) { return a.x < b.x; }),
                  knot);
  }

  /// dE/dg.
  double slope(double gap) const {
    const double x = std::log(gap);
    std::size_t right = 1;
    while (right + 1 < knots_.size() && knots_[right].x < x) ++right;
    const Knot &a = knots_[right - 1], &b = knots_[right];
    const double h = b.x - a.x, t = (x - a.x) / h;
    const double rise = b.y - a.y;
    // Hermite cubic y = a.y + t(...): value and derivative.
    const double c2 = 3 * rise - h * (2 * a.slope + b.slope);
    const double c3 = -2 * rise + h * (a.slope + b.slope);
    const double y = a.y + t * (h * a.slope + t * (c2 + t * c3));
    const double dy = (h * a.slope + t * (2 * c2 + 3 * t * c3)) / h;
    return -std::exp(y) * dy / gap;
  }

 private:
  struct Knot {
    double x, y, slope;
  };
  std::vector<Knot> knots_;
};

/// Root of an increasing crossing of f in [low, high] with f(low) < 0 < f(high), by bisection and
/// secant steps in turn.
template <typename Function>
double root(double low, double high, Function f) {
  double f_low = f(low), f_high = f(high);
  for (int i = 0; i < 200 && high - low > 1e-10; ++i) {
    double middle = 0.5 * (low + high);
    if (i % 3 != 2) {
      const double secant = low - f_low * (high - low) / (f_high - f_low);
      const double margin = 0.01 * (high - low);
      middle = std::clamp(secant, low + margin, high - margin);
    }
    const double value = f(middle);
    if (value < 0) {
      low = middle;
      f_low = value;
    } else {
      high = middle;
      f_high = value;
    }
  }
  return 0.5 * (low + high);
}

}  // namespace

std::optional<Well> find_well(const std::function<CurvePoint(double gap_nm)>& dispersion,
                              const std::function<SmoothEnergy(double gap_nm)>& contact) {
  LogCurve curve;
  for (const double gap : {0.29, 0.36}) curve.add(gap, dispersion(gap));
  const auto slope = [&](double gap) { return curve.slope(gap) + contact(gap).slope; };
  double before = 0.0;
  for (int round = 0; round < 8; ++round) {
    // The first rise of the slope through zero, looked for outwards from contact.
    double low = closest_well_nm, high = low;
    while (high < farthest_well_nm && slope(high) < 0) {
      low = high;
      high *= 1.06;
    }
    if (high == closest_well_nm || high >= farthest_well_nm) return std::nullopt;
    const double gap = root(low, high, slope);
    const CurvePoint point = dispersion(gap);
    curve.add(gap, point);
    if (std::fabs(gap - before) < 1e-7) {
      constexpr double step = 1e-5;
      const double stiffness = (slope(gap + step) - slope(gap - step)) / (2 * step);
      return Well{gap, point.slope.error / stiffness + 1e-7, stiffness, point};
    }
    before = gap;
  }
  return std::nullopt;
}

}  // namespace gapwright
