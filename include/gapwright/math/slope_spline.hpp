// Smooth curves through values and slopes.
#pragma once

#include <span>
#include <vector>

namespace gapwright {

/// A value with its first two derivatives.
struct Jet {
  double value = 0.0;
  double slope = 0.0;
  double curvature = 0.0;
};

/// Quintic spline through values and slopes at rising knots, continuous up to its third derivative;
/// at both ends the second derivative is that of the quintic through the last three knots. Its
/// error falls as the sixth power of the spacing, that of the slope as the fifth.
class SlopeSpline {
 public:
  SlopeSpline() = default;
  /// Throws std::domain_error unless there are three or more rising knots and as many values and
  /// slopes.
  SlopeSpline(std::vector<double> knots, std::span<const double> values,
              std::span<const double> slopes);

  double first() const { return knots_.front(); }
  double last() const { return knots_.back(); }
  /// Beyond the ends the curve goes on as a straight line.
  Jet at(double x) const;

 private:
  struct Piece {
    double c[6];  // powers of t = (x - knot)/h
    double h;
  };
  std::vector<double> knots_;
  std::vector<Piece> pieces_;
};

}  // namespace gapwright
