#include "multipoles.hpp"
#include "parallel_kernel.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/bessel.hpp>
#include <gapwright/math/kernel.hpp>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <memory>
#include <stdexcept>

namespace gapwright {

const ParallelKernel& parallel_kernel() {
#if defined(__x86_64__)
  if (kernel_variant() == KernelVariant::avx512) return avx512::parallel_kernel;
  if (kernel_variant() == KernelVariant::avx2) return avx2::parallel_kernel;
#endif
  return portable::parallel_kernel;
}

Window parallel_window(double radius_1_nm, double radius_2_nm, double distance_nm,
                       const Nodes& nodes) {
  const double gap = distance_nm - radius_1_nm - radius_2_nm;
  if (!(radius_1_nm > 0) || !(radius_2_nm > 0) || !(gap > 0))
    throw std::domain_error("parallel_window: the bodies must not touch");
  // Far gapped tubes answer as q², which lifts the integrand to q⁴e^{-2qD}: it ends later.
  const double limit = largest_exponent(nodes.tolerance) + (gap > 1.0 ? 6.0 : 0.0);
  Window window;
  window.xi = frequencies_at(gap, nodes);
  const LogLattice q_lattice = nodes_on(window.xi, nodes).q;
  // Of far metallic tubes the axial charge waves are the whole energy: four times as long ones
  // count.
  const double lowest = lowest_wave(distance_nm, nodes.tolerance);
  window.q.first = q_lattice.index_below(gap > 1.0 ? 0.25 * lowest : lowest);
  window.q.count = q_lattice.index_above(limit / (2 * gap)) - window.q.first + 1;
  // A multipole m of one body meets the other's nearest image line.
  const double wider = std::max(radius_1_nm, radius_2_nm);
  const double far = distance_nm - std::min(radius_1_nm, radius_2_nm);
  int largest = 0;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = q_lattice.node(window.q.first + j);
    const int m = largest_multipole(q, wider, far, limit, largest);
    largest = j == 0 ? m : std::min(m, largest);
    window.orders.push_back(largest + 1);
  }
  return window;
}

namespace {

/// The coupling of both parities at one wave number, with the scales of the two scatterers.
class Coupling {
 public:
  Coupling(const std::vector<double>& scale_1, const std::vector<double>& scale_2, double q,
           double distance, bool with_slope)
      : orders_(int(scale_1.size())) {
    const BesselLogs waves = bessel_logs(q * distance, 2 * orders_);
    even.resize(scale_1.size() * scale_1.size());
    odd.resize(std::size_t(orders_ - 1) * std::size_t(orders_ - 1));
    if (with_slope) {
      even_slope.resize(even.size());
      odd_slope.resize(odd.size());
    }
    for (int m = 0; m < orders_; ++m)
      for (int n = 0; n < orders_; ++n) {
        const double scale = 0.5 * (scale_1[std::size_t(m)] + scale_2[std::size_t(n)]);
        const std::size_t low = std::size_t(std::abs(m - n)), high = std::size_t(m + n);
        const double minus = std::exp(scale + waves.log_k[low]);
        const double plus = std::exp(scale + waves.log_k[high]);
        // e_m = (|m> + |-m>)/√2 for m > 0.
        const double norm = m == 0 && n == 0 ? 0.5 : (m == 0 || n == 0 ? std::sqrt(0.5) : 1.0);
        const std::size_t at = std::size_t(m) * scale_1.size() + std::size_t(n);
        even[at] = norm * (minus + plus);
        const bool inside = m > 0 && n > 0;
        const std::size_t at_odd = std::size_t((m - 1) * (orders_ - 1) + n - 1);
        if (inside) odd[at_odd] = minus - plus;
        if (!with_slope) continue;
        const double minus_slope = q * waves.slope_k[low] * minus;
        const double plus_slope = q * waves.slope_k[high] * plus;
        even_slope[at] = norm * (minus_slope + plus_slope);
        if (inside) odd_slope[at_odd] = minus_slope - plus_slope;
      }
  }

