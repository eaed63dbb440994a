// One pair as a block to read.
#pragma once

#include <gapwright/pair/binding.hpp>

#include <string>

namespace gapwright::cli {

std::string binding_text(const Binding& row);

/// The pair, how it is placed, and the conditions.
std::string heading_text(const Binding& row);

/// "at a gap of 0.34 nm".
std::string gap_text(const Binding& row);

}  // namespace gapwright::cli
