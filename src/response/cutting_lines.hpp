// Lines through the reciprocal plane along which a band sum is integrated, and the branch points
// of the bands beside them (METHODS §8).
#pragma once

#include "band_zeros.hpp"

#include <gapwright/bands/hamiltonian.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// Nodes and weights along a line.
struct LineNodes {
  std::vector<double> z;
  std::vector<double> weight;
  void clear() {
    z.clear();
    weight.clear();
  }
};

/// How finely lines are cut.
struct PanelRule {
  int nodes = 8;         ///< Gauss nodes a panel
  double ellipse = 2.4;  ///< Bernstein ellipse that holds no branch point
  double longest = 7.0;  ///< half length of the longest panel [nm^-1]
};

/// Appends Gauss panels for [from, to], each as long as keeps every branch point outside its
/// Bernstein ellipse, split at points that lie on the line. `points` rise in z.
void append_panels(double from, double to, std::span<const BranchPoint> points,
                   const PanelRule& rule, LineNodes& out);

/// The closed helical lines of a tube: k_c = line/R, z periodic with `period`; gcd(n,m) of them
/// hold all N zone-folding lines.
class HelicalLines {
 public:
  HelicalLines(const Tube& tube, const SheetHamiltonian& hamiltonian, double reach);

  int count() const { return symmetry_; }
  double period() const { return period_; }

  /// Zeros of F(k + (shift_order/R, 0)) within reach of the line, z in [0, period), rising.
  std::vector<BranchPoint> branch_points(int line, int shift_order) const;

  /// A line beyond the first count() ones is one of them, moved along z.
  struct Moved {
    int line;
    double shift;
  };
  Moved moved(int line) const;
  double into_period(double z) const;

  /// The line that k → -k - Q maps `line` on, Q = (order/R, q), and for a line mapped on itself the
  /// sum z + z' of a point and its image at q = 0.
  int image(int line, int order) const;
  double mirror_sum(int line, int order) const;

 private:
  int symmetry_;
  double inverse_radius_;
  double period_;
  double helix_step_;  // z shift of the reciprocal vector whose k_c is symmetry/R
  BandZeros zeros_;
};

/// Copies points of one period so that [from, to] and a margin around it are covered, shifted by
/// `shift` in z; rising.
void unroll(std::span<const BranchPoint> points, double period, double shift, double from,
            double to, double margin, std::vector<BranchPoint>& out);

}  // namespace gapwright
