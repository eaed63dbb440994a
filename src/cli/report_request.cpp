#include "report_request.hpp"

#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <algorithm>
#include <map>
#include <sstream>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

namespace fs = std::filesystem;

constexpr std::size_t pairs_by_default = 4;
constexpr std::size_t most_pairs = 40;

void require_figure_folder(const fs::path& folder) {
  std::error_code error;
  if (fs::is_directory(folder, error)) return require_file_place(folder / "figure.svg");
  if (fs::exists(folder, error))
    throw InputError({"is no folder", folder.string(), {}, "a folder for the figures", {}});
  require_file_place(folder);  // its parent must be there
}

// Objects as the store writes them: two, or one that holds both.
std::vector<std::string> objects_of(const std::string& typed) {
  std::vector<std::string> objects;
  std::istringstream words(typed);
  for (std::string word; words >> word;) objects.push_back(word);
  for (std::string& object : objects) {
    const ParsedLabel parsed = at_option("--pair", [&] { return parse_label(object); });
    for (const std::string& remark : parsed.notes) note("note: " + remark);
    object = label_of(parsed.object);
  }
  return objects;
}

bool names(const std::vector<std::string>& objects, const Binding& row) {
  if (objects.size() == 1) return objects[0] == row.object_1 + "@" + row.object_2;
  if (objects.size() != 2 || row.arrangement == "coaxial") return false;
  return (objects[0] == row.object_1 && objects[1] == row.object_2) ||
         (objects[1] == row.object_1 && objects[0] == row.object_2);
}

std::size_t row_of(const std::vector<ReportRow>& rows, const std::string& typed) {
  const std::vector<std::string> objects = objects_of(typed);
  for (std::size_t i = 0; i < rows.size(); ++i)
    if (names(objects, rows[i].binding)) return i;
  std::vector<std::string> labels;
  for (const ReportRow& row : rows) labels.push_back(pair_name(row.binding));
  const std::string wanted =
      fmt::format("{}", fmt::join(objects, rows[0].binding.arrangement == "coaxial" ? "@" : " "));
  throw InputError(
      {"no row of " + wanted + " among the " + std::to_string(rows.size()) + " of the store",
       "--pair",
       {},
       "a pair of the store, such as " + labels.front(),
       nearest_word(wanted, labels)});
}

}  // namespace

ReportRequest read_report_request(const Words& words) {
  if (words.operands.empty())
    throw InputError({"no store", "report", {}, "STORE.db, a file that rank --store wrote", {}});
  ReportRequest request;
  request.store = words.operands.front();
  if (const auto it = words.lists.find("--pair"); it != words.lists.end())
    request.pairs = it->second;
  const bool more = words.operands.size() > 1;
  if (more && request.pairs.empty())
    throw InputError({"more than one store", "report", {}, "one STORE.db", {}});
  request.pairs.insert(request.pairs.end(), words.operands.begin() + 1, words.operands.end());
  if (request.pairs.size() > most_pairs)
    throw InputError({fmt::format("{} pairs", request.pairs.size()),
                      "--pair",
                      {},
                      fmt::format("at most {}", most_pairs),
                      {}});
  if (const auto page = words.text("--output")) request.page = *page;
  if (const auto folder = words.text("--svg")) request.figures = *folder;
  if (const auto word = words.text("--arrangement"))
    request.arrangement = at_option("--arrangement", [&] { return parse_arrangement(*word); });
  request.json = words.flag("--json");
  if (!request.page && !request.figures && !request.json)
    throw InputError({"nothing to write", "report", {}, "-o FILE.html, --svg DIR, or both", {}});
  if (request.json && request.page == "-")
    throw InputError(
        {"two things for standard output", "-o -", {}, "--json or -o -, not both", {}});
  if (has_settings(words))
    throw InputError({"the settings of a report are those of its store",
                      "report",
                      {},
                      "no option that changes them",
                      {}});
  if (request.page && *request.page != "-") require_file_place(*request.page);
  if (request.figures) require_figure_folder(*request.figures);
  return request;
}

std::vector<Binding> rows_of(const Store& store, const ReportRequest& request) {
  const auto known = store.keys();
  std::vector<std::string> keys(known.begin(), known.end());
  std::sort(keys.begin(), keys.end());
  std::vector<Binding> rows = store.read(keys);
  std::map<std::string, std::size_t> counts;
  for (const Binding& row : rows) ++counts[row.arrangement];
  if (counts.empty())
    throw InputError({"the store holds no rows",
                      request.store.string(),
                      {},
                      "a store with rows: run the rank command that made it again",
                      {}});
  std::string chosen = std::max_element(counts.begin(), counts.end(), [](auto& a, auto& b) {
                         return a.second < b.second;
                       })->first;
  if (request.arrangement) chosen = arrangement_word(*request.arrangement);
  if (!counts.contains(chosen))
    throw InputError({"the store holds no " + chosen + " rows",
                      "--arrangement",
                      {},
                      "an arrangement it holds: " + counts.begin()->first,
                      counts.begin()->first});
  if (counts.size() > 1)
    note(fmt::format("{} of {} rows are {} and shown; --arrangement chooses others", counts[chosen],
                     rows.size(), chosen));
  std::erase_if(rows, [&](const Binding& row) { return row.arrangement != chosen; });
  return rows;
}

std::vector<std::size_t> figured_rows(const std::vector<ReportRow>& rows,
                                      const ReportRequest& request) {
  std::vector<std::size_t> chosen;
  for (const std::string& typed : request.pairs) {
    const std::size_t row = row_of(rows, typed);
    if (std::find(chosen.begin(), chosen.end(), row) == chosen.end()) chosen.push_back(row);
  }
  if (!request.pairs.empty()) return chosen;
  for (std::size_t i = 0; i < rows.size() && chosen.size() < pairs_by_default; ++i)
    if (rows[i].binding.status == Status::ok) chosen.push_back(i);
  return chosen;
}

Placement placement_of(const Binding& row) {
  const Arrangement arrangement = parse_arrangement(row.arrangement);
  if (arrangement == Arrangement::coaxial)
    return {arrangement, parse_label(row.object_1 + "@" + row.object_2).object};
  return {arrangement, parse_label(row.object_1).object, parse_label(row.object_2).object,
          row.gap_nm};
}

}  // namespace gapwright::cli
