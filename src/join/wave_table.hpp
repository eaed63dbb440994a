// A body about an axis as a mirror of evanescent plane waves, between the nodes (METHODS §5).
#pragma once

#include "crossed_kernel.hpp"
#include "face.hpp"

#include <gapwright/shell/scatterer.hpp>

#include <array>
#include <span>
#include <vector>

namespace gapwright {

/// A place on the lattice of wave numbers and the Lagrange weights of the ten nodes around it: in
/// the middle of them (0), and moved down by one node after another, for multipoles that end here.
struct WavePlace {
  WavePlace(double log_q, double step);

  int below;   ///< lattice index of the node at or below
  bool above;  ///< truly above it
  std::array<std::array<double, wave_nodes>, wave_nodes / 2 + 1> weights;
};

/// ln T_m (or T_m where it changes sign) of one outward scatterer, interpolated in ln q over ten
/// nodes: at the step of a tolerance the error of an energy is below a hundredth of it. Below the
/// window T_0 continues as a power, the others as the multipole itself.
class WaveTable final : public FaceTable {
 public:
  /// `lowest_index` is the lattice index down to which values will be asked for.
  WaveTable(const Scatterer& scatterer, const Window& window, int lowest_index);

  int frequencies() const override { return frequencies_; }

  /// e^{-2k·depth} Σ_m T_m(q) [(k + k_⊥)/q]^{2m} over m of both signs, at every frequency;
  /// q lies `shift` nodes above the place, k² = q² + k_⊥². Multipoles that add less than a
  /// thousandth of the tolerance are left out.
  void plane_wave(const WavePlace& place, int shift, double q, double k, double across,
                  double depth, std::span<double> out) const override;

  /// T_m(q) = reduced·e^{log_scale} for m = 0 … orders-1; reduced is [m][ξ]. Returns orders.
  int multipoles(const WavePlace& place, double q, std::vector<double>& reduced,
                 std::vector<double>& log_scale) const;

 private:
  std::size_t cell(int r, int m) const {
    return std::size_t(r) * std::size_t(orders_) + std::size_t(m);
  }
  bool holds(const WavePlace& place, int r, int m) const {
    return r + (place.above ? 1 : 0) <= last_row_[std::size_t(m)];
  }
  void fill(int m, const Scatterer& scatterer, const Window& window);
  void continue_below(int m, int start, bool two_rows);
  /// Nodes the stencil moves down because multipole m ends at its last row.
  int moved(int m, int r) const;
  double log_scale(const WavePlace& place, int r, int m, double q) const;
  WaveTerm term(const WavePlace& place, int r, int m, double factor) const;

  double radius_;
  double tolerance_;
  int frequencies_;
  int orders_;
  int first_;                   // lattice index of row 0
  std::vector<int> last_row_;   // per m
  std::vector<double> curves_;  // [row][m][ξ]
  std::vector<double> scales_;  // [row][m]: ln scale less twice the exponent of the multipole
  std::vector<double> sign_;    // [m][ξ]
  std::vector<double> linear_;  // [m][ξ]
};

}  // namespace gapwright
