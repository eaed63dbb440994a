// Imaginary times that stand for imaginary frequencies (METHODS §8).
#pragma once

#include <vector>

#include <Eigen/Dense>

namespace gapwright {

/// Δ/(Δ² + ξ²) ≈ Σ_i weight(i, ξ) e^{-Δτ_i} for every transition energy Δ of a range.
struct TimeGrid {
  std::vector<double> times;  ///< [1/eV], rising from 0
  Eigen::MatrixXd weights;    ///< times × frequencies
  double relative_error = 0;  ///< the largest over Δ and ξ
};

/// Times 0 and logarithmic ones from 0.02/Δ_max to 12/Δ_min, as few as meet the error, with
/// least-squares weights. [eV]
TimeGrid time_grid(double least_transition_eV, double largest_transition_eV,
                   const std::vector<double>& frequencies_eV, double relative_error);

}  // namespace gapwright
