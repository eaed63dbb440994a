// Crossed bodies: exchange, small angles, derivatives, and sums made by other means.
#include "synthetic_shell.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/quadrature.hpp>

#include <algorithm>
#include <cmath>
#include <vector>

#include <Eigen/Dense>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double degree = constants::pi / 180;

struct Body {
  Tube tube;
  Scatterer scatterer;
};

Body body(int n, int m, const Nodes& nodes, const Window& window) {
  const Catalogs& catalogs = Catalogs::built_in();
  const Tube tube = make_tube({n, m});
  const ShellResponse response =
      tube_response(tube, catalogs.hopping(), {}, nodes_on(window, nodes), window);
  return {tube, shell_scatterer(Channel::outward, response, catalogs.background(), window)};
}

/// Two tubes a gap apart.
struct Pair {
  Pair(Chirality a, Chirality b, double gap, double tolerance)
      : nodes(make_nodes(tolerance)),
        distance(make_tube(a).radius_nm + make_tube(b).radius_nm + gap),
        window(crossed_window(make_tube(a).radius_nm, make_tube(b).radius_nm, distance, nodes)),
        first(body(a.n, a.m, nodes, window)),
        second(body(b.n, b.m, nodes, window)) {}

  double sum(const FrequencyDensity& density) const {
    return frequency_sum(density, nodes, window.xi, {}).value;
  }

  Nodes nodes;
  double distance;
  Window window;
  Body first, second;
};

/// The first round trip in polar coordinates of k, q₁ = k cos θ, q₂ = k cos(θ - γ), with panels
/// that end where a wave number vanishes.
double polar_first_round_trip(const SyntheticShell& a, const SyntheticShell& b, double distance,
                              double angle) {
  const GaussRule& rule = gauss_legendre(48);
  const double depth_a = 0.5 * (distance + a.radius - b.radius), depth_b = distance - depth_a;
  const double gap = distance - a.radius - b.radius;
  // θ from π/2 to π/2 + π: q₁ vanishes at the ends, q₂ at π/2 + γ.
  const std::vector<double> ends{0.0, angle, 0.5 * (constants::pi + angle), constants::pi};
  double sum = 0.0;
  constexpr double step = 0.2;
  for (int i = -40; i * step < std::log(20 / gap); ++i) {
    const double k = std::exp(i * step);
    const int count = 8 + int(4 * k * std::max(a.radius, b.radius));
    for (std::size_t panel = 1; panel < ends.size(); ++panel) {
      const double middle = 0.5 * (ends[panel] + ends[panel - 1]);
      const double half = 0.5 * (ends[panel] - ends[panel - 1]);
      for (std::size_t l = 0; l < rule.nodes.size(); ++l) {
        const double theta = 0.5 * constants::pi + middle + half * rule.nodes[l];
        const double q1 = k * std::cos(theta), q2 = k * std::cos(theta - angle);
        const double mirror_a = a.mirror(std::fabs(q1), k * std::sin(theta), depth_a, count);
        const double mirror_b =
            b.mirror(std::fabs(q2), k * std::sin(theta - angle), depth_b, count);
        // 2 for the other half of the circle; (π/k)² of the two mirrors.
        sum += 2 * step * k * k * half * rule.weights[l] * mirror_a * mirror_b *
               std::pow(constants::pi / k, 2);
      }
    }
  }
  return -sum / (4 * constants::pi * constants::pi * std::sin(angle));
}

/// ln det(1 - R₁R₂) + Tr R₁R₂ with both mirrors as dense matrices over a grid of (q₁, q₂) of both
/// signs, q = e^{jh}.
double dense_further(const SyntheticShell& a, const SyntheticShell& b, double distance,
                     double angle, double step, double low, double high) {
  std::vector<double> q, weight;
  for (int j = int(std::ceil(std::log(low) / step)); j * step <= std::log(high); ++j)
    for (const double sign : {1.0, -1.0}) {
      q.push_back(sign * std::exp(j * step));
      weight.push_back(step * std::exp(j * step));
    }
  const Eigen::Index n = Eigen::Index(q.size());
  const double depth_a = 0.5 * (distance + a.radius - b.radius), depth_b = distance - depth_a;
  // (π/√(kk')) Σ_m T_m τ^m τ'^m e^{-(k+k')·depth}·√(w w')/(2π sin γ)
  const auto kernel = [&](const SyntheticShell& s, double own, double other, double primed,
                          double depth) {
    const auto across = [&](double o) { return (o - own * std::cos(angle)) / std::sin(angle); };
    const double x = across(other), y = across(primed), p = std::fabs(own);
    const double k = std::hypot(own, x), l = std::hypot(own, y);
    const double eta = std::asinh(x / p) + std::asinh(y / p);
    const int count = 12 + int(4 * std::max(k, l) * s.radius);
    const std::vector<double> logs = s.log_t(p, count);
    double sum = 0.0;
    for (int m = 0; m < count; ++m)
      sum += std::exp(logs[std::size_t(m)] + m * std::fabs(eta) - (k + l) * depth) *
             (m == 0 ? 1.0 : 1.0 + std::exp(-2 * m * std::fabs(eta)));
    return sum / (2 * std::sin(angle) * std::sqrt(k * l));
  };
  Eigen::MatrixXd first = Eigen::MatrixXd::Zero(n * n, n * n), second = first;
  for (Eigen::Index i = 0; i < n; ++i)
    for (Eigen::Index j = 0; j < n; ++j)
      for (Eigen::Index l = 0; l <= j; ++l) {
        const double measure = std::sqrt(weight[std::size_t(j)] * weight[std::size_t(l)]);
        const double qi = q[std::size_t(i)], qj = q[std::size_t(j)], ql = q[std::size_t(l)];
        first(i * n + j, i * n + l) = first(i * n + l, i * n + j) =
            measure * kernel(a, qi, qj, ql, depth_a);
        second(j * n + i, l * n + i) = second(l * n + i, j * n + i) =
            measure * kernel(b, qi, qj, ql, depth_b);
      }
  const Eigen::MatrixXd product = first * second;
  const Eigen::MatrixXd matrix = Eigen::MatrixXd::Identity(n * n, n * n) - product;
  const Eigen::PartialPivLU<Eigen::MatrixXd> lu(matrix);
  return lu.matrixLU().diagonal().array().abs().log().sum() + product.trace();
}

}  // namespace

