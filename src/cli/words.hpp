// The words of a command line, before they mean anything.
#pragma once

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/catalog/toml_reader.hpp>

#include <map>
#include <optional>
#include <string>
#include <vector>

namespace gapwright::cli {

/// What was typed for one command. Options are named with their dashes, "--top".
struct Words {
  std::string command;
  std::vector<std::string> operands;
  std::map<std::string, std::string> values;
  std::vector<std::string> flags;
  std::map<std::string, std::vector<std::string>> lists;  // of options that may be repeated

  bool has(const std::string& option) const { return values.contains(option); }
  bool flag(const std::string& option) const;
  /// As typed; nothing when the option was not given.
  std::optional<std::string> text(const std::string& option) const;

  /// Finite and in range; throws InputError that names the option.
  std::optional<double> number(const std::string& option, const NumberRange& range) const;
  std::optional<int> integer(const std::string& option, int low, int high) const;
  std::optional<std::array<double, 2>> interval(const std::string& option,
                                                const NumberRange& range) const;
};

/// Runs a check that does not know of options, and names the option in its message.
template <typename Check>
auto at_option(const std::string& option, Check&& check) {
  try {
    return check();
  } catch (const InputError& error) {
    InputError::Parts parts = error.parts();
    parts.where = option;
    throw InputError(parts);
  }
}

}  // namespace gapwright::cli
