// Two ribbons with parallel axes, row against row (METHODS §5, rows).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/lattice/ribbon.hpp>
#include <gapwright/wire/row_scatterer.hpp>

#include <vector>

namespace gapwright {

/// Where a body stands to a ribbon whose rows lie along y about the origin, normals along z.
struct RowPose {
  double y_nm = 0.0;  ///< its axis, of a ribbon the middle of its width
  double z_nm = 0.0;
  double width_angle_deg = 0.0;  ///< direction of its rising rows, from y towards z
  double away_y = 0.0;           ///< unit vector along which it moves off: slopes are by that
  double away_z = 1.0;

  /// True when the mirror y → -y maps either ribbon to itself.
  bool mirrored() const { return y_nm == 0 && width_angle_deg == 0 && away_y == 0; }
};

/// Face to face at a height, shifted sideways.
RowPose stacked_pose(double gap_nm, double offset_nm = 0.0);
/// Side by side, edge rows `gap` apart along y, shifted in height.
RowPose coplanar_pose(const Ribbon& first, const Ribbon& second, double gap_nm,
                      double offset_nm = 0.0);
/// The second one stands upright on the first one's face, its lowest row at a height.
RowPose edge_on_pose(const Ribbon& second, double gap_nm, double offset_nm = 0.0);

/// A row of a placed ribbon in the plane across its axis.
struct RowPoint {
  double y_nm, z_nm;
};
std::vector<RowPoint> placed_rows(const std::vector<RibbonRow>& rows, const RowPose& pose);

/// The least distance between a row of either ribbon [nm].
double least_row_distance_nm(const std::vector<RibbonRow>& first,
                             const std::vector<RibbonRow>& second, const RowPose& pose);

/// The window of ribbons whose nearest rows are a gap apart: wave numbers up to those that
/// e^{-2q·gap} leaves at the tolerance, frequencies as of two parallel bodies. Depends on gap and
/// tolerance only. Throws std::domain_error for a gap that is not positive.
Window rows_window(double gap_nm, const Nodes& nodes);

/// Densities per length of two ribbons, or of a ribbon and a tube.
struct RowDensity {
  FrequencyDensity energy;            ///< ∫dq/2π ln det[1 - X₁ W X₂ Wᵀ]
  FrequencyDensity first_round_trip;  ///< -∫dq/2π Tr X₁ W X₂ Wᵀ
  FrequencyDensity distance_slope;    ///< derivative of `energy` along `away`
  FrequencyDensity first_slope;       ///< derivative of `first_round_trip`
  bool positive = true;               ///< false: a determinant was not positive
};

/// W = 2k_e[[K₀, ∂_{n2}K₀], [∂_{n1}K₀, ∂_{n1}∂_{n2}K₀]](q|ρ|) between charges and normal dipoles of
/// all rows. Ribbons centred face to face split into two halves, a quarter of the work. Uses
/// inner_threads(). with_slope = false leaves the derivatives empty. Throws std::domain_error for
/// rows that meet, std::invalid_argument unless both cover the window.
RowDensity rows_density(const RowScatterer& first, const RowScatterer& second, const RowPose& pose,
                        const Window& window, bool with_slope);

}  // namespace gapwright
