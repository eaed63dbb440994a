// How far a sweep is, on standard error.
#pragma once

#include <gapwright/sweep/runner.hpp>

#include <chrono>
#include <string>

namespace gapwright::cli {

/// A bar that is redrawn on a terminal, else a line every ten seconds.
class Progress : public SweepObserver {
 public:
  Progress();
  ~Progress() override;
  void started(std::size_t rows, std::size_t already_stored) override;
  void progressed(std::size_t done, std::size_t failed) override;

 private:
  using Clock = std::chrono::steady_clock;
  void show(std::size_t done, std::size_t failed);

  bool terminal_;
  bool drawn_ = false;
  std::size_t rows_ = 0;
  std::size_t first_done_ = 0;
  Clock::time_point first_time_;
  Clock::time_point shown_;
};

/// "[=====     ] 1234 of 3000 rows, 0 failed, 410/s, 4 s left" without the bar when width is 0.
std::string progress_line(std::size_t done, std::size_t rows, std::size_t failed,
                          double rows_per_second, int width);
/// "4 s", "12 min", "3 h 20 min".
std::string duration_text(double seconds);

}  // namespace gapwright::cli
