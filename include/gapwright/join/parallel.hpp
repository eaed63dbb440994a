// Two round bodies side by side (METHODS §5, (5.6)).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/shell/scatterer.hpp>

namespace gapwright {

/// The window of a parallel row: multipoles that fall as e^{-2[η_m(q(D-R')) - η_m(qR)]} at each
/// wave number, frequencies down to those that matter at the distance. Depends on radii, distance
/// and tolerance only.
Window parallel_window(double radius_1_nm, double radius_2_nm, double distance_nm,
                       const Nodes& nodes);

/// Densities of two outward scatterers with parallel axes.
struct ParallelDensity {
  FrequencyDensity energy;            ///< ∫dq/2π ln det[1 - T₁ K T₂ Kᵀ]
  FrequencyDensity first_round_trip;  ///< -∫dq/2π Tr T₁ K T₂ Kᵀ
  FrequencyDensity distance_slope;    ///< derivative of `energy` by the distance of the axes
  FrequencyDensity first_slope;       ///< derivative of `first_round_trip`
  bool positive = true;               ///< false: a determinant was not positive
};

/// The sum over multipoles of both signs splits into an even and an odd half, because T_m = T_-m.
/// Both scatterers must cover the window. with_slope = false leaves the derivatives empty.
ParallelDensity parallel_density(const Scatterer& first, const Scatterer& second,
                                 double distance_nm, const Window& window, bool with_slope);

}  // namespace gapwright