TEST_CASE("the first round trip equals an integral in polar coordinates") {
  const SyntheticShell a{0.7, 1.5, 0.2}, b{0.4, 0.6, 0.1};
  for (const double gap : {0.34, 1.5}) {
    const double distance = a.radius + b.radius + gap;
    for (const double tolerance : {1e-4, 1e-6}) {
      const Nodes nodes = make_nodes(tolerance);
      Window window = crossed_window(a.radius, b.radius, distance, nodes);
      window.xi.count = 1;
      const Nodes own = nodes_on(window, nodes);
      const Scatterer first = a.scatterer(own, window), second = b.scatterer(own, window);
      for (const double degrees : {90.0, 61.0, 20.0, 4.0, 1.0}) {
        const CrossedDensity density =
            crossed_density(first, second, distance, degrees, window, false);
        INFO(gap << " nm at " << degrees << " degrees, tolerance " << tolerance);
        CHECK(density.first_round_trip.full[0] ==
              Approx(polar_first_round_trip(a, b, distance, degrees * degree)).epsilon(tolerance));
      }
    }
  }
}

TEST_CASE("further round trips equal a dense determinant") {
  const SyntheticShell a{0.7, 1.5, 0.2}, b{0.4, 0.6, 0.1};
  const double distance = a.radius + b.radius + 0.4;
  const Nodes nodes = make_nodes(1e-5);
  Window window = crossed_window(a.radius, b.radius, distance, nodes);
  window.xi.count = 1;
  const Nodes own = nodes_on(window, nodes);
  const Scatterer first = a.scatterer(own, window), second = b.scatterer(own, window);
  for (const double degrees : {90.0, 65.0}) {
    const CrossedDensity trip = crossed_density(first, second, distance, degrees, window, false);
    const CrossedFurther further = crossed_further(first, second, distance, degrees, window, false);
    CHECK(further.positive);
    CHECK(further.angle_share == 0.0);
    const double dense = dense_further(a, b, distance, degrees * degree, 0.6, 0.003, 12);
    INFO(degrees << " degrees");
    CHECK(std::fabs(further.energy.full[0] - dense) <
          1e-4 * std::fabs(trip.first_round_trip.full[0]));
    CHECK(std::fabs(dense) > 0.005 * std::fabs(trip.first_round_trip.full[0]));
  }
}

TEST_CASE("exchanging crossed bodies changes nothing") {
  const Pair pair({10, 10}, {7, 2}, 0.34, 1e-4);
  for (const double degrees : {90.0, 50.0, 7.0}) {
    const CrossedDensity there = crossed_density(pair.first.scatterer, pair.second.scatterer,
                                                 pair.distance, degrees, pair.window, true);
    const CrossedDensity back = crossed_density(pair.second.scatterer, pair.first.scatterer,
                                                pair.distance, degrees, pair.window, true);
    CHECK(pair.sum(there.first_round_trip) ==
          Approx(pair.sum(back.first_round_trip)).epsilon(1e-12));
    CHECK(pair.sum(there.first_slope) == Approx(pair.sum(back.first_slope)).epsilon(1e-12));
  }
  const auto further = [&](const Body& a, const Body& b) {
    return pair.sum(
        crossed_further(a.scatterer, b.scatterer, pair.distance, 90.0, pair.window, false).energy);
  };
  // The two orders leave out other rows of the coupling.
  CHECK(further(pair.first, pair.second) == Approx(further(pair.second, pair.first)).epsilon(1e-3));
}

