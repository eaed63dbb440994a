#include "aligned_scratch.hpp"
#include "charge_waves.hpp"
#include "multipoles.hpp"
#include "parallel_kernel.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/over_sheet.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

double gap_of(double radius, double distance, const char* where) {
  const double gap = distance - radius;
  if (!(radius > 0) || !(gap > 0) || !std::isfinite(gap))
    throw std::domain_error(
        fmt::format("{}: radius {} nm, axis {} nm from the plane, required: a gap above 0", where,
                    radius, distance));
  return gap;
}

/// Plane waves k = q·cosh η of one wave number along the axis; -η goes with η.
struct PlaneWaves {
  std::vector<double> eta, wave;
  std::vector<double> reflection;  // [wave][ξ]
};

/// Step in η: the integrand is as smooth as in ln q, but a round wall smears the waves it reflects
/// by no more than about 1/√(kR).
double eta_step(double radius, double highest, double lattice_step) {
  return std::min(1.2 * lattice_step, 2.5 / std::sqrt(1 + highest * radius));
}

PlaneWaves plane_waves(double q, double highest, double step, const Reflector& sheet) {
  PlaneWaves waves;
  for (int i = 0; i == 0 || q * std::cosh(i * step) <= highest; ++i) {
    waves.eta.push_back(i * step);
    waves.wave.push_back(q * std::cosh(i * step));
  }
  const std::size_t frequencies = std::size_t(sheet.xi().count);
  waves.reflection.resize(waves.eta.size() * frequencies);
  for (std::size_t i = 0; i < waves.eta.size(); ++i)
    sheet.reflection(q, waves.wave[i], {waves.reflection.data() + i * frequencies, frequencies});
  return waves;
}

/// Multipoles in even and odd halves against plane waves.
struct Coupling {
  std::vector<double> even, odd, even_slope, odd_slope;
};

Coupling couple(const std::vector<double>& scale, const PlaneWaves& waves, double distance,
                double step, bool with_slope) {
  const std::size_t orders = scale.size(), columns = waves.eta.size();
  Coupling c;
  c.even.resize(orders * columns);
  c.odd.resize((orders - 1) * columns);
  for (std::size_t i = 0; i < columns; ++i) {
    const double eta = waves.eta[i];
    const double weight = std::sqrt(step * (i == 0 ? 0.5 : 1.0));
    for (std::size_t m = 0; m < orders; ++m) {
      // √2 for e_m = (|m> + |-m>)/√2, and cosh mη = e^{mη}(1 + e^{-2mη})/2.
      const double most = weight * (m == 0 ? 1.0 : std::sqrt(0.5)) *
                          std::exp(0.5 * scale[m] + double(m) * eta - waves.wave[i] * distance);
      const double rest = std::exp(-2 * double(m) * eta);
      c.even[m * columns + i] = m == 0 ? most : most * (1 + rest);
      if (m > 0) c.odd[(m - 1) * columns + i] = most * (1 - rest);
    }
  }
  if (!with_slope) return c;
  c.even_slope = c.even;
  c.odd_slope = c.odd;
  for (std::vector<double>* values : {&c.even_slope, &c.odd_slope})
    for (std::size_t at = 0; at < values->size(); ++at) (*values)[at] *= -waves.wave[at % columns];
  return c;
}

}  // namespace

Window over_sheet_window(double radius_nm, double gap_nm, const Nodes& nodes) {
  gap_of(radius_nm, radius_nm + gap_nm, "over_sheet_window");
  const double limit = largest_exponent(nodes.tolerance);
  const double distance = radius_nm + gap_nm;
  Window window;
  window.xi = frequencies_at(gap_nm, nodes);
  window.fine = far_apart(gap_nm);
  const LogLattice lattice = nodes_on(window, nodes).q;
  // Below the lowest node the density is continued as a constant, an error of 8·share·(qD)².
  const double lowest = std::sqrt(0.004 * nodes.tolerance / charge_wave_share(gap_nm));
  double first = std::min(0.01, lowest) / distance;
  if (nodes.warm())
    first =
        std::min(first, lowest_static_wave(distance, nodes.tolerance) / charge_wave_share(gap_nm));
  window.q.first = lattice.index_below(first);
  window.q.count = lattice.index_above(limit / (2 * gap_nm)) - window.q.first + 1;
  const int least = least_multipole(gap_nm);
  int largest = 0;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = lattice.node(window.q.first + j);
    const int m = largest_multipole(q, radius_nm, distance, limit, largest);
    largest = j == 0 ? m : std::min(m, largest);
    window.orders.push_back(std::max(largest, least) + 1);
  }
  return window;
}

