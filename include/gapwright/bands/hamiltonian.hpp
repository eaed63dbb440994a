// The two-band π Hamiltonian of flat graphene and of a rolled sheet (METHODS §2).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/lattice/tube.hpp>

#include <array>
#include <complex>
#include <vector>

namespace gapwright {

/// In-plane vector: c along the circumference (or any axis of a flat sheet), z along the axis
/// [nm or nm^-1].
struct PlaneVector {
  double c = 0.0;
  double z = 0.0;
  PlaneVector operator+(PlaneVector o) const { return {c + o.c, z + o.z}; }
  PlaneVector operator-(PlaneVector o) const { return {c - o.c, z - o.z}; }
  PlaneVector operator*(double s) const { return {c * s, z * s}; }
};

/// One bond from an A atom: to a B atom (`between`), or to an A atom (`within`).
struct Bond {
  PlaneVector delta;  ///< [nm]
  double hopping_eV;  ///< curvature included
  double overlap;
};

/// The lattice as seen along a direction: the three nearest-neighbour vectors, reciprocal lattice
/// and the Dirac points of the uncurved sheet, in (c, z) components.
struct RotatedLattice {
  std::array<PlaneVector, 3> neighbours;  ///< A → B [nm], sum zero
  std::array<PlaneVector, 2> primitive;   ///< a1, a2 [nm]
  std::array<PlaneVector, 2> reciprocal;  ///< b1, b2 [nm^-1], a_i·b_j = 2πδ_ij
  PlaneVector dirac;                      ///< K; the other valley is -K [nm^-1]
};

/// Lattice with ĉ at the chiral angle θ [rad] from a1, the zigzag direction: with the angle of a
/// tube C_h = n·a1 + m·a2 = (2πR, 0) to rounding.
RotatedLattice rotated_lattice(double chiral_angle_rad);

/// E_-(k) <= E_+(k) [eV] and the off-diagonal element F(k) of S^{-1/2} H S^{-1/2}, whose phase is
/// that of the eigenvectors (1, ±e^{-i arg F})/√2.
struct BandState {
  double midpoint_eV = 0.0;          ///< (E_+ + E_-)/2, zero at the neutrality point
  std::complex<double> coupling_eV;  ///< F; E_± = midpoint ± |F|
};

/// H(k), S(k) of one sheet or tube; k in the components of `lattice`. Bonds reach to third
/// neighbours; curvature multiplies hopping and overlap of each by 1 - (δ·ĉ/R)²/8.
class SheetHamiltonian {
 public:
  /// radius_nm <= 0: flat, no curvature. Throws std::invalid_argument for a set without one to
  /// three hoppings (overlap: as many or none), std::domain_error for an overlap matrix that is
  /// not positive definite or when F has no zero next to K.
  SheetHamiltonian(const HoppingSet& hopping, const RotatedLattice& lattice, double radius_nm);

  /// Bands at k [nm^-1]; with one hopping F = Σ hopping·e^{ik·δ} and the midpoint is 0.
  BandState at(PlaneVector k) const;
  const RotatedLattice& lattice() const { return lattice_; }
  /// The three A → B nearest-neighbour bonds.
  const std::array<Bond, 3>& nearest() const { return nearest_; }
  bool nearest_neighbour_only() const { return simple_; }
  /// The zero of F next to K, by Newton's method to 1e-14 (the valley -K is its mirror) [nm^-1].
  PlaneVector dirac_point() const { return dirac_; }

 private:
  /// Entries of H = h + offdiag f and S = s + offdiag g.
  struct Elements {
    double h;
    double s;
    std::complex<double> f;
    std::complex<double> g;
  };

  Elements elements(PlaneVector k) const;
  std::array<std::complex<double>, 2> gradient(PlaneVector k) const;  // ∂F/∂c, ∂F/∂z
  void require_positive_overlap(const HoppingSet& hopping) const;
  void find_dirac_point(const HoppingSet& hopping);

  RotatedLattice lattice_;
  std::array<Bond, 3> nearest_;
  std::vector<Bond> within_;   // second neighbours (A → A), one of each ± pair: δ_j - δ_{j+1}
  std::vector<Bond> between_;  // all A → B bonds, first neighbours first; none if simple_
  double onsite_eV_ = 0.0;
  double neutrality_eV_ = 0.0;
  bool simple_ = true;
  PlaneVector dirac_;
};

/// Hamiltonian of a tube.
SheetHamiltonian tube_hamiltonian(const Tube& tube, const HoppingSet& hopping);

}  // namespace gapwright
