// A ribbon and a round body with parallel axes (METHODS §5, rows).
#pragma once

#include <gapwright/join/rows.hpp>
#include <gapwright/shell/scatterer.hpp>

namespace gapwright {

/// The axis of a tube over the face of a ribbon, its wall a gap above it, shifted sideways.
RowPose tube_over_pose(double radius_nm, double gap_nm, double offset_nm = 0.0);
/// The axis of a tube in the plane of the ribbon, its wall a gap from the edge row, shifted in
/// height: coplanar and edge-on are the same.
RowPose tube_beside_pose(const Ribbon& ribbon, double radius_nm, double gap_nm,
                         double offset_nm = 0.0);

/// The least distance between a row and the axis [nm].
double least_axis_distance_nm(const std::vector<RibbonRow>& rows, const RowPose& pose);

/// The window of a ribbon whose nearest row is a gap from a wall: multipoles that fall as
/// e^{-2[η_m(q(R+gap)) - η_m(qR)]}, else as rows_window. Throws std::domain_error for a radius or
/// gap that is not positive.
Window rows_tube_window(double radius_nm, double gap_nm, const Nodes& nodes);

/// ∫dq/2π ln det[1 + 2k_e X Y T^e Y†], Y_jm = K_m(qρ_j)e^{imφ_j} and its normal derivative for the
/// dipoles. A tube centred over the face splits into two halves. Uses inner_threads(). Throws
/// std::domain_error for a row inside the tube or a T^e that is negative (a tube in a liquid),
/// std::invalid_argument unless both cover the window.
RowDensity rows_tube_density(const RowScatterer& ribbon, const Scatterer& tube, const RowPose& pose,
                             const Window& window, bool with_slope);

}  // namespace gapwright
