// What can be placed how, in which medium.
#pragma once

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/pair/placement.hpp>

namespace gapwright {

/// Throws InputError unless the bodies fit the arrangement, the gap and the angle are in range, and
/// the model holds for all of it in this medium, with retardation if so asked.
void require_fit(const Placement& placement, const Catalogs& catalogs, const Medium& around,
                 bool retarded);

/// The same for a row, which also needs a gap where there is no well.
void require_row(const Placement& placement, const Catalogs& catalogs, const Medium& around,
                 bool retarded);

}  // namespace gapwright
