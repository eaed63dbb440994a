#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/density.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

namespace {
/// What windows leave out at either end, relative to the tolerance.
constexpr double truncation_share = 0.1;
/// A derivative by distance multiplies the integrand by about 2Q: the cut end weighs more by the
/// ratio of its exponent to the mean one.
constexpr double slope_factor = 5.0;

/// F is constant below, up to a relative ξ²D²/(3ħv)² for bodies 1 nm apart.
constexpr double lowest_frequency_eV = 1e-3;

/// Accuracy of the responses, relative to the energy.
double response_accuracy(double tolerance) {
  return tolerance < 1e-5 ? 1e-8 : 1e-6;
}
}  // namespace

double lowest_wave(double length_nm, double tolerance) {
  // Charge waves of metallic bodies make the integrand rise as q from zero, where it is taken as
  // constant: an error of order (q·length)².
  return 0.003 * std::sqrt(std::min(1.0, tolerance / 1e-4)) / std::max(1.0, length_nm);
}

IndexRange contact_frequencies(const Nodes& nodes) {
  // Above the plasmons of the background F falls as ξ^-4; the cut leaves (30 eV/ξ)^3 of that.
  const double highest = 600.0 * std::pow(1e-4 / std::min(nodes.tolerance, 1e-4), 0.2);
  const int first = nodes.xi.index_below(lowest_frequency_eV);
  return {first, nodes.xi.index_above(highest) - first + 1};
}

Nodes nodes_on(IndexRange xi, const Nodes& nodes) {
  Nodes chosen = nodes;
  if (xi.first < contact_frequencies(nodes).first) chosen.q.step *= 0.5;
  return chosen;
}

IndexRange frequencies_at(double distance_nm, const Nodes& nodes) {
  IndexRange range = contact_frequencies(nodes);
  if (distance_nm <= 1.0) return range;
  // Charge waves of length D answer below ħv/D: the lower end moves with 1/D, in decades, so that
  // rows at many distances share few ranges.
  const double decade = std::pow(10.0, std::ceil(std::log10(distance_nm) - 1e-9));
  const int first = nodes.xi.index_below(lowest_frequency_eV / decade);
  return {first, range.end() - first};
}

Estimate frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi,
                       const Conditions& conditions) {
  validate(conditions);
  if (density.full.size() != std::size_t(xi.count) || density.halved.size() != density.full.size())
    throw std::invalid_argument("frequency_sum: one density value a frequency is required");
  const AxisWeights weights =
      trapezoid_weights(nodes.xi, xi, {.constant_below = true, .power_above = 4.0});
  double sum = 0.0, halved_waves = 0.0, halved_frequencies = 0.0;
  for (std::size_t k = 0; k < density.full.size(); ++k) {
    sum += weights.full[k] * density.full[k];
    halved_waves += weights.full[k] * density.halved[k];
    halved_frequencies += weights.halved[k] * density.full[k];
  }
  Estimate energy;
  energy.value = sum / (2 * constants::pi);
  energy.error = (trapezoid_error(sum, halved_waves) + trapezoid_error(sum, halved_frequencies)) /
                     (2 * constants::pi) +
                 ((1 + slope_factor * density.derivatives) * truncation_share * nodes.tolerance +
                  response_accuracy(nodes.tolerance)) *
                     std::fabs(energy.value);
  return energy;
}

}  // namespace gapwright
