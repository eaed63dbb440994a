#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/density.hpp>
#include <gapwright/math/matsubara.hpp>

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

/// F falls as this power of ξ above the last node.
constexpr double power_above = 4.0;

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

double lowest_static_wave(double length_nm, double tolerance) {
  return 1.5e-5 * std::min(1.0, tolerance / 1e-4) / std::max(1.0, length_nm);
}

IndexRange contact_frequencies(const Nodes& nodes) {
  // Above the plasmons of the background F falls as ξ^-4; the cut leaves (30 eV/ξ)^3 of that.
  const double highest = 600.0 * std::pow(1e-4 / std::min(nodes.tolerance, 1e-4), 0.2);
  const int first = nodes.warm() ? -1 : nodes.xi.index_below(lowest_frequency_eV);
  return {first, nodes.xi.index_above(highest) - first + 1};
}

bool far_apart(double distance_nm) {
  return std::log10(distance_nm) > 1e-9;
}

Nodes nodes_on(const Window& window, const Nodes& nodes) {
  Nodes chosen = nodes;
  if (window.fine) chosen.q.step *= 0.5;
  return chosen;
}

IndexRange frequencies_at(double distance_nm, const Nodes& nodes) {
  IndexRange range = contact_frequencies(nodes);
  if (nodes.warm() || !far_apart(distance_nm)) return range;
  // Charge waves of length D answer below ħv/D: the lower end moves with 1/D, in decades, so that
  // rows at many distances share few ranges.
  const double decade = std::pow(10.0, std::ceil(std::log10(distance_nm) - 1e-9));
  const int first = nodes.xi.index_below(lowest_frequency_eV / decade);
  return {first, range.end() - first};
}

namespace {

/// What windows and responses leave out.
double neglected(double energy, const FrequencyDensity& density, double tolerance) {
  return ((1 + slope_factor * density.derivatives) * truncation_share * tolerance +
          response_accuracy(tolerance)) *
         std::fabs(energy);
}

AxisWeights integral_weights(const Nodes& nodes, IndexRange xi) {
  return trapezoid_weights(nodes.xi, xi, {.constant_below = true, .power_above = power_above});
}

FrequencySum integral(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi) {
  const AxisWeights weights = integral_weights(nodes, xi);
  double sum = 0.0, halved_waves = 0.0, halved_frequencies = 0.0;
  for (std::size_t k = 0; k < density.full.size(); ++k) {
    sum += weights.full[k] * density.full[k];
    halved_waves += weights.full[k] * density.halved[k];
    halved_frequencies += weights.halved[k] * density.full[k];
  }
  FrequencySum energy;
  energy.value = sum / (2 * constants::pi);
  energy.error = (trapezoid_error(sum, halved_waves) + trapezoid_error(sum, halved_frequencies)) /
                     (2 * constants::pi) +
                 neglected(energy.value, density, nodes.tolerance);
  return energy;
}

FrequencySum thermal_sum(const FrequencyDensity& density, const Nodes& nodes) {
  const auto sum = [&](const std::vector<double>& values) {
    return matsubara_sum(nodes.xi, values.front(), {values.data() + 1, values.size() - 1},
                         power_above);
  };
  const MatsubaraSum full = sum(density.full);
  FrequencySum energy;
  energy.value = full.value;
  energy.static_part = full.static_part;
  energy.error = trapezoid_error(full.value, sum(density.halved).value) + full.error +
                 neglected(energy.value, density, nodes.tolerance);
  return energy;
}

}  // namespace

std::vector<double> frequency_weights(const Nodes& nodes, IndexRange xi) {
  if (!nodes.warm()) return integral_weights(nodes, xi).full;
  // The static node stands for half a term, the first one for the rest of its own.
  const double term = nodes.xi.origin;
  std::vector<double> weights;
  for (int k = xi.first; k < xi.end(); ++k)
    weights.push_back(
        k < 0 ? 0.5 * term
              : (k == 0 ? 0.5 * term * (1 + nodes.xi.step) : nodes.xi.step * nodes.xi.node(k)));
  return weights;
}

FrequencySum frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi) {
  if (density.full.size() != std::size_t(xi.count) || density.halved.size() != density.full.size())
    throw std::invalid_argument("frequency_sum: one density value a frequency is required");
  if (!nodes.warm()) return integral(density, nodes, xi);
  if (xi.first != -1)
    throw std::invalid_argument("frequency_sum: the static node is required at T > 0");
  return thermal_sum(density, nodes);
}

FrequencySum frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi,
                           const Conditions& conditions) {
  validate(conditions);
  if ((conditions.temperature_K > 0) != nodes.warm())
    throw std::invalid_argument("frequency_sum: the nodes are those of another temperature");
  return frequency_sum(density, nodes, xi);
}

}  // namespace gapwright
