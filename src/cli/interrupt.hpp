// Ctrl-C and its like.
#pragma once

#include <atomic>

namespace gapwright::cli {

/// Writing to a closed pipe or beyond a size limit becomes an error instead of a silent end.
void ignore_output_signals();

/// While it lives, the first SIGINT, SIGTERM or SIGHUP sets a flag and the second ends the program
/// at once.
class InterruptGuard {
 public:
  InterruptGuard();
  ~InterruptGuard();
  InterruptGuard(const InterruptGuard&) = delete;
  InterruptGuard& operator=(const InterruptGuard&) = delete;

  const std::atomic<bool>& flag() const;
};

}  // namespace gapwright::cli
