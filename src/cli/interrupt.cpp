#include "interrupt.hpp"

#include <array>
#include <csignal>

#include <signal.h>

namespace gapwright::cli {
namespace {

constexpr std::array signals = {SIGINT, SIGTERM, SIGHUP};
std::atomic<bool> interrupted{false};
static_assert(std::atomic<bool>::is_always_lock_free, "set in a signal handler");

extern "C" void on_signal(int number) {
  if (!interrupted.exchange(true)) return;
  ::signal(number, SIG_DFL);
  ::raise(number);
}

void handle(int number, void (*handler)(int)) {
  struct sigaction action = {};
  action.sa_handler = handler;
  action.sa_flags = SA_RESTART;
  ::sigemptyset(&action.sa_mask);
  ::sigaction(number, &action, nullptr);
}

// A signal that was ignored at the start (nohup) stays so.
bool was_ignored(int number) {
  struct sigaction action = {};
  ::sigaction(number, nullptr, &action);
  return action.sa_handler == SIG_IGN;
}

}  // namespace

void ignore_output_signals() {
  handle(SIGPIPE, SIG_IGN);
  handle(SIGXFSZ, SIG_IGN);
}

InterruptGuard::InterruptGuard() {
  interrupted.store(false);
  for (const int number : signals)
    if (!was_ignored(number)) handle(number, on_signal);
}

InterruptGuard::~InterruptGuard() {
  for (const int number : signals)
    if (!was_ignored(number)) handle(number, SIG_DFL);
}

const std::atomic<bool>& InterruptGuard::flag() const {
  return interrupted;
}

}  // namespace gapwright::cli
