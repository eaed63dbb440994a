#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/quadrature.hpp>
#include <gapwright/response/electron_gas.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>
#include <vector>

#include <fmt/format.h>

namespace gapwright {
namespace {

using constants::hbar2_per_mass_eV_nm2;
using constants::pi;

/// Beyond so many kT -∂f/∂μ is nothing.
constexpr double thermal_reach = 40.0;
constexpr int panel_nodes = 10;

/// ∫_0^∞ f(κ) (-∂f_μ/∂μ')(dμ'/dκ) dκ over the wave number κ that belongs to μ', with panels that
/// shrink towards a logarithmic singularity of f at `singular`.
template <typename Function>
double thermal_mean(double per_mass, double chemical, double thermal, double singular, Function f) {
  const auto wave = [&](double energy) { return std::sqrt(2 * energy / per_mass); };
  std::vector<double> ends = {0.0};
  for (double x = -thermal_reach; x <= thermal_reach; x += 2.0)
    if (chemical + x * thermal > 0) ends.push_back(wave(chemical + x * thermal));
  const double last = ends.back();
  for (double share = 1.0; share > 1e-13; share *= 0.25)
    for (const double sign : {-1.0, 1.0}) ends.push_back(singular * (1 + sign * share));
  ends.push_back(singular);
  std::sort(ends.begin(), ends.end());
  const GaussRule& rule = gauss_legendre(panel_nodes);
  double sum = 0.0;
  for (std::size_t p = 1; p < ends.size() && ends[p - 1] < last; ++p) {
    const double low = ends[p - 1], half = 0.5 * (std::min(ends[p], last) - low);
    if (!(half > 0)) continue;
    for (int i = 0; i < panel_nodes; ++i) {
      const double k = low + half * (1 + rule.nodes[std::size_t(i)]);
      const double x = (0.5 * per_mass * k * k - chemical) / thermal;
      const double fermi = 1 / (4 * thermal * std::pow(std::cosh(0.5 * x), 2));
      sum += half * rule.weights[std::size_t(i)] * fermi * per_mass * k * f(k);
    }
  }
  return sum;
}

/// The chemical potential at which the gas holds as many electrons as at T = 0.
double chemical_potential(double per_mass, double fermi_wave, double thermal) {
  const double fermi = 0.5 * per_mass * fermi_wave * fermi_wave;
  const auto waves = [&](double chemical) {
    return thermal_mean(per_mass, chemical, thermal, fermi_wave, [](double k) { return k; });
  };
  // Few electrons at high temperature put it far below the band.
  double low = fermi, high = fermi + thermal;
  for (double step = thermal; waves(low) > fermi_wave; step *= 2) low -= step;
  while (waves(high) < fermi_wave) high += thermal;
  for (int i = 0; i < 80 && high - low > 1e-14 * std::max(thermal, std::fabs(high)); ++i) {
    const double middle = 0.5 * (low + high);
    (waves(middle) < fermi_wave ? low : high) = middle;
  }
  return 0.5 * (low + high);
}

}  // namespace

double gas_response(double mass, double degeneracy, double fermi_wave_per_nm, double q_per_nm,
                    double xi_eV) {
  if (!(q_per_nm > 0) || !(xi_eV >= 0) || !(fermi_wave_per_nm > 0))
    throw std::domain_error(
        fmt::format("gas_response: q = {}, ξ = {}, k_F = {}, required: q > 0, ξ >= 0, k_F > 0",
                    q_per_nm, xi_eV, fermi_wave_per_nm));
  const double per_mass = hbar2_per_mass_eV_nm2 / mass;
  const double b = 0.5 * per_mass * q_per_nm * q_per_nm;
  const double c = per_mass * q_per_nm * fermi_wave_per_nm;
  const double difference = b - c;
  return degeneracy / (2 * pi * per_mass * q_per_nm) *
         std::log1p(4 * b * c / (xi_eV * xi_eV + difference * difference));
}

GasResponse::GasResponse(const ElectronGasWire& wire, double temperature_K)
    : mass_(wire.mass),
      degeneracy_(wire.degeneracy),
      fermi_wave_(wire.fermi_wave_per_nm()),
      thermal_energy_(constants::boltzmann_eV_per_K * temperature_K),
      chemical_potential_(wire.fermi_energy_eV()) {
  if (!(temperature_K >= 0) || !std::isfinite(temperature_K))
    throw std::domain_error(
        fmt::format("GasResponse: temperature = {} K, required: >= 0", temperature_K));
  if (temperature_K > 0)
    chemical_potential_ =
        gapwright::chemical_potential(hbar2_per_mass_eV_nm2 / mass_, fermi_wave_, thermal_energy_);
}

double GasResponse::operator()(double q_per_nm, double xi_eV) const {
  if (thermal_energy_ == 0) return gas_response(mass_, degeneracy_, fermi_wave_, q_per_nm, xi_eV);
  return thermal_mean(
      hbar2_per_mass_eV_nm2 / mass_, chemical_potential_, thermal_energy_, 0.5 * q_per_nm,
      [&](double k) { return gas_response(mass_, degeneracy_, k, q_per_nm, xi_eV); });
}

}  // namespace gapwright
