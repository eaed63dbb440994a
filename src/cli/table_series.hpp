// One table for every pair of a range of tubes.
#pragma once

#include "table_request.hpp"

namespace gapwright::cli {

/// Writes a file a pair and index.csv into the job's folder; a table that is there already, made by
/// the same command, stays. Returns the exit code.
int write_series(const TableJob& job, const Binder& binder);

/// The table in the form of the job.
std::string table_text(const TableJob& job, const Table& table, const Catalogs& catalogs);

}  // namespace gapwright::cli
