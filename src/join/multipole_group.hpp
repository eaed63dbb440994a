// What the kernels of multipole blocks share: a group of frequencies in one vector. Part of every
// kernel source, in the namespace of its instruction set.
#pragma once

#include "parallel_kernel.hpp"

namespace gapwright::GAPWRIGHT_KERNEL {

void first_trip(const MultipoleBlock& block);

namespace {

#if defined(__AVX512F__)
constexpr int lanes = 8;
#elif defined(__AVX2__)
constexpr int lanes = 4;
#else
constexpr int lanes = 2;
#endif
typedef double Vector __attribute__((vector_size(8 * lanes)));
typedef double Unaligned __attribute__((vector_size(8 * lanes), aligned(8), may_alias));

/// The frequencies of one group of lanes.
struct Group {
  const MultipoleBlock& block;
  int start, used;

  Vector load(const double* values) const {
    if (used == lanes) return *reinterpret_cast<const Unaligned*>(values + start);
    Vector v{};
    for (int l = 0; l < used; ++l) v[l] = values[start + l];
    return v;
  }
  void add(double* sums, Vector v) const {
    for (int l = 0; l < used; ++l) sums[start + l] += block.weight * v[l];
  }
  void store(double* values, Vector v) const {
    for (int l = 0; l < used; ++l) values[start + l] = v[l];
  }
};

template <typename Work>
bool each_group(const MultipoleBlock& block, Work work) {
  bool good = true;
  for (int done = 0; done < block.frequencies; done += lanes) {
    const int left = block.frequencies - done;
    good = work(Group{block, block.start + done, left < lanes ? left : lanes}) && good;
  }
  return good;
}

}  // namespace
}  // namespace gapwright::GAPWRIGHT_KERNEL
