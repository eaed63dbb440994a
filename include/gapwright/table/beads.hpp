// A tube as a chain of beads (METHODS §10).
#pragma once

#include <gapwright/table/placing.hpp>

#include <optional>

namespace gapwright {

/// Two chains of beads, spacings l_A and l_B, that stand for two parallel tubes of energy U(D) per
/// length: what a single pair of beads must contribute.
class BeadPair {
 public:
  /// U [eV/nm] is asked for at distances > closest_nm only, without end unless a cut is given: then
  /// it must vanish from there on. Smooth but for the switch of OuterCut.
  BeadPair(EnergyFunction parallel, double spacing_1_nm, double spacing_2_nm, double closest_nm,
           std::optional<double> cut_nm);

  /// Energy of two beads at a distance r [eV], and derivatives by r:
  /// u = -(l_A l_B/π)∫₀^∞ U'(r cosh s) ds; curvature stays empty. A straight line below closest_nm.
  Jet at(double distance_nm) const;

  /// Energy per length of the two chains summed back, (1/l_A l_B)∫u(√(D²+z²))dz [eV/nm], over bead
  /// energies read from elsewhere; reach_nm: where they end.
  double chain_energy(const std::function<double(double distance_nm)>& bead_energy,
                      double distance_nm, double reach_nm) const;

  /// Peak to peak of the energy of two chains, both of spacing l, that slide along each other, over
  /// its mean: 4|û(2π/l)|/û(0), û(k) = ∫u(√(D²+z²))cos kz dz.
  double corrugation(double distance_nm, double spacing_nm) const;

  double closest_nm() const { return closest_nm_; }
  double spacing_product_nm2() const { return product_; }

 private:
  Jet inverted(double distance_nm) const;

  EnergyFunction parallel_;
  double product_;
  double closest_nm_;
  std::optional<double> cut_nm_;
  Jet closest_;
};

/// The largest spacing of beads whose chains slide with a corrugation of about 1e-3 at an axis
/// distance D: 0.25 √(D/nm) [nm].
double usual_bead_spacing_nm(double distance_nm);

/// ∫U(√(D²+y²))dy of a parallel energy U and its derivative by D [eV, eV/nm]: the energy of two
/// crossed chains of beads times sin γ, and the limit γ → 0 of E·sin γ of two tubes.
Jet crossing_limit(const EnergyFunction& parallel, double distance_nm);

}  // namespace gapwright
