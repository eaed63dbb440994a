#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/plain_wire.hpp>
#include <gapwright/math/bessel.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

/// Below so many radii m = 0 is said to be far from the whole.
constexpr double far_in_radii = 10.0;

/// Scales of all multipoles as of a shell: empty ones must not overflow beside others.
void set_scales(Scatterer& wire) {
  const Window& window = wire.window();
  for (int j = 0; j < window.q.count; ++j) {
    const int orders = window.orders[std::size_t(j)];
    const BesselLogs waves =
        bessel_logs(wire.nodes().q.node(window.q.first + j) * wire.radius_nm(), orders);
    for (int m = 0; m < orders; ++m)
      wire.log_scale(j, m) = waves.log_i[std::size_t(m)] - waves.log_k[std::size_t(m)];
  }
}

}  // namespace

Scatterer gas_wire_scatterer(const ElectronGasWire& wire, double temperature_K, const Nodes& nodes,
                             const Window& window) {
  Scatterer scatterer(Channel::outward, wire.radius_nm, nodes, window);
  set_scales(scatterer);
  const GasResponse response(wire, temperature_K);
  const double coulomb = constants::coulomb_eV_nm / wire.host_permittivity;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    const BesselLogs waves = bessel_logs(q * wire.radius_nm, 1);
    const double product = std::exp(waves.log_i[0] + waves.log_k[0]);
    const std::span<double> reduced = scatterer.reduced(j, 0);
    for (int k = 0; k < window.xi.count; ++k) {
      const double strength = 2 * coulomb * response(q, nodes.xi.node(window.xi.first + k));
      reduced[std::size_t(k)] = strength * product / (1 + strength * product);
    }
  }
  return scatterer;
}

Scatterer axial_scatterer(const Scatterer& body) {
  if (body.channel() != Channel::outward)
    throw std::invalid_argument("axial_scatterer: an outward scatterer is required");
  Scatterer wire(Channel::outward, body.radius_nm(), body.nodes(), body.window());
  set_scales(wire);
  for (int j = 0; j < body.window().q.count; ++j) {
    wire.log_scale(j, 0) = body.log_scale(j, 0);
    std::copy(body.reduced(j, 0).begin(), body.reduced(j, 0).end(), wire.reduced(j, 0).begin());
  }
  return wire;
}

Scatterer axial_scatterer(const RowScatterer& ribbon, double radius_nm) {
  Scatterer wire(Channel::outward, radius_nm, ribbon.nodes(), ribbon.window());
  set_scales(wire);
  const std::size_t frequencies = std::size_t(ribbon.window().xi.count);
  const int size = ribbon.half_size(Mirror::even);
  const bool middle = ribbon.rows().size() % 2 == 1;
  for (int j = 0; j < ribbon.window().q.count; ++j) {
    const std::span<const double> packed = ribbon.factor(j, Mirror::even);
    wire.log_scale(j, 0) = 0.0;
    // -Σ X = |Uᵀv|² with v_i = √2 for two rows and 1 for the middle one.
    for (std::size_t k = 0; k < frequencies; ++k) {
      std::size_t at = k;
      double sum = 0.0;
      for (int column = 0; column < size; ++column) {
        double total = 0.0;
        for (int row = 0; row <= column; ++row, at += frequencies)
          total += (middle && row == size - 1 ? 1.0 : std::sqrt(2.0)) * packed[at];
        sum += total * total;
      }
      wire.reduced(j, 0)[k] = 2 * constants::coulomb_eV_nm * sum;
    }
  }
  return wire;
}

Window axial_window(Window window) {
  std::fill(window.orders.begin(), window.orders.end(), 1);
  return window;
}

std::string axial_note(double distance_nm, double wider_radius_nm, bool gapped) {
  std::string note;
  if (distance_nm < far_in_radii * wider_radius_nm)
    note = fmt::format(
        "at {:.4g} nm, below {:g} radii, charges around the bodies count as much as those along "
        "them: m = 0 is the axial share",
        distance_nm, far_in_radii);
  if (gapped)
    note += fmt::format(
        "{}dipoles across a body with a gap fall with the distance as its axial "
        "charges do: m = 0 stays a lower bound of the attraction",
        note.empty() ? "" : "; ");
  return note;
}

}  // namespace gapwright