TEST_CASE("a body crossed with its own copy is the same as with itself") {
  const Pair pair({5, 5}, {5, 5}, 0.34, 1e-4);
  const auto energy = [&](const Body& other) {
    return crossed_density(pair.first.scatterer, other.scatterer, pair.distance, 33.0, pair.window,
                           false)
        .first_round_trip.full;
  };
  CHECK(energy(pair.first) == energy(pair.second));
}

TEST_CASE("energy times sine tends to parallel bodies over their lateral offset") {
  for (const double gap : {0.32, 1.5}) {
    const Pair pair({10, 10}, {8, 4}, gap, 1e-4);
    // ∫dy U₁(√(D² + y²)), y = gap·sinh u.
    double first = 0.0, further = 0.0;
    constexpr double step = 0.2;
    for (int i = 0; i < 36; ++i) {
      const double y = gap * std::sinh(i * step);
      const double distance = std::hypot(pair.distance, y);
      const ParallelDensity at = parallel_density(pair.first.scatterer, pair.second.scatterer,
                                                  distance, pair.window, false);
      const double dy = (i == 0 ? 1 : 2) * step * gap * std::cosh(i * step);
      first += dy * pair.sum(at.first_round_trip);
      further += dy * (pair.sum(at.energy) - pair.sum(at.first_round_trip));
    }
    double last = 1.0;
    for (const double degrees : {8.0, 4.0, 2.0, 1.0}) {
      const CrossedDensity density = crossed_density(pair.first.scatterer, pair.second.scatterer,
                                                     pair.distance, degrees, pair.window, false);
      const double off =
          pair.sum(density.first_round_trip) * std::sin(degrees * degree) / first - 1;
      INFO("gap " << gap << ", " << degrees << " degrees, off by " << off);
      CHECK(std::fabs(off) < std::max(0.7 * last, 5e-5));
      last = std::fabs(off);
    }
    CHECK(last < 2e-4);
    const CrossedFurther small = crossed_further(pair.first.scatterer, pair.second.scatterer,
                                                 pair.distance, 1.0, pair.window, false);
    CHECK(pair.sum(small.energy) * std::sin(degree) == Approx(further).epsilon(0.02));
    CHECK(small.angle_share < 5e-5);
  }
}

TEST_CASE("slopes of crossed bodies are derivatives by the distance") {
  const Pair pair({10, 10}, {9, 0}, 0.4, 1e-5);
  const double step = 2e-3;
  for (const double degrees : {90.0, 12.0}) {
    const auto first = [&](double distance, bool with_slope) {
      return crossed_density(pair.first.scatterer, pair.second.scatterer, distance, degrees,
                             pair.window, with_slope);
    };
    const auto energy = [&](double shift) {
      return pair.sum(first(pair.distance + shift, false).first_round_trip);
    };
    const double difference =
        (8 * (energy(step) - energy(-step)) - energy(2 * step) + energy(-2 * step)) / (12 * step);
    CHECK(pair.sum(first(pair.distance, true).first_slope) == Approx(difference).epsilon(1e-5));
  }
  const auto further = [&](double shift) {
    return crossed_further(pair.first.scatterer, pair.second.scatterer, pair.distance + shift, 90.0,
                           pair.window, shift == 0.0);
  };
  const double wide = 0.01;
  const double difference =
      (pair.sum(further(wide).energy) - pair.sum(further(-wide).energy)) / (2 * wide);
  CHECK(pair.sum(further(0.0).slope) == Approx(difference).epsilon(5e-3));
}

TEST_CASE("further round trips join where the angle leaves the grid") {
  for (const double gap : {0.34, 2.0}) {
    const Pair pair({6, 6}, {6, 6}, gap, 1e-4);
    const double radius = pair.first.tube.radius_nm;
    const double lowest = lowest_grid_angle_deg(radius, radius, pair.distance);
    CHECK(lowest >= 15.0);
    CHECK(lowest <= 45.0);
    const auto share = [&](double degrees) {
      const auto& s = pair.first.scatterer;
      return pair.sum(crossed_further(s, s, pair.distance, degrees, pair.window, false).energy) /
             pair.sum(crossed_density(s, s, pair.distance, degrees, pair.window, false)
                          .first_round_trip);
    };
    CHECK(share(lowest * 0.999) == Approx(share(lowest)).margin(5e-5));
  }
}

TEST_CASE("crossed bodies that touch and angles out of range are refused") {
  const Pair pair({5, 5}, {5, 5}, 0.34, 1e-3);
  const auto& s = pair.first.scatterer;
  CHECK_THROWS_AS(crossed_window(0.5, 0.5, 1.0, pair.nodes), std::domain_error);
  for (const double degrees : {0.5, 90.5, -3.0, std::nan("")}) {
    CHECK_THROWS_AS(crossed_density(s, s, pair.distance, degrees, pair.window, false),
                    std::domain_error);
    CHECK_THROWS_AS(crossed_further(s, s, pair.distance, degrees, pair.window, false),
                    std::domain_error);
  }
  CHECK_THROWS_AS(crossed_density(s, s, 2 * s.radius_nm(), 90.0, pair.window, false),
                  std::domain_error);
}