OverSheetDensity over_sheet_density(const Scatterer& body, const Reflector& sheet,
                                    double distance_nm, const Window& window, bool with_slope) {
  const double gap = gap_of(body.radius_nm(), distance_nm, "over_sheet_density");
  if (body.channel() != Channel::outward || !body.window().covers(window) ||
      !sheet.xi().contains(window.xi))
    throw std::invalid_argument(
        "over_sheet_density: an outward scatterer and a sheet on the window are required");
  const Nodes& nodes = body.nodes();
  const double highest = largest_exponent(nodes.tolerance) / (2 * gap);
  const double step = eta_step(body.radius_nm(), highest, nodes.q.step);
  const std::size_t frequencies = std::size_t(window.xi.count);
  const AxisWeights weights = trapezoid_weights(nodes.q, window.q, {});
  OverSheetDensity density;
  const std::array all = {&density.energy, &density.first_round_trip, &density.distance_slope,
                          &density.first_slope};
  density.distance_slope.derivatives = density.first_slope.derivatives = 1;
  const std::size_t used = with_slope ? 4 : 2;
  for (std::size_t p = 0; p < used; ++p) {
    all[p]->full.assign(frequencies, 0.0);
    all[p]->halved.assign(frequencies, 0.0);
  }
  std::vector<std::vector<double>> row(4, std::vector<double>(frequencies));
  const int shift = window.q.first - body.window().q.first;
  const int xi_body = window.xi.first - body.window().xi.first;
  const int xi_sheet = window.xi.first - sheet.xi().first;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    const int orders = window.orders[std::size_t(j)];
    const PlaneWaves waves = plane_waves(q, highest, step, sheet);
    std::vector<double> scale;
    std::vector<const double*> first, second;
    for (int m = 0; m < orders; ++m) {
      scale.push_back(body.log_scale(j + shift, m));
      first.push_back(body.reduced(j + shift, m).data() + xi_body);
    }
    for (std::size_t i = 0; i < waves.eta.size(); ++i)
      second.push_back(waves.reflection.data() + i * std::size_t(sheet.xi().count) + xi_sheet);
    const Coupling coupling = couple(scale, waves, distance_nm, step, with_slope);
    for (auto& values : row) std::fill(values.begin(), values.end(), 0.0);
    MultipoleBlock block;
    block.frequencies = window.xi.count;
    block.columns = block.stride = int(waves.eta.size());
    block.weight = 1 / constants::pi;  // both signs of q
    block.further = row[0].data();
    block.trace = row[1].data();
    block.further_slope = row[2].data();
    block.trace_slope = row[3].data();
    block.second = second.data();
    const AlignedScratch scratch(multipole_scratch(orders, block.columns));
    block.scratch = scratch.data();
    for (const bool even : {true, false}) {
      if (!even && orders == 1) continue;
      block.rows = even ? orders : orders - 1;
      block.coupling = (even ? coupling.even : coupling.odd).data();
      block.coupling_slope =
          with_slope ? (even ? coupling.even_slope : coupling.odd_slope).data() : nullptr;
      block.first = first.data() + (even ? 0 : 1);
      parallel_kernel().first_trip(block);
      density.positive = parallel_kernel().further_trips(block) && density.positive;
    }
    for (const std::size_t p : {0, 2})
      for (std::size_t k = 0; k < frequencies; ++k) row[p][k] += row[p + 1][k];
    for (std::size_t p = 0; p < used; ++p)
      for (std::size_t k = 0; k < frequencies; ++k) {
        all[p]->full[k] += weights.full[std::size_t(j)] * row[p][k];
        all[p]->halved[k] += weights.halved[std::size_t(j)] * row[p][k];
      }
  }
  return density;
}

}  // namespace gapwright
