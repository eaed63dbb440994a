// rank --count: how many pairs, how long, how large; computes nothing.
#pragma once

#include "rank_plan.hpp"

namespace gapwright::cli {

int count_rows(const RankRequest& request, const PlanRows& rows);

}  // namespace gapwright::cli
