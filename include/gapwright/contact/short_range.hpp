// The registry-averaged short-range term between atoms of different objects (METHODS §6).
#pragma once

namespace gapwright {

/// Pair function B/r^12 - C/r^power, integrated over smooth shells at the carbon density.
/// power = 8 for the calibrated term, 6 for the chirality-blind pair potential.
struct PairFunction {
  double repulsion_eV_nm12 = 0.0;  ///< B
  double attraction_eV_nmp = 0.0;  ///< C [eV·nm^power]
  int power = 8;
};

/// Energy and derivative of one geometry.
struct SmoothEnergy {
  double energy = 0.0;  ///< eV/nm² (sheets) or eV/nm (tubes)
  double slope = 0.0;   ///< derivative by the spacing or gap
};

/// Two sheets at a spacing d [nm]: σ²π[B/(5d^10) - 2C/((p-2)d^{p-2})] per area [eV/nm², eV/nm³],
/// σ one atom an atom's area. Throws std::domain_error for spacing <= 0.
SmoothEnergy sheets_energy(const PairFunction& pair, double spacing_nm);

/// Two coaxial shells: σ²·2πR₁R₂∫dφ [B c₁₂ρ^{-11} - C c_pρ^{1-p}], ρ² = R₁² + R₂² - 2R₁R₂cos φ
/// [eV/nm]; slope is dE/dg at fixed mid radius with σ fixed [eV/nm²]. Exact (hypergeometric), 1e-12
/// of either term. Throws std::domain_error for radii not positive and rising.
SmoothEnergy coaxial_energy(const PairFunction& pair, double inner_radius_nm,
                            double outer_radius_nm);

/// The graphitic pair potential A = 15.2e-6 eV·nm^6, B = 24.1e-9 eV·nm^12.
/// Source: Girifalco, Hodak & Lee, Phys. Rev. B 62, 13104 (2000).
PairFunction graphitic_pair_potential();

}  // namespace gapwright
