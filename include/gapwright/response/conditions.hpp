// What holds for all bodies of a row: temperature, chemical potential, medium, retardation.
#pragma once

#include <string>

namespace gapwright {

struct Conditions {
  double temperature_K = 0.0;
  double chemical_potential_eV = 0.0;  ///< from neutrality at T = 0
  std::string medium = "vacuum";
  bool retarded = false;  ///< two coaxial walls only (METHODS §9)
  bool operator==(const Conditions&) const = default;
};

/// Throws InputError for conditions that are out of range or not yet computed, by name.
void validate(const Conditions& conditions);

}  // namespace gapwright
