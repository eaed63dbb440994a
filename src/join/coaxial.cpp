#include "coaxial_kernel.hpp"
#include "multipoles.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/math/kernel.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

const InterfaceKernel& interface_kernel() {
#if defined(__x86_64__)
  if (kernel_variant() == KernelVariant::avx512) return avx512::interface_kernel;
  if (kernel_variant() == KernelVariant::avx2) return avx2::interface_kernel;
#endif
  return portable::interface_kernel;
}

double largest_exponent(double tolerance) {
  double x = 2.0;
  for (int i = 0; i < 40; ++i) x = std::log(30.0 * x * x / tolerance);
  return x;
}

Window coaxial_window(double inner_radius_nm, double outer_radius_nm, const Nodes& nodes) {
  if (!(inner_radius_nm > 0) || !(outer_radius_nm > inner_radius_nm))
    throw std::domain_error("coaxial_window: radii must rise from a positive value");
  const double limit = largest_exponent(nodes.tolerance);
  const double gap = outer_radius_nm - inner_radius_nm;
  Window window;
  window.q.first = nodes.q.index_below(lowest_wave(outer_radius_nm, nodes.tolerance));
  window.q.count = nodes.q.index_above(limit / (2 * gap)) - window.q.first + 1;
  window.xi = contact_frequencies(nodes);
  int largest = 0;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    const int m = largest_multipole(q, inner_radius_nm, outer_radius_nm, limit, largest);
    largest = j == 0 ? m : std::min(m, largest);
    window.orders.push_back(largest + 1);
  }
  return window;
}

CoaxialDensity coaxial_density(const Scatterer& inside, const Scatterer& around,
                               const Window& window, bool with_slope) {
  for (const Scatterer* part : {&inside, &around})
    if (!part->window().covers(window) || !(part->window().xi == window.xi))
      throw std::invalid_argument("coaxial_density: a scatterer does not cover the window");
  const std::size_t frequencies = std::size_t(window.xi.count);
  const AxisWeights weights = trapezoid_weights(inside.nodes().q, window.q, {});
  const InterfaceKernel& kernel = interface_kernel();
  CoaxialDensity density;
  for (FrequencyDensity* d : {&density.energy, &density.gap_slope}) {
    if (d == &density.gap_slope && !with_slope) continue;
    d->full.assign(frequencies, 0.0);
    d->halved.assign(frequencies, 0.0);
  }
  density.gap_slope.derivatives = 1;
  std::vector<double> energy(frequencies), slope(frequencies);
  const int in = window.q.first - inside.window().q.first;
  const int out = window.q.first - around.window().q.first;
  const int count = int(frequencies);
  for (int j = 0; j < window.q.count; ++j) {
    std::fill(energy.begin(), energy.end(), 0.0);
    std::fill(slope.begin(), slope.end(), 0.0);
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) {
      const double factor = std::exp(inside.log_scale(j + in, m) + around.log_scale(j + out, m));
      // ±q and ±m: ∫_{-∞}^{∞} dq/2π Σ_m counts each cell with m > 0 four times, m = 0 twice.
      const double weight = (m == 0 ? 1.0 : 2.0) / constants::pi;
      if (with_slope)
        kernel.energy_and_slope(
            inside.reduced(j + in, m).data(), inside.radius_slope(j + in, m).data(),
            around.reduced(j + out, m).data(), around.radius_slope(j + out, m).data(), factor,
            weight, count, energy.data(), slope.data());
      else
        kernel.energy(inside.reduced(j + in, m).data(), around.reduced(j + out, m).data(), factor,
                      weight, count, energy.data());
    }
    const double full = weights.full[std::size_t(j)], halved = weights.halved[std::size_t(j)];
    for (std::size_t k = 0; k < frequencies; ++k) {
      density.energy.full[k] += full * energy[k];
      density.energy.halved[k] += halved * energy[k];
    }
    if (with_slope)
      for (std::size_t k = 0; k < frequencies; ++k) {
        density.gap_slope.full[k] += full * slope[k];
        density.gap_slope.halved[k] += halved * slope[k];
      }
  }
  return density;
}

}  // namespace gapwright
