// Band integrals over the whole reciprocal cell of flat graphene.
#pragma once

#include "fermi_lines.hpp"
#include "line_integral.hpp"

#include <gapwright/bands/hamiltonian.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// The sheet seen along one direction of Q.
class FlatDirection {
 public:
  /// angle_rad: between the axis direction and the armchair direction, as a tube's chiral angle.
  FlatDirection(const HoppingSet& hopping, const Conditions& conditions, double angle_rad,
                double tolerance, std::span<const double> xi_eV);
  // Parts refer to the Hamiltonian of their own object.
  FlatDirection(const FlatDirection&) = delete;
  FlatDirection& operator=(const FlatDirection&) = delete;

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
  void find_tangents();
  void add_fermi_points(double c, double from, double to, double q,
                        std::vector<BranchPoint>& initial, std::vector<BranchPoint>& final) const;
  double folded(PlaneVector point, const Cut& cut) const;

  SheetHamiltonian hamiltonian_;
  LinePrecision precision_;
  BandZeros band_zeros_;
  Filling filling_;
  FermiLines fermi_lines_;
  std::span<const double> xi_;
  Cell cell_;
  struct Zero {
    double valley;
    PlaneVector at;
  };
  std::vector<Zero> zeros_;            // Dirac points around the cell, rising in z
  std::vector<PlaneVector> tangents_;  // where lines touch the Fermi contour of either valley
  double contour_ = 1.0;               // its extent across the lines [nm^-1]
};

}  // namespace gapwright
