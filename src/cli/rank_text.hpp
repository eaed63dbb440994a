// A ranking to read, and what an export says of its making.
#pragma once

#include "rank_plan.hpp"

#include <gapwright/sweep/ranking.hpp>

#include <string>
#include <vector>

namespace gapwright::cli {

/// Aligned table of the main fields; a field sorted by that is not among them is added.
std::string ranking_table(const std::vector<RankedRow>& rows, Arrangement arrangement,
                          const Order& order);
/// One or two lines that explain the table.
std::string how_to_read(std::size_t shown, std::size_t rows, Arrangement arrangement,
                        const Order& order);
/// Versions, order and plan, a line each.
std::string making_of(const RankRequest& request, const Binder& binder, const Order& order);

}  // namespace gapwright::cli
