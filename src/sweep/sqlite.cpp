#include "sqlite.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <stdexcept>
#include <system_error>

namespace gapwright {
namespace {

struct Blame {
  std::string what;
  std::string expected;
};

// What the user can do something about; empty for our own faults.
std::optional<Blame> blame_of(int code, int system_error) {
  switch (code & 0xff) {
    case SQLITE_NOTADB:
      return Blame{"is no store: not an SQLite database", "a file that rank --store wrote"};
    case SQLITE_CORRUPT:
      return Blame{"the store is damaged", "an undamaged copy, or a new file name"};
    case SQLITE_BUSY:
    case SQLITE_LOCKED:
      return Blame{"the store is in use by another run",
                   "one run a store at a time; it is free when that run ends"};
    case SQLITE_FULL:
      return Blame{"no space left on the disk",
                   "free space; rows written before are kept, run again to go on"};
    case SQLITE_READONLY:
    case SQLITE_PERM:
    case SQLITE_AUTH:
      return Blame{"the store cannot be written here", "a file and folder you may write to"};
    case SQLITE_CANTOPEN:
      return Blame{"the store cannot be opened", "a file and folder you may read and write"};
    case SQLITE_IOERR:
      return Blame{
          "the disk refuses to read or write" +
              (system_error != 0 ? std::string(": ") + std::generic_category().message(system_error)
                                 : std::string()),
          "a disk with space and without faults; rows written before are kept"};
    default:
      return std::nullopt;
  }
}

[[noreturn]] void fail(sqlite3* handle, int code, const std::filesystem::path& file) {
  const int system_error = handle ? sqlite3_system_errno(handle) : 0;
  if (const auto blame = blame_of(code, system_error))
    throw InputError({.what = blame->what,
                      .where = file.string(),
                      .excerpt = {},
                      .expected = blame->expected,
                      .nearest = {}});
  throw std::runtime_error(file.string() + ": " +
                           (handle ? sqlite3_errmsg(handle) : sqlite3_errstr(code)));
}

}  // namespace

Database::Database(std::filesystem::path file, Access access) : file_(std::move(file)) {
  sqlite3* handle = nullptr;
  const int flags =
      access == Access::write ? SQLITE_OPEN_READWRITE | SQLITE_OPEN_CREATE : SQLITE_OPEN_READONLY;
  const int code = sqlite3_open_v2(file_.c_str(), &handle, flags, nullptr);
  handle_.reset(handle);
  if (code != SQLITE_OK) fail(handle, code, file_);
}

void Database::check(int code) const {
  if (code != SQLITE_OK && code != SQLITE_ROW && code != SQLITE_DONE)
    fail(handle_.get(), code, file_);
}

void Database::execute(const std::string& sql) const {
  check(sqlite3_exec(handle_.get(), sql.c_str(), nullptr, nullptr, nullptr));
}

std::int64_t Database::integer(const std::string& sql) const {
  Statement statement(*this, sql);
  return statement.step() ? statement.integer(0) : 0;
}

std::string Database::text(const std::string& sql) const {
  Statement statement(*this, sql);
  return statement.step() ? statement.text(0) : std::string();
}

bool Database::writable() const {
  return sqlite3_db_readonly(handle_.get(), "main") == 0;
}

Statement::Statement(const Database& database, const std::string& sql) : database_(&database) {
  sqlite3_stmt* statement = nullptr;
  database.check(sqlite3_prepare_v2(database.handle(), sql.c_str(), static_cast<int>(sql.size()),
                                    &statement, nullptr));
  statement_.reset(statement);
}

Statement& Statement::bind(int parameter, const std::string& value) {
  database_->check(sqlite3_bind_text(statement_.get(), parameter + 1, value.data(),
                                     static_cast<int>(value.size()), SQLITE_TRANSIENT));
  return *this;
}

Statement& Statement::bind(int parameter, double value) {
  database_->check(sqlite3_bind_double(statement_.get(), parameter + 1, value));
  return *this;
}

Statement& Statement::bind(int parameter, std::int64_t value) {
  database_->check(sqlite3_bind_int64(statement_.get(), parameter + 1, value));
  return *this;
}

Statement& Statement::bind_null(int parameter) {
  database_->check(sqlite3_bind_null(statement_.get(), parameter + 1));
  return *this;
}

bool Statement::step() {
  const int code = sqlite3_step(statement_.get());
  database_->check(code);
  return code == SQLITE_ROW;
}

void Statement::reset() {
  sqlite3_reset(statement_.get());
  sqlite3_clear_bindings(statement_.get());
}

bool Statement::is_null(int column) const {
  return sqlite3_column_type(statement_.get(), column) == SQLITE_NULL;
}

double Statement::number(int column) const {
  return sqlite3_column_double(statement_.get(), column);
}

std::int64_t Statement::integer(int column) const {
  return sqlite3_column_int64(statement_.get(), column);
}

std::string Statement::text(int column) const {
  const auto* text = reinterpret_cast<const char*>(sqlite3_column_text(statement_.get(), column));
  if (!text) return {};
  return {text, static_cast<std::size_t>(sqlite3_column_bytes(statement_.get(), column))};
}

Transaction::Transaction(const Database& database) : database_(database) {
  database_.execute("BEGIN IMMEDIATE");
}

Transaction::~Transaction() {
  if (open_) sqlite3_exec(database_.handle(), "ROLLBACK", nullptr, nullptr, nullptr);
}

void Transaction::commit() {
  database_.execute("COMMIT");
  open_ = false;
}

}  // namespace gapwright
