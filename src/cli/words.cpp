#include "words.hpp"

#include <algorithm>
#include <charconv>
#include <cmath>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

template <typename Number>
std::optional<Number> whole_text_as(const std::string& text) {
  Number value{};
  const char* end = text.data() + text.size();
  const auto [stop, problem] = std::from_chars(text.data(), end, value);
  if (problem != std::errc() || stop != end) return std::nullopt;
  return value;
}

InputError not_accepted(const std::string& option, const std::string& text, const char* kind,
                        const std::string& expected, const std::string& nearest = {}) {
  return InputError({fmt::format("'{}' is not {}", text, kind), option, {}, expected, nearest});
}

}  // namespace

bool Words::flag(const std::string& option) const {
  return std::find(flags.begin(), flags.end(), option) != flags.end();
}

std::optional<std::string> Words::text(const std::string& option) const {
  const auto place = values.find(option);
  if (place == values.end()) return std::nullopt;
  return place->second;
}

std::optional<double> Words::number(const std::string& option, const NumberRange& range) const {
  const auto typed = text(option);
  if (!typed) return std::nullopt;
  const auto value = whole_text_as<double>(*typed);
  const std::string unit = range.unit.empty() ? "" : " " + range.unit;
  if (!value || !std::isfinite(*value) || *value < range.low || *value > range.high)
    throw not_accepted(option, *typed, value ? "in range" : "a number",
                       fmt::format("a number of {:g} to {:g}{}", range.low, range.high, unit),
                       value && std::isfinite(*value)
                           ? fmt::format("{:g}", *value < range.low ? range.low : range.high)
                           : "");
  return value;
}

std::optional<int> Words::integer(const std::string& option, int low, int high) const {
  const auto typed = text(option);
  if (!typed) return std::nullopt;
  const auto value = whole_text_as<int>(*typed);
  if (!value || *value < low || *value > high)
    throw not_accepted(option, *typed, value ? "in range" : "a whole number",
                       fmt::format("a whole number of {} to {}", low, high));
  return value;
}

std::optional<std::array<double, 2>> Words::interval(const std::string& option,
                                                     const NumberRange& range) const {
  const auto typed = text(option);
  if (!typed) return std::nullopt;
  return parse_interval(*typed, option, range);
}

}  // namespace gapwright::cli
