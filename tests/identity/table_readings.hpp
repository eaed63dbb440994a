// How a stranger reads a table: independent of the code that places its points.
#pragma once

#include <algorithm>
#include <vector>

#include <Eigen/Dense>

namespace readings {

struct Columns {
  std::vector<double> x, energy, force;
};

inline std::size_t interval(const std::vector<double>& x, double at) {
  const auto place = std::upper_bound(x.begin() + 1, x.end() - 1, at);
  return std::size_t(place - x.begin()) - 1;
}

/// Energy of the cubic through energies and forces of two rows (Hermite's basis functions).
inline double hermite(const Columns& c, double at) {
  const std::size_t i = interval(c.x, at);
  const double h = c.x[i + 1] - c.x[i], t = (at - c.x[i]) / h, u = 1 - t;
  return (1 + 2 * t) * u * u * c.energy[i] - t * u * u * h * c.force[i] +
         t * t * (3 - 2 * t) * c.energy[i + 1] + t * t * u * h * c.force[i + 1];
}

/// Minus its derivative.
inline double hermite_force(const Columns& c, double at) {
  const std::size_t i = interval(c.x, at);
  const double h = c.x[i + 1] - c.x[i], t = (at - c.x[i]) / h;
  return 6 * t * (1 - t) / h * (c.energy[i] - c.energy[i + 1]) +
         (1 - t) * (1 - 3 * t) * c.force[i] + t * (3 * t - 2) * c.force[i + 1];
}

/// Not-a-knot cubic spline: all coefficients from one dense system in scaled slopes.
class Spline {
 public:
  Spline(std::vector<double> x, std::vector<double> y) : x_(std::move(x)), y_(std::move(y)) {
    const auto n = Eigen::Index(x_.size());
    Eigen::MatrixXd a = Eigen::MatrixXd::Zero(n, n);
    Eigen::VectorXd b(n);
    const auto h = [&](Eigen::Index i) { return x_[i + 1] - x_[i]; };
    const auto rise = [&](Eigen::Index i) { return (y_[i + 1] - y_[i]) / h(i); };
    for (Eigen::Index i = 1; i + 1 < n; ++i) {  // second derivative continuous
      a(i, i - 1) = 1 / h(i - 1);
      a(i, i) = 2 / h(i - 1) + 2 / h(i);
      a(i, i + 1) = 1 / h(i);
      b(i) = 3 * (rise(i - 1) / h(i - 1) + rise(i) / h(i));
    }
    for (const Eigen::Index i : {Eigen::Index(1), n - 2}) {  // third derivative continuous
      const Eigen::Index row = i == 1 ? 0 : n - 1;
      const double l = 1 / (h(i - 1) * h(i - 1)), r = 1 / (h(i) * h(i));
      a(row, i - 1) = l;
      a(row, i) = l - r;
      a(row, i + 1) = -r;
      b(row) = 2 * (rise(i - 1) * l - rise(i) * r);
    }
    slopes_ = a.partialPivLu().solve(b);
  }
  double at(double x) const {
    const auto i = Eigen::Index(interval(x_, x));
    const Columns two{{x_[i], x_[i + 1]}, {y_[i], y_[i + 1]}, {-slopes_[i], -slopes_[i + 1]}};
    return hermite(two, x);
  }

 private:
  std::vector<double> x_, y_;
  Eigen::VectorXd slopes_;
};

}  // namespace readings
