#include "table_series.hpp"

#include "exit_code.hpp"
#include "interrupt.hpp"
#include "output.hpp"
#include "progress.hpp"
#include "table_index.hpp"
#include "table_text.hpp"

#include <gapwright/sweep/store.hpp>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

struct Planned {
  TableRequest request;
  std::string file;
  std::string key;
};

// "(5,5)@(10,10)" as part of a file name: "5-5+10-10".
std::string name_of(const Object& object) {
  std::string name;
  for (const char c : label_of(object))
    if (c != '(' && c != ')') name += c == ',' ? '-' : c == '@' ? '+' : c;
  return name;
}

std::string key_of(const TableJob& job, const TableRequest& request, const Binder& binder) {
  ContentHash hash;
  hash.add(binder.settings_key()).add(program_version());
  hash.add(label_of(request.first)).add(label_of(request.second));
  hash.add(table_kind_word(request.kind)).add(job.extension).add(job.layout_text);
  hash.add(std::int64_t(job.form));
  hash.add(request.inner_cut_nm.value_or(-1)).add(request.outer_cut_nm.value_or(-1));
  hash.add(request.spacing_nm.value_or(-1)).add(std::int64_t(request.angles_deg.size()));
  for (const double angle : request.angles_deg) hash.add(angle);
  return hash.hex();
}

std::vector<Planned> planned(const TableJob& job, const Binder& binder) {
  TableRequest request = job.request;
  std::vector<TableRequest> requests;
  for (std::size_t i = 0; i < job.series.size(); ++i)
    for (std::size_t j = i; j < job.series.size(); ++j) {
      request.first = job.series[i];
      request.second = job.series[j];
      check_request(request);
      requests.push_back(request);
    }
  // A tube has the same beads whatever it meets: those of the closest pair.
  if (request.kind == TableKind::beads && !request.spacing_nm)
    for (TableRequest& each : requests)
      each.spacing_nm = requests[0].spacing_nm
                            ? requests[0].spacing_nm
                            : default_spacing_nm(binder, job.series[0], job.series[0]);
  std::vector<Planned> all;
  for (const TableRequest& each : requests)
    all.push_back({each, name_of(each.first) + "_" + name_of(each.second) + job.extension,
                   key_of(job, each, binder)});
  return all;
}

int report(const TableJob& job, std::size_t done, std::size_t wanted,
           const std::vector<std::string>& failures, bool interrupted) {
  for (const std::string& failure : failures) note("gapwright: " + failure);
  note(fmt::format("{} of {} tables are in {}, listed in index.csv", done, wanted,
                   job.output->string()));
  if (interrupted) {
    note("gapwright: stopped: run the same command again to go on");
    return stopped;
  }
  return failures.empty() ? good : some_failed;
}

}  // namespace

std::string table_text(const TableJob& job, const Table& table, const Catalogs& catalogs) {
  if (job.form == TableForm::layout) return job.layout->write(table);
  return job.form == TableForm::json ? table_json(table, catalogs) : table_csv(table, catalogs);
}

int write_series(const TableJob& job, const Binder& binder) {
  TableIndex index(*job.output);
  const std::vector<Planned> pairs = planned(job, binder);
  const InterruptGuard interrupt;
  std::vector<const Planned*> missing;
  for (const Planned& pair : pairs)
    if (!index.holds(pair.file, pair.key)) missing.push_back(&pair);
  std::size_t done = pairs.size() - missing.size();
  std::vector<std::string> failures;
  bool interrupted = false;
  {
    Progress progress;
    progress.started(pairs.size(), done);
    for (const Planned* pair : missing) {
      interrupted = interrupt.flag();
      if (interrupted) break;
      const Table table = make_table(binder, pair->request);
      if (table.status == Status::ok) {
        index.add(pair->file, pair->key, table, table_text(job, table, binder.catalogs()));
        ++done;
      } else {
        failures.push_back(fmt::format("{} {}: {}, {}", table.object_1, table.object_2,
                                       status_word(table.status), table.message));
      }
      progress.progressed(done + failures.size(), failures.size());
    }
  }
  return report(job, done, pairs.size(), failures, interrupted);
}

}  // namespace gapwright::cli
