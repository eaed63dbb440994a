// From argc and argv to words: commands, options, help.
#pragma once

#include "words.hpp"

namespace gapwright::cli {

/// What to do: run `words`, or print `text` on standard output and end well.
struct Request {
  Words words;
  std::string text;
};

/// Throws InputError for unknown commands and options, a missing or repeated value.
Request read_command_line(int argc, const char* const* argv);

}  // namespace gapwright::cli
