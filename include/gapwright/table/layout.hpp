// A user's own form of a table: a text with a header, a row and a footer.
#pragma once

#include <gapwright/table/table.hpp>
#include <gapwright/table/units.hpp>

#include <filesystem>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright {

/// A text file of up to three parts, each after a line with its name in brackets:
///
///   [header]  once          [row]  for every row, required          [footer]  once
///
/// Lines before the first part are comments when they begin with #, else blank. In a part, {NAME},
/// {NAME UNIT}, {NAME FORMAT} or {NAME UNIT FORMAT} stands for a field, {{ and }} for braces, all
/// else for itself. FORMAT is [WIDTH][.DIGITS] and e, f or g for numbers, [WIDTH]d for counts,
/// [WIDTH] or -WIDTH (to the left) for text; without it numbers are written so that reading gives
/// the same bits.
class Layout {
 public:
  /// Throws InputError with name:line, the line, a caret and the nearest valid word.
  static Layout from_text(std::string_view text, const std::string& name, TableKind kind);
  static Layout from_file(const std::filesystem::path& file, TableKind kind);

  /// The table in this form. Rows whose fields have no value (energies in the limit γ → 0) are left
  /// out.
  std::string write(const Table& table) const;

 private:
  friend class LayoutReader;
  struct Piece {
    std::string literal;  // before the field
    int field = -1;       // of layout_fields(); -1: none
    double unit_size = 1.0;
    std::string format;  // for fmt, "{}" or like "{:12.6f}"
  };
  using Part = std::vector<Piece>;
  static void write_part(const Part& part, const Table& table, const TableRow* row, int number,
                         int count, std::string& text);
  bool skips(const Table& table, const TableRow& row) const;

  Part header_, row_, footer_;
};

/// Names of the fields that a layout may use in rows, and of those that it may use anywhere.
std::vector<std::string> layout_row_fields();
std::vector<std::string> layout_table_fields();

}  // namespace gapwright
