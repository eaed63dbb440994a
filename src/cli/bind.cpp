#include "bind_request.hpp"
#include "binding_text.hpp"
#include "bundle.hpp"
#include "commands.hpp"
#include "distance_table.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"

#include <algorithm>
#include <cmath>

namespace gapwright::cli {
namespace {

constexpr int table_rows = 25;

/// Gaps whose logarithms are evenly spaced, both ends included.
std::vector<Placement> placements_of(const BindRequest& request) {
  if (!request.distances_nm) return {request.placement};
  const auto [low, high] = *request.distances_nm;
  std::vector<Placement> rows(table_rows, request.placement);
  for (int i = 0; i < table_rows; ++i)
    rows[std::size_t(i)].gap_nm = low * std::pow(high / low, i / double(table_rows - 1));
  rows.back().gap_nm = high;
  return rows;
}

std::string text_of(const BindRequest& request, const std::vector<Binding>& rows, bool json) {
  if (!json) return request.distances_nm ? distance_table(rows) : binding_text(rows.front());
  std::string lines;
  for (const Binding& row : rows) lines += row_json(row).dump() + "\n";
  return lines;
}

/// The notes of a row, or of the closest and the farthest one of a table.
void print_notes(const std::vector<Binding>& rows) {
  const Binding &closest = rows.front(), &farthest = rows.back();
  const auto both = [&](const std::string& remark) {
    const auto& others = farthest.notes;
    return std::find(others.begin(), others.end(), remark) != others.end();
  };
  for (const std::string& remark : closest.notes)
    note("note: " + (both(remark) ? "" : gap_text(closest) + ": ") + remark);
  for (const std::string& remark : farthest.notes) {
    const auto& known = closest.notes;
    if (std::find(known.begin(), known.end(), remark) == known.end())
      note("note: " + gap_text(farthest) + ": " + remark);
  }
}

}  // namespace

int bind(const Words& words) {
  const Catalogs catalogs = load_catalogs(words);
  const Settings settings = read_settings(words, catalogs);
  if (words.flag("--bundle")) return bind_bundle(words, catalogs, settings);
  const BindRequest request = read_bind_request(words, catalogs);
  const std::vector<Binding> rows = at_bind_options([&] {
    const Binder binder(catalogs, settings);
    const std::vector<Placement> placements = placements_of(request);
    binder.announce(placements);
    std::vector<Binding> all;
    for (const Placement& placement : placements) all.push_back(binder.bind(placement));
    return all;
  });
  print(text_of(request, rows, words.flag("--json")));
  print_notes(rows);
  bool ok = true;
  for (const Binding& row : rows) {
    if (row.status == Status::ok) continue;
    ok = false;
    const std::string place = row.gap_nm && row.arrangement != "coaxial" ? " " + gap_text(row) : "";
    note("gapwright: " + pair_name(row) + place + ": " + std::string(status_word(row.status)) +
         ", " + row.message);
  }
  return ok ? good : some_failed;
}

}  // namespace gapwright::cli
