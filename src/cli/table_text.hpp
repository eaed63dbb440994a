// Tables as CSV and JSON.
#pragma once

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/table/table.hpp>

#include <string>

namespace gapwright::cli {

/// Comment lines with every condition, cut and error, a header with units, a line a row; numbers so
/// that reading gives the same bits back.
std::string table_csv(const Table& table, const Catalogs& catalogs);
/// The same as one object; columns are arrays.
std::string table_json(const Table& table, const Catalogs& catalogs);

}  // namespace gapwright::cli
