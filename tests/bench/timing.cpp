#include "timing.hpp"

#include <fmt/format.h>

namespace gapwright::bench {
namespace {

std::string duration(double seconds) {
  if (seconds < 1e-3) return fmt::format("{:.1f} µs", seconds * 1e6);
  if (seconds < 1.0) return fmt::format("{:.2f} ms", seconds * 1e3);
  return fmt::format("{:.2f} s", seconds);
}

}  // namespace

void print_header() {
  fmt::print("{:<42}{:>11}{:>11}{:>10}{:>10}{:>10}  {}\n", "item", "best", "median", "goal",
             "error", "ns/op", "operations");
}

void print_row(const std::string& item, const Timing& time, const std::string& goal, double error,
               double operations, const std::string& what) {
  fmt::print("{:<42}{:>11}{:>11}{:>10}{:>10.1e}", item, duration(time.best_s),
             duration(time.median_s), goal, error);
  if (operations > 0)
    fmt::print("{:>10.3f}  {}\n", time.best_s * 1e9 / operations, what);
  else
    fmt::print("{:>10}  {}\n", "", what);
}

}  // namespace gapwright::bench
