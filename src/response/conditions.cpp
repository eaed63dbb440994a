#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/response/conditions.hpp>

#include <cmath>

#include <fmt/format.h>

namespace gapwright {

double thermal_energy_eV(const Conditions& conditions) {
  return constants::boltzmann_eV_per_K * conditions.temperature_K;
}

Nodes make_nodes(double tolerance, const Conditions& conditions) {
  return make_nodes(tolerance, 2 * constants::pi * thermal_energy_eV(conditions));
}

void validate(const Conditions& conditions) {
  const double t = conditions.temperature_K;
  const auto refuse = [&](const std::string& nearest) {
    throw InputError(
        {.what = fmt::format("temperature {} K is out of range", t),
         .where = "temperature_K",
         .excerpt = {},
         .expected = fmt::format("0, or {} to {} K", lowest_temperature_K, highest_temperature_K),
         .nearest = nearest});
  };
  if (!(t >= 0)) refuse("0");
  if (t > highest_temperature_K) refuse(fmt::format("{}", highest_temperature_K));
  if (t > 0 && t < lowest_temperature_K) refuse("0");
  if (!std::isfinite(conditions.chemical_potential_eV))
    throw InputError({.what = "the chemical potential is not a number",
                      .where = "chemical_potential_eV",
                      .excerpt = {},
                      .expected = "a number of eV",
                      .nearest = "0"});
}

void validate(const Conditions& conditions, const HoppingSet& hopping) {
  validate(conditions);
  const double largest = largest_doping * std::fabs(hopping.hopping_eV.front());
  const double mu = conditions.chemical_potential_eV;
  if (std::fabs(mu) <= largest) return;
  throw InputError({.what = fmt::format("chemical potential {} eV is out of range", mu),
                    .where = "chemical_potential_eV",
                    .excerpt = {},
                    .expected = fmt::format("{0:.4g} to {1:.4g} eV, {2} hoppings of {3}", -largest,
                                            largest, largest_doping, hopping.name),
                    .nearest = fmt::format("{:.4g}", std::copysign(largest, mu))});
}

}  // namespace gapwright
