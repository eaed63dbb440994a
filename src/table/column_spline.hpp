// A cubic spline through one column of a table.
#pragma once

#include <vector>

namespace gapwright {

/// Not-a-knot cubic spline on four or more rising knots: what common readers make of a column.
class ColumnSpline {
 public:
  ColumnSpline(std::vector<double> x, std::vector<double> y);
  /// Value at a place between knot `piece` and the next one.
  double at(double x, std::size_t piece) const;

 private:
  std::vector<double> x_, y_, moments_;  // moments: second derivatives
};

}  // namespace gapwright
