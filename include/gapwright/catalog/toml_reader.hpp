// Typed, checked reading of TOML text: catalogues and plans.
#pragma once

#include <gapwright/catalog/input_error.hpp>

#include <array>
#include <filesystem>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright {

/// The closed range a number must lie in and the unit messages name.
struct NumberRange {
  double low;
  double high;
  std::string unit;  ///< may be empty
};

/// "LOW:HIGH" with LOW <= HIGH, both finite and in range; blanks around the numbers are allowed.
/// Throws InputError that names `where`.
std::array<double, 2> parse_interval(std::string_view text, const std::string& where,
                                     const NumberRange& range);

/// One table of a TOML text. Every reading function takes note of its key; finish() then refuses
/// every key nobody asked for. All of them throw InputError with name:line, the line, a caret under
/// the place, what was expected and the nearest valid word. Numbers must be finite; integers serve
/// as numbers. A copy reads the same table and shares the notes.
class TomlReader {
 public:
  /// Parses text; `name` stands in messages. Throws InputError at the first syntax error.
  static TomlReader from_text(std::string_view text, const std::string& name);
  /// Reads and parses a file. Throws InputError also when it cannot be read.
  static TomlReader from_file(const std::filesystem::path& file);

  bool has(const std::string& key) const;

  double number(const std::string& key, const NumberRange& range) const;
  std::optional<double> optional_number(const std::string& key, const NumberRange& range) const;
  long integer(const std::string& key, long low, long high) const;
  std::optional<long> optional_integer(const std::string& key, long low, long high) const;
  bool flag(const std::string& key) const;
  std::optional<bool> optional_flag(const std::string& key) const;
  /// Text that is not blank.
  std::string text(const std::string& key) const;
  std::optional<std::string> optional_text(const std::string& key) const;
  /// Text that is one of `choices`.
  std::string word(const std::string& key, const std::vector<std::string>& choices) const;
  std::optional<std::string> optional_word(const std::string& key,
                                           const std::vector<std::string>& choices) const;
  /// "LOW:HIGH" or [LOW, HIGH], LOW <= HIGH.
  std::array<double, 2> interval(const std::string& key, const NumberRange& range) const;
  std::optional<std::array<double, 2>> optional_interval(const std::string& key,
                                                         const NumberRange& range) const;
  /// An array of least … most numbers, or one number for an array of one.
  std::vector<double> numbers(const std::string& key, std::size_t least, std::size_t most,
                              const NumberRange& range) const;

  /// A table inside this one; its finish() is called apart.
  TomlReader table(const std::string& key) const;
  std::optional<TomlReader> optional_table(const std::string& key) const;
  /// The tables of [[key]], at least one.
  std::vector<TomlReader> tables(const std::string& key) const;

  /// Throws InputError for a key that was never asked for.
  void finish() const;

  /// The error of a value that fails a further check, at the place of `key`; at the table when the
  /// key is absent.
  InputError error(const std::string& key, const std::string& what, const std::string& expected,
                   const std::string& nearest = {}) const;

 private:
  struct Table;
  explicit TomlReader(std::shared_ptr<Table> table) : table_(std::move(table)) {}

  InputError missing(const std::string& key, const std::string& expected) const;
  std::shared_ptr<Table> table_;
};

}  // namespace gapwright
