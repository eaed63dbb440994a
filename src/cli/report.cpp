#include "binding_text.hpp"
#include "commands.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "report_figures.hpp"
#include "report_parts.hpp"
#include "report_request.hpp"
#include "setup.hpp"

#include <gapwright/sweep/ranking.hpp>

#include <algorithm>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

namespace fs = std::filesystem;

// The strongest first, by what the rows have.
Order order_of_rows(const std::vector<Binding>& rows) {
  const auto any = [&](const auto& has) { return std::any_of(rows.begin(), rows.end(), has); };
  if (any([](const Binding& row) { return row.energy_mJ_per_m2.has_value(); }))
    return order_of("energy_mJ_per_m2");
  if (any([](const Binding& row) { return row.well_depth_eV_per_nm.has_value(); }))
    return order_of("well_depth_eV_per_nm");
  return order_of("energy_eV_per_nm");
}

// Rows of other numbers would not fit the figures drawn now. The kernel variant, which changes
// last digits, may differ.
void require_same_numbers(const Store& store, const Binder& binder) {
  if (store.origin().settings_key != binder.settings_key()) store.require_same_origin(binder);
}

std::string title_of(const std::vector<StoredRun>& runs) {
  for (const StoredRun& run : runs) {
    try {
      if (const auto title = TomlReader::from_text(run.plan, "plan").optional_text("title"))
        return *title;
    } catch (const InputError&) {
      continue;  // a plan of another version: the page does without its title
    }
  }
  return {};
}

std::vector<std::pair<std::string, std::string>> facts_of(const StoreOrigin& origin) {
  const Settings& settings = origin.settings;
  const Conditions& conditions = settings.conditions;
  return {{"Temperature", fmt::format("{} K", conditions.temperature_K)},
          {"Chemical potential", fmt::format("{} eV", conditions.chemical_potential_eV)},
          {"Medium", conditions.medium},
          {"Retardation", conditions.retarded ? "yes" : "no"},
          {"Hopping set", settings.hopping},
          {"Background response", settings.background},
          {"Contact target", settings.contact_target},
          {"Tolerance", fmt::format("{}", settings.tolerance)},
          {"Program", "gapwright " + origin.program_version},
          {"Version of the numbers", origin.numerics_version},
          {"Catalogues", origin.catalog_hash},
          {"Kernel", origin.kernel}};
}

std::vector<Tube> walls_of(const Placement& placement) {
  std::vector<Tube> walls = tubes_of(placement.first).walls;
  if (placement.second)
    if (const TubeObject* second = std::get_if<TubeObject>(&*placement.second))
      walls.insert(walls.end(), second->walls.begin(), second->walls.end());
  return walls;
}

void add_pair(std::size_t row, const Binder& binder, Report& report) {
  const Placement placement = placement_of(report.rows[row].binding);
  PairFigures figures{row, {}, gap_curve(binder, placement)};
  const HoppingSet& hopping = binder.catalogs().hopping(binder.settings().hopping);
  for (const Tube& wall : walls_of(placement)) {
    const auto same = [&](const auto& label) { return label == wall.label(); };
    if (std::none_of(figures.tubes.begin(), figures.tubes.end(), same))
      figures.tubes.push_back(wall.label());
    if (std::none_of(report.tubes.begin(), report.tubes.end(),
                     [&](const BandPicture& tube) { return same(tube.label); }))
      report.tubes.push_back(band_picture(wall, hopping));
  }
  report.pairs.push_back(std::move(figures));
}

Report report_of(const Store& store, const ReportRequest& request, const Binder& binder) {
  const std::vector<Binding> rows = rows_of(store, request);
  const Order order = order_of_rows(rows);
  Report report;
  report.arrangement = rows.front().arrangement;
  report.facts = facts_of(store.origin());
  const std::vector<StoredRun> runs = store.runs();
  report.title = title_of(runs);
  for (const StoredRun& run : runs)
    report.runs.push_back({run.started, run.ended, run.finished, run.rows_computed, run.threads,
                           run.program_version, run.plan});
  report.order_field = order.field;
  report.descending = order.descending;
  for (RankedRow& row : ranked(rows, binder, order))
    report.rows.push_back({std::move(row.binding), row.rank, row.rank_spread});
  for (const std::size_t row : figured_rows(report.rows, request)) add_pair(row, binder, report);
  return report;
}

void write_figures(const fs::path& folder,
                   const std::vector<std::pair<std::string, std::string>>& files) {
  std::error_code error;
  fs::create_directory(folder, error);
  for (const auto& [name, content] : files) write_file(folder / name, content);
  note(fmt::format("{} files are in {}", files.size(), folder.string()));
}

}  // namespace

int report(const Words& words) {
  const Catalogs catalogs = load_catalogs(words);
  const ReportRequest request = read_report_request(words);
  const Store store = Store::open_read_only(request.store);
  const bool drawn = request.page || request.figures;
  const fs::path folder = drawn ? report_folder() : fs::path();
  if (request.figures) require_node();
  const Binder binder(catalogs, store.origin().settings);
  require_same_numbers(store, binder);
  const Report report = report_of(store, request, binder);
  const std::string json = report_json(report);
  std::vector<std::pair<std::string, std::string>> figures;
  if (request.figures) figures = draw_figures(folder, json);
  if (request.page) {
    const std::string title = report.title.empty() ? "Binding of tubes" : report.title;
    const std::string page = report_page(read_page_parts(folder), title, json);
    if (*request.page == "-")
      print(page);
    else
      write_file(*request.page, page);
    note(fmt::format(
        "{} rows, {} with figures of their own{}", report.rows.size(), report.pairs.size(),
        *request.page == "-" ? "" : "; open " + request.page->string() + " in a browser"));
  }
  if (request.figures) write_figures(*request.figures, figures);
  if (request.json) print(json);
  return good;
}

}  // namespace gapwright::cli
