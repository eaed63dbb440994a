// A round body over a flat one (METHODS §5, over a sheet).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/sheet/reflector.hpp>
#include <gapwright/shell/scatterer.hpp>

namespace gapwright {

/// The window of a tube over a plane: multipoles that fall as e^{-2[η_m(qD) - η_m(qR)]}, D = R +
/// gap. Depends on radius, gap and tolerance only. Throws std::domain_error for bodies that touch.
Window over_sheet_window(double radius_nm, double gap_nm, const Nodes& nodes);

/// Densities per length of an outward scatterer, axis at a distance D from the plane.
struct OverSheetDensity {
  FrequencyDensity energy;            ///< ∫dq/2π ln det[δ - √T_m U_mm' √T_m']
  FrequencyDensity first_round_trip;  ///< its trace, -∫dq/2π Σ_m T_m U_mm
  FrequencyDensity distance_slope;    ///< derivative of `energy` by the distance
  FrequencyDensity first_slope;       ///< derivative of `first_round_trip`
  bool positive = true;               ///< false: a determinant was not positive
};

/// U_mm' is a sum over plane waves k = q·cosh η, so that the determinant has the form of two
/// parallel bodies with waves in place of the second one's multipoles. The scatterer must cover the
/// window, the reflector its frequencies. with_slope = false leaves the derivatives empty. Throws
/// std::domain_error for a distance not above the radius.
OverSheetDensity over_sheet_density(const Scatterer& body, const Reflector& sheet,
                                    double distance_nm, const Window& window, bool with_slope);

}  // namespace gapwright
