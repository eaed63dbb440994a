// Band integrals over the whole reciprocal cell of flat graphene.
#pragma once

#include "line_integral.hpp"

#include <gapwright/bands/hamiltonian.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// The sheet seen along one direction of Q.
class FlatDirection {
 public:
  /// angle_rad: between the axis direction and the armchair direction, as a tube's chiral angle.
  FlatDirection(const HoppingSet& hopping, double angle_rad, double tolerance,
                std::span<const double> xi_eV);

  /// (αQ²)_π [nm^-1] for Q along ẑ at every ξ, overwriting sums.
  void strengths(double wave_per_nm, std::span<double> sums) const;

 private:
  struct Cell {
    double width;      // extent of the lines in k_c
    double slant;      // start of a line: z = slant·k_c + z0
    double length;     // of every line
    double row_shift;  // shift in k_c of the cell above
  };
  /// How the cell is cut into lines: where they start, and whether half of them is enough.
  struct Cut {
    double height;
    bool halved;
  };
  double clearance(double q, double height) const;
  Cut cut_for(double q) const;
  std::vector<double> line_positions(double q, const Cut& cut, std::vector<double>& weights) const;

  SheetHamiltonian hamiltonian_;
  LinePrecision precision_;
  BandZeros band_zeros_;
  std::span<const double> xi_;
  Cell cell_;
  struct Zero {
    double valley;
    PlaneVector at;
  };
  std::vector<Zero> zeros_;  // Dirac points around the cell, rising in z
};

}  // namespace gapwright
