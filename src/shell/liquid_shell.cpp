#include "usual_orders.hpp"

#include <gapwright/math/bessel.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

/// The Bessel functions of one cell at x = qR: I K, I'/I and K'/K.
struct LiquidCell {
  double q, radius, product, slope_i, slope_k;
};

/// Reduced T of one channel (METHODS §4, liquids) at ε, A = αQ² and α_⊥.
double reduced_channel(Channel channel, const LiquidCell& c, double epsilon, double a,
                       double normal) {
  const double y = c.radius * c.product;
  const double edge = (epsilon - 1) * c.q * y;  // (ε-1)·x·I K
  const double d = 1 - edge * c.slope_k;
  const double p = a / (1 + a * y / d);
  const double q2 = c.q * c.q;
  switch (channel) {
    case Channel::outward:
      return -edge * c.slope_i / d +
             epsilon * y / (d * d) * (p + normal * (q2 * c.slope_i * c.slope_i));
    case Channel::inward:
      return -edge * c.slope_k / d +
             y / (d * d) * (p + epsilon * epsilon * normal * (q2 * c.slope_k * c.slope_k));
    case Channel::through:
      break;
  }
  const double passed =
      std::sqrt(epsilon) / d * (1 - y / d * (p + epsilon * normal * (q2 * c.slope_i * c.slope_k)));
  return 1 - passed;
}

}  // namespace

Scatterer liquid_shell_scatterer(Channel channel, const ShellResponse& response,
                                 const Background& background, const Medium& outside,
                                 const Window& window) {
  if (!response.window().covers(window) || !(response.window().xi == window.xi))
    throw std::invalid_argument("liquid_shell_scatterer: the response does not cover the window");
  const double radius = response.radius_nm();
  const Nodes& nodes = response.nodes();
  Scatterer scatterer(channel, radius, nodes, window);
  const std::size_t frequencies = std::size_t(window.xi.count);
  std::vector<double> sigma(frequencies), normal(frequencies), epsilon(frequencies);
  for (std::size_t k = 0; k < frequencies; ++k) {
    const double xi = nodes.xi.node(window.xi.first + int(k));
    sigma[k] = background.in_plane_nm(xi);
    normal[k] = background.normal_nm(xi);
    epsilon[k] = outside.permittivity(xi);
  }
  const int offset = window.q.first - response.window().q.first;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    const int orders = window.orders[std::size_t(j)];
    const BesselLogs waves = bessel_logs(q * radius, std::max(orders, usual_orders(radius)));
    for (int m = 0; m < orders; ++m) {
      const std::size_t i = std::size_t(m);
      const LiquidCell cell{q, radius, std::exp(waves.log_i[i] + waves.log_k[i]), waves.slope_i[i],
                            waves.slope_k[i]};
      const double scale = waves.log_i[i] - waves.log_k[i];
      scatterer.log_scale(j, m) =
          channel == Channel::through ? 0.0 : (channel == Channel::inward ? -scale : scale);
      const double wave2 = q * q + m * m / (radius * radius);
      const auto pi = response.cell(j + offset, m);
      const auto out = scatterer.reduced(j, m);
      for (std::size_t k = 0; k < frequencies; ++k)
        out[k] = reduced_channel(channel, cell, epsilon[k], pi[k] + sigma[k] * wave2, normal[k]);
    }
  }
  return scatterer;
}

}  // namespace gapwright
