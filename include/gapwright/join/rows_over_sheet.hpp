// A ribbon's face over a flat body, in the first round trip (METHODS §5, rows).
#pragma once

#include <gapwright/join/density.hpp>
#include <gapwright/sheet/reflector.hpp>
#include <gapwright/wire/row_scatterer.hpp>

namespace gapwright {

/// First round trip per length; further ones are not computed.
struct RowsOverSheetDensity {
  FrequencyDensity first_round_trip;  ///< -∫dq dk_⊥/(2π)² e^{-2kD} r̃ r
  FrequencyDensity first_slope;       ///< its derivative by the gap
};

/// Both must cover the window (rows_window of the gap): std::invalid_argument. Throws
/// std::domain_error for a gap that is not positive.
RowsOverSheetDensity rows_over_sheet_density(const RowScatterer& ribbon, const Reflector& sheet,
                                             double gap_nm, const Window& window, bool with_slope);

}  // namespace gapwright
