// Aligned columns for reading.
#pragma once

#include <optional>
#include <string>
#include <vector>

namespace gapwright::cli {

/// Columns of text, two blanks apart; the first may be left-aligned, numbers are right-aligned.
class TextTable {
 public:
  struct Column {
    std::string title;
    std::string unit;  ///< second header line; may be empty
    bool left = false;
  };
  explicit TextTable(std::vector<Column> columns);
  /// One cell a column.
  void add(std::vector<std::string> cells);
  std::string text() const;

 private:
  std::vector<Column> columns_;
  std::vector<std::vector<std::string>> rows_;
};

/// Characters a terminal shows: UTF-8 continuation bytes do not count.
std::size_t shown_width(const std::string& text);

/// With so many decimals, "" for nothing; never "-0.00".
std::string fixed(std::optional<double> value, int decimals);
/// With so many significant digits, "" for nothing.
std::string significant(std::optional<double> value, int digits);

}  // namespace gapwright::cli
