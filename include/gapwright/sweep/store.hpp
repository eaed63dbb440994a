// The SQLite store of a sweep.
#pragma once

#include <gapwright/pair/binding.hpp>
#include <gapwright/sweep/plan.hpp>

#include <cstdint>
#include <filesystem>
#include <memory>
#include <string>
#include <unordered_set>
#include <utility>
#include <vector>

namespace gapwright {

/// Version of the program, "0.1.0".
std::string_view program_version();

/// What a store was made with: all its rows share it.
struct StoreOrigin {
  std::string program_version;
  std::string numerics_version;
  std::string catalog_hash;
  std::string kernel;        ///< variant of the hot kernels
  std::string settings_key;  ///< of the Binder
  Settings settings;         ///< in clear
};

/// One run that wrote into a store.
struct StoredRun {
  std::string started, ended;  ///< UTC; no end: it was killed, or goes on
  bool finished = false;       ///< every row of its plan was there at the end
  std::int64_t rows_computed = 0;
  int threads = 0;
  std::string program_version;
  std::string plan;  ///< its text
};

/// Rows of one or more runs under one set of settings. Written in batches, each batch one
/// transaction with full synchronisation: a kill loses at most the rows in flight. While open to
/// write it belongs to this run alone; at rest it is one file.
class Store {
 public:
  /// Opens or creates. Throws InputError when the file is no store of this program, is damaged, was
  /// made by another schema, numerics version, kernel variant, catalogue or settings (saying
  /// which), is used by another run, or cannot be written.
  static Store open(const std::filesystem::path& file, const Binder& binder);
  /// Opens an existing store to read. Throws InputError as above, but for the settings.
  static Store open_read_only(const std::filesystem::path& file);
  Store(Store&&) noexcept;
  Store& operator=(Store&&) noexcept;
  ~Store();

  const StoreOrigin& origin() const;
  /// Throws InputError saying what differs when rows of this binder would not be rows of this
  /// store.
  void require_same_origin(const Binder& binder) const;

  std::unordered_set<std::string> keys() const;
  /// One transaction. Throws InputError when the disk is full or refuses (nothing of the batch is
  /// then kept), std::invalid_argument for a number that is not finite.
  void write(const std::vector<std::pair<std::string, Binding>>& rows);
  /// Rows by key, in the order of `keys`; missing ones are skipped.
  std::vector<Binding> read(const std::vector<std::string>& keys) const;
  /// All runs, the first one first.
  std::vector<StoredRun> runs() const;

  /// Notes a run; `plan` is its text.
  std::int64_t begin_run(const std::string& plan, int threads);
  void end_run(std::int64_t run, bool finished, std::int64_t computed);

 private:
  struct Impl;
  explicit Store(std::unique_ptr<Impl> impl);
  std::unique_ptr<Impl> impl_;
};

}  // namespace gapwright
