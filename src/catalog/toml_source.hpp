// The text of a TOML file and the places in it that messages point at.
#pragma once

#include <gapwright/catalog/input_error.hpp>

#include <string>
#include <string_view>
#include <vector>

#include <toml++/toml.h>

namespace gapwright {

/// Lines of a named text.
class TomlSource {
 public:
  TomlSource(std::string_view text, std::string name);

  /// "name:line".
  std::string where(const toml::source_position& place) const;
  /// The line and a caret under the column; empty for an unknown place.
  std::string excerpt(const toml::source_position& place) const;
  InputError error(const toml::source_position& place, std::string what, std::string expected,
                   std::string nearest) const;

 private:
  std::string name_;
  std::vector<std::string> lines_;
};

}  // namespace gapwright
