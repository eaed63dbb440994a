#include "ribbon_label.hpp"

#include "label_text.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <algorithm>
#include <cctype>
#include <optional>

#include <fmt/format.h>

namespace gapwright {

namespace {

constexpr const char* expected_ribbon =
    "a ribbon such as 13-AGNR (armchair, 3 to 3000 dimer lines) or 6-ZGNR (zigzag, 2 to 3000 "
    "chains)";

std::string in_capitals(std::string_view text) {
  std::string upper(text);
  for (char& c : upper)
    if (c >= 'a' && c <= 'z') c = static_cast<char>(c - 'a' + 'A');
  return upper;
}

/// The only number of a text without sign, capped at 10⁹, or nothing.
std::optional<long> only_number(std::string_view text) {
  const auto with_zero = label_text::two_numbers(std::string(text) + " 0");
  if (!with_zero) return std::nullopt;
  return with_zero->front();
}

Ribbon clamped(RibbonEdge edge, long lines) {
  const int least = edge == RibbonEdge::armchair ? min_armchair_lines : min_zigzag_lines;
  return {edge, static_cast<int>(std::clamp<long>(lines, least, max_gap_lines))};
}

[[noreturn]] void refuse(std::string what, std::string_view text, std::string nearest) {
  throw InputError({std::move(what),
                    fmt::format("label {}", label_text::quoted(text)),
                    {},
                    expected_ribbon,
                    std::move(nearest)});
}

}  // namespace

Ribbon read_ribbon(std::string_view text) {
  const std::string upper = in_capitals(text);
  const bool armchair = upper.find("AGNR") != std::string::npos;
  const bool zigzag = upper.find("ZGNR") != std::string::npos;
  const auto lines = only_number(upper);
  if (armchair == zigzag)
    refuse("the ribbon's edge is not named", text,
           lines ? clamped(RibbonEdge::armchair, *lines).label() : "");
  const RibbonEdge edge = armchair ? RibbonEdge::armchair : RibbonEdge::zigzag;
  if (!lines) refuse("the ribbon has not one number of lines", text, "");
  const Ribbon nearest = clamped(edge, *lines);
  const auto dash = upper.find('-');
  const bool written =
      dash != std::string::npos && upper.substr(dash + 1) == (armchair ? "AGNR" : "ZGNR");
  const auto number = label_text::whole_numbers(upper.substr(0, written ? dash : 0), ',');
  if (!written || !number || !std::isdigit(static_cast<unsigned char>(upper.front())))
    refuse("the ribbon is not written as N-AGNR or N-ZGNR", text, nearest.label());
  if (nearest.lines != *lines)
    refuse(*lines < nearest.lines ? fmt::format("a ribbon of {} lines is too narrow", *lines)
                                  : "the ribbon is too wide",
           text, nearest.label());
  return nearest;
}

}  // namespace gapwright
