// Fields of layouts by name.
#pragma once

#include <gapwright/table/layout.hpp>

#include <variant>

namespace gapwright {

/// Nothing where a field has no value in this table or row.
using LayoutValue = std::variant<std::monostate, double, long, std::string>;

/// Where a field comes from: a row is null outside of rows.
struct LayoutSource {
  const Table& table;
  const TableRow* row;
  long number;  ///< of the row, from 1
  long count;   ///< of rows
};

enum class LayoutType { number, count, text };

struct LayoutField {
  std::string_view name;
  bool of_row;
  LayoutType type;
  Dimension (*dimension)(TableKind);
  LayoutValue (*value)(const LayoutSource&);
  bool crossed_only = false;
};

const std::vector<LayoutField>& layout_fields();

}  // namespace gapwright
