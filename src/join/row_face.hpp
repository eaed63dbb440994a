// The face of a ribbon as a mirror of evanescent plane waves (METHODS §5, rows).
#pragma once

#include "face.hpp"
#include "wave_table.hpp"

#include <gapwright/wire/row_scatterer.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// r̃ = -(2πk_e/k)Σ_jj'[X_jj' + k²X^⊥_jj'] cos[k_⊥(y_j - y_j')] of a flat ribbon whose normal points
/// to the other body; between the nodes Σ X cos is interpolated in ln q at the same k_⊥.
class RowFace final : public FaceTable {
 public:
  RowFace(const RowScatterer& ribbon, const Window& window);

  int frequencies() const override { return frequencies_; }
  void plane_wave(const WavePlace& place, int shift, double q, double k, double across,
                  double depth, std::span<double> out) const override;

  /// (k/π) r̃ at a node of the window, j = wave-number index minus window.q.first.
  void at_node(int j, double k, double across, std::span<double> out) const;

 private:
  /// -Σ_jj' X_jj' cos at a node; `wave` holds cos and sin of the mirror's vectors.
  void charges(int j, const std::vector<double>& wave, std::span<double> out) const;
  std::vector<double> wave_of(double across) const;

  const RowScatterer& ribbon_;
  int frequencies_, first_, count_;  // lattice index and number of the window's wave numbers
  int row_, xi_;                     // where the window starts in the scatterer
};

}  // namespace gapwright
