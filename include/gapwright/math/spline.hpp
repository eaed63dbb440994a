// Cubic splines on equally spaced nodes, many curves at once.
#pragma once

#include <span>
#include <vector>

namespace gapwright {

/// Not-a-knot cubic splines through `curves` values at each of `count` >= 4 nodes
/// x_i = first + i·step; values[i·curves + c]. Error falls as step^4.
class UniformSplines {
 public:
  UniformSplines() = default;
  /// Throws std::domain_error for fewer than four nodes or a step that is not positive.
  UniformSplines(double first, double step, int curves, std::vector<double> values);

  double first() const { return first_; }
  double last() const { return first_ + step_ * (count_ - 1); }
  int curves() const { return curves_; }

  /// All curves at x; beyond the ends the end polynomial is continued. out.size() == curves().
  void evaluate(double x, std::span<double> out) const;
  /// One curve at x: value and first derivative.
  double value(double x, int curve = 0) const;
  double slope(double x, int curve = 0) const;

 private:
  double first_ = 0.0;
  double step_ = 1.0;
  int count_ = 0;
  int curves_ = 0;
  std::vector<double> values_;   // [node][curve]
  std::vector<double> moments_;  // second derivatives times step², [node][curve]
};

}  // namespace gapwright
