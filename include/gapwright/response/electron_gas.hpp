// The density response of a one-band electron gas in one dimension (METHODS §3).
#pragma once

#include <gapwright/catalog/wires.hpp>

namespace gapwright {

/// -χ₁D(q, iξ) [1/(eV·nm)] of the gas at T = 0, per length:
/// (g m_b/2πħ²q) ln{[ξ² + (b+c)²]/[ξ² + (b-c)²]}, b = ħ²q²/2m_b, c = ħ²qk_F/m_b. Diverges at q =
/// 2k_F for ξ = 0. Source: the Lindhard function in one dimension at imaginary frequency, e.g.
/// Giuliani & Vignale, Quantum Theory of the Electron Liquid (2005) §4.4. Throws std::domain_error
/// unless q > 0, ξ >= 0, k_F > 0.
double gas_response(double mass, double degeneracy, double fermi_wave_per_nm, double q_per_nm,
                    double xi_eV);

/// The same at any temperature and fixed density: at T > 0 the mean of the T = 0 response over the
/// chemical potential, weighted by -∂f/∂μ' (Maldague, Surf. Sci. 73, 296 (1978)). Relative accuracy
/// 1e-8.
class GasResponse {
 public:
  /// Throws std::domain_error for a temperature below 0 or not finite.
  GasResponse(const ElectronGasWire& wire, double temperature_K);

  /// -χ₁D(q, iξ) [1/(eV·nm)]. Throws as gas_response.
  double operator()(double q_per_nm, double xi_eV) const;
  double chemical_potential_eV() const { return chemical_potential_; }

 private:
  double mass_, degeneracy_, fermi_wave_, thermal_energy_, chemical_potential_;
};

}  // namespace gapwright
