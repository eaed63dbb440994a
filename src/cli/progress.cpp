#include "progress.hpp"

#include "output.hpp"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>
#include <unistd.h>

namespace gapwright::cli {
namespace {

constexpr int bar_width = 30;
constexpr double seconds_between_bars = 0.1;
constexpr double seconds_between_lines = 10;
constexpr const char* start_of_cleared_line = "\r\x1b[K";

void write_error(const std::string& text) {
  [[maybe_unused]] const ssize_t ignored = ::write(STDERR_FILENO, text.data(), text.size());
}

}  // namespace

std::string duration_text(double seconds) {
  if (seconds < 0.95) return "under 1 s";
  if (seconds < 99.5) return fmt::format("{:.0f} s", seconds);
  const double minutes = std::round(seconds / 60);
  if (minutes < 100) return fmt::format("{:.0f} min", minutes);
  const double hours = std::floor(minutes / 60);
  if (hours < 100) return fmt::format("{:.0f} h {:.0f} min", hours, minutes - 60 * hours);
  return fmt::format("{:.0f} days", hours / 24);
}

std::string progress_line(std::size_t done, std::size_t rows, std::size_t failed,
                          double rows_per_second, int width) {
  std::string text;
  if (width > 0) {
    const auto filled = static_cast<std::size_t>(width) * done / std::max<std::size_t>(rows, 1);
    text += "[" + std::string(filled, '=') +
            std::string(static_cast<std::size_t>(width) - filled, ' ') + "] ";
  }
  text += fmt::format("{} of {} rows, {} failed", done, rows, failed);
  if (rows_per_second > 0) {
    const double left = static_cast<double>(rows - done) / rows_per_second;
    text += fmt::format(", {:.{}f}/s", rows_per_second, rows_per_second < 10 ? 1 : 0);
    if (done < rows) text += ", " + duration_text(left) + " left";
  }
  return text;
}

Progress::Progress() : terminal_(error_is_terminal()) {}

Progress::~Progress() {
  if (drawn_) write_error("\n");
}

void Progress::started(std::size_t rows, std::size_t already_stored) {
  rows_ = rows;
  shown_ = Clock::now();
  if (already_stored > 0)
    note(fmt::format("{} of {} rows are in the store already", already_stored, rows));
}

void Progress::progressed(std::size_t done, std::size_t failed) {
  if (first_done_ == 0) {  // what comes before the first row says nothing about the rest
    first_done_ = done;
    first_time_ = Clock::now();
  }
  const double since = std::chrono::duration<double>(Clock::now() - shown_).count();
  const double between = terminal_ ? seconds_between_bars : seconds_between_lines;
  if (since >= between || (terminal_ && done == rows_)) show(done, failed);
}

void Progress::show(std::size_t done, std::size_t failed) {
  shown_ = Clock::now();
  const double elapsed = std::chrono::duration<double>(shown_ - first_time_).count();
  const double rate = elapsed > 0 ? static_cast<double>(done - first_done_) / elapsed : 0.0;
  const std::string line = progress_line(done, rows_, failed, rate, terminal_ ? bar_width : 0);
  if (terminal_)
    write_error(start_of_cleared_line + line);
  else
    note(line);
  drawn_ = terminal_;
}

}  // namespace gapwright::cli
