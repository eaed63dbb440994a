// Two coaxial walls with retardation (METHODS §9).
#pragma once

#include <gapwright/join/coaxial.hpp>
#include <gapwright/shell/retarded_shell.hpp>

namespace gapwright {

/// Σ_m ∫dq/2π ln det[1 - T^e_1 T^i_2] over TM and TE at every ξ of the window, and its derivative
/// by the gap at fixed mid radius, αQ² and α_⊥ (empty without with_slope). The window
/// is that of coaxial_window: κ >= q only shortens the waves. Both shells must cover it on the same
/// frequencies and nodes; throws std::invalid_argument otherwise. About 0.6 µs a node and order.
CoaxialDensity retarded_coaxial_density(const RetardedShell& inside, const RetardedShell& around,
                                        const Window& window, bool with_slope);

}  // namespace gapwright
