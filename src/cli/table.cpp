#include "commands.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "setup.hpp"
#include "table_series.hpp"
#include "table_text.hpp"

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

void write_one(const TableJob& job, const Table& table, const Catalogs& catalogs) {
  const bool only_csv = job.csv && job.form == TableForm::csv;
  if (!only_csv) {
    const std::string text = table_text(job, table, catalogs);
    if (job.output)
      write_file(*job.output, text);
    else
      print(text);
  }
  if (job.csv && *job.csv == "-")
    print(table_csv(table, catalogs));
  else if (job.csv)
    write_file(*job.csv, table_csv(table, catalogs));
  for (const auto& file : {only_csv ? std::nullopt : job.output, job.csv})
    if (file && *file != "-")
      note(fmt::format("{} rows are in {}", table.rows.size(), file->string()));
}

int one_pair(const TableJob& job, const Binder& binder) {
  const Table table = make_table(binder, job.request);
  if (table.status == Status::ok || table.status == Status::not_converged)
    write_one(job, table, binder.catalogs());
  if (table.status == Status::ok) return good;
  note(fmt::format("gapwright: {} {}: {}, {}", table.object_1, table.object_2,
                   status_word(table.status), table.message));
  return some_failed;
}

}  // namespace

int table(const Words& words) {
  const Catalogs catalogs = load_catalogs(words);
  const Settings settings = read_settings(words, catalogs);
  const TableJob job = read_table_job(words);
  return at_table_options([&] {
    const Binder binder(catalogs, settings);
    return job.series.empty() ? one_pair(job, binder) : write_series(job, binder);
  });
}

}  // namespace gapwright::cli
