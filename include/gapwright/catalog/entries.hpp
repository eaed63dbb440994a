// Catalogue entries: the chosen numbers of the model, each with its source.
#pragma once

#include <string>
#include <vector>

namespace gapwright {

/// Tight-binding parameters of one π orbital an atom (METHODS §2). Index 0 is the first neighbour.
/// H and S hold hopping_eV[k] and overlap[k] for the (k+1)-th neighbours, k < 3, on-site energy
/// onsite_eV. Energies are measured from the neutrality point whatever the on-site energy.
struct HoppingSet {
  std::string name;
  std::string title;
  std::vector<double> hopping_eV;  ///< 1 to 3 values; sign as in H, f = Σ hopping·e^{ik·δ}
  std::vector<double> overlap;     ///< as many; all zero: orthogonal
  double onsite_eV = 0.0;
  bool curvature = true;  ///< bonds weakened by 1 - (δ·ĉ/R)²/8 on tubes
  std::string source;

  /// One hopping, no overlap: the fast path of the response.
  bool nearest_neighbour_only() const;
};

/// Electrons other than π, the same for every carbon shell (METHODS §3).
struct Background {
  std::string name;
  std::string title;
  double in_plane_strength_nm = 0.0;  ///< α_σ0
  double in_plane_energy_eV = 1.0;    ///< ω_σ
  double normal_strength_nm = 0.0;    ///< α_⊥0
  double normal_energy_eV = 1.0;      ///< ω_⊥
  std::string source;

  double in_plane_nm(double xi_eV) const;  ///< α_σ(iξ) [nm]
  double normal_nm(double xi_eV) const;    ///< α_⊥(iξ) [nm]
};

/// Edges of nanoribbons (METHODS §2).
struct RibbonEdges {
  std::string name;
  std::string title;
  double edge_bond = 1.0;     ///< hopping of the two edge dimer lines of armchair ribbons, over t
  double repulsion_eV = 0.0;  ///< mean-field Hubbard U of zigzag ribbons
  std::string source;
};

/// How a contact target is to be met (METHODS §6).
enum class TargetKind {
  pair,      ///< two sheets
  stack,     ///< energy per area of one layer of an infinite stack
  cleavage,  ///< energy per area of cutting an infinite stack
};

/// Spacing and energy that the short-range term is solved from.
struct ContactTarget {
  std::string name;
  std::string title;
  TargetKind kind = TargetKind::pair;
  double spacing_nm = 0.0;
  double energy_eV_per_nm2 = 0.0;  ///< positive: binding
  std::string source;
};

/// How a published value is judged by `check`.
enum class CheckWeight { gated, informative, from_memory };

/// One published value that `check` recomputes; `quantity` names the computation.
struct CheckRow {
  std::string name;
  std::string quantity;
  std::string object;
  std::string condition;
  double value = 0.0;
  double uncertainty = 0.0;  ///< same unit as value; what a gated row must stay within
  std::string unit;
  CheckWeight weight = CheckWeight::informative;
  std::string hopping;  ///< empty: the default set
  std::string source;
  std::string remark;
};

}  // namespace gapwright
