// Two flat sheets with retardation (METHODS §9).
#pragma once

#include <gapwright/join/planar.hpp>
#include <gapwright/response/retardation.hpp>
#include <gapwright/sheet/retarded_sheet.hpp>

namespace gapwright {

/// E/A = (1/2π)∫dξ∫QdQ/2π Σ_{TM,TE} ln(1 - r₁r₂e^{-2κ_z d}) and its derivative by d, T = 0. The
/// waves are those of planar_waves. Throws as planar_energy does.
PlanarEnergy retarded_planar_energy(const RetardedSheet& a, const RetardedSheet& b,
                                    double spacing_nm, const Conditions& conditions,
                                    const RetardedOptions& options = {});

}  // namespace gapwright
