// The index of a folder of tables.
#pragma once

#include <gapwright/table/table.hpp>

#include <filesystem>
#include <map>
#include <string>

namespace gapwright::cli {

/// index.csv: which file holds which pair, and what it was made from.
class TableIndex {
 public:
  /// Reads the folder's index if there is one. Throws InputError when its index.csv is none of
  /// ours.
  explicit TableIndex(std::filesystem::path folder);

  /// True when the folder holds this file with the key and as it was written.
  bool holds(const std::string& file, const std::string& key) const;
  /// Writes the table's file, then the index that names it; each whole or not at all.
  void add(const std::string& file, const std::string& key, const Table& table,
           const std::string& text);
  std::filesystem::path path(const std::string& file) const { return folder_ / file; }

 private:
  void read();
  void write() const;

  std::filesystem::path folder_;
  std::map<std::string, std::string> lines_;  // by file
};

}  // namespace gapwright::cli
