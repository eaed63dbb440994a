#include "commands.hpp"
#include "exit_code.hpp"
#include "interrupt.hpp"
#include "output.hpp"
#include "progress.hpp"
#include "rank_count.hpp"
#include "rank_pair.hpp"
#include "rank_plan.hpp"
#include "rank_text.hpp"
#include "row_text.hpp"
#include "setup.hpp"

#include <gapwright/sweep/runner.hpp>

#include <algorithm>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

constexpr std::size_t failures_listed = 20;

SweepResult run(const RankRequest& request, const PlanRows& rows, const Binder& binder) {
  std::optional<Store> store;
  if (request.store)
    store = Store::open(*request.store, binder);
  else
    note("nothing is kept: --store FILE.db keeps the rows and lets an interrupted run go on");
  const InterruptGuard interrupt;
  Progress progress;
  const RunOptions options{.threads = request.threads,
                           .store = store ? &*store : nullptr,
                           .stop = &interrupt.flag(),
                           .time_limit_s = request.time_limit_s,
                           .part = request.part,
                           .parts = request.parts,
                           .observer = &progress};
  Plan plan = request.plan;
  plan.settings = binder.settings();
  SweepResult result = run_plan(rows, plan_text(plan), binder, options);
  if (result.stored_beside > 0)
    note(fmt::format("the store holds {} rows of other plans or parts: kept, not listed",
                     result.stored_beside));
  return result;
}

void list_failures(const SweepResult& result) {
  if (result.failed == 0) return;
  note(fmt::format("{} of {} rows failed:", result.failed, result.rows.size()));
  std::size_t listed = 0;
  for (const Binding& row : result.rows) {
    if (row.status == Status::ok) continue;
    if (++listed > failures_listed) {
      note(fmt::format("  and {} more, see the status field", result.failed - failures_listed));
      break;
    }
    note(fmt::format("  {}: {}, {}", pair_name(row), status_word(row.status), row.message));
  }
}

int report_early_end(const RankRequest& request, const SweepResult& result) {
  list_failures(result);
  if (result.end == RunEnd::mostly_failed) {
    note("gapwright: more than half of the rows failed: the run was given up");
    return some_failed;
  }
  const std::string done = fmt::format("{} of {} rows are done", result.rows.size(), result.wanted);
  if (request.store)
    note(fmt::format("gapwright: stopped; {} and kept in {}: run the same command again to go on",
                     done, request.store->string()));
  else
    note(
        fmt::format("gapwright: stopped; {} and lost: with --store FILE.db the same command "
                    "would go on",
                    done));
  return stopped;
}

void write_results(const RankRequest& request, const Binder& binder, const SweepResult& result) {
  const Order order = order_of(request.plan);
  const std::vector<RankedRow> ranking = ranked(result.rows, binder, order);
  const std::size_t shown = request.plan.top > 0
                                ? std::min(ranking.size(), std::size_t(request.plan.top))
                                : ranking.size();
  const bool csv_to_output = request.csv && *request.csv == "-";
  if (csv_to_output) {
    print(ranked_csv(ranking, making_of(request, binder, order)));
    return;
  }
  const std::vector<RankedRow> top(ranking.begin(), ranking.begin() + std::ptrdiff_t(shown));
  if (request.json) {
    std::string lines;
    for (const RankedRow& row : top) lines += ranked_json(row).dump() + "\n";
    print(lines);
  } else {
    print(ranking_table(top, request.plan.arrangement, order));
    note(how_to_read(shown, ranking.size(), request.plan.arrangement, order));
  }
  if (!request.csv) return;  // last: a file that cannot be written takes no result with it
  write_file(*request.csv, ranked_csv(ranking, making_of(request, binder, order)));
  note(fmt::format("{} rows with all fields are in {}", ranking.size(), request.csv->string()));
}

}  // namespace

int rank(const Words& words) {
  const Catalogs catalogs = load_catalogs(words);
  const RankRequest request = read_rank_request(words, catalogs);
  for (const std::string& remark : request.plan.notes) note("note: " + remark);
  if (!request.pair.empty()) return compare_pair(words, request, catalogs);
  const PlanRows rows(request.plan);
  if (request.count) return count_rows(request, rows);
  if (request.csv && *request.csv != "-") require_file_place(*request.csv);
  const Binder binder(catalogs, request.plan.settings);
  const SweepResult result = run(request, rows, binder);
  if (result.end != RunEnd::finished) return report_early_end(request, result);
  write_results(request, binder, result);
  list_failures(result);
  return result.failed > 0 ? some_failed : good;
}

}  // namespace gapwright::cli
