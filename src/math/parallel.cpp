#include <gapwright/math/parallel.hpp>

#include <atomic>

#include <omp.h>

namespace gapwright {
namespace {
std::atomic<int> chosen{0};
thread_local bool serial = false;
}  // namespace

int inner_threads() {
  if (serial) return 1;
  const int count = chosen.load(std::memory_order_relaxed);
  return count > 0 ? count : omp_get_max_threads();
}

void set_inner_threads(int count) {
  chosen.store(count, std::memory_order_relaxed);
}

SerialRegion::SerialRegion() : before_(serial) {
  serial = true;
}
SerialRegion::~SerialRegion() {
  serial = before_;
}

}  // namespace gapwright
