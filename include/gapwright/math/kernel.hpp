// Which instruction set the hot kernels use.
#pragma once

#include <string_view>

namespace gapwright {

/// The hot kernels exist once for each variant; results are the same bits for any number of
/// threads within one variant.
enum class KernelVariant { portable, avx2, avx512 };

/// The variant in use: the best this machine has, unless one was selected.
KernelVariant kernel_variant();
/// Selects a variant for the whole program, before any computation. Throws std::invalid_argument
/// when this machine or build lacks it.
void select_kernel(KernelVariant variant);
bool kernel_available(KernelVariant variant);
std::string_view kernel_word(KernelVariant variant);

}  // namespace gapwright
