// Rows of two bodies whose gap is free.
#pragma once

#include "contact_terms.hpp"

#include <gapwright/pair/binding.hpp>
#include <gapwright/pair/curve.hpp>

#include <optional>

namespace gapwright {

/// Responses serve a whole well: the closest gap its search visits.
inline constexpr double closest_visited_nm = 0.28;

/// Fills the energies of a row at its gap, or at the bottom of its well.
void bind_beside(const PairCurve& curve, std::optional<double> gap_nm, double tolerance,
                 const ContactTerm& contact, Binding& row);

}  // namespace gapwright
