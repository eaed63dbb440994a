#include "line_integral.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/kernel.hpp>

#include <cmath>

namespace gapwright {

const LineKernel& line_kernel() {
#if defined(__x86_64__)
  if (kernel_variant() == KernelVariant::avx512) return avx512::line_kernel;
  if (kernel_variant() == KernelVariant::avx2) return avx2::line_kernel;
#endif
  return portable::line_kernel;
}

LinePrecision line_precision(double tolerance, bool nearest_neighbour_only) {
  LinePrecision precision;
  precision.single = tolerance >= 1e-5;
  if (!precision.single) precision.panels.nodes = tolerance < 1e-7 ? 16 : 12;
  // Longer-range hoppings move the branch points, which are those of the nearest neighbours.
  if (!nearest_neighbour_only) precision.panels.nodes += precision.single ? 4 : 8;
  return precision;
}

LineIntegrator::LineIntegrator(const SheetHamiltonian& hamiltonian, const LinePrecision& precision,
                               std::span<const double> xi_eV)
    : hamiltonian_(hamiltonian), single_(precision.single) {
  for (const double xi : xi_eV) xi2_.push_back(xi * xi);
  scratch_.resize(xi2_.size());
}

void LineIntegrator::add(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes,
                         double factor, std::span<double> sums) {
  if (hamiltonian_.nearest_neighbour_only())
    simple_transitions(origin, wave_vector, nodes);
  else
    general_transitions(origin, wave_vector, nodes);
  std::fill(scratch_.begin(), scratch_.end(), 0.0);
  const LineKernel& kernel = line_kernel();
  (single_ ? kernel.accumulate_single : kernel.accumulate_double)(
      transitions_.strength.data(), transitions_.energy2.data(), int(transitions_.strength.size()),
      xi2_.data(), int(xi2_.size()), scratch_.data());
  for (std::size_t x = 0; x < sums.size(); ++x) sums[x] += factor * scratch_[x];
}

void LineIntegrator::simple_transitions(PlaneVector origin, PlaneVector wave_vector,
                                        const LineNodes& nodes) {
  LineBonds bonds;
  for (int j = 0; j < 3; ++j) {
    const Bond& bond = hamiltonian_.nearest()[j];
    bonds.hopping[j] = bond.hopping_eV;
    bonds.turns[j] = (origin.c * bond.delta.c + origin.z * bond.delta.z) / (2 * constants::pi);
    bonds.turns_per_z[j] = bond.delta.z / (2 * constants::pi);
    const double phase = wave_vector.c * bond.delta.c + wave_vector.z * bond.delta.z;
    const double half = std::sin(0.5 * phase);
    bonds.shift[j] = {-2 * half * half, std::sin(phase)};  // e^{iφ} - 1 without cancellation
  }
  transitions_.strength.resize(nodes.z.size());
  transitions_.energy2.resize(nodes.z.size());
  (single_ ? line_kernel().transitions_single : line_kernel().transitions_double)(
      bonds, nodes.z.data(), nodes.weight.data(), int(nodes.z.size()), transitions_.strength.data(),
      transitions_.energy2.data());
}

void LineIntegrator::general_transitions(PlaneVector origin, PlaneVector wave_vector,
                                         const LineNodes& nodes) {
  transitions_.strength.clear();
  transitions_.energy2.clear();
  for (std::size_t i = 0; i < nodes.z.size(); ++i) {
    const PlaneVector k = origin + PlaneVector{0.0, nodes.z[i]};
    const BandState a = hamiltonian_.at(k);
    const BandState b = hamiltonian_.at(k + wave_vector);
    const double product = std::abs(a.coupling_eV) * std::abs(b.coupling_eV);
    const double scalar = (std::conj(a.coupling_eV) * b.coupling_eV).real();
    const double vector = (std::conj(a.coupling_eV) * (b.coupling_eV - a.coupling_eV)).imag();
    const double overlap =
        (scalar > 0 ? vector * vector / (product + scalar) : product - scalar) / (2 * product);
    const double sum = std::abs(a.coupling_eV) + std::abs(b.coupling_eV);
    const double tilt = b.midpoint_eV - a.midpoint_eV;
    // Up from k and up from k + Q differ when the bands are not symmetric about the midpoint.
    for (const double energy : {sum + tilt, sum - tilt}) {
      transitions_.strength.push_back(0.5 * nodes.weight[i] * overlap * energy);
      transitions_.energy2.push_back(energy * energy);
    }
  }
}

}  // namespace gapwright
