// What report is asked for, and the rows it finds in the store.
#pragma once

#include "words.hpp"

#include <gapwright/pair/placement.hpp>
#include <gapwright/report/report.hpp>
#include <gapwright/sweep/store.hpp>

#include <filesystem>
#include <optional>
#include <vector>

namespace gapwright::cli {

struct ReportRequest {
  std::filesystem::path store;
  std::optional<std::filesystem::path> page;
  std::optional<std::filesystem::path> figures;  ///< folder
  std::vector<std::string> pairs;                ///< as typed
  std::optional<Arrangement> arrangement;
  bool json = false;  ///< what the page is made of, on standard output
};

/// Throws InputError when something is missing or cannot be written later.
ReportRequest read_report_request(const Words& words);

/// All rows of the store of one arrangement: the one asked for, else that of most rows, with a note
/// when there are others. Throws InputError when there is none.
std::vector<Binding> rows_of(const Store& store, const ReportRequest& request);

/// The indices of pairs with figures of their own: those asked for, else the first ones. Throws
/// InputError for a pair that no row has, naming the nearest.
std::vector<std::size_t> figured_rows(const std::vector<ReportRow>& rows,
                                      const ReportRequest& request);

/// The placement a row came from.
Placement placement_of(const Binding& row);

}  // namespace gapwright::cli
