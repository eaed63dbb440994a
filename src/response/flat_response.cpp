#include "flat_sum.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/response/flat_response.hpp>

#include <algorithm>
#include <cmath>
#include <deque>
#include <stdexcept>

namespace gapwright {
namespace {

/// Directions of the midpoint rule over 0 … 30°. The sheet's harmonics are cos 6lφ, of relative
/// order (Qa)^{6l-2}; n directions remove all but l = 2n, 4n, …
int directions_for(double wave_per_nm) {
  if (wave_per_nm < 0.8) return 1;
  if (wave_per_nm < 5.0) return 2;
  return 4;
}

}  // namespace

FlatResponse::FlatResponse(const HoppingSet& hopping, const Conditions& conditions,
                           const Nodes& nodes, IndexRange xi, double wave_min_per_nm,
                           double wave_max_per_nm)
    : xi_(xi), wave_min_(wave_min_per_nm), wave_max_(wave_max_per_nm) {
  validate(conditions, hopping);
  if (!(wave_min_per_nm > 0) || !(wave_max_per_nm > wave_min_per_nm))
    throw std::domain_error("FlatResponse: waves must rise from a positive value");
  // Grid points are multiples of the step, so that values do not depend on the range asked for.
  const double step = nodes.tolerance < 1e-5 ? 0.0625 : 0.125;
  const int first = int(std::floor(std::log(wave_min_per_nm) / step)) - 1;
  const int last = int(std::ceil(std::log(wave_max_per_nm) / step)) + 1;
  const int count = last - first + 1;
  std::vector<double> frequencies;
  for (int k = 0; k < xi.count; ++k) frequencies.push_back(nodes.xi.node(xi.first + k));

  std::vector<std::deque<FlatDirection>> fans(5);
  for (const int n : {1, 2, 4})
    for (int i = 0; i < n; ++i)
      fans[std::size_t(n)].emplace_back(hopping, conditions, (i + 0.5) / n * constants::pi / 6,
                                        nodes.tolerance, frequencies);

  std::vector<double> logs(std::size_t(count) * std::size_t(xi.count), 0.0);
#pragma omp parallel num_threads(inner_threads())
  {
    std::vector<double> sums(frequencies.size());
    std::vector<double> mean(frequencies.size());
#pragma omp for schedule(dynamic, 1)
    for (int i = count - 1; i >= 0; --i) {
      const double wave = std::exp((first + i) * step);
      const auto& fan = fans[std::size_t(directions_for(wave))];
      std::fill(mean.begin(), mean.end(), 0.0);
      for (const FlatDirection& direction : fan) {
        direction.strengths(wave, sums);
        for (std::size_t x = 0; x < mean.size(); ++x) mean[x] += sums[x] / double(fan.size());
      }
      for (std::size_t x = 0; x < mean.size(); ++x)
        logs[std::size_t(i) * mean.size() + x] = std::log(mean[x] / (wave * wave));
    }
  }
  log_strength_ = UniformSplines(first * step, step, xi.count, std::move(logs));
}

bool FlatResponse::covers(double wave_min_per_nm, double wave_max_per_nm) const {
  return wave_min_ <= wave_min_per_nm && wave_max_per_nm <= wave_max_;
}

void FlatResponse::strength_nm(double wave_per_nm, std::span<double> out) const {
  const double x = std::clamp(std::log(wave_per_nm), log_strength_.first(), log_strength_.last());
  log_strength_.evaluate(x, out);
  for (double& value : out) value = std::exp(value);
}

ShellResponse flat_shell_response(const FlatResponse& flat, double radius_nm, const Nodes& nodes,
                                  const Window& window) {
  if (!(flat.xi() == window.xi))
    throw std::invalid_argument("flat_shell_response: the frequencies differ");
  ShellResponse response(radius_nm, nodes, window);
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) {
      const double wave2 = q * q + m * m / (radius_nm * radius_nm);
      const std::span<double> out = response.cell(j, m);
      flat.strength_nm(std::sqrt(wave2), out);
      for (double& value : out) value *= wave2;
    }
  }
  return response;
}

}  // namespace gapwright
