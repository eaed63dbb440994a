// Refining the tolerance or the lattice step: errors fall at the expected rate and stay below the
// estimates.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/lattice/candidates.hpp>

#include <algorithm>
#include <cmath>
#include <random>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Sums {
  Estimate energy;     // dispersion [eV/nm]
  Estimate gap_slope;  // [eV/nm²], two walls only
};

/// Dispersion of coaxial walls by METHODS (5.3), innermost first.
Sums walls_on(const std::vector<Tube>& walls, const Nodes& nodes) {
  const Background& background = Catalogs::built_in().background();
  std::vector<Window> windows;
  for (std::size_t k = 1; k < walls.size(); ++k)
    windows.push_back(coaxial_window(walls[k - 1].radius_nm, walls[k].radius_nm, nodes));
  Window all = windows.front();
  for (const Window& window : windows) all = united(all, window);
  std::vector<ShellResponse> responses;
  for (const Tube& wall : walls)
    responses.push_back(tube_response(wall, Catalogs::built_in().hopping(), {}, nodes, all));
  const auto shell = [&](std::size_t wall, Channel channel) {
    return shell_scatterer(channel, responses[wall], background, all);
  };
  Sums sums;
  Scatterer inside = shell(0, Channel::outward);
  for (std::size_t k = 1; k < walls.size(); ++k) {
    const Window& window = windows[k - 1];
    const Scatterer around = shell(k, Channel::inward);
    const CoaxialDensity density = coaxial_density(inside, around, window, walls.size() == 2);
    const Estimate part = frequency_sum(density.energy, nodes, window.xi, {});
    sums.energy = {sums.energy.value + part.value, sums.energy.error + part.error};
    if (walls.size() == 2)
      sums.gap_slope = frequency_sum(density.gap_slope, nodes, window.xi, {});
    else if (k + 1 < walls.size())
      inside =
          enclosed(inside, shell(k, Channel::outward), around, shell(k, Channel::through), all);
  }
  return sums;
}

/// Inner walls of 0.4 to 0.9 nm in outer ones at gaps of 0.28 to 0.5 nm.
std::vector<std::vector<Tube>> random_pairs(int count) {
  std::mt19937 random(20);
  TubeFilter filter;
  filter.diameter_nm = Interval{0.4, 0.9};
  const std::vector<Tube> inner = candidate_tubes(filter);
  std::vector<std::vector<Tube>> pairs;
  while (int(pairs.size()) < count) {
    const Tube& inside = inner[random() % inner.size()];
    filter.diameter_nm = Interval{inside.diameter_nm() + 0.56, inside.diameter_nm() + 1.0};
    const std::vector<Tube> outer = candidate_tubes(filter);
    pairs.push_back({inside, outer[random() % outer.size()]});
  }
  return pairs;
}

/// Checks one sum against a far finer one; its relative error.
double checked_error(const Estimate& ours, const Estimate& exact, double tolerance) {
  const double error = std::fabs(ours.value - exact.value);
  CHECK(error <= ours.error + exact.error);
  CHECK(ours.error <= tolerance * std::fabs(ours.value));
  return error / std::fabs(exact.value);
}

/// Slope of the least-squares line.
double line_slope(const std::vector<double>& x, const std::vector<double>& y) {
  double mean_x = 0, mean_y = 0, above = 0, below = 0;
  for (std::size_t i = 0; i < x.size(); ++i) {
    mean_x += x[i] / double(x.size());
    mean_y += y[i] / double(x.size());
  }
  for (std::size_t i = 0; i < x.size(); ++i) {
    above += (x[i] - mean_x) * (y[i] - mean_y);
    below += (x[i] - mean_x) * (x[i] - mean_x);
  }
  return above / below;
}

Nodes with_steps(double q_step, double xi_step) {
  Nodes nodes = make_nodes(1e-8);  // windows and responses that leave only the step to see
  nodes.q.step = q_step;
  nodes.xi.step = xi_step;
  return nodes;
}

}  // namespace

TEST_CASE("refining the tolerance lowers the errors, and the estimates bound them") {
  std::vector<std::vector<Tube>> rows = random_pairs(30);
  rows.push_back({make_tube({5, 5}), make_tube({10, 10}), make_tube({17, 12})});
  const std::vector<double> tolerances = {1e-2, 1e-3, 1e-4, 1e-5, 1e-6};
  std::vector<double> worst(tolerances.size(), 0.0);
  for (const std::vector<Tube>& walls : rows) {
    const Sums exact = walls_on(walls, make_nodes(1e-7));
    for (std::size_t t = 0; t < tolerances.size(); ++t) {
      const Sums ours = walls_on(walls, make_nodes(tolerances[t]));
      INFO(walls[0].label() << "@" << walls[1].label() << " at " << tolerances[t]);
      const double error = checked_error(ours.energy, exact.energy, tolerances[t]);
      worst[t] = std::max(worst[t], error);
      if (walls.size() == 2)
        CHECK(std::fabs(ours.gap_slope.value - exact.gap_slope.value) <=
              ours.gap_slope.error + exact.gap_slope.error);
    }
  }
  for (std::size_t t = 0; t < tolerances.size(); ++t) {
    INFO("worst at " << tolerances[t] << ": " << worst[t]);
    CHECK(worst[t] < 0.1 * tolerances[t]);
    if (t > 0) CHECK(worst[t] < 0.3 * worst[t - 1]);
  }
}

// Integrands analytic in a strip about the real axis of ln x: Trefethen & Weideman, SIAM Rev. 56,
// 385 (2014).
TEST_CASE("the trapezoids converge exponentially in the inverse step") {
  constexpr double finest = 0.25, fixed = 0.5;
  constexpr double floor = 1e-8;  // what the windows leave out
  for (const std::vector<Tube>& walls : {std::vector<Tube>{make_tube({5, 5}), make_tube({10, 10})},
                                         std::vector<Tube>{make_tube({6, 4}), make_tube({14, 5})}})
    for (const bool waves : {true, false}) {
      const auto energy = [&](double step) {
        return walls_on(walls, waves ? with_steps(step, fixed) : with_steps(fixed, step)).energy;
      };
      const double exact = energy(finest).value;
      std::vector<double> inverse_steps, logs;
      for (const double step : {1.2, 1.0, 0.8, 0.7, 0.6, 0.5, 0.45, 0.4}) {
        const double error = std::fabs(energy(step).value / exact - 1);
        INFO(walls[0].label() << (waves ? " waves" : " frequencies") << ", step " << step);
        CHECK(error < 20 * std::exp(-8 / step) + floor);
        inverse_steps.push_back(1 / step);
        logs.push_back(std::log(error + floor));
      }
      INFO(walls[0].label() << (waves ? " waves" : " frequencies"));
      const double rate = -line_slope(inverse_steps, logs);
      CHECK(rate > 6.1);  // what the lattice counts on
      CHECK(rate < 12);
    }
}
