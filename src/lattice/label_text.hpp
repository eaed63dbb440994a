// The characters of a label, without their physics.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright::label_text {

/// In quotes, fit for a terminal: control and broken bytes replaced, long text cut.
std::string quoted(std::string_view text);

/// Without blanks at the ends and around brackets, commas and @; blanks between other characters
/// stay, one each, so that "10 10" is not read as 1010.
std::string blanks_removed(std::string_view text);

std::vector<std::string> split(std::string_view text, char separator);

/// All parts as whole numbers with optional sign, or nothing. Magnitudes end at 10⁹.
std::optional<std::vector<long>> whole_numbers(std::string_view text, char separator);

/// The numbers of a text that holds exactly two, neither signed, whatever stands between.
std::optional<std::vector<long>> two_numbers(std::string_view text);

/// True when "GNR" stands in it, in capitals or not.
bool is_ribbon(std::string_view text);

}  // namespace gapwright::label_text
