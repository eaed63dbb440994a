#include <gapwright/math/spline.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>
#include <utility>

#include <fmt/format.h>

namespace gapwright {
namespace {

// The interval of x and the place t in [0, 1] within it (outside beyond the ends).
struct Place {
  int interval;
  double t;
};

Place place(double x, double first, double step, int count) {
  const double u = (x - first) / step;
  // In double and in this order of arguments, so that a NaN gives a valid interval.
  const double interval = std::max(0.0, std::min<double>(count - 2, std::floor(u)));
  return {static_cast<int>(interval), u - interval};
}

// Second derivatives times step². Continuity of the first derivative at each inner node:
// m[i-1] + 4m[i] + m[i+1] = 6(y[i-1] - 2y[i] + y[i+1]). Not-a-knot makes m linear over the first
// and the last two intervals, so that m[1] and m[count-2] are the plain second differences.
std::vector<double> make_moments(const std::vector<double>& values, int count, int curves) {
  std::vector<double> moments(values.size());
  const auto row = [&](int i) { return moments.data() + static_cast<std::ptrdiff_t>(i) * curves; };
  for (int i = 1; i < count - 1; ++i) {
    const double* y = values.data() + static_cast<std::ptrdiff_t>(i) * curves;
    double* m = row(i);
    for (int c = 0; c < curves; ++c) m[c] = y[c - curves] - 2 * y[c] + y[c + curves];
  }
  std::vector<double> upper(count, 0.0);
  for (int i = 2; i < count - 2; ++i) {
    upper[i] = 1 / (4 - upper[i - 1]);
    double* m = row(i);
    for (int c = 0; c < curves; ++c) m[c] = (6 * m[c] - m[c - curves]) * upper[i];
  }
  for (int i = count - 3; i >= 2; --i) {
    double* m = row(i);
    for (int c = 0; c < curves; ++c) m[c] -= upper[i] * m[c + curves];
  }
  double* head = row(0);
  double* tail = row(count - 1);
  for (int c = 0; c < curves; ++c) {
    head[c] = 2 * head[c + curves] - head[c + 2 * curves];
    tail[c] = 2 * tail[c - curves] - tail[c - 2 * curves];
  }
  return moments;
}

}  // namespace

UniformSplines::UniformSplines(double first, double step, int curves, std::vector<double> values)
    : first_(first), step_(step), curves_(curves), values_(std::move(values)) {
  if (curves < 1)
    throw std::domain_error(fmt::format("UniformSplines: curves = {}, required: >= 1", curves));
  if (!(step > 0) || !std::isfinite(step))
    throw std::domain_error(fmt::format("UniformSplines: step = {}, required: > 0", step));
  if (values_.size() % curves != 0 || values_.size() / curves < 4)
    throw std::domain_error(
        fmt::format("UniformSplines: {} values of {} curves, required: as many values of each "
                    "curve, at least four",
                    values_.size(), curves));
  count_ = static_cast<int>(values_.size() / curves);
  moments_ = make_moments(values_, count_, curves);
}

void UniformSplines::evaluate(double x, std::span<double> out) const {
  if (count_ == 0 || out.size() != static_cast<std::size_t>(curves_))
    throw std::domain_error(
        fmt::format("UniformSplines::evaluate: out.size() = {}, required: {} of a spline with "
                    "nodes",
                    out.size(), curves_));
  const auto [i, t] = place(x, first_, step_, count_);
  const double s = 1 - t;
  const double left = s * (s * s - 1) / 6, right = t * (t * t - 1) / 6;
  const double* y = values_.data() + static_cast<std::ptrdiff_t>(i) * curves_;
  const double* m = moments_.data() + static_cast<std::ptrdiff_t>(i) * curves_;
  double* result = out.data();
  const int curves = curves_;
  for (int c = 0; c < curves; ++c)
    result[c] = s * y[c] + t * y[c + curves] + (left * m[c] + right * m[c + curves]);
}

double UniformSplines::value(double x, int curve) const {
  const auto [i, t] = place(x, first_, step_, count_);
  const double s = 1 - t;
  const std::size_t a = static_cast<std::size_t>(i) * curves_ + curve, b = a + curves_;
  return s * values_[a] + t * values_[b] +
         (s * (s * s - 1) * moments_[a] + t * (t * t - 1) * moments_[b]) / 6;
}

double UniformSplines::slope(double x, int curve) const {
  const auto [i, t] = place(x, first_, step_, count_);
  const double s = 1 - t;
  const std::size_t a = static_cast<std::size_t>(i) * curves_ + curve, b = a + curves_;
  return (values_[b] - values_[a] +
          ((3 * t * t - 1) * moments_[b] - (3 * s * s - 1) * moments_[a]) / 6) /
         step_;
}

}  // namespace gapwright
