#include <gapwright/math/kernel.hpp>

#include <atomic>
#include <stdexcept>
#include <string>

namespace gapwright {
namespace {

KernelVariant best_available() {
  if (kernel_available(KernelVariant::avx512)) return KernelVariant::avx512;
  if (kernel_available(KernelVariant::avx2)) return KernelVariant::avx2;
  return KernelVariant::portable;
}

std::atomic<KernelVariant>& selected() {
  static std::atomic<KernelVariant> variant{best_available()};
  return variant;
}

}  // namespace

bool kernel_available(KernelVariant variant) {
#if defined(__x86_64__)
  switch (variant) {
    case KernelVariant::portable:
      return true;
    case KernelVariant::avx2:
      return __builtin_cpu_supports("avx2") && __builtin_cpu_supports("fma");
    case KernelVariant::avx512:
      return __builtin_cpu_supports("avx512f") && __builtin_cpu_supports("avx512dq") &&
             __builtin_cpu_supports("avx512vl") && __builtin_cpu_supports("avx512bw");
  }
  return false;
#else
  return variant == KernelVariant::portable;
#endif
}

KernelVariant kernel_variant() {
  return selected().load(std::memory_order_relaxed);
}

void select_kernel(KernelVariant variant) {
  if (!kernel_available(variant))
    throw std::invalid_argument("select_kernel: this machine has no " +
                                std::string(kernel_word(variant)) + " instructions");
  selected().store(variant, std::memory_order_relaxed);
}

std::string_view kernel_word(KernelVariant variant) {
  switch (variant) {
    case KernelVariant::portable:
      return "portable";
    case KernelVariant::avx2:
      return "avx2";
    case KernelVariant::avx512:
      return "avx512";
  }
  return "portable";
}

}  // namespace gapwright
