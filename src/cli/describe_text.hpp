// Pieces of the blocks that describe prints.
#pragma once

#include "row_text.hpp"

#include <string>

namespace gapwright::cli {

Json energy_or_null(double energy_eV);
/// "0.12345 eV", or "none" where there is no such energy.
std::string energy_text(double energy_eV, int decimals);
/// Lines of some 76 characters under the values of a block.
std::string wrapped(const std::string& sentence);
/// "  name          value   remark"
std::string block_line(const char* name, const std::string& value, const char* remark = "");

}  // namespace gapwright::cli
