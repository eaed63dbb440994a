#include "column_spline.hpp"

#include <stdexcept>

namespace gapwright {

ColumnSpline::ColumnSpline(std::vector<double> x, std::vector<double> y)
    : x_(std::move(x)), y_(std::move(y)), moments_(x_.size()) {
  const std::size_t n = x_.size();
  if (n < 4 || y_.size() != n) throw std::domain_error("ColumnSpline: four or more knots required");
  std::vector<double>& m = moments_;
  const auto h = [&](std::size_t i) { return x_[i + 1] - x_[i]; };
  const auto rise = [&](std::size_t i) { return (y_[i + 1] - y_[i]) / h(i); };
  // The third derivative does not jump at the second and the last but one knot: m at both ends is
  // on the line through its neighbours, which goes into their equations.
  std::vector<double> above(n), right(n);
  for (std::size_t i = 1; i + 1 < n; ++i) {
    double below = h(i - 1), diagonal = 2 * (h(i - 1) + h(i)), over = h(i);
    if (i == 1) {
      diagonal += h(0) * (1 + h(0) / h(1));
      over -= h(0) * h(0) / h(1);
      below = 0;
    }
    if (i + 2 == n) {
      diagonal += h(i) * (1 + h(i) / h(i - 1));
      below -= h(i) * h(i) / h(i - 1);
      over = 0;
    }
    const double pivot = diagonal - below * above[i - 1];
    above[i] = over / pivot;
    right[i] = (6 * (rise(i) - rise(i - 1)) - below * right[i - 1]) / pivot;
  }
  for (std::size_t i = n - 1; i-- > 1;) m[i] = right[i] - (i + 2 < n ? above[i] * m[i + 1] : 0.0);
  m[0] = m[1] - h(0) / h(1) * (m[2] - m[1]);
  m[n - 1] = m[n - 2] + h(n - 2) / h(n - 3) * (m[n - 2] - m[n - 3]);
}

double ColumnSpline::at(double x, std::size_t piece) const {
  const double h = x_[piece + 1] - x_[piece];
  const double a = (x_[piece + 1] - x) / h, b = 1 - a;
  return a * y_[piece] + b * y_[piece + 1] +
         h * h / 6 * ((a * a * a - a) * moments_[piece] + (b * b * b - b) * moments_[piece + 1]);
}

}  // namespace gapwright
