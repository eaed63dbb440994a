// SQLite handles with lifetimes, and its result codes as errors of ours.
#pragma once

#include <cstdint>
#include <filesystem>
#include <memory>
#include <optional>
#include <string>

#include <sqlite3.h>

namespace gapwright {

/// A connection. Every failing call throws: InputError for what the user's file or disk is to blame
/// for, std::runtime_error for anything else.
class Database {
 public:
  enum class Access { read, write };
  Database(std::filesystem::path file, Access access);

  void execute(const std::string& sql) const;
  std::int64_t integer(const std::string& sql) const;
  std::string text(const std::string& sql) const;
  bool writable() const;

  sqlite3* handle() const { return handle_.get(); }
  const std::filesystem::path& file() const { return file_; }
  /// Throws unless `code` is a success.
  void check(int code) const;

 private:
  struct Closer {
    void operator()(sqlite3* handle) const { sqlite3_close_v2(handle); }
  };
  std::filesystem::path file_;
  std::unique_ptr<sqlite3, Closer> handle_;
};

/// A prepared statement; parameters and columns count from 0.
class Statement {
 public:
  Statement(const Database& database, const std::string& sql);

  Statement& bind(int parameter, const std::string& value);
  Statement& bind(int parameter, double value);
  Statement& bind(int parameter, std::int64_t value);
  Statement& bind_null(int parameter);
  /// True while there is a row.
  bool step();
  /// Ready for the next execution, with no parameter bound.
  void reset();

  bool is_null(int column) const;
  double number(int column) const;
  std::int64_t integer(int column) const;
  std::string text(int column) const;

 private:
  struct Finalizer {
    void operator()(sqlite3_stmt* statement) const { sqlite3_finalize(statement); }
  };
  const Database* database_;
  std::unique_ptr<sqlite3_stmt, Finalizer> statement_;
};

/// Rolls back unless committed.
class Transaction {
 public:
  explicit Transaction(const Database& database);
  ~Transaction();
  Transaction(const Transaction&) = delete;
  Transaction& operator=(const Transaction&) = delete;
  void commit();

 private:
  const Database& database_;
  bool open_ = true;
};

}  // namespace gapwright
