// The short-range term of ribbons: rows as lines of atoms (METHODS §6).
#pragma once

#include <gapwright/contact/short_range.hpp>

#include <span>

namespace gapwright {

/// A line of atoms along the axis at a place of the plane across it.
struct AtomLine {
  double y_nm = 0.0;
  double z_nm = 0.0;
  double atoms_per_nm = 0.0;  ///< λ = w/A_at
};

/// Σ λ_jλ_j'[B c₁₂ρ^{-11} - C c_pρ^{1-p}] per length [eV/nm] and its derivative when the second set
/// moves along the unit vector (away_y, away_z) [eV/nm²]. Exact. Throws std::domain_error for lines
/// that meet.
SmoothEnergy lines_energy(const PairFunction& pair, std::span<const AtomLine> first,
                          std::span<const AtomLine> second, double away_y, double away_z);

/// Lines of atoms and a smooth shell about an axis at (axis_y, axis_z), moving likewise; 1e-12 of
/// either term. Throws std::domain_error for a line that is not outside the shell.
SmoothEnergy lines_shell_energy(const PairFunction& pair, std::span<const AtomLine> lines,
                                double radius_nm, double axis_y_nm, double axis_z_nm, double away_y,
                                double away_z);

/// Lines of atoms at a height above a flat sheet [eV/nm], and by the height [eV/nm²].
SmoothEnergy lines_sheet_energy(const PairFunction& pair, std::span<const AtomLine> lines,
                                double height_nm);

/// Two crossed flat ribbons, face to face: energy times sin γ of lines a height apart, which does
/// not depend on the angle, and its derivative [eV, eV/nm]: Σλλ'∫u along both.
SmoothEnergy crossed_lines_energy_sine(const PairFunction& pair, double atoms_per_nm_1,
                                       double atoms_per_nm_2, double height_nm);

/// A flat ribbon crossed over a smooth shell, axis `distance` above the face: likewise.
SmoothEnergy crossed_lines_shell_energy_sine(const PairFunction& pair, double atoms_per_nm,
                                             double radius_nm, double distance_nm);

}  // namespace gapwright
