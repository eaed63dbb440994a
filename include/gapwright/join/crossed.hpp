// Two round bodies whose axes cross at an angle (METHODS §5, crossed).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/shell/scatterer.hpp>
#include <gapwright/wire/row_scatterer.hpp>

namespace gapwright {

inline constexpr double min_crossing_deg = 1.0;
inline constexpr double max_crossing_deg = 90.0;

/// The window of a crossed row at any angle, radius 0 for a ribbon's face: multipoles as of
/// parallel bodies, wave numbers and frequencies further down, because the bodies come together at
/// one place only. Depends on radii, distance of the axes and tolerance. Throws std::domain_error
/// for bodies that touch.
Window crossed_window(double radius_1_nm, double radius_2_nm, double distance_nm,
                      const Nodes& nodes);

/// First round trip of two outward scatterers; the energy is total, not per length.
struct CrossedDensity {
  FrequencyDensity first_round_trip;  ///< -(1/sin γ)∫d²k/(2π)² e^{-2kD} r̃₁r̃₂ [1]
  FrequencyDensity first_slope;       ///< its derivative by the distance of the axes [nm^-1]
};

/// One method for all angles: with q₁ = ±q₂e^{2v} = q·e^v, k is q·cosh t/cos(γ/2) where
/// sinh v = sin(γ/2) sinh t (equal signs; for opposite signs γ becomes π-γ), and the integrand is
/// smooth in ln q and t however small γ; the bodies are interpolated in ln q. Relative accuracy as
/// of the tolerance. Both scatterers must cover the window. with_slope = false leaves the slope
/// empty. Throws std::domain_error for angles outside 1° … 90° and bodies that touch.
CrossedDensity crossed_density(const Scatterer& first, const Scatterer& second, double distance_nm,
                               double angle_deg, const Window& window, bool with_slope);

/// The first round trip of two ribbons face to face, or of a ribbon's face and a tube, as above;
/// further ones are not computed. The window is that of radius 0 for a ribbon.
CrossedDensity crossed_density(const RowScatterer& first, const RowScatterer& second, double gap_nm,
                               double angle_deg, const Window& window, bool with_slope);
CrossedDensity crossed_density(const RowScatterer& ribbon, const Scatterer& tube,
                               double distance_nm, double angle_deg, const Window& window,
                               bool with_slope);

/// Further round trips, ln det(1 - R₁R₂) less its first trace: add them to the first one for the
/// full form.
struct CrossedFurther {
  FrequencyDensity energy;  ///< [1]
  FrequencyDensity slope;   ///< derivative by the distance of the axes [nm^-1]
  /// Additional error as a share of the first round trip, where the angle is interpolated.
  double angle_share = 0.0;
  /// Additional errors of the static frequency at T > 0: its longest waves are a limit.
  double static_error = 0.0, static_slope_error = 0.0;
  bool positive = true;  ///< false: a determinant was not positive
};

/// The angle from which on crossed_further stands on a grid of the two wave numbers.
double lowest_grid_angle_deg(double radius_1_nm, double radius_2_nm, double distance_nm);

/// On a grid of both wave numbers (METHODS §5) from 15° up, for wide bodies near contact from 45°;
/// at smaller angles the ratio to the first round trip is interpolated in sin γ between that angle
/// and γ → 0, where it is that of parallel bodies integrated over their lateral offset. Accuracy:
/// the tolerance, relative to the first round trip. Uses inner_threads(). Requirements and
/// exceptions as of crossed_density.
CrossedFurther crossed_further(const Scatterer& first, const Scatterer& second, double distance_nm,
                               double angle_deg, const Window& window, bool with_slope);

}  // namespace gapwright
