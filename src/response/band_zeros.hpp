// Where the bands' branch points lie beside a line (METHODS §8).
#pragma once

#include <gapwright/bands/hamiltonian.hpp>

#include <complex>
#include <optional>
#include <vector>

namespace gapwright {

/// A zero of F seen from a line: at axial position z and distance from the real axis. The band
/// energy |F| has branch points at z ± i·distance. With a length: Fermi poles anywhere from z to
/// z + length. With a slope: a band crosses the chemical potential at T = 0.
struct BranchPoint {
  double z = 0.0;
  double distance = 0.0;
  double length = 0.0;
  double slope = 0.0;  // of the band energy there [eV nm]

  double end() const { return z + length; }
};

/// The zeros of the nearest-neighbour F(k_c, z) in complex z, followed from a Dirac point as the
/// line moves away from it. Near the point they lie at ±i times the distance of the line; farther
/// off trigonal warping bends them, down to 3.3 nm^-1 on lines that no Dirac point is near to.
class BandZeros {
 public:
  /// Zeros up to `reach` from the real axis are followed.
  BandZeros(const SheetHamiltonian& hamiltonian, double reach);

  PlaneVector dirac_point() const { return dirac_; }
  /// How far a line may pass from a Dirac point and still feel its zero [nm^-1].
  double lateral_reach() const { return step_ * double(half_count_); }

  /// The zero that belongs to the Dirac point (valley·K + …) at height `z_dirac`, on a line that
  /// passes it at k_c - K_c = offset; none when it is out of reach.
  std::optional<BranchPoint> on_line(double valley, double z_dirac, double offset) const;

 private:
  PlaneVector dirac_;
  double reach_;
  double step_ = 0.1;
  int half_count_ = 180;
  std::vector<std::complex<double>> curve_;  // z - K_z at offsets -half_count … half_count
};

}  // namespace gapwright
