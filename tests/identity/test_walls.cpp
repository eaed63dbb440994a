// The wall recursion against a direct determinant of coupled charges and dipoles.
#include <gapwright/join/coaxial.hpp>
#include <gapwright/math/bessel.hpp>

#include <random>
#include <vector>

#include <Eigen/Dense>
#include <boost/math/special_functions/bessel.hpp>
#include <boost/math/special_functions/bessel_prime.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Wall {
  double radius, strength, normal;  // R, αQ², α_⊥
};

/// ln det of the response of charges c_i and normal dipoles d_i at (m, q), less the isolated walls:
/// c_i = -A_i φ(R_i), d_i = -α_⊥ ∂φ/∂r from the other walls, φ of a charge R_j I_<K_>, of a dipole
/// its derivative by R_j.
double direct_energy(const std::vector<Wall>& walls, int m, double q) {
  const auto i = [&](double r) { return boost::math::cyl_bessel_i(m, q * r); };
  const auto k = [&](double r) { return boost::math::cyl_bessel_k(m, q * r); };
  const auto di = [&](double r) { return q * boost::math::cyl_bessel_i_prime(m, q * r); };
  const auto dk = [&](double r) { return q * boost::math::cyl_bessel_k_prime(m, q * r); };
  const Eigen::Index n = Eigen::Index(walls.size());
  Eigen::MatrixXd matrix = Eigen::MatrixXd::Identity(2 * n, 2 * n);
  double isolated = 0.0;
  for (Eigen::Index a = 0; a < n; ++a) {
    const Wall& on = walls[std::size_t(a)];
    for (Eigen::Index b = 0; b < n; ++b) {
      const Wall& from = walls[std::size_t(b)];
      const bool outside = on.radius > from.radius;
      const double r = on.radius, s = from.radius;
      const double here = outside ? k(r) : i(r), there = outside ? i(s) : k(s);
      const double here_slope = outside ? dk(r) : di(r), there_slope = outside ? di(s) : dk(s);
      if (a == b) {
        const double self = on.strength * r * i(r) * k(r);
        matrix(2 * a, 2 * a) += self;
        isolated += std::log1p(self);
        continue;
      }
      matrix(2 * a, 2 * b) += on.strength * s * here * there;
      matrix(2 * a, 2 * b + 1) += on.strength * s * here * there_slope;
      matrix(2 * a + 1, 2 * b) += on.normal * s * here_slope * there;
      matrix(2 * a + 1, 2 * b + 1) += on.normal * s * here_slope * there_slope;
    }
  }
  return std::log(matrix.determinant()) - isolated;
}

}  // namespace

TEST_CASE("walls in walls equal the determinant of coupled charges and dipoles") {
  std::mt19937 random(7);
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  Nodes nodes = make_nodes(1e-4);
  Background background;
  background.in_plane_strength_nm = 0.0;
  for (int trial = 0; trial < 40; ++trial) {
    const int count = 2 + trial % 3;
    const int orders = 6;
    Window window{{nodes.q.index_below(0.05 + 4 * unit(random)), 1}, {orders}, {0, 1}};
    const double q = nodes.q.node(window.q.first);
    background.normal_strength_nm = 0.3 * unit(random);
    background.normal_energy_eV = 1e9;  // the static value at any ξ here
    std::vector<Wall> walls;
    std::vector<ShellResponse> responses;
    double radius = 0.3 + unit(random);
    for (int w = 0; w < count; ++w) {
      responses.emplace_back(radius, nodes, window);
      radius += 0.2 + 0.4 * unit(random);
    }
    for (int m = 0; m < orders; ++m) {
      walls.clear();
      for (ShellResponse& response : responses) {
        const double strength = 0.1 + 50 * unit(random);
        response.cell(0, m)[0] = strength;
        walls.push_back({response.radius_nm(), strength, background.normal_strength_nm});
      }
      Scatterer inside = shell_scatterer(Channel::outward, responses[0], background, window);
      double energy = 0.0;
      for (std::size_t w = 1; w < responses.size(); ++w) {
        const auto make = [&](Channel c) {
          return shell_scatterer(c, responses[w], background, window);
        };
        const Scatterer around = make(Channel::inward);
        energy += std::log1p(-inside.reduced(0, m)[0] * around.reduced(0, m)[0] *
                             std::exp(inside.log_scale(0, m) + around.log_scale(0, m)));
        inside = enclosed(inside, make(Channel::outward), around, make(Channel::through), window);
      }
      CHECK(energy == Approx(direct_energy(walls, m, q)).epsilon(1e-12).margin(1e-13));
    }
  }
}

TEST_CASE("gap slope is the derivative of the energy at fixed response per area") {
  const Nodes nodes = make_nodes(1e-4);
  Background background;
  background.in_plane_strength_nm = 0.0;
  background.normal_strength_nm = 0.2;
  background.normal_energy_eV = 1e9;
  const double middle = 1.0, gap = 0.35, step = 1e-4;
  const Window window = coaxial_window(middle - gap / 2, middle + gap / 2, nodes);
  const auto density = [&](double g) {
    ShellResponse inner(middle - g / 2, nodes, window), outer(middle + g / 2, nodes, window);
    for (int j = 0; j < window.q.count; ++j)
      for (int m = 0; m < window.orders[std::size_t(j)]; ++m)
        for (int k = 0; k < window.xi.count; ++k) {
          inner.cell(j, m)[std::size_t(k)] = 5.0 + 0.1 * j + m;
          outer.cell(j, m)[std::size_t(k)] = 7.0 + 0.2 * j + 2 * m;
        }
    return coaxial_density(shell_scatterer(Channel::outward, inner, background, window),
                           shell_scatterer(Channel::inward, outer, background, window), window,
                           true);
  };
  const CoaxialDensity at = density(gap), less = density(gap - step), more = density(gap + step);
  const double difference = (more.energy.full[3] - less.energy.full[3]) / (2 * step);
  CHECK(at.gap_slope.full[3] == Approx(difference).epsilon(1e-6));
}
