// What `table` was asked for.
#pragma once

#include "words.hpp"

#include <gapwright/table/layout.hpp>
#include <gapwright/table/table.hpp>

#include <filesystem>
#include <optional>
#include <vector>

namespace gapwright::cli {

/// Form of the tables written.
enum class TableForm { csv, json, layout };

struct TableJob {
  TableRequest request;            ///< of one pair; of a series all but the objects
  std::vector<TubeObject> series;  ///< --tubes, by diameter; empty: one pair
  TableForm form = TableForm::csv;
  std::optional<Layout> layout;
  std::string layout_text;                      ///< for the key of a series
  std::string extension;                        ///< of the files of a series, with its point
  std::optional<std::filesystem::path> csv;     ///< beside or instead of standard output
  std::optional<std::filesystem::path> output;  ///< a file; of a series a folder
};

/// The option that sets a member; the word itself when there is none.
std::string option_of(const std::string& member);

/// Throws InputError, naming the option, for everything that is wrong before any energy is known.
TableJob read_table_job(const Words& words);

/// Runs what knows members of a request or of settings, and names their options in its messages.
template <typename Check>
auto at_table_options(Check&& check) {
  try {
    return check();
  } catch (const InputError& error) {
    InputError::Parts parts = error.parts();
    parts.where = option_of(parts.where);
    throw InputError(parts);
  }
}

}  // namespace gapwright::cli
