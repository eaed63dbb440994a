// Where the web parts of a report are, and what is in them.
#pragma once

#include <gapwright/report/report.hpp>

#include <filesystem>

namespace gapwright::cli {

/// The folder of the parts: beside the installed program, else that of the build. Throws InputError
/// saying how to get them when the packages a page needs are in neither.
std::filesystem::path report_folder();

/// Reads the parts of a page. Throws InputError when one cannot be read.
PageParts read_page_parts(const std::filesystem::path& folder);

}  // namespace gapwright::cli
