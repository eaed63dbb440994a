#include "report_parts.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <algorithm>
#include <array>
#include <fstream>
#include <sstream>
#include <vector>

namespace gapwright::cli {
namespace {

namespace fs = std::filesystem;

constexpr const char* packed_style = "node_modules/tabulator-tables/dist/css/tabulator.min.css";
constexpr std::array package_scripts = {"node_modules/vega/build/vega.min.js",
                                        "node_modules/vega-lite/build/vega-lite.min.js",
                                        "node_modules/tabulator-tables/dist/js/tabulator.min.js"};
constexpr std::array<std::array<const char*, 2>, 2> licences = {
    {{"Vega and Vega-Lite", "node_modules/vega-lite/LICENSE"},
     {"Tabulator", "node_modules/tabulator-tables/LICENSE"}}};
constexpr std::array own_scripts = {"fields.js", "data.js", "figures.js", "table.js", "page.js"};

// Installed in PREFIX/bin, the program finds PREFIX/share.
std::vector<fs::path> candidates() {
  std::vector<fs::path> folders;
  std::error_code error;
  const fs::path program = fs::read_symlink("/proc/self/exe", error);
  if (!error) folders.push_back(program.parent_path() / GAPWRIGHT_REPORT_FROM_PROGRAM);
  folders.emplace_back(GAPWRIGHT_REPORT_FOLDER);
  return folders;
}

bool is_file(const fs::path& file) {
  std::error_code error;
  return fs::is_regular_file(file, error);
}

bool is_complete(const fs::path& folder) {
  return is_file(folder / "page.html") && is_file(folder / packed_style) &&
         std::all_of(package_scripts.begin(), package_scripts.end(),
                     [&](const char* name) { return is_file(folder / name); });
}

std::string content(const fs::path& file) {
  std::ifstream stream(file, std::ios::binary);
  std::ostringstream text;
  text << stream.rdbuf();
  if (!stream || text.str().empty())
    throw InputError({"a part of the report cannot be read",
                      file.string(),
                      {},
                      "the parts as they were installed",
                      {}});
  return text.str();
}

}  // namespace

fs::path report_folder() {
  const std::vector<fs::path> folders = candidates();
  for (const fs::path& folder : folders)
    if (is_complete(folder)) return folder.lexically_normal();
  fs::path best = folders.back();
  for (const fs::path& folder : folders)
    if (is_file(folder / "page.html")) {
      best = folder;
      break;
    }
  throw InputError({"the packages a report is drawn with are not installed",
                    best.lexically_normal().string(),
                    {},
                    "them: run 'npm ci' in that folder (Node.js and its registry are needed once); "
                    "everything but report works without",
                    {}});
}

PageParts read_page_parts(const fs::path& folder) {
  PageParts parts;
  parts.page = content(folder / "page.html");
  parts.styles = {content(folder / packed_style), content(folder / "page.css")};
  for (const char* name : package_scripts) parts.scripts.push_back(content(folder / name));
  for (const char* name : own_scripts) parts.scripts.push_back(content(folder / name));
  for (const auto& [package, file] : licences)
    parts.licences += std::string(package) + "\n\n" + content(folder / file) + "\n\n";
  return parts;
}

}  // namespace gapwright::cli
