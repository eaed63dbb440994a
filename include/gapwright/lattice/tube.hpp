// Chiral indices and the geometry of a nanotube (METHODS §1).
#pragma once

#include <compare>
#include <string>

namespace gapwright {

/// Chiral indices (n, m), n >= m >= 0, n >= 1 once canonical.
struct Chirality {
  int n = 0;
  int m = 0;
  auto operator<=>(const Chirality&) const = default;
};

enum class TubeKind { armchair, zigzag, chiral };

/// Geometry of one tube. Source: Saito, Dresselhaus & Dresselhaus, Physical Properties of Carbon
/// Nanotubes (1998), with a_cc = 0.142 nm.
struct Tube {
  Chirality chirality;
  double radius_nm = 0.0;         ///< R = a√(n²+nm+m²)/2π
  double chiral_angle_rad = 0.0;  ///< θ, 0 (zigzag) … π/6 (armchair)
  double period_nm = 0.0;         ///< T = √3·2πR/d_R
  int hexagons = 0;               ///< N per cell; 2N atoms
  int symmetry = 1;               ///< gcd(n, m): number of helical cutting lines
  TubeKind shape = TubeKind::chiral;

  double diameter_nm() const { return 2 * radius_nm; }
  double chiral_angle_deg() const;
  int atoms_per_cell() const { return 2 * hexagons; }
  double atoms_per_nm() const;
  double mass_per_nm_zg() const;  ///< mass per nm of axis [1e-21 g]
  /// (n - m) mod 3 == 0, curvature gap or not.
  bool metallic() const { return (chirality.n - chirality.m) % 3 == 0; }
  std::string label() const;  ///< "(10,10)"
};

inline constexpr double min_diameter_nm = 0.3;
inline constexpr double max_diameter_nm = 20.0;
inline constexpr double min_gap_nm = 0.2;

/// Tube from canonical indices. Throws std::domain_error unless n >= m >= 0 and n >= 1.
Tube make_tube(Chirality chirality);

}  // namespace gapwright
