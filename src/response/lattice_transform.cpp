#include "lattice_transform.hpp"

#include <gapwright/catalog/constants.hpp>

#include <cmath>

#include <unsupported/Eigen/FFT>

namespace gapwright {

using constants::pi;

LatticeTransform::LatticeTransform(int waves, double period_nm,
                                   const std::vector<double>& waves_per_nm)
    : waves_(waves), period_nm_(period_nm), q_(waves_per_nm) {}

std::vector<std::complex<double>> LatticeTransform::phases(double offset) const {
  std::vector<Complex> factors;
  for (int i = 0; i <= waves_ / 2; ++i)
    factors.push_back(std::polar(1.0, 2 * pi * i * offset / waves_));
  return factors;
}

void LatticeTransform::to_positions(const Complex* series, double* values) const {
  // The plan inside is kept by thread: it is built once for each length.
  thread_local Eigen::FFT<double> transform(Eigen::FFT<double>::impl_type(),
                                            Eigen::FFT<double>::HalfSpectrum);
  transform.inv(values, series, waves_);
}

Eigen::MatrixXd LatticeTransform::cosines(double offset) const {
  Eigen::MatrixXd table(waves_, static_cast<Eigen::Index>(q_.size()) + 1);
  table.col(0).setOnes();
  for (Eigen::Index c = 1; c < table.cols(); ++c)
    for (int r = 0; r < waves_; ++r) {
      double x = r + offset;
      x -= waves_ * std::round(x / waves_);
      const double half = std::sin(0.5 * q_[c - 1] * x * period_nm_);
      table(r, c) = -2 * half * half;
    }
  return table;
}

}  // namespace gapwright
