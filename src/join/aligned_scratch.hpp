// Scratch memory for the kernels.
#pragma once

#include <cstddef>
#include <cstdlib>
#include <memory>
#include <new>

namespace gapwright {

/// So many doubles, 64-byte aligned, not initialised.
class AlignedScratch {
 public:
  explicit AlignedScratch(int doubles)
      : memory_(static_cast<double*>(std::aligned_alloc(64, (std::size_t(doubles) + 7) / 8 * 64))) {
    if (!memory_) throw std::bad_alloc();
  }
  double* data() const { return memory_.get(); }

 private:
  struct Free {
    void operator()(double* p) const { std::free(p); }
  };
  std::unique_ptr<double, Free> memory_;
};

}  // namespace gapwright
