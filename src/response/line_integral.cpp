#include "line_integral.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/kernel.hpp>

#include <algorithm>
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

namespace {

/// Fermi factors are 0 or 1 to the precision beyond the first, transitions within a band negligible
/// beyond the second [kT].
struct Reach {
  double frozen, active;
};
Reach reach(bool single) {
  return single ? Reach{20.0, 14.0} : Reach{38.0, 22.0};
}

/// Transitions within a band: largest (ΔE)² of a line below which sums run in double precision.
constexpr double least_single_eV2 = 1e-7;
constexpr double least_energy2 = 1e-18;

/// Factors of T = 0.
void step_factors(const double* f, const double* g, const double* change, std::size_t count,
                  double mu, double* across, double* within) {
  for (std::size_t i = 0; i < count; ++i) {
    across[i] = 0.5 * ((f[i] > mu) + (g[i] > mu));
    within[i] = (f[i] > mu) != (g[i] > mu) ? 1 / std::fabs(change[i]) : 0.0;
  }
}

}  // namespace

LineIntegrator::LineIntegrator(const SheetHamiltonian& hamiltonian, const LinePrecision& precision,
                               const Filling& filling, std::span<const double> xi_eV)
    : hamiltonian_(hamiltonian),
      single_(precision.single),
      filling_(filling),
      active_(filling.nearest + reach(single_).active * filling.occupation.kT()),
      frozen_(std::max(active_, reach(single_).frozen * filling.occupation.kT())) {
  for (const double xi : xi_eV) xi2_.push_back(xi * xi);
  scratch_.resize(xi2_.size());
}

void LineIntegrator::add(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes,
                         double factor, std::span<double> sums) {
  within_.strength.clear();
  within_.energy2.clear();
  if (hamiltonian_.nearest_neighbour_only())
    simple_transitions(origin, wave_vector, nodes);
  else
    general_transitions(origin, wave_vector, nodes);
  std::fill(scratch_.begin(), scratch_.end(), 0.0);
  accumulate(transitions_, single_);
  if (!within_.strength.empty()) {
    // Long waves move energies within a band too little for single precision.
    const double largest = *std::max_element(within_.energy2.begin(), within_.energy2.end());
    accumulate(within_, single_ && largest > least_single_eV2);
  }
  for (std::size_t x = 0; x < sums.size(); ++x) sums[x] += factor * scratch_[x];
}

void LineIntegrator::accumulate(const LineTransitions& transitions, bool single) {
  const LineKernel& kernel = line_kernel();
  (single ? kernel.accumulate_single : kernel.accumulate_double)(
      transitions.strength.data(), transitions.energy2.data(), int(transitions.strength.size()),
      xi2_.data(), int(xi2_.size()), scratch_.data());
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
  if (!filling_.trivial) {
    levels_.resize(4 * nodes.z.size());
    (single_ ? line_kernel().levels_single : line_kernel().levels_double)(
        bonds, nodes.z.data(), nodes.weight.data(), int(nodes.z.size()),
        transitions_.strength.data(), transitions_.energy2.data(), levels_.data());
    fill_simple(nodes);
    return;
  }
  (single_ ? line_kernel().transitions_single : line_kernel().transitions_double)(
      bonds, nodes.z.data(), nodes.weight.data(), int(nodes.z.size()), transitions_.strength.data(),
      transitions_.energy2.data());
}

void LineIntegrator::fill_simple(const LineNodes& nodes) {
  const std::size_t count = nodes.z.size();
  const double mu = std::fabs(filling_.occupation.chemical_potential());
  warm_nodes_.clear();
  warm_nodes_.reserve(count);
  for (std::size_t i = 0; i < count; ++i)
    if (std::min(levels_[i], levels_[count + i]) - mu <= frozen_) warm_nodes_.push_back(int(i));
  const std::size_t warm = warm_nodes_.size();
  warm_.resize(5 * warm);
  for (std::size_t part = 0; part < 3; ++part)
    for (std::size_t w = 0; w < warm; ++w)
      warm_[part * warm + w] = levels_[part * count + std::size_t(warm_nodes_[w])];
  const double *f = warm_.data(), *g = f + warm, *change = g + warm;
  double *across = warm_.data() + 3 * warm, *within = across + warm;
  if (filling_.occupation.kT() > 0)
    line_kernel().factors(f, g, change, int(warm), mu, filling_.occupation.kT(), across, within);
  else
    step_factors(f, g, change, warm, mu, across, within);
  for (std::size_t w = 0; w < warm; ++w) {
    const std::size_t i = std::size_t(warm_nodes_[w]);
    transitions_.strength[i] *= across[w];
    const double low = std::min(f[w], g[w]), high = std::max(f[w], g[w]);
    if (std::max(low - mu, mu - high) < active_ && within[w] > 0)
      add_within(0.5 * nodes.weight[i] * (1 - levels_[3 * count + i]) * within[w], change[w]);
  }
}

void LineIntegrator::add_within(double half_strength, double difference) {
  // Equal energies count at ξ = 0 only; the floor keeps products of two in range.
  const double floor = single_ ? least_energy2 : 1e-60;
  const double energy2 = std::max(difference * difference, floor);
  within_.strength.push_back(half_strength * energy2);
  within_.energy2.push_back(energy2);
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
    if (!filling_.trivial) {
      fill_general(a, b, overlap, nodes.weight[i]);
      continue;
    }
    // Up from k and up from k + Q differ when the bands are not symmetric about the midpoint.
    for (const double energy : {sum + tilt, sum - tilt}) {
      transitions_.strength.push_back(0.5 * nodes.weight[i] * overlap * energy);
      transitions_.energy2.push_back(energy * energy);
    }
  }
}

void LineIntegrator::fill_general(const BandState& a, const BandState& b, double overlap,
                                  double weight) {
  const Occupation& n = filling_.occupation;
  const double f = std::abs(a.coupling_eV), g = std::abs(b.coupling_eV);
  const std::complex<double> change = b.coupling_eV - a.coupling_eV;
  const double tilt = b.midpoint_eV - a.midpoint_eV;
  for (const int band : {-1, 1}) {
    const double from = a.midpoint_eV + band * f, across = b.midpoint_eV - band * g;
    const double up = std::fabs(across - from);
    transitions_.strength.push_back(
        0.5 * weight * overlap * up * up *
        n.per_energy(std::min(from, across), std::max(from, across), up));
    transitions_.energy2.push_back(up * up);
    const double to = b.midpoint_eV + band * g;
    // |b| - |a| = (2a + change)·change/(|a| + |b|), without cancellation.
    const double rise = (std::conj(2.0 * a.coupling_eV + change) * change).real() / (f + g);
    const double difference = std::fabs(tilt + band * rise);
    const double within = n.per_energy(std::min(from, to), std::max(from, to), difference);
    if (within > 0) add_within(0.5 * weight * (1 - overlap) * within, difference);
  }
}

}  // namespace gapwright
