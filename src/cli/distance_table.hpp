// One pair at many gaps as a table to read.
#pragma once

#include <gapwright/pair/binding.hpp>

#include <string>
#include <vector>

namespace gapwright::cli {

/// Rows of one pair, one a gap; columns without meaning for it are left out.
std::string distance_table(const std::vector<Binding>& rows);

}  // namespace gapwright::cli
