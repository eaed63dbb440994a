#include "shell_integrals.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/short_range.hpp>

#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

using constants::pi;

// Mean of ρ^{-2s} over the angle between two coaxial circles, ρ² = R₁² + R₂² - 2R₁R₂cos φ:
// R₂^{-2s} F(s, s; 1; z), z = (R₁/R₂)². Euler's transformation (A&S 15.3.3) makes it
// (g·S)^{1-2s} R₂^{2s-2} F(1-s, 1-s; 1; z), g = R₂ - R₁, S = R₁ + R₂. Slope by g at fixed S.
SmoothEnergy mean_inverse_power(int twice_s, double inner, double outer) {
  const double s = 0.5 * twice_s;
  const double gap = outer - inner, sum = outer + inner;
  const double quotient = inner / outer;
  const CircleSeries series = circle_series(s, quotient * quotient);
  const double front = std::pow(gap * sum, 1 - twice_s) * std::pow(outer, twice_s - 2);
  const double front_rate = (1 - twice_s) / gap + (s - 1) / outer;
  const double z_slope = -quotient * sum / (outer * outer);
  return {front * series.value, front * (front_rate * series.value + z_slope * series.slope)};
}

}  // namespace

SmoothEnergy sheets_energy(const PairFunction& pair, double spacing_nm) {
  require_power("sheets_energy", pair.power);
  if (!(spacing_nm > 0))
    throw std::domain_error(
        fmt::format("sheets_energy: spacing_nm = {}, required: > 0", spacing_nm));
  const double front = carbon_density_per_nm2 * carbon_density_per_nm2 * pi;
  const auto term = [&](int power) {
    return front * 2 / (power - 2) * std::pow(spacing_nm, 2 - power);
  };
  const double repulsion = pair.repulsion_eV_nm12 * term(repulsive_power);
  const double attraction = pair.attraction_eV_nmp * term(pair.power);
  return {repulsion - attraction,
          ((pair.power - 2) * attraction - (repulsive_power - 2) * repulsion) / spacing_nm};
}

SmoothEnergy coaxial_energy(const PairFunction& pair, double inner_radius_nm,
                            double outer_radius_nm) {
  require_power("coaxial_energy", pair.power);
  if (!(inner_radius_nm > 0 && outer_radius_nm > inner_radius_nm && std::isfinite(outer_radius_nm)))
    throw std::domain_error(
        fmt::format("coaxial_energy: radii = {}, {} nm, required: 0 < inner < outer",
                    inner_radius_nm, outer_radius_nm));
  const double repulsion = pair.repulsion_eV_nm12 * line_factor(repulsive_power);
  const double attraction = pair.attraction_eV_nmp * line_factor(pair.power);
  const SmoothEnergy steep =
      mean_inverse_power(repulsive_power - 1, inner_radius_nm, outer_radius_nm);
  const SmoothEnergy soft = mean_inverse_power(pair.power - 1, inner_radius_nm, outer_radius_nm);
  const double energy = repulsion * steep.energy - attraction * soft.energy;
  const double slope = repulsion * steep.slope - attraction * soft.slope;

  // Two circles of 2πR atoms areas each; R₁R₂ changes by (R₁ - R₂)/2 with the gap.
  const double front = carbon_density_per_nm2 * carbon_density_per_nm2 * 4 * pi * pi;
  const double product = inner_radius_nm * outer_radius_nm;
  const double product_slope = 0.5 * (inner_radius_nm - outer_radius_nm);
  return {front * product * energy, front * (product * slope + product_slope * energy)};
}

PairFunction graphitic_pair_potential() {
  return {.repulsion_eV_nm12 = 24.1e-9, .attraction_eV_nmp = 15.2e-6, .power = 6};
}

}  // namespace gapwright
