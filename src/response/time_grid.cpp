#include "time_grid.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace gapwright {

namespace {

constexpr int fewest_times = 14;
constexpr int most_times = 60;

std::vector<double> logarithmic(double low, double high, int count) {
  std::vector<double> values;
  for (int i = 0; i < count; ++i)
    values.push_back(low * std::pow(high / low, double(i) / (count - 1)));
  return values;
}

std::vector<double> times_of(double least, double largest, int count) {
  std::vector<double> times = logarithmic(0.02 / largest, 12 / least, count - 1);
  times.insert(times.begin(), 0.0);
  return times;
}

/// e^{-Δτ} over Δ/(Δ² + ξ²): a fit to 1 in these is one in relative error.
Eigen::MatrixXd relative_basis(const std::vector<double>& transitions,
                               const std::vector<double>& times, double xi) {
  Eigen::MatrixXd basis(transitions.size(), times.size());
  for (Eigen::Index i = 0; i < basis.cols(); ++i)
    for (Eigen::Index d = 0; d < basis.rows(); ++d) {
      const double energy = transitions[d];
      basis(d, i) = std::exp(-energy * times[i]) * (energy * energy + xi * xi) / energy;
    }
  return basis;
}

/// Weights of one frequency from the fit on `transitions`. The ridge keeps them from growing where
/// they only fight each other: their sum of magnitudes multiplies the rounding of what they weigh.
Eigen::VectorXd fitted(const std::vector<double>& transitions, const std::vector<double>& times,
                       double xi, double ridge) {
  const Eigen::MatrixXd basis = relative_basis(transitions, times, xi);
  const Eigen::Index samples = basis.rows(), count = basis.cols();
  const Eigen::VectorXd scale = basis.colwise().norm().cwiseInverse();
  Eigen::MatrixXd system = Eigen::MatrixXd::Zero(samples + count, count);
  system.topRows(samples) = basis * scale.asDiagonal();
  system.bottomRows(count).diagonal().setConstant(ridge);
  Eigen::VectorXd goal = Eigen::VectorXd::Zero(samples + count);
  goal.head(samples).setOnes();
  return scale.cwiseProduct(system.householderQr().solve(goal));
}

/// The largest relative error of weights over the transitions.
double largest_error(const std::vector<double>& transitions, const std::vector<double>& times,
                     double xi, const Eigen::VectorXd& weights) {
  const Eigen::VectorXd fit = relative_basis(transitions, times, xi) * weights;
  return (fit.array() - 1).abs().maxCoeff();
}

}  // namespace

TimeGrid time_grid(double least, double largest, const std::vector<double>& frequencies,
                   double relative_error) {
  const int samples = 60 + static_cast<int>(20 * std::log(largest / least));
  const std::vector<double> fitting = logarithmic(least, largest, samples);
  const std::vector<double> checking = logarithmic(least, largest, 2 * samples - 1);
  const double ridge = 1e-4 * relative_error;
  // How many times is a matter of the ribbon and the error alone, not of the frequencies asked for.
  const std::vector<double> probes = logarithmic(0.1 * least, 200 * largest, 12);
  TimeGrid best;
  double least_error = std::numeric_limits<double>::infinity();
  for (int count = fewest_times; count <= most_times && least_error > relative_error; count += 2) {
    const std::vector<double> times = times_of(least, largest, count);
    double error = 0;
    for (const double xi : probes)
      error =
          std::max(error, largest_error(checking, times, xi, fitted(fitting, times, xi, ridge)));
    if (error < least_error) best.times = times;
    least_error = std::min(least_error, error);
  }
  best.weights.resize(best.times.size(), frequencies.size());
  for (std::size_t k = 0; k < frequencies.size(); ++k) {
    const double xi = frequencies[k];
    best.weights.col(k) = fitted(fitting, best.times, xi, ridge);
    best.relative_error =
        std::max(best.relative_error, largest_error(checking, best.times, xi, best.weights.col(k)));
  }
  return best;
}

}  // namespace gapwright
