// Physical constants: exact, measured (CODATA 2018) and derived. Energy eV, length nm.
#pragma once

#include <numbers>

namespace gapwright::constants {

inline constexpr double pi = std::numbers::pi;

// Exact by definition of the SI (2019).
inline constexpr double elementary_charge_C = 1.602176634e-19;
inline constexpr double boltzmann_eV_per_K = 8.617333262145179e-5;
inline constexpr double hbar_c_eV_nm = 197.3269804593025;

// Measured, CODATA 2018 (Tiesinga et al., Rev. Mod. Phys. 93, 025010 (2021)).
inline constexpr double coulomb_eV_nm = 1.439964548;           ///< k_e = e²/(4πε₀)
inline constexpr double hbar2_per_mass_eV_nm2 = 0.0761996423;  ///< ħ²/m_e

// The honeycomb (METHODS §1): bond length by convention of the trade, the rest follows.
inline constexpr double bond_nm = 0.142;
inline constexpr double lattice_nm = 0.142 * 1.7320508075688772;  ///< a = √3·a_cc
inline constexpr double atom_area_nm2 = 1.7320508075688772 / 4 * lattice_nm * lattice_nm;
inline constexpr double atom_mass_kg = 12.011 * 1.66053906660e-27;  ///< natural carbon

// Derived conversions.
inline constexpr double mJ_per_m2_per_eV_per_nm2 = elementary_charge_C * 1e18 * 1e3;
inline constexpr double GPa_per_eV_per_nm3 = elementary_charge_C * 1e27 * 1e-9;
inline constexpr double nN_per_eV_per_nm = elementary_charge_C * 1e9 * 1e9;

}  // namespace gapwright::constants
