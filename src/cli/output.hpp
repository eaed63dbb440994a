// Standard output and files, with every error noticed.
#pragma once

#include <filesystem>
#include <string>
#include <string_view>

namespace gapwright::cli {

/// Thrown when whoever read standard output has gone: nothing is left to do, and nothing is wrong.
struct ReaderGone {};

/// Writes all of it to standard output. Throws InputError when it cannot be written (a full disk),
/// ReaderGone when the reader closed it.
void print(std::string_view text);
/// Closes standard output: some errors show only then. Throws as print() does.
void close_output();
/// A line on standard error; its errors have nowhere to go.
void note(std::string_view line);
bool error_is_terminal();

/// Throws InputError unless a file of this name can be made later: before long work.
void require_file_place(const std::filesystem::path& file);
/// Writes the file whole or not at all: a temporary file beside it, synchronised, then renamed.
/// Devices and pipes are written to directly. Throws InputError naming the file.
void write_file(const std::filesystem::path& file, std::string_view text);

}  // namespace gapwright::cli
