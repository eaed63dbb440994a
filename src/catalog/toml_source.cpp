#include "toml_source.hpp"

#include <algorithm>

namespace gapwright {
namespace {

bool continues_character(char c) {
  return (static_cast<unsigned char>(c) & 0xc0U) == 0x80U;
}

// Blanks as wide as the first `columns` characters of a line; tabs stay tabs.
std::string padding(std::string_view line, std::size_t columns) {
  std::string pad;
  for (const char c : line) {
    if (continues_character(c)) continue;
    if (pad.size() == columns) break;
    pad += c == '\t' ? '\t' : ' ';
  }
  pad.resize(std::max(pad.size(), columns), ' ');
  return pad;
}

}  // namespace

TomlSource::TomlSource(std::string_view text, std::string name) : name_(std::move(name)) {
  while (!text.empty()) {
    const std::size_t length = std::min(text.find('\n'), text.size());
    std::string_view line = text.substr(0, length);
    if (line.ends_with('\r')) line.remove_suffix(1);
    lines_.emplace_back(line);
    text.remove_prefix(std::min(length + 1, text.size()));
  }
}

std::string TomlSource::where(const toml::source_position& place) const {
  return place ? name_ + ":" + std::to_string(place.line) : name_;
}

std::string TomlSource::excerpt(const toml::source_position& place) const {
  if (!place || place.line > lines_.size()) return {};
  const std::string& line = lines_[place.line - 1];
  return "  " + line + "\n  " + padding(line, place.column - 1) + "^";
}

InputError TomlSource::error(const toml::source_position& place, std::string what,
                             std::string expected, std::string nearest) const {
  return InputError(
      {std::move(what), where(place), excerpt(place), std::move(expected), std::move(nearest)});
}

}  // namespace gapwright
