// rank --pair: one stored row computed again.
#pragma once

#include "rank_plan.hpp"

namespace gapwright::cli {

/// Prints the fields of the stored row and of the new one that differ; exit code 1 when they do.
int compare_pair(const Words& words, const RankRequest& request, const Catalogs& catalogs);

}  // namespace gapwright::cli
