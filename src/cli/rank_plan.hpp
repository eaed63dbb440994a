// The plan of a rank command: a file, flags, or both.
#pragma once

#include "words.hpp"

#include <gapwright/sweep/plan.hpp>

#include <filesystem>
#include <optional>

namespace gapwright::cli {

/// What rank is asked for besides the plan.
struct RankRequest {
  Plan plan;
  std::optional<std::filesystem::path> csv, store;
  std::string pair;  ///< label of --pair
  double time_limit_s = 0.0;
  int part = 1, parts = 1;
  int threads = 0;
  bool json = false;
  bool count = false;
};

/// Flags replace keys of the plan. Throws InputError also when nothing says which tubes to take.
RankRequest read_rank_request(const Words& words, const Catalogs& catalogs);

}  // namespace gapwright::cli
