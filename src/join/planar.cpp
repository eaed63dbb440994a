#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/planar.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

IndexRange planar_waves(double min_spacing_nm, double max_spacing_nm, const Nodes& nodes) {
  if (!(min_spacing_nm > 0) || !(max_spacing_nm >= min_spacing_nm))
    throw std::domain_error("planar_waves: spacings must rise from a positive value");
  // The integrand is Q·ln(1 - r²e^{-2Qd}): nothing below 0.002/d, e^{-2Qd} beyond.
  const double exponent = 6.0 + std::log(1 / nodes.tolerance);
  const int first = nodes.q.index_below(0.002 / max_spacing_nm);
  return {first, nodes.q.index_above(exponent / (2 * min_spacing_nm)) - first + 1};
}

PlanarEnergy planar_energy(const SheetScatterer& a, const SheetScatterer& b, double spacing_nm,
                           const Conditions& conditions) {
  if (!(a.wave == b.wave) || !(a.xi == b.xi) || !(a.nodes == b.nodes))
    throw std::invalid_argument("planar_energy: the sheets stand on different nodes");
  if (!(spacing_nm > 0)) throw std::domain_error("planar_energy: the spacing must be positive");
  const std::size_t frequencies = std::size_t(a.xi.count);
  const AxisWeights weights = trapezoid_weights(a.nodes.q, a.wave, {});
  FrequencyDensity energy{std::vector<double>(frequencies), std::vector<double>(frequencies), 0};
  FrequencyDensity slope = energy;
  slope.derivatives = 1;
  for (int j = 0; j < a.wave.count; ++j) {
    const double q = a.nodes.q.node(a.wave.first + j);
    const double decay = std::exp(-2 * q * spacing_nm);
    const double measure = q / (2 * constants::pi);
    const double *ra = a.row(j), *rb = b.row(j);
    const double full = measure * weights.full[std::size_t(j)];
    const double halved = measure * weights.halved[std::size_t(j)];
    for (std::size_t k = 0; k < frequencies; ++k) {
      const double p = ra[k] * rb[k] * decay;
      const double e = std::log1p(-p), s = 2 * q * p / (1 - p);
      energy.full[k] += full * e;
      energy.halved[k] += halved * e;
      slope.full[k] += full * s;
      slope.halved[k] += halved * s;
    }
  }
  return {frequency_sum(energy, a.nodes, a.xi, conditions),
          frequency_sum(slope, a.nodes, a.xi, conditions)};
}

}  // namespace gapwright
