// A shell of constant polarisability, known at every wave number, for tests of the joins.
#pragma once

#include <gapwright/math/bessel.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <cmath>
#include <vector>

struct SyntheticShell {
  double radius = 0.7;
  double strength = 1.5;  // α [nm]
  double normal = 0.2;    // α_⊥ [nm]

  /// The scatterer on a window, one frequency or more, all alike.
  gapwright::Scatterer scatterer(const gapwright::Nodes& nodes,
                                 const gapwright::Window& window) const {
    using namespace gapwright;
    Background background;
    background.in_plane_strength_nm = 0.0;
    background.normal_strength_nm = normal;
    background.normal_energy_eV = 1e12;
    ShellResponse response(radius, nodes, window);
    for (int j = 0; j < window.q.count; ++j) {
      const double q = nodes.q.node(window.q.first + j);
      for (int m = 0; m < window.orders[std::size_t(j)]; ++m)
        for (double& value : response.cell(j, m))
          value = strength * (q * q + m * m / (radius * radius));
    }
    return shell_scatterer(Channel::outward, response, background, window);
  }

  /// ln T_m(q), m = 0 … count-1, by METHODS (4.1), (4.2).
  std::vector<double> log_t(double q, int count) const {
    const double x = q * radius;
    const gapwright::BesselLogs w = gapwright::bessel_logs(x, count);
    std::vector<double> logs;
    for (std::size_t m = 0; m < std::size_t(count); ++m) {
      const double order = double(m);
      const double a = strength * (q * q + order * order / (radius * radius));
      const double p = a / (1 + a * radius * std::exp(w.log_i[m] + w.log_k[m]));
      const double dipole = normal * q * q * w.slope_i[m] * w.slope_i[m];
      logs.push_back(std::log(radius * (p + dipole)) + 2 * w.log_i[m]);
    }
    return logs;
  }

  /// e^{-2k·depth} Σ_m T_m(q) [(k + k_⊥)/q]^{2m}, m of both signs.
  double mirror(double q, double across, double depth, int count) const {
    const double k = std::hypot(q, across), eta = std::asinh(std::fabs(across) / q);
    const std::vector<double> logs = log_t(q, count);
    double sum = 0.0;
    for (int m = 0; m < count; ++m)
      sum += std::exp(logs[std::size_t(m)] + 2 * m * eta - 2 * k * depth) *
             (m == 0 ? 1.0 : 1.0 + std::exp(-4 * m * eta));
    return sum;
  }
};
