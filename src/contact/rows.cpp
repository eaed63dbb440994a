#include "atom_by_shell.hpp"

#include <gapwright/contact/beside.hpp>
#include <gapwright/contact/rows.hpp>

#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

/// ∫u along a line at a distance ρ, and by ρ.
SmoothEnergy line_energy(const PairFunction& pair, double rho) {
  const double steep =
      pair.repulsion_eV_nm12 * line_factor(repulsive_power) * std::pow(rho, 1 - repulsive_power);
  const double soft =
      pair.attraction_eV_nmp * line_factor(pair.power) * std::pow(rho, 1 - pair.power);
  return {steep - soft, ((pair.power - 1) * soft - (repulsive_power - 1) * steep) / rho};
}

double atoms_of(std::span<const AtomLine> lines) {
  double sum = 0.0;
  for (const AtomLine& line : lines) sum += line.atoms_per_nm;
  return sum;
}

SmoothEnergy scaled(const SmoothEnergy& e, double factor) {
  return {factor * e.energy, factor * e.slope};
}

}  // namespace

SmoothEnergy lines_energy(const PairFunction& pair, std::span<const AtomLine> first,
                          std::span<const AtomLine> second, double away_y, double away_z) {
  require_power("lines_energy", pair.power);
  SmoothEnergy sum;
  for (const AtomLine& a : first)
    for (const AtomLine& b : second) {
      const double y = b.y_nm - a.y_nm, z = b.z_nm - a.z_nm, rho = std::hypot(y, z);
      if (!(rho > 0)) throw std::domain_error("lines_energy: two lines meet, required: apart");
      const SmoothEnergy e = line_energy(pair, rho);
      const double atoms = a.atoms_per_nm * b.atoms_per_nm;
      sum.energy += atoms * e.energy;
      sum.slope += atoms * e.slope * (y * away_y + z * away_z) / rho;
    }
  return sum;
}

SmoothEnergy lines_shell_energy(const PairFunction& pair, std::span<const AtomLine> lines,
                                double radius_nm, double axis_y_nm, double axis_z_nm, double away_y,
                                double away_z) {
  require_power("lines_shell_energy", pair.power);
  const AtomByShell atom(pair, radius_nm);
  SmoothEnergy sum;
  for (const AtomLine& line : lines) {
    const double y = axis_y_nm - line.y_nm, z = axis_z_nm - line.z_nm, s = std::hypot(y, z);
    if (!(s > radius_nm))
      throw std::domain_error(fmt::format(
          "lines_shell_energy: a line {} nm from the axis of a shell of radius {} nm, required: "
          "outside",
          s, radius_nm));
    const SmoothEnergy e = atom.at(s);
    sum.energy += line.atoms_per_nm * e.energy;
    sum.slope += line.atoms_per_nm * e.slope * (y * away_y + z * away_z) / s;
  }
  return sum;
}

SmoothEnergy lines_sheet_energy(const PairFunction& pair, std::span<const AtomLine> lines,
                                double height_nm) {
  return scaled(sheets_energy(pair, height_nm), atoms_of(lines) / carbon_density_per_nm2);
}

SmoothEnergy crossed_lines_energy_sine(const PairFunction& pair, double atoms_per_nm_1,
                                       double atoms_per_nm_2, double height_nm) {
  // Two crossed lines see all of each other's plane, as sheets do per area.
  return scaled(
      sheets_energy(pair, height_nm),
      atoms_per_nm_1 * atoms_per_nm_2 / (carbon_density_per_nm2 * carbon_density_per_nm2));
}

SmoothEnergy crossed_lines_shell_energy_sine(const PairFunction& pair, double atoms_per_nm,
                                             double radius_nm, double distance_nm) {
  return scaled(over_sheet_energy(pair, radius_nm, distance_nm - radius_nm),
                atoms_per_nm / carbon_density_per_nm2);
}

}  // namespace gapwright
