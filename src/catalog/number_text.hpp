// Numbers and ranges in messages and in "LOW:HIGH" text.
#pragma once

#include <gapwright/catalog/toml_reader.hpp>

#include <array>
#include <optional>
#include <string>
#include <string_view>

namespace gapwright {

/// Finite and within the range.
bool in_range(double value, const NumberRange& range);
/// "of 0.3 to 20 nm".
std::string range_text(const NumberRange& range);
/// "a whole number of 1 to 200".
std::string integer_range_text(long low, long high);
/// "LOW:HIGH" in range and in order, else nothing.
std::optional<std::array<double, 2>> read_interval(std::string_view text, const NumberRange& range);

}  // namespace gapwright
