#include "text_table.hpp"

#include <algorithm>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

std::string padded(const std::string& text, std::size_t width, bool left) {
  const std::string blanks(width - std::min(width, shown_width(text)), ' ');
  return left ? text + blanks : blanks + text;
}

// "-0.00" is rounding, not a sign.
std::string without_negative_zero(std::string text) {
  if (text.starts_with('-') && text.find_first_of("123456789") == std::string::npos)
    text.erase(0, 1);
  return text;
}

}  // namespace

std::size_t shown_width(const std::string& text) {
  return static_cast<std::size_t>(std::count_if(text.begin(), text.end(), [](char c) {
    return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U;
  }));
}

std::string fixed(std::optional<double> value, int decimals) {
  return value ? without_negative_zero(fmt::format("{:.{}f}", *value, decimals)) : std::string();
}

std::string significant(std::optional<double> value, int digits) {
  return value ? without_negative_zero(fmt::format("{:.{}g}", *value, digits)) : std::string();
}

TextTable::TextTable(std::vector<Column> columns) : columns_(std::move(columns)) {}

void TextTable::add(std::vector<std::string> cells) {
  rows_.push_back(std::move(cells));
}

std::string TextTable::text() const {
  std::vector<std::size_t> widths;
  bool units = false;
  for (std::size_t c = 0; c < columns_.size(); ++c) {
    widths.push_back(std::max(shown_width(columns_[c].title), shown_width(columns_[c].unit)));
    for (const auto& row : rows_) widths[c] = std::max(widths[c], shown_width(row[c]));
    units = units || !columns_[c].unit.empty();
  }
  std::string text;
  const auto line = [&](const auto& cell) {
    std::string out;
    for (std::size_t c = 0; c < columns_.size(); ++c)
      out += (c == 0 ? "" : "  ") + padded(cell(c), widths[c], columns_[c].left);
    out.erase(out.find_last_not_of(' ') + 1);
    text += out + "\n";
  };
  line([&](std::size_t c) { return columns_[c].title; });
  if (units) line([&](std::size_t c) { return columns_[c].unit; });
  for (const auto& row : rows_) line([&](std::size_t c) { return row[c]; });
  return text;
}

}  // namespace gapwright::cli
