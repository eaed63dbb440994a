#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/retarded_planar.hpp>

#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

struct Mirror {
  double tm, te;
};

/// METHODS (9.8), with κ_z the decay constant.
Mirror reflection(double strength, double normal, double wave, double delay, double kappa) {
  const double tm = 0.5 * strength * kappa, te = 0.5 * strength * delay * delay / kappa;
  return {tm / (1 + tm) + 0.5 * normal * wave * wave / kappa, te / (1 + te)};
}

}  // namespace

PlanarEnergy retarded_planar_energy(const RetardedSheet& a, const RetardedSheet& b,
                                    double spacing_nm, const Conditions& conditions,
                                    const RetardedOptions& options) {
  if (!(a.wave == b.wave) || !(a.xi == b.xi) || !(a.nodes == b.nodes))
    throw std::invalid_argument("retarded_planar_energy: the sheets stand on different nodes");
  if (!(spacing_nm > 0))
    throw std::domain_error("retarded_planar_energy: the spacing must be positive");
  if (!(options.hbar_c_eV_nm > 0))
    throw std::domain_error("retarded_planar_energy: hbar_c_eV_nm must be positive");
  const std::size_t frequencies = std::size_t(a.xi.count);
  const AxisWeights weights = trapezoid_weights(a.nodes.q, a.wave, {});
  FrequencyDensity energy{std::vector<double>(frequencies), std::vector<double>(frequencies), 0};
  FrequencyDensity slope = energy;
  slope.derivatives = 1;
  for (int j = 0; j < a.wave.count; ++j) {
    const double q = a.nodes.q.node(a.wave.first + j);
    const double full = q / (2 * constants::pi) * weights.full[std::size_t(j)];
    const double halved = q / (2 * constants::pi) * weights.halved[std::size_t(j)];
    for (std::size_t k = 0; k < frequencies; ++k) {
      const double s = a.nodes.xi.node(a.xi.first + int(k)) / options.hbar_c_eV_nm;
      const double kappa = std::hypot(q, s);
      const std::size_t at = std::size_t(j) * frequencies + k;
      const Mirror one = reflection(a.strength_nm[at], a.normal_nm[k], q, s, kappa);
      const Mirror two = reflection(b.strength_nm[at], b.normal_nm[k], q, s, kappa);
      const double decay = std::exp(-2 * kappa * spacing_nm);
      const double tm = one.tm * two.tm * decay, te = one.te * two.te * decay;
      const double e = std::log1p(-tm) + std::log1p(-te);
      const double f = 2 * kappa * (tm / (1 - tm) + te / (1 - te));
      energy.full[k] += full * e;
      energy.halved[k] += halved * e;
      slope.full[k] += full * f;
      slope.halved[k] += halved * f;
    }
  }
  return {frequency_sum(energy, a.nodes, a.xi, conditions),
          frequency_sum(slope, a.nodes, a.xi, conditions)};
}

}  // namespace gapwright
