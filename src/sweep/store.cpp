#include "store_schema.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/sweep/store.hpp>

#include <chrono>
#include <cmath>
#include <stdexcept>

#include <fmt/chrono.h>
#include <fmt/format.h>

namespace gapwright {
namespace {

std::string field_list(const char* before) {
  std::string list;
  for (const BindingField& field : binding_fields())
    list += fmt::format("{}{}{}", list.empty() ? "" : ", ", before, field.name);
  return list;
}

std::string insert_pair_sql() {
  std::string marks;
  for (std::size_t i = 0; i < binding_fields().size(); ++i) marks += ", ?";
  return "INSERT OR REPLACE INTO pairs(key, " + field_list("") + ") VALUES(?" + marks + ")";
}

std::string now_utc() {
  const auto now = std::chrono::system_clock::to_time_t(std::chrono::system_clock::now());
  return fmt::format("{:%Y-%m-%dT%H:%M:%SZ}", fmt::gmtime(now));
}

void bind_field(Statement& statement, int parameter, const BindingField& field,
                const Binding& row) {
  const FieldValue value = field.get(row);
  if (const double* number = std::get_if<double>(&value)) {
    if (!std::isfinite(*number))
      throw std::invalid_argument(
          fmt::format("Store::write: {} = {}, required a finite number", field.name, *number));
    statement.bind(parameter, *number);
  } else if (const std::string* text = std::get_if<std::string>(&value)) {
    statement.bind(parameter, *text);
  } else {
    statement.bind_null(parameter);
  }
}

FieldValue column_value(const Statement& statement, int column, const BindingField& field) {
  if (statement.is_null(column)) return {};
  if (field.is_text) return statement.text(column);
  return statement.number(column);
}

// A writer owns the file until it closes it, and needs no shared memory beside it.
void lock_for_writing(const Database& database) {
  if (!database.writable())
    throw InputError({.what = "the store is write-protected",
                      .where = database.file().string(),
                      .excerpt = {},
                      .expected = "a file you may write to",
                      .nearest = {}});
  database.execute("PRAGMA locking_mode = EXCLUSIVE");
}

void start_log(const Database& database) {
  if (database.text("PRAGMA journal_mode = WAL") != "wal")
    throw std::runtime_error(database.file().string() + ": no write-ahead log");
  database.execute("PRAGMA synchronous = FULL");
}

}  // namespace

struct Store::Impl {
  explicit Impl(const std::filesystem::path& file,
                Database::Access access = Database::Access::write)
      : database(file, access) {}

  ~Impl() {
    insert_pair.reset();
    insert_object.reset();
    insert_failure.reset();
    // One plain file at rest; where that fails the log stays beside it and nothing is lost.
    if (writer)
      sqlite3_exec(database.handle(), "PRAGMA journal_mode = DELETE", nullptr, nullptr, nullptr);
  }

  void prepare() {
    if (insert_pair) return;
    insert_pair.emplace(database, insert_pair_sql());
    insert_object.emplace(database, "INSERT OR IGNORE INTO objects VALUES(?,?,?,?,?)");
    insert_failure.emplace(database, "INSERT OR REPLACE INTO failures VALUES(?,?,?,?,?)");
  }

  void write_pair(const std::string& key, const Binding& row) {
    insert_pair->reset();
    insert_pair->bind(0, key);
    int parameter = 1;
    for (const BindingField& field : binding_fields())
      bind_field(*insert_pair, parameter++, field, row);
    insert_pair->step();
  }

  void write_object(const std::string& label, const std::string& kind,
                    std::optional<double> diameter_nm, std::optional<double> chiral_angle_deg,
                    std::optional<double> band_gap_eV) {
    insert_object->reset();
    insert_object->bind(0, label).bind(1, kind);
    int parameter = 2;
    for (const std::optional<double>& value : {diameter_nm, chiral_angle_deg, band_gap_eV}) {
      if (value)
        insert_object->bind(parameter, *value);
      else
        insert_object->bind_null(parameter);
      ++parameter;
    }
    insert_object->step();
  }

  void write_failure(const std::string& key, const Binding& row) {
    insert_failure->reset();
    insert_failure->bind(0, key).bind(1, row.object_1).bind(2, row.object_2);
    insert_failure->bind(3, std::string(status_word(row.status))).bind(4, row.message);
    insert_failure->step();
  }

