// What holds for all bodies of a row: temperature, chemical potential, medium, retardation.
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/math/nodes.hpp>

#include <string>

namespace gapwright {

struct Conditions {
  double temperature_K = 0.0;
  double chemical_potential_eV = 0.0;  ///< from neutrality at T = 0
  std::string medium = "vacuum";       ///< vacuum or a liquid, by its catalogue name
  bool retarded = false;               ///< two coaxial walls only (METHODS §9)
  bool operator==(const Conditions&) const = default;
};

/// What plans and commands take where nothing is said.
inline constexpr double usual_temperature_K = 300.0;
inline constexpr double lowest_temperature_K = 0.01;  ///< above zero
inline constexpr double highest_temperature_K = 3000.0;
/// |μ| in hoppings: below the saddle point of the bands.
inline constexpr double largest_doping = 0.8;

/// kT [eV].
double thermal_energy_eV(const Conditions& conditions);
/// The lattices of a tolerance at these conditions.
Nodes make_nodes(double tolerance, const Conditions& conditions);

/// Throws InputError for conditions that are out of range or not yet computed, by name. The medium
/// is left to those who hold a catalogue; carbon answers alike in any.
void validate(const Conditions& conditions);
/// Also for a chemical potential beyond 0.8 hoppings.
void validate(const Conditions& conditions, const HoppingSet& hopping);

}  // namespace gapwright
