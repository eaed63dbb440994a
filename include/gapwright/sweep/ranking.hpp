// The order of finished rows and how far it depends on the contact target.
#pragma once

#include <gapwright/pair/binder.hpp>

#include <string>
#include <vector>

namespace gapwright {

/// How rows are sorted.
struct Order {
  std::string field;        ///< a field of Binding
  bool descending = false;  ///< where a larger number is a stronger pair
};

/// The order of a field; empty: energy_mJ_per_m2 ascending. Throws InputError for a word that is no
/// field.
Order order_of(const std::string& field);

/// A row with its place and how far it moves between contact targets.
struct RankedRow {
  Binding binding;
  int rank = 0;         ///< from 1; rows without the field come last
  int rank_spread = 0;  ///< highest less lowest place over all catalogued contact targets
};

/// Rows in order, ties by label. The places under other targets come from the contact term alone:
/// dispersion does not depend on it.
std::vector<RankedRow> ranked(const std::vector<Binding>& rows, const Binder& binder,
                              const Order& order);

/// The row as it is under another contact target; errors are those of the row. Two walls.
Binding under_target(const Binding& row, const Binder& binder, const std::string& contact_target);

}  // namespace gapwright
