// The order of finished rows and how far it depends on the contact target.
#pragma once

#include <gapwright/pair/binder.hpp>
#include <gapwright/sweep/plan.hpp>

#include <string>
#include <vector>

namespace gapwright {

/// How rows are sorted.
struct Order {
  std::string field;        ///< a field of Binding
  bool descending = false;  ///< where a larger number is a stronger pair
};

/// The order of a field: the strongest pair first. Throws InputError for a word that is no field.
Order order_of(const std::string& field);

/// The order of a plan that names none: energy per area of coaxial pairs, well depth of parallel
/// ones, energy per length where they stand at one gap.
Order order_of(const Plan& plan);

/// A row with its place and how far it moves between contact targets.
struct RankedRow {
  Binding binding;
  int rank = 0;         ///< from 1; rows without the field come last
  int rank_spread = 0;  ///< highest less lowest place over all catalogued contact targets
};

/// Rows in order, ties by label. The places under other targets come from the contact term and from
/// what a row holds: dispersion does not depend on the target. Works in parallel over rows.
std::vector<RankedRow> ranked(const std::vector<Binding>& rows, const Binder& binder,
                              const Order& order);

/// The row as it is under another contact target; errors are those of the row. Two walls, or two
/// tubes side by side. Where they rest, the dispersion near their well follows from its value, its
/// slope, which the contact force balances, and its curvature, the stiffness less that of the
/// contact term: ln|E| is a parabola in ln g. The shift of the well between published targets is
/// some 0.01 nm; its depth is then right to 1e-5. Fields of a well are empty where there is none;
/// the electronic share, the first round trip and the pair potential stay those of the row's own
/// gap.
Binding under_target(const Binding& row, const Binder& binder, const std::string& contact_target);

}  // namespace gapwright
