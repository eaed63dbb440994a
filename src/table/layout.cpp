#include "layout_fields.hpp"

#include <fmt/format.h>

namespace gapwright {
namespace {

std::string formatted(const std::string& format, const LayoutValue& value, double unit_size) {
  if (const double* number = std::get_if<double>(&value))
    return fmt::format(fmt::runtime(format), *number / unit_size + 0.0);  // no "-0"
  if (const long* count = std::get_if<long>(&value))
    return fmt::format(fmt::runtime(format), *count);
  if (const std::string* text = std::get_if<std::string>(&value))
    return fmt::format(fmt::runtime(format), *text);
  return {};
}

}  // namespace

void Layout::write_part(const Part& part, const Table& table, const TableRow* row, int number,
                        int count, std::string& text) {
  const LayoutSource source{table, row, number, count};
  for (const Piece& piece : part) {
    text += piece.literal;
    if (piece.field < 0) continue;
    const LayoutField& field = layout_fields()[std::size_t(piece.field)];
    text += formatted(piece.format, field.value(source), piece.unit_size);
  }
}

bool Layout::skips(const Table& table, const TableRow& row) const {
  const LayoutSource source{table, &row, 0, 0};
  for (const Piece& piece : row_) {
    if (piece.field < 0) continue;
    const LayoutField& field = layout_fields()[std::size_t(piece.field)];
    if (field.of_row && std::holds_alternative<std::monostate>(field.value(source))) return true;
  }
  return false;
}

std::string Layout::write(const Table& table) const {
  std::vector<const TableRow*> rows;
  for (const TableRow& row : table.rows)
    if (!skips(table, row)) rows.push_back(&row);
  const int count = int(rows.size());
  std::string text;
  write_part(header_, table, nullptr, 0, count, text);
  for (int i = 0; i < count; ++i) write_part(row_, table, rows[std::size_t(i)], i + 1, count, text);
  write_part(footer_, table, nullptr, 0, count, text);
  return text;
}

}  // namespace gapwright
