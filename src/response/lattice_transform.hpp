// From k to positions along a ribbon and on to wave numbers.
#pragma once

#include <complex>
#include <vector>

#include <Eigen/Dense>

namespace gapwright {

/// Series over k_i = 2πi/(n·T), i = 0 … n/2, of functions f(-k) = f*(k) that are periodic in k but
/// for the phase of an offset between atoms: f(k)·e^{ik·offset·T} is periodic.
class LatticeTransform {
 public:
  using Complex = std::complex<double>;

  /// n a power of two >= 8; q [nm^-1], period T [nm].
  LatticeTransform(int waves, double period_nm, const std::vector<double>& waves_per_nm);

  int waves() const { return waves_; }
  /// e^{ik_i·offset·T} for i = 0 … n/2.
  std::vector<Complex> phases(double offset) const;
  /// values[r] = (1/n)Σ_k series(k) e^{ikrT} for r = 0 … n-1, from a series that holds its phase.
  void to_positions(const Complex* series, double* values) const;
  /// Column 0: 1; column 1 + j: cos(q_j X_r) - 1, X_r = (r + offset)T with r wrapped about 0; n ×
  /// (q
  /// + 1). Apart from the 1 they lose nothing to rounding at small q.
  Eigen::MatrixXd cosines(double offset) const;

 private:
  int waves_;
  double period_nm_;
  std::vector<double> q_;
};

}  // namespace gapwright
