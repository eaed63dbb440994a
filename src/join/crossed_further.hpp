// What the parts of a crossed row share.
#pragma once

#include <gapwright/join/crossed.hpp>

namespace gapwright {

/// The lowest wave number of a crossed row at T = 0, and of its further round trips.
double lowest_charge_wave(double gap_nm, double distance_nm, double tolerance);

/// Where two crossed bodies stand, a flat one with radius 0.
struct CrossedAxes {
  const Nodes& nodes;
  const Window& window;
  double radius_1, radius_2;
  double distance_nm, angle_deg;

  double gap() const { return distance_nm - radius_1 - radius_2; }
  /// Distances of a plane in the middle of the gap from the two axes.
  double depth_1() const { return radius_1 + 0.5 * gap(); }
  double depth_2() const { return radius_2 + 0.5 * gap(); }
  /// Throws std::domain_error for an angle outside 1° … 90° or bodies that touch; `where` names the
  /// function.
  void require(const char* where) const;
};

/// Two outward scatterers on a window, their distance and angle.
struct Crossing {
  const Scatterer& first;
  const Scatterer& second;
  const Window& window;
  double distance_nm, angle_deg;

  CrossedAxes axes() const {
    return {first.nodes(), window, first.radius_nm(), second.radius_nm(), distance_nm, angle_deg};
  }
  double gap() const { return distance_nm - first.radius_nm() - second.radius_nm(); }
  double wider_radius() const;
  /// Distances of a plane in the middle of the gap from the two axes.
  double depth_1() const { return first.radius_nm() + 0.5 * gap(); }
  double depth_2() const { return second.radius_nm() + 0.5 * gap(); }
  /// Throws std::domain_error for an angle outside 1° … 90° or bodies that touch,
  /// std::invalid_argument for scatterers that do not serve; `where` names the function.
  void require(const char* where) const;
};

/// Further round trips on a grid of the two wave numbers: the cost rises as 1/angle³.
CrossedFurther further_on_grid(const Crossing& row, bool with_slope);

/// sin γ times the densities in the limit γ → 0: ∫dy of those of parallel bodies at √(D² + y²).
struct SmallAngle {
  FrequencyDensity first, further, first_slope, further_slope;
  bool positive = true;
};
SmallAngle small_angle(const Crossing& row, bool with_slope);

}  // namespace gapwright