  std::vector<double> even, odd, even_slope, odd_slope;

 private:
  int orders_;
};

struct AlignedScratch {
  explicit AlignedScratch(int doubles)
      : memory(static_cast<double*>(std::aligned_alloc(64, std::size_t(doubles) * 8))) {
    if (!memory) throw std::bad_alloc();
  }
  struct Free {
    void operator()(double* p) const { std::free(p); }
  };
  std::unique_ptr<double, Free> memory;
};

std::vector<FrequencyDensity*> parts(ParallelDensity& density) {
  return {&density.energy, &density.first_round_trip, &density.distance_slope,
          &density.first_slope};
}

}  // namespace

ParallelDensity parallel_density(const Scatterer& first, const Scatterer& second,
                                 double distance_nm, const Window& window, bool with_slope) {
  for (const Scatterer* part : {&first, &second})
    if (!part->window().covers(window) || part->channel() != Channel::outward)
      throw std::invalid_argument("parallel_density: outward scatterers on the window required");
  const std::size_t frequencies = std::size_t(window.xi.count);
  const AxisWeights weights = trapezoid_weights(first.nodes().q, window.q, {});
  const ParallelKernel& kernel = parallel_kernel();
  const AlignedScratch scratch(multipole_scratch(window.max_order(), window.max_order()));
  ParallelDensity density;
  const auto all = parts(density);
  density.distance_slope.derivatives = density.first_slope.derivatives = 1;
  const std::size_t used = with_slope ? 4 : 2;
  for (std::size_t p = 0; p < used; ++p) {
    all[p]->full.assign(frequencies, 0.0);
    all[p]->halved.assign(frequencies, 0.0);
  }
  std::vector<std::vector<double>> row(4, std::vector<double>(frequencies));
  const int shift_1 = window.q.first - first.window().q.first;
  const int shift_2 = window.q.first - second.window().q.first;
  const int xi_1 = window.xi.first - first.window().xi.first;
  const int xi_2 = window.xi.first - second.window().xi.first;
  for (int j = 0; j < window.q.count; ++j) {
    const int orders = window.orders[std::size_t(j)];
    std::vector<double> scale_1, scale_2;
    std::vector<const double*> t1, t2;
    for (int m = 0; m < orders; ++m) {
      scale_1.push_back(first.log_scale(j + shift_1, m));
      scale_2.push_back(second.log_scale(j + shift_2, m));
      t1.push_back(first.reduced(j + shift_1, m).data() + xi_1);
      t2.push_back(second.reduced(j + shift_2, m).data() + xi_2);
    }
    const Coupling coupling(scale_1, scale_2, first.nodes().q.node(window.q.first + j), distance_nm,
                            with_slope);
    for (auto& values : row) std::fill(values.begin(), values.end(), 0.0);
    MultipoleBlock block;
    block.frequencies = window.xi.count;
    block.weight = 1 / constants::pi;  // both signs of q
    block.log_det = row[0].data();
    block.trace = row[1].data();
    block.log_det_slope = row[2].data();
    block.trace_slope = row[3].data();
    block.scratch = scratch.memory.get();
    for (const bool even : {true, false}) {
      if (!even && orders == 1) continue;
      block.rows = block.columns = even ? orders : orders - 1;
      block.coupling = (even ? coupling.even : coupling.odd).data();
      block.coupling_slope =
          with_slope ? (even ? coupling.even_slope : coupling.odd_slope).data() : nullptr;
      block.first = t1.data() + (even ? 0 : 1);
      block.second = t2.data() + (even ? 0 : 1);
      density.positive = kernel.add(block) && density.positive;
    }
    for (std::size_t p = 0; p < used; ++p)
      for (std::size_t k = 0; k < frequencies; ++k) {
        all[p]->full[k] += weights.full[std::size_t(j)] * row[p][k];
        all[p]->halved[k] += weights.halved[std::size_t(j)] * row[p][k];
      }
  }
  return density;
}

}  // namespace gapwright
