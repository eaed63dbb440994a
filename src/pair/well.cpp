#include "well.hpp"

#include <algorithm>
#include <cmath>
#include <vector>

namespace gapwright {
namespace {

/// A well is found when it moves by less.
constexpr double settled_nm = 1e-7;

/// ln(-E) over ln g: a cubic on each interval between known points of the first round trip, and a
/// line on top of it that meets one point of all round trips in value and slope.
class LogCurve {
 public:
  void add(double gap, double energy, double slope) {
    const Knot knot{std::log(gap), std::log(-energy), gap * slope / energy};
    knots_.insert(std::upper_bound(knots_.begin(), knots_.end(), knot,
                                   [](const Knot& a, const Knot& b) { return a.x < b.x; }),
                  knot);
  }

  void correct(double gap, double energy, double slope) {
    const Value first = at(std::log(gap));
    corrected_at_ = std::log(gap);
    rise_ = std::log(-energy) - first.y;
    tilt_ = gap * slope / energy - first.slope;
  }

  /// dE/dg.
  double slope(double gap) const {
    const double x = std::log(gap);
    const Value first = at(x);
    return -std::exp(first.y + rise_ + tilt_ * (x - corrected_at_)) * (first.slope + tilt_) / gap;
  }

 private:
  struct Knot {
    double x, y, slope;
  };
  struct Value {
    double y, slope;
  };

  Value at(double x) const {
    std::size_t right = 1;
    while (right + 1 < knots_.size() && knots_[right].x < x) ++right;
    const Knot &a = knots_[right - 1], &b = knots_[right];
    const double h = b.x - a.x, t = (x - a.x) / h;
    const double rise = b.y - a.y;
    // Hermite cubic y = a.y + t(...): value and derivative.
    const double c2 = 3 * rise - h * (2 * a.slope + b.slope);
    const double c3 = -2 * rise + h * (a.slope + b.slope);
    return {a.y + t * (h * a.slope + t * (c2 + t * c3)),
            (h * a.slope + t * (2 * c2 + 3 * t * c3)) / h};
  }

  std::vector<Knot> knots_;
  double corrected_at_ = 0.0, rise_ = 0.0, tilt_ = 0.0;
};

/// Root of an increasing crossing of f in [low, high] with f(low) < 0 < f(high), by bisection and
/// secant steps in turn.
template <typename Function>
double root(double low, double high, Function f) {
  double f_low = f(low), f_high = f(high);
  for (int i = 0; i < 200 && high - low > 1e-11; ++i) {
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

/// The first rise of the slope through zero, looked for outwards from contact.
template <typename Function>
std::optional<double> first_minimum(Function slope) {
  double low = closest_well_nm, high = low;
  while (high < farthest_well_nm && slope(high) < 0) {
    low = high;
    high *= 1.06;
  }
  if (high == closest_well_nm || high >= farthest_well_nm) return std::nullopt;
  return root(low, high, slope);
}

}  // namespace

std::optional<Well> find_well(const std::function<CurvePoint(double gap_nm)>& dispersion,
                              const std::function<CurvePoint(double gap_nm)>& first,
                              const std::function<SmoothEnergy(double gap_nm)>& contact) {
  LogCurve curve;
  const auto slope = [&](double gap) { return curve.slope(gap) + contact(gap).slope; };
  for (const double gap : {0.29, 0.33, 0.38}) {
    const CurvePoint point = first(gap);
    curve.add(gap, point.energy.value, point.slope.value);
  }
  // Where the first round trip has no minimum, all of them are looked at from its middle.
  double gap = first_minimum(slope).value_or(0.33);
  for (int round = 0; round < 8; ++round) {
    const CurvePoint point = dispersion(gap);
    curve.correct(gap, point.energy.value, point.slope.value);
    const std::optional<double> next = first_minimum(slope);
    if (!next) return std::nullopt;
    if (std::fabs(*next - gap) < settled_nm) {
      constexpr double step = 1e-5;
      const double stiffness = (slope(gap + step) - slope(gap - step)) / (2 * step);
      return Well{gap, point.slope.error / stiffness + settled_nm, stiffness, point};
    }
    gap = *next;
  }
  return std::nullopt;
}

}  // namespace gapwright
