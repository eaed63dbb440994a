// Two round bodies side by side (METHODS §5, (5.6)).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <memory>

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

/// Which round trips to follow.
enum class FurtherTrips {
  included,
  left_out,  ///< `energy` and `distance_slope` stay those of the first round trip: far less work
};

/// Two bodies at a distance, whatever their electrons: the coupling of their multipoles, formed
/// once for any number of scatterers of the same radii and window. The sum over multipoles of both
/// signs splits into an even and an odd half, because T_m = T_-m.
class ParallelCoupling {
 public:
  /// Both scatterers must be outward and cover the window; only their scales are read. Throws
  /// std::invalid_argument otherwise.
  ParallelCoupling(const Scatterer& first, const Scatterer& second, double distance_nm,
                   const Window& window, bool with_slope);
  ~ParallelCoupling();
  ParallelCoupling(const ParallelCoupling&) = delete;
  ParallelCoupling& operator=(const ParallelCoupling&) = delete;

  /// Densities of scatterers of the same bodies, that is of the same scales, else throws
  /// std::invalid_argument. The first round trip takes the whole window; further ones leave out
  /// multipoles whose share is provably below 0.03 of the tolerance in all (METHODS §8).
  /// Slopes are empty unless the coupling has them.
  ParallelDensity density(const Scatterer& first, const Scatterer& second,
                          FurtherTrips further = FurtherTrips::included) const;

 private:
  struct Impl;
  std::unique_ptr<const Impl> impl_;
};

/// Densities of two scatterers at one distance. with_slope = false leaves the derivatives empty.
ParallelDensity parallel_density(const Scatterer& first, const Scatterer& second,
                                 double distance_nm, const Window& window, bool with_slope);

}  // namespace gapwright
