#include "describe_text.hpp"

#include "row_text.hpp"
#include "text_table.hpp"

#include <cmath>
#include <sstream>

#include <fmt/format.h>

namespace gapwright::cli {

Json energy_or_null(double energy_eV) {
  return std::isfinite(energy_eV) ? Json(energy_eV + 0.0) : Json(nullptr);
}

std::string energy_text(double energy_eV, int decimals) {
  return std::isfinite(energy_eV) ? fixed(energy_eV, decimals) + " eV" : "none";
}

std::string wrapped(const std::string& sentence) {
  std::string text, line;
  std::istringstream words(sentence);
  for (std::string word; words >> word;) {
    if (!line.empty() && shown_width(line) + 1 + shown_width(word) > 76) {
      text += line + "\n" + std::string(16, ' ');
      line.clear();
    }
    line += (line.empty() ? "" : " ") + word;
  }
  return text + line;
}

std::string block_line(const char* name, const std::string& value, const char* remark) {
  return fmt::format("  {:<14}{}{}{}\n", name, value, *remark == '\0' ? "" : "   ", remark);
}

}  // namespace gapwright::cli
