// Walls in walls: coupling is diagonal in (m, q) (METHODS §5, coaxial).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/shell/scatterer.hpp>

namespace gapwright {

/// Round trips that decay as e^-x are left out beyond this x: the share x²e^-x/2 of the energy is
/// then below a sixtieth of the tolerance.
double largest_exponent(double tolerance);

/// The window of a coaxial row: cells whose round trip e^{-2(η_m(qR₂) - η_m(qR₁))} matters at the
/// tolerance. Depends on the two radii and the tolerance only.
Window coaxial_window(double inner_radius_nm, double outer_radius_nm, const Nodes& nodes);

/// Densities of one interface between an outward scatterer and the wall around it.
struct CoaxialDensity {
  FrequencyDensity energy;     ///< Σ_m ∫dq/2π ln[1 - S T^i]
  FrequencyDensity gap_slope;  ///< its derivative by the gap at fixed mid radius
};

/// Both scatterers must cover the window. with_slope = false leaves gap_slope empty.
CoaxialDensity coaxial_density(const Scatterer& inside, const Scatterer& around,
                               const Window& window, bool with_slope);

}  // namespace gapwright
