#include "band_zeros.hpp"

#include <cmath>

namespace gapwright {
namespace {

using Complex = std::complex<double>;

/// One zero of Σ t_j e^{i(k_c δ_c + z δ_z)} by Newton's method from a guess.
Complex refined(const SheetHamiltonian& hamiltonian, double k_c, Complex z) {
  for (int iteration = 0; iteration < 20; ++iteration) {
    Complex f = 0, slope = 0;
    for (const Bond& bond : hamiltonian.nearest()) {
      const Complex phase = std::exp(Complex(0, 1) * (k_c * bond.delta.c + z * bond.delta.z));
      f += bond.hopping_eV * phase;
      slope += Complex(0, bond.delta.z) * bond.hopping_eV * phase;
    }
    const Complex change = f / slope;
    z -= change;
    if (std::abs(change) < 1e-12) break;
  }
  return z;
}

}  // namespace

BandZeros::BandZeros(const SheetHamiltonian& hamiltonian, double reach)
    : dirac_(hamiltonian.dirac_point()), reach_(reach) {
  const Complex far(0, 1e3 * reach);
  curve_.assign(std::size_t(2 * half_count_ + 1), far);
  curve_[std::size_t(half_count_)] = 0.0;
  for (const int side : {-1, 1}) {
    Complex z = dirac_.z, before = z;
    for (int i = 1; i <= half_count_; ++i) {
      const double offset = side * i * step_;
      const Complex guess = i == 1 ? z + Complex(0, offset) : 2.0 * z - before;
      const Complex next = refined(hamiltonian, dirac_.c + offset, guess);
      if (!(std::abs(next - guess) < 0.5) || std::fabs(next.imag()) > 1.5 * reach) break;
      before = z;
      z = next;
      curve_[std::size_t(half_count_ + side * i)] = z - dirac_.z;
    }
  }
}

std::optional<BranchPoint> BandZeros::on_line(double valley, double z_dirac, double offset) const {
  // F(-k) is the conjugate of F(k): the other valley's zeros are the mirror image.
  const double position = valley * offset / step_ + half_count_;
  if (!(position >= 0 && position <= 2 * half_count_)) return std::nullopt;
  const int cell = std::min(int(position), 2 * half_count_ - 1);
  const double part = position - cell;
  const Complex z = (1 - part) * curve_[std::size_t(cell)] + part * curve_[std::size_t(cell + 1)];
  if (std::fabs(z.imag()) > reach_) return std::nullopt;
  return BranchPoint{z_dirac + valley * z.real(), std::fabs(z.imag())};
}

}  // namespace gapwright
