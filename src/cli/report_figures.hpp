// The figures of a report as files, drawn by Vega in Node.js.
#pragma once

#include <filesystem>
#include <string>
#include <utility>
#include <vector>

namespace gapwright::cli {

/// Throws InputError when Node.js is not there.
void require_node();

/// Name and content of every file: an SVG and a CSV a figure. Throws InputError when Node.js or the
/// script fails.
std::vector<std::pair<std::string, std::string>> draw_figures(const std::filesystem::path& folder,
                                                              const std::string& json);

}  // namespace gapwright::cli
