// Quantum wires of the catalogue: one-band electron gases.
#pragma once

#include <string>

namespace gapwright {

/// Electrons of one parabolic subband on a cylinder (METHODS §3).
struct ElectronGasWire {
  std::string name;
  std::string title;
  double mass = 1.0;               ///< m_b in electron masses
  double density_per_nm = 0.0;     ///< n
  double degeneracy = 2.0;         ///< g, spin times valleys
  double radius_nm = 1.0;          ///< of the charge
  double host_permittivity = 1.0;  ///< k_e → k_e/ε
  std::string source;

  double fermi_wave_per_nm() const;  ///< k_F = πn/g
  double fermi_energy_eV() const;    ///< ħ²k_F²/2m_b
};

}  // namespace gapwright
