// Repeated timing and the lines of a benchmark's table.
#pragma once

#include <algorithm>
#include <chrono>
#include <string>
#include <vector>

namespace gapwright::bench {

struct Timing {
  double best_s, median_s;
};

/// Repeats a piece of work for about half a second, at least five times.
template <typename Work>
Timing timed(Work work) {
  using Clock = std::chrono::steady_clock;
  std::vector<double> times;
  double total = 0.0;
  while (times.size() < 5 || (total < 0.5 && times.size() < 20000)) {
    const auto start = Clock::now();
    work();
    times.push_back(std::chrono::duration<double>(Clock::now() - start).count());
    total += times.back();
  }
  std::sort(times.begin(), times.end());
  return {times.front(), times[times.size() / 2]};
}

void print_header();
/// `error` relative; `operations` of the kind `what` says, 0 where they are not counted.
void print_row(const std::string& item, const Timing& time, const std::string& goal, double error,
               double operations, const std::string& what);

}  // namespace gapwright::bench
