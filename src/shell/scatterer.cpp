#include "usual_orders.hpp"

#include <gapwright/math/bessel.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

Scatterer::Scatterer(Channel channel, double radius_nm, Nodes nodes, Window window)
    : channel_(channel), radius_nm_(radius_nm), nodes_(nodes), window_(std::move(window)) {
  std::size_t cells = 0;
  for (const int orders : window_.orders) {
    cells_.push_back(cells);
    cells += std::size_t(orders);
  }
  reduced_.assign(cells * std::size_t(window_.xi.count), 0.0);
  radius_slope_.assign(reduced_.size(), 0.0);
  log_scale_.assign(cells, 0.0);
}

std::size_t Scatterer::bytes() const {
  return sizeof(double) * (reduced_.size() + radius_slope_.size() + log_scale_.size()) +
         sizeof(Scatterer);
}

namespace {

/// What one cell needs of the Bessel functions at x = qR.
struct CellWaves {
  double x;
  double product;       ///< I K
  double slope_first;   ///< I'/I or K'/K of the incoming and
  double slope_second;  ///< of the outgoing wave
  double order2;        ///< m²/x²
};

/// T = R·F₁F₂[P + α_⊥q² s₁s₂] with F the waves of the channel, s their logarithmic derivatives;
/// reduced T and d ln T/dR at fixed A = αQ² and α_⊥. METHODS §4.
void fill_cell(const CellWaves& w, double radius, double q, bool with_slope,
               std::span<const double> pi, std::span<const double> sigma_wave2,
               std::span<const double> normal, std::span<double> reduced,
               std::span<double> radius_slope, double sum_slopes) {
  const double y = radius * w.product;
  const double y_slope = w.product * (1 + w.x * sum_slopes);
  const double dipole = q * q * w.slope_first * w.slope_second;
  const double dipole_slope = -1 + 2 * w.x * (1 + w.order2) / w.slope_first;
  const double wave_slope = 1 + 2 * w.x * w.slope_first;
  for (std::size_t k = 0; k < reduced.size(); ++k) {
    const double a = pi[k] + sigma_wave2[k];
    const double p = a / (1 + a * y);
    const double d = normal[k] * dipole;
    const double sum = p + d;
    reduced[k] = y * sum;
    if (with_slope)
      radius_slope[k] =
          (p * (wave_slope - radius * p * y_slope) + d * dipole_slope) / (radius * sum);
  }
}

}  // namespace

Scatterer shell_scatterer(Channel channel, const ShellResponse& response,
                          const Background& background, const Window& window) {
  if (!response.window().covers(window) || !(response.window().xi == window.xi))
    throw std::invalid_argument("shell_scatterer: the response does not cover the window");
  const double radius = response.radius_nm();
  const Nodes& nodes = response.nodes();
  Scatterer scatterer(channel, radius, nodes, window);
  const std::size_t frequencies = std::size_t(window.xi.count);
  std::vector<double> sigma(frequencies), normal(frequencies), sigma_wave2(frequencies);
  for (std::size_t k = 0; k < frequencies; ++k) {
    const double xi = nodes.xi.node(window.xi.first + int(k));
    sigma[k] = background.in_plane_nm(xi);
    normal[k] = background.normal_nm(xi);
  }
  const int offset = window.q.first - response.window().q.first;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    const double x = q * radius;
    const int orders = window.orders[std::size_t(j)];
    const BesselLogs waves = bessel_logs(x, std::max(orders, usual_orders(radius)));
    for (int m = 0; m < orders; ++m) {
      const std::size_t i = std::size_t(m);
      const double log_product = waves.log_i[i] + waves.log_k[i];
      CellWaves w{x, std::exp(log_product), waves.slope_i[i], waves.slope_i[i], m * m / (x * x)};
      double scale = waves.log_i[i] - waves.log_k[i];
      if (channel == Channel::inward) {
        w.slope_first = w.slope_second = waves.slope_k[i];
        scale = -scale;
      } else if (channel == Channel::through) {
        w.slope_second = waves.slope_k[i];
        scale = 0.0;
      }
      const double wave2 = q * q + m * m / (radius * radius);
      for (std::size_t k = 0; k < frequencies; ++k) sigma_wave2[k] = sigma[k] * wave2;
      scatterer.log_scale(j, m) = scale;
      fill_cell(w, radius, q, channel != Channel::through, response.cell(j + offset, m),
                sigma_wave2, normal, scatterer.reduced(j, m), scatterer.radius_slope(j, m),
                waves.slope_i[i] + waves.slope_k[i]);
    }
  }
  return scatterer;
}

Scatterer enclosed(const Scatterer& inside, const Scatterer& outward, const Scatterer& inward,
                   const Scatterer& through, const Window& window) {
  for (const Scatterer* part : {&inside, &outward, &inward, &through})
    if (!part->window().covers(window) || !(part->window().xi == window.xi))
      throw std::invalid_argument("enclosed: a scatterer does not cover the window");
  Scatterer result(Channel::outward, outward.radius_nm(), outward.nodes(), window);
  const auto row = [&](const Scatterer& s) { return window.q.first - s.window().q.first; };
  const int r0 = row(inside), r1 = row(outward), r2 = row(inward), r3 = row(through);
  for (int j = 0; j < window.q.count; ++j)
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) {
      const auto s = inside.reduced(j + r0, m), e = outward.reduced(j + r1, m),
                 i = inward.reduced(j + r2, m), x = through.reduced(j + r3, m);
      const double scale = outward.log_scale(j + r1, m);
      // S_{k-1} in the scale of the outer wall; times T^i the two scales are one round trip.
      const double shrink = std::exp(inside.log_scale(j + r0, m) - scale);
      const auto out = result.reduced(j, m);
      result.log_scale(j, m) = scale;
      for (std::size_t k = 0; k < out.size(); ++k) {
        const double inner = s[k] * shrink;
        const double passed = 1 - x[k];
        out[k] = e[k] + passed * passed * inner / (1 - inner * i[k]);
      }
    }
  return result;
}

}  // namespace gapwright
