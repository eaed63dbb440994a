#include "number_text.hpp"

#include <charconv>
#include <cmath>

#include <fmt/format.h>

namespace gapwright {
namespace {

std::optional<double> read_number(std::string_view text) {
  constexpr std::string_view blanks = " \t";
  const std::size_t first = text.find_first_not_of(blanks);
  if (first == std::string_view::npos) return std::nullopt;
  text = text.substr(first, text.find_last_not_of(blanks) - first + 1);
  double value = 0.0;
  const char* end = text.data() + text.size();
  const auto [stop, problem] = std::from_chars(text.data(), end, value);
  if (problem != std::errc() || stop != end) return std::nullopt;
  return value;
}

}  // namespace

bool in_range(double value, const NumberRange& range) {
  return std::isfinite(value) && range.low <= value && value <= range.high;
}

std::string range_text(const NumberRange& range) {
  const std::string unit = range.unit.empty() ? "" : " " + range.unit;
  return fmt::format("of {:g} to {:g}{}", range.low, range.high, unit);
}

std::string integer_range_text(long low, long high) {
  return fmt::format("a whole number of {} to {}", low, high);
}

std::optional<std::array<double, 2>> read_interval(std::string_view text,
                                                   const NumberRange& range) {
  const std::size_t colon = text.find(':');
  if (colon == std::string_view::npos) return std::nullopt;
  const auto low = read_number(text.substr(0, colon));
  const auto high = read_number(text.substr(colon + 1));
  if (!low || !high || *low > *high) return std::nullopt;
  if (!in_range(*low, range) || !in_range(*high, range)) return std::nullopt;
  return std::array<double, 2>{*low, *high};
}

std::array<double, 2> parse_interval(std::string_view text, const std::string& where,
                                     const NumberRange& range) {
  if (const auto both = read_interval(text, range)) return *both;
  throw InputError({"'" + std::string(text) + "' is not an interval in range",
                    where,
                    {},
                    "LOW:HIGH, LOW not above HIGH, both " + range_text(range),
                    {}});
}

}  // namespace gapwright
