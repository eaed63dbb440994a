#include "table_index.hpp"

#include "output.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/input_error.hpp>

#include <fstream>
#include <iterator>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

namespace fs = std::filesystem;

constexpr const char* first_line = "# gapwright index of tables";
constexpr const char* header =
    "file,object_1,object_2,diameter_1_nm,diameter_2_nm,table,rows,spacing_nm,well_distance_nm,"
    "well_energy_eV_per_nm,status,key,content";

std::optional<std::string> content_of(const fs::path& file) {
  std::ifstream stream(file, std::ios::binary);
  if (!stream) return std::nullopt;
  return std::string(std::istreambuf_iterator<char>(stream), {});
}

std::string number(const std::optional<double>& value) {
  return value ? fmt::format("{}", *value) : std::string();
}

std::string ending(const std::string& key, const std::string& text) {
  return "," + key + "," + ContentHash().add(text).hex();
}

}  // namespace

TableIndex::TableIndex(fs::path folder) : folder_(std::move(folder)) {
  std::error_code problem;
  if (!fs::exists(folder_, problem)) fs::create_directory(folder_, problem);
  if (problem || !fs::is_directory(folder_, problem))
    throw InputError({"is no folder and cannot be made one",
                      folder_.string(),
                      {},
                      "a folder, or a name in an existing one",
                      {}});
  require_file_place(path("index.csv"));
  read();
}

void TableIndex::read() {
  const auto text = content_of(path("index.csv"));
  if (!text) return;
  std::size_t begin = 0;
  for (int number = 1; begin < text->size(); ++number) {
    const std::size_t end = std::min(text->find('\n', begin), text->size());
    const std::string line = text->substr(begin, end - begin);
    begin = end + 1;
    if ((number == 1 && line != first_line) || (number == 2 && line != header))
      throw InputError({"is no index of tables of this version",
                        path("index.csv").string(),
                        {},
                        "a folder of its own for each series",
                        {}});
    if (number > 2) lines_[line.substr(0, line.find(','))] = line;
  }
}

bool TableIndex::holds(const std::string& file, const std::string& key) const {
  const auto line = lines_.find(file);
  if (line == lines_.end()) return false;
  const auto text = content_of(path(file));
  return text && line->second.ends_with(ending(key, *text));
}

void TableIndex::add(const std::string& file, const std::string& key, const Table& table,
                     const std::string& text) {
  write_file(path(file), text);
  lines_[file] =
      fmt::format("{},\"{}\",\"{}\",{},{},{},{},{},{},{},{}", file, table.object_1, table.object_2,
                  table.diameter_1_nm, table.diameter_2_nm, table_kind_word(table.kind),
                  table.rows.size(), number(table.spacing_nm), number(table.well_distance_nm),
                  number(table.well_energy), status_word(table.status)) +
      ending(key, text);
  write();
}

void TableIndex::write() const {
  std::string text = std::string(first_line) + "\n" + header + "\n";
  for (const auto& [file, line] : lines_) text += line + "\n";
  write_file(path("index.csv"), text);
}

}  // namespace gapwright::cli
