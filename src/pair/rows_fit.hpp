// What ribbons and wires can be placed how, and the curve of it.
#pragma once

#include "ribbon_cache.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/pair/curve.hpp>
#include <gapwright/pair/placement.hpp>

#include <memory>

namespace gapwright {

/// Farthest sideways shift of two bodies.
inline constexpr double farthest_offset_nm = 1000.0;

/// True when a ribbon or a wire takes part, or the arrangement is one of ribbons.
bool rows_take_part(const Placement& placement);

/// Throws InputError unless the bodies of such a placement fit it: kinds, medium, host, offset. Gap
/// and angle are looked at elsewhere.
void require_rows_fit(const Placement& placement, const Catalogs& catalogs, const Medium& around);

/// True when a short-range term exists between the bodies: no wire, no half-space.
bool rows_have_contact(const Placement& placement);

/// The curve of such a placement, which must fit.
std::unique_ptr<PairCurve> curve_of_rows(const Placement& placement, const Catalogs& catalogs,
                                         const Carbon& carbon, TubeCache& tubes,
                                         RibbonCache& ribbons);

}  // namespace gapwright
