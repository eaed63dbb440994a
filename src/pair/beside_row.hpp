// Rows of two bodies whose gap is free.
#pragma once

#include "contact_terms.hpp"

#include <gapwright/pair/binding.hpp>
#include <gapwright/pair/curve.hpp>
#include <gapwright/pair/placement.hpp>

namespace gapwright {

/// Responses serve a whole well: the closest gap its search visits.
inline constexpr double closest_visited_nm = 0.28;

/// Fills the energies of a row at its gap, or at the bottom of its well; no contact term: none.
void bind_beside(const PairCurve& curve, const Placement& placement, double tolerance,
                 const ContactTerm* contact, Binding& row);

}  // namespace gapwright
