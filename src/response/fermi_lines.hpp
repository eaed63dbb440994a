// Where along a line a band comes close to the chemical potential (METHODS §8).
#pragma once

#include "band_zeros.hpp"
#include "occupation.hpp"

#include <gapwright/bands/hamiltonian.hpp>

#include <vector>

namespace gapwright {

/// Looks along lines k = (c, z). The integrand of a response is smooth there but for the poles of
/// the Fermi function at T > 0, its steps at T = 0.
class FermiLines {
 public:
  FermiLines(const SheetHamiltonian& hamiltonian, const Occupation& occupation);

  /// The least distance of a band energy from the chemical potential on [from, to], or `best` where
  /// that is not undercut; good to a third of kT [eV].
  double nearest(double c, double from, double to, double best) const;

  /// T > 0: parts of [from, to] where a band is closer than `nearest` and 15 kT, rising, with the
  /// distance of Fermi poles from the line. T = 0: the points where a band crosses.
  std::vector<BranchPoint> along(double c, double from, double to, double nearest) const;

 private:
  double distance(double c, double z) const;
  double energy(double c, double z, int band) const;  // less the chemical potential
  void append_warm(double c, double from, double to, double limit,
                   std::vector<BranchPoint>& out) const;
  void append_crossings(double c, double from, double to, int band,
                        std::vector<BranchPoint>& out) const;

  const SheetHamiltonian& hamiltonian_;
  Occupation occupation_;
  double steepest_;       // bound of |dE/dz| [eV nm]
  double pole_distance_;  // of Fermi poles [nm^-1]
};

/// Points of F with those along its line: a warm part stands for the zeros of F inside, where
/// transitions within and across the bands add up to a smooth function.
std::vector<BranchPoint> with_fermi_points(const std::vector<BranchPoint>& zeros,
                                           const std::vector<BranchPoint>& fermi);

/// T = 0: where |F(k)| and |F(k + Q)| cross next to the chemical potential, transitions within a
/// band resonate at small ξ. Adds those points, from the crossings of either, and sorts.
void add_resonances(const std::vector<BranchPoint>& initial, const std::vector<BranchPoint>& final,
                    double least_xi, std::vector<BranchPoint>& points);

}  // namespace gapwright