  Database database;
  bool writer = false;
  StoreOrigin origin;
  std::optional<Statement> insert_pair, insert_object, insert_failure;
};

Store::Store(std::unique_ptr<Impl> impl) : impl_(std::move(impl)) {}
Store::Store(Store&&) noexcept = default;
Store& Store::operator=(Store&&) noexcept = default;
Store::~Store() = default;

Store Store::open(const std::filesystem::path& file, const Binder& binder) {
  require_store_path(file, false);
  auto impl = std::make_unique<Impl>(file);
  const Database& database = impl->database;
  lock_for_writing(database);
  const bool fresh = is_fresh(database);
  if (!fresh) {  // a file that is refused is left as it was
    require_store(database);
    require_same(read_origin(database), origin_of(binder), file);
  }
  start_log(database);
  impl->writer = true;
  Transaction transaction(database);
  if (fresh) create_schema(database, origin_of(binder));
  transaction.commit();
  impl->origin = read_origin(database);
  return Store(std::move(impl));
}

Store Store::open_read_only(const std::filesystem::path& file) {
  require_store_path(file, true);
  auto impl = std::make_unique<Impl>(file, Database::Access::read);
  require_store(impl->database);
  impl->origin = read_origin(impl->database);
  return Store(std::move(impl));
}

const StoreOrigin& Store::origin() const {
  return impl_->origin;
}

void Store::require_same_origin(const Binder& binder) const {
  require_same(impl_->origin, origin_of(binder), impl_->database.file());
}

std::unordered_set<std::string> Store::keys() const {
  std::unordered_set<std::string> keys;
  Statement select(impl_->database, "SELECT key FROM pairs");
  while (select.step()) keys.insert(select.text(0));
  return keys;
}

void Store::write(const std::vector<std::pair<std::string, Binding>>& rows) {
  impl_->prepare();
  Transaction transaction(impl_->database);
  for (const auto& [key, row] : rows) {
    impl_->write_pair(key, row);
    impl_->write_object(row.object_1, row.kind_1, row.diameter_1_nm, row.chiral_angle_1_deg,
                        row.band_gap_1_eV);
    impl_->write_object(row.object_2, row.kind_2, row.diameter_2_nm, row.chiral_angle_2_deg,
                        row.band_gap_2_eV);
    if (row.status != Status::ok) impl_->write_failure(key, row);
  }
  impl_->insert_pair->reset();
  impl_->insert_object->reset();
  impl_->insert_failure->reset();
  transaction.commit();
}

std::vector<Binding> Store::read(const std::vector<std::string>& keys) const {
  Statement select(impl_->database,
                   "SELECT failures.message, " + field_list("pairs.") +
                       " FROM pairs LEFT JOIN failures USING(key) WHERE pairs.key = ?");
  std::vector<Binding> rows;
  for (const std::string& key : keys) {
    select.reset();
    select.bind(0, key);
    if (!select.step()) continue;
    Binding row;
    row.message = select.text(0);
    try {
      int column = 1;
      for (const BindingField& field : binding_fields()) {
        field.set(row, column_value(select, column, field));
        ++column;
      }
      if (!row.diameter_1_nm || !row.diameter_2_nm)
        throw std::invalid_argument("Binding: a pair of tubes without diameters");
    } catch (const std::invalid_argument& error) {
      throw InputError({.what = "the store is damaged: row " + key + ", " + error.what(),
                        .where = impl_->database.file().string(),
                        .excerpt = {},
                        .expected = "an undamaged copy, or a new file name",
                        .nearest = {}});
    }
    rows.push_back(std::move(row));
  }
  return rows;
}

std::vector<StoredRun> Store::runs() const {
  Statement select(impl_->database,
                   "SELECT started, ended, completed, rows_computed, threads, program_version, plan"
                   " FROM runs ORDER BY id");
  std::vector<StoredRun> runs;
  while (select.step())
    runs.push_back({.started = select.text(0),
                    .ended = select.text(1),
                    .finished = select.integer(2) != 0,
                    .rows_computed = select.integer(3),
                    .threads = static_cast<int>(select.integer(4)),
                    .program_version = select.text(5),
                    .plan = select.text(6)});
  return runs;
}

std::int64_t Store::begin_run(const std::string& plan, int threads) {
  Statement insert(impl_->database,
                   "INSERT INTO runs(started, program_version, threads, plan) VALUES(?,?,?,?)");
  insert.bind(0, now_utc()).bind(1, std::string(program_version()));
  insert.bind(2, std::int64_t{threads}).bind(3, plan);
  insert.step();
  return sqlite3_last_insert_rowid(impl_->database.handle());
}

void Store::end_run(std::int64_t run, bool finished, std::int64_t computed) {
  Statement update(impl_->database,
                   "UPDATE runs SET ended = ?, completed = ?, rows_computed = ? WHERE id = ?");
  update.bind(0, now_utc()).bind(1, std::int64_t{finished}).bind(2, computed).bind(3, run);
  update.step();
}

}  // namespace gapwright
