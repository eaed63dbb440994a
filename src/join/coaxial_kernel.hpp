// Inner loop of the log-determinant over frequencies, one copy per instruction set.
#pragma once

namespace gapwright {

/// energy[x] += weight·ln(1 - p) and slope[x] += weight·d ln(1 - p)/dg, p = factor·inside·around
/// < 1: the inner radius falls and the outer one rises by half of the gap's change.
struct InterfaceKernel {
  void (*energy)(const double* inside, const double* around, double factor, double weight,
                 int count, double* energy);
  void (*energy_and_slope)(const double* inside, const double* inside_slope, const double* around,
                           const double* around_slope, double factor, double weight, int count,
                           double* energy, double* slope);
};

const InterfaceKernel& interface_kernel();

namespace portable {
extern const InterfaceKernel interface_kernel;
}
namespace avx2 {
extern const InterfaceKernel interface_kernel;
}
namespace avx512 {
extern const InterfaceKernel interface_kernel;
}

}  // namespace gapwright
