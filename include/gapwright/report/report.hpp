// What a report shows, and the report as JSON and as one page.
#pragma once

#include <gapwright/pair/binding.hpp>
#include <gapwright/report/band_picture.hpp>
#include <gapwright/report/gap_curve.hpp>

#include <cstdint>
#include <string>
#include <utility>
#include <vector>

namespace gapwright {

/// A row with its place.
struct ReportRow {
  Binding binding;
  int rank = 0;
  int rank_spread = 0;
};

/// One run of the sweep that made the rows.
struct ReportRun {
  std::string started, ended;
  bool finished = false;
  std::int64_t rows_computed = 0;
  int threads = 0;
  std::string program_version;
  std::string plan;  ///< its text
};

/// A pair with figures of its own; its objects are those of the row.
struct PairFigures {
  std::size_t row = 0;             ///< index in Report::rows
  std::vector<std::string> tubes;  ///< labels of its walls, drawn from Report::tubes
  std::optional<GapCurve> curve;
};

struct Report {
  std::string title;
  std::string arrangement;                                 ///< of all rows
  std::vector<std::pair<std::string, std::string>> facts;  ///< conditions and versions, by name
  std::vector<ReportRun> runs;
  std::string order_field;  ///< what the rows are ranked by
  bool descending = false;
  std::vector<ReportRow> rows;  ///< in their order
  std::vector<BandPicture> tubes;
  std::vector<PairFigures> pairs;
};

/// The report as one JSON object: rows packed by columns, numbers to six significant digits. Text
/// that is no UTF-8 is mended; no "<" is in it, so that it can stand in a page.
std::string report_json(const Report& report);

/// The files a page is put together from.
struct PageParts {
  std::string page;                  ///< the page with marks "{{…}}" for the rest
  std::vector<std::string> styles;   ///< CSS, in order
  std::vector<std::string> scripts;  ///< JavaScript, in order
  std::string licences;              ///< of what is not ours
};

/// One self-contained page around the JSON. Throws std::invalid_argument when a mark is missing.
std::string report_page(const PageParts& parts, const std::string& title, const std::string& json);

}  // namespace gapwright
