// Liquids and solids by their permittivity at imaginary frequency.
#pragma once

#include <string>
#include <vector>

namespace gapwright {

/// One damped oscillator: strength/(ω² + damping·ξ + ξ²).
struct Oscillator {
  double energy_eV = 0.0;     ///< ω
  double strength_eV2 = 0.0;  ///< f
  double damping_eV = 0.0;    ///< g
};

/// One relaxation of dipoles: strength/(1 + ξ/energy).
struct Relaxation {
  double energy_eV = 0.0;
  double strength = 0.0;
};

/// A medium without structure of its own. The default is vacuum.
struct Medium {
  std::string name = "vacuum";
  std::string title = "Vacuum";
  bool liquid = true;
  std::vector<Relaxation> relaxations;
  std::vector<Oscillator> oscillators;
  std::string source;

  /// ε(iξ) = 1 + Σ relaxations + Σ oscillators at ξ [eV] >= 0, dimensionless, falling with ξ.
  double permittivity(double xi_eV) const;
};

}  // namespace gapwright
