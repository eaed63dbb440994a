// Ideal metal cylinders in the static limit: parallel bodies that screen perfectly.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/bessel.hpp>

#include <algorithm>
#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

/// T_m = I_m/K_m at qR, R = 1 nm.
Scatterer perfect_cylinder(const Nodes& nodes, const Window& window) {
  Scatterer body(Channel::outward, 1.0, nodes, window);
  for (int j = 0; j < window.q.count; ++j) {
    const int orders = window.orders[std::size_t(j)];
    const BesselLogs waves = bessel_logs(nodes.q.node(window.q.first + j), std::max(orders, 64));
    for (int m = 0; m < orders; ++m) {
      body.log_scale(j, m) = waves.log_i[std::size_t(m)] - waves.log_k[std::size_t(m)];
      body.reduced(j, m)[0] = 1.0;
    }
  }
  return body;
}

}  // namespace

// Thermal part of the Dirichlet mode, n = 0 alone: F = (kT L/2)∫dq/2π ln det. Exact values of the
// scattering formula of Rahi, Emig, Jaffe & Kardar, arXiv:0805.4241, kTL/R.
TEST_CASE("perfect cylinders in the static limit") {
  struct Row {
    double distance, free_energy;
  };
  for (const Row& r : {Row{2.5, -0.118481},
                       {3.0, -0.0446042},
                       {4.0, -0.0170930},
                       {10.0, -2.57662e-3},
                       {100.0, -8.97311e-5}}) {
    Nodes nodes = make_nodes(1e-6);
    Window window = parallel_window(1.0, 1.0, r.distance, nodes);
    nodes = nodes_on(window, nodes);
    // The density falls only as a double logarithm towards small q.
    const int lowest = nodes.q.index_below(1e-7 / r.distance);
    const int more = window.q.first - lowest;
    window.q = {lowest, window.q.count + more};
    window.orders.insert(window.orders.begin(), std::size_t(more), window.orders.front());
    window.xi = {0, 1};
    const Scatterer body = perfect_cylinder(nodes, window);
    const ParallelDensity density = parallel_density(body, body, r.distance, window, true);
    INFO("d/R " << r.distance);
    CHECK(density.positive);
    CHECK(0.5 * density.energy.full[0] == Approx(r.free_energy).epsilon(1e-4));
    CHECK(density.distance_slope.full[0] > 0);
  }
}

// Far apart F → -π kT L/(8 d ln²(d/R)) (Rahi et al.), approached as slowly as the logarithm grows.
// Its next term follows from (K₀(qd)/K₀(qR))², K₀(qR) ≈ ln(2/qR) - γ, with the mean of ln qd over
// K₀²(qd), -γ - 3 ln 2: ln(d/R) becomes ln(d/R) + 4 ln 2, up to a relative 1/ln².
TEST_CASE("perfect cylinders far apart") {
  double last = 10.0;
  for (const double distance : {1e2, 1e4, 1e8, 1e16}) {
    const Nodes nodes = make_nodes(1e-5);
    Window window;
    window.q.first = nodes.q.index_below(1e-9 / distance);
    window.q.count = nodes.q.index_above(10.0 / distance) - window.q.first + 1;
    window.orders.assign(std::size_t(window.q.count), 1);
    window.xi = {0, 1};
    const Scatterer body = perfect_cylinder(nodes, window);
    const double ours = 0.5 * parallel_density(body, body, distance, window, false).energy.full[0];
    const double log_distance = std::log(distance);
    const double beyond = std::sqrt(constants::pi / (8 * distance * -ours)) - log_distance;
    const double off = std::fabs(beyond - 4 * std::log(2.0));
    INFO("d/R " << distance << ", the logarithm exceeds ln(d/R) by " << beyond);
    CHECK(off < 8.0 / log_distance);
    CHECK(off < last);
    last = off;
  }
  CHECK(last < 0.2);
}
