// Inner loops of the cutting-line integrals, one copy per instruction set.
#pragma once

#include <array>
#include <complex>
#include <vector>

namespace gapwright {

/// Nearest-neighbour bonds along one line k = (k_c, z), and the shift by the wave vector Q.
struct LineBonds {
  std::array<double, 3> hopping;              ///< t_j [eV]
  std::array<double, 3> turns;                ///< k_c δ_j,c/2π
  std::array<double, 3> turns_per_z;          ///< δ_j,z/2π [nm]
  std::array<std::complex<double>, 3> shift;  ///< e^{iQ·δ_j} - 1
};

/// Transitions at the nodes of a line: `strength` = weight·W·ΔE and `energy2` = ΔE², so that the
/// line integral is Σ strength/(energy2 + ξ²).
struct LineTransitions {
  std::vector<double> strength;
  std::vector<double> energy2;
};

struct LineKernel {
  /// Fills strength[i], energy2[i] for the nodes z[i] with weights w[i] (T = 0, undoped), phases
  /// to 4e-13.
  void (*transitions_single)(const LineBonds& bonds, const double* z, const double* w, int count,
                             double* strength, double* energy2);
  /// The same with phases to rounding.
  void (*transitions_double)(const LineBonds& bonds, const double* z, const double* w, int count,
                             double* strength, double* energy2);
  /// The same, and what Fermi factors need besides: four arrays of `count`, one after the other,
  /// |F(k)|, |F(k + Q)|, their difference without cancellation, W.
  void (*levels_single)(const LineBonds& bonds, const double* z, const double* w, int count,
                        double* strength, double* energy2, double* levels);
  void (*levels_double)(const LineBonds& bonds, const double* z, const double* w, int count,
                        double* strength, double* energy2, double* levels);
  /// Fermi factors of nodes with bands ±f and ±g, f - g = change, at kT > 0 and mu >= 0 (METHODS
  /// (3.8)): across = ½[h(f) + h(g)], within = [h(f) - h(g)]/(f - g), to 1e-11.
  void (*factors)(const double* f, const double* g, const double* change, int count, double mu,
                  double kT, double* across, double* within);
  /// sum[x] += Σ_i strength[i]/(energy2[i] + xi2[x]), single precision in blocks of 32 nodes.
  void (*accumulate_single)(const double* strength, const double* energy2, int count,
                            const double* xi2, int frequencies, double* sum);
  /// The same in double precision.
  void (*accumulate_double)(const double* strength, const double* energy2, int count,
                            const double* xi2, int frequencies, double* sum);
};

/// Kernels of the selected instruction set.
const LineKernel& line_kernel();

namespace portable {
extern const LineKernel line_kernel;
}
namespace avx2 {
extern const LineKernel line_kernel;
}
namespace avx512 {
extern const LineKernel line_kernel;
}

}  // namespace gapwright
