#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/retarded_coaxial.hpp>

#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

double trace_of_product(const WaveBlock& a, const WaveBlock& b) {
  return a.tm * b.tm + 2 * a.mixed * b.mixed + a.te * b.te;
}

/// d det A by dA: tr[adj(A) dA].
double determinant_slope(const WaveBlock& a, const WaveBlock& slope) {
  return a.te * slope.tm - 2 * a.mixed * slope.mixed + a.tm * slope.te;
}

struct LogDeterminant {
  double value = 0.0;
  double gap_slope = 0.0;
};

/// ln(1 - tr N + det N), N = T^e_1 T^i_2; the gap widens as R₁ shrinks and R₂ grows by its half.
LogDeterminant log_determinant(const RetardedBlock& in, const RetardedBlock& out, bool with_slope) {
  const double factor = std::exp(in.log_scale + out.log_scale);
  const double trace = factor * trace_of_product(in.reduced, out.reduced);
  const double product = factor * factor * in.determinant * out.determinant;
  LogDeterminant result{std::log1p(product - trace), 0.0};
  if (!with_slope) return result;
  const double trace_slope = factor * (trace_of_product(in.reduced, out.radius_slope) -
                                       trace_of_product(in.radius_slope, out.reduced));
  const double product_slope = factor * factor *
                               (in.determinant * determinant_slope(out.reduced, out.radius_slope) -
                                out.determinant * determinant_slope(in.reduced, in.radius_slope));
  result.gap_slope = 0.5 * (product_slope - trace_slope) / (1 - trace + product);
  return result;
}

void require_cover(const RetardedShell& shell, const Window& window) {
  if (!shell.window().covers(window) || !(shell.window().xi == window.xi))
    throw std::invalid_argument("retarded_coaxial_density: a shell does not cover the window");
}

}  // namespace

CoaxialDensity retarded_coaxial_density(const RetardedShell& inside, const RetardedShell& around,
                                        const Window& window, bool with_slope) {
  require_cover(inside, window);
  require_cover(around, window);
  if (!(inside.nodes() == around.nodes()))
    throw std::invalid_argument("retarded_coaxial_density: the shells stand on different nodes");
  const std::size_t frequencies = std::size_t(window.xi.count);
  const AxisWeights weights = trapezoid_weights(inside.nodes().q, window.q, {});
  CoaxialDensity density;
  density.energy.full.assign(frequencies, 0.0);
  density.energy.halved.assign(frequencies, 0.0);
  density.gap_slope.derivatives = 1;
  if (with_slope) {
    density.gap_slope.full = density.energy.full;
    density.gap_slope.halved = density.energy.full;
  }
  const int in = window.q.first - inside.window().q.first;
  const int out = window.q.first - around.window().q.first;
  std::vector<RetardedBlock> inner(std::size_t(window.max_order()));
  std::vector<RetardedBlock> outer(inner.size());
  for (int j = 0; j < window.q.count; ++j) {
    const std::size_t orders = std::size_t(window.orders[std::size_t(j)]);
    const double full = weights.full[std::size_t(j)], halved = weights.halved[std::size_t(j)];
    for (std::size_t k = 0; k < frequencies; ++k) {
      inside.blocks(Channel::outward, j + in, int(k), {inner.data(), orders});
      around.blocks(Channel::inward, j + out, int(k), {outer.data(), orders});
      LogDeterminant sum;
      for (std::size_t m = 0; m < orders; ++m) {
        const LogDeterminant cell = log_determinant(inner[m], outer[m], with_slope);
        // ±q and ±m are alike: the signs of both blocks' off-diagonals turn together.
        const double weight = (m == 0 ? 1.0 : 2.0) / constants::pi;
        sum.value += weight * cell.value;
        sum.gap_slope += weight * cell.gap_slope;
      }
      density.energy.full[k] += full * sum.value;
      density.energy.halved[k] += halved * sum.value;
      if (!with_slope) continue;
      density.gap_slope.full[k] += full * sum.gap_slope;
      density.gap_slope.halved[k] += halved * sum.gap_slope;
    }
  }
  return density;
}

}  // namespace gapwright
