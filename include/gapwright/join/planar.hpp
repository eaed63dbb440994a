// Two flat sheets (METHODS §5, planar).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/sheet/flat_sheet.hpp>

namespace gapwright {

/// Wave numbers a planar row needs from the smallest to the largest spacing.
IndexRange planar_waves(double min_spacing_nm, double max_spacing_nm, const Nodes& nodes);

/// E/A [eV/nm²] and dE/A/dd [eV/nm³] of two sheets at spacing d [nm], at T > 0 free energies.
struct PlanarEnergy {
  FrequencySum energy_eV_per_nm2;
  FrequencySum slope_eV_per_nm3;
};
PlanarEnergy planar_energy(const SheetScatterer& a, const SheetScatterer& b, double spacing_nm,
                           const Conditions& conditions);

}  // namespace gapwright
