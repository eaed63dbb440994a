// A shell between vacuum and a liquid against its boundary problem.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/bessel.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <cmath>
#include <random>
#include <vector>

#include <Eigen/Dense>
#include <boost/math/special_functions/bessel.hpp>
#include <boost/math/special_functions/bessel_prime.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

struct Waves {
  Waves(int m, double q, double r)
      : i(boost::math::cyl_bessel_i(m, q * r)),
        k(boost::math::cyl_bessel_k(m, q * r)),
        di(q * boost::math::cyl_bessel_i_prime(m, q * r)),
        dk(q * boost::math::cyl_bessel_k_prime(m, q * r)) {}
  double i, k, di, dk;  // functions and derivatives by r
};

struct Wall {
  double epsilon;   // outside; vacuum inside
  double strength;  // αQ²
  double normal;    // α_⊥
};

/// I and K in units of their values at the wall, so that amplitudes are of order one.
Waves at_wall(int m, double q, double r) {
  Waves w(m, q, r);
  w.di /= w.i;
  w.dk /= w.k;
  w.i = w.k = 1.0;
  return w;
}

/// Amplitudes of I inside and of K outside.
struct Amplitudes {
  double inside, outside;
};

/// Matching at the wall: a·I inside, b·K outside, besides the incident wave whose potential and
/// normal derivative are given on either side (zero where it does not exist). φ jumps by `jump`
/// outwards, ε φ' by charge·φ(inside).
Amplitudes match(const Waves& w, const Wall& wall, double phi_in, double slope_in, double phi_out,
                 double slope_out, double charge, double jump) {
  Eigen::Matrix2d matrix;
  Eigen::Vector2d right;
  // b K + phi_out - a I - phi_in = jump
  matrix.row(0) << -w.i, w.k;
  right(0) = jump + phi_in - phi_out;
  // ε(b K' + slope_out) - (a I' + slope_in) = charge·(a I + phi_in)
  matrix.row(1) << -w.di - charge * w.i, wall.epsilon * w.dk;
  right(1) = slope_in - wall.epsilon * slope_out + charge * phi_in;
  const Eigen::Vector2d x = matrix.fullPivLu().solve(right);
  return {x(0), x(1)};
}

/// Bare edge, charges that answer the potential at the wall, and a dipole layer that answers the
/// normal displacement the bare edge has ("per applied field"): what each adds to the bare edge.
Amplitudes direct(const Waves& w, const Wall& wall, bool from_outside) {
  const double phi_in = from_outside ? 0.0 : w.k, slope_in = from_outside ? 0.0 : w.dk;
  const double phi_out = from_outside ? w.i : 0.0, slope_out = from_outside ? w.di : 0.0;
  const auto solve = [&](double charge, double jump) {
    return match(w, wall, phi_in, slope_in, phi_out, slope_out, charge, jump);
  };
  const Amplitudes bare = solve(0.0, 0.0);
  const double displacement = bare.inside * w.di + slope_in;
  const Amplitudes charged = solve(wall.strength, 0.0);
  const Amplitudes layer = solve(0.0, -wall.normal * displacement);
  return {charged.inside + layer.inside - bare.inside,
          charged.outside + layer.outside - bare.outside};
}

Medium constant(double epsilon) {
  Medium medium;
  if (epsilon != 1) medium.oscillators = {{1e9, (epsilon - 1) * 1e18, 0.0}};
  return medium;
}

struct Cell {
  Nodes nodes = make_nodes(1e-4);
  Window window;
  Background background;
  double q;

  Cell(double wave, int orders, double normal)
      : window{{nodes.q.index_below(wave), 1}, {}, {0, 1}} {
    window.orders = {orders};
    q = nodes.q.node(window.q.first);
    background.in_plane_strength_nm = 0.0;
    background.normal_strength_nm = normal;
    background.normal_energy_eV = 1e9;
  }
  ShellResponse response(double radius, const std::vector<double>& strengths) const {
    ShellResponse r(radius, nodes, window);
    for (std::size_t m = 0; m < strengths.size(); ++m) r.cell(0, int(m))[0] = strengths[m];
    return r;
  }
};

double value(const Scatterer& s, int m) {
  return s.reduced(0, m)[0] * std::exp(s.log_scale(0, m));
}

}  // namespace

TEST_CASE("a shell in a liquid solves its boundary problem") {
  std::mt19937 random(11);
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  constexpr int orders = 8;
  bool negative = false;
  for (int trial = 0; trial < 200; ++trial) {
    const double epsilon = trial % 4 == 0 ? 1.0 : std::exp(5 * unit(random));
    const Cell cell(std::exp(7 * unit(random) - 4), orders, 0.3 * unit(random));
    const double radius = 0.2 + 2 * unit(random);
    std::vector<double> strengths;
    for (int m = 0; m < orders; ++m)
      strengths.push_back(trial % 3 == 0 ? 0.01 * unit(random) : std::exp(8 * unit(random) - 3));
    const ShellResponse response = cell.response(radius, strengths);
    const auto make = [&](Channel channel) {
      return liquid_shell_scatterer(channel, response, cell.background, constant(epsilon),
                                    cell.window);
    };
    const Scatterer outward = make(Channel::outward), inward = make(Channel::inward),
                    through = make(Channel::through);
    for (int m = 0; m < orders; ++m) {
      const Waves w = at_wall(m, cell.q, radius);
      const Wall wall{constant(epsilon).permittivity(cell.nodes.xi.node(0)),
                      strengths[std::size_t(m)], cell.background.normal_nm(cell.nodes.xi.node(0))};
      const Amplitudes outside = direct(w, wall, true), inside = direct(w, wall, false);
      INFO("epsilon " << epsilon << " q " << cell.q << " R " << radius << " m " << m);
      // Where parts cancel, the boundary problem too is only as good as the largest of them.
      CHECK(outward.reduced(0, m)[0] == Approx(-outside.outside).epsilon(1e-10).margin(1e-13));
      CHECK(inward.reduced(0, m)[0] == Approx(-inside.inside).epsilon(1e-10).margin(1e-13));
      CHECK(outward.log_scale(0, m) == -inward.log_scale(0, m));
      CHECK(std::exp(outward.log_scale(0, m)) ==
            Approx(boost::math::cyl_bessel_i(m, cell.q * radius) /
                   boost::math::cyl_bessel_k(m, cell.q * radius))
                .epsilon(1e-11));
      // What passes in differs from what passes out by ε, the flux of a wave.
      CHECK(outside.inside == Approx(epsilon * inside.outside).epsilon(1e-9));
      CHECK(1 - value(through, m) ==
            Approx(std::copysign(std::sqrt(outside.inside * inside.outside), outside.inside))
                .epsilon(1e-10)
                .margin(1e-12));
      negative = negative || outward.reduced(0, m)[0] < 0;
    }
  }
  CHECK(negative);
}

TEST_CASE("without a liquid a shell in a liquid is the shell") {
  const Cell cell(1.7, 12, 0.208);
  std::vector<double> strengths;
  for (int m = 0; m < 12; ++m) strengths.push_back(3.0 + 2 * m);
  const ShellResponse response = cell.response(0.7, strengths);
  for (const Channel channel : {Channel::outward, Channel::inward, Channel::through}) {
    const Scatterer plain = shell_scatterer(channel, response, cell.background, cell.window);
    const Scatterer liquid =
        liquid_shell_scatterer(channel, response, cell.background, Medium{}, cell.window);
    for (int m = 0; m < 12; ++m) {
      CHECK(liquid.log_scale(0, m) == plain.log_scale(0, m));
      CHECK(liquid.reduced(0, m)[0] == Approx(plain.reduced(0, m)[0]).epsilon(1e-14));
    }
  }
}

TEST_CASE("walls in walls in a liquid solve their boundary problem") {
  // Charges only: a·I | b·I + c·K | I - T·K.
  const double epsilon = 5.3, inner = 0.5, outer = 0.9;
  const Cell cell(1.3, 6, 0.0);
  const std::vector<double> a{2, 5, 9, 14, 20, 30}, b{1, 3, 4, 8, 16, 33};
  const ShellResponse first = cell.response(inner, a), second = cell.response(outer, b);
  const auto make = [&](Channel channel) {
    return liquid_shell_scatterer(channel, second, cell.background, constant(epsilon), cell.window);
  };
  const Scatterer whole =
      enclosed(shell_scatterer(Channel::outward, first, cell.background, cell.window),
               make(Channel::outward), make(Channel::inward), make(Channel::through), cell.window);
  for (int m = 0; m < 6; ++m) {
    const Waves w(m, cell.q, inner), v(m, cell.q, outer);
    const double s = a[std::size_t(m)], t = b[std::size_t(m)];
    Eigen::Matrix4d matrix;
    matrix << w.i, -w.i, -w.k, 0,        //
        -w.di - s * w.i, w.di, w.dk, 0,  //
        0, v.i, v.k, v.k,                //
        0, -v.di - t * v.i, -v.dk - t * v.k, -epsilon * v.dk;
    const Eigen::Vector4d right(0, 0, v.i, -epsilon * v.di);
    const double exact = matrix.fullPivLu().solve(right)(3);
    CHECK(value(whole, m) == Approx(exact).epsilon(1e-10));
  }
}

// T_0 changes its sign along q and ξ: interpolation and determinants have to bear it.
TEST_CASE("crossed tubes in water tend to parallel ones over their lateral offset") {
  const Catalogs& catalogs = Catalogs::built_in();
  const Tube tube = make_tube({10, 10});
  const double distance = tube.diameter_nm() + 0.7;
  const Nodes nodes = make_nodes(1e-4);
  const Window window = crossed_window(tube.radius_nm, tube.radius_nm, distance, nodes);
  const Scatterer body = liquid_shell_scatterer(
      Channel::outward,
      tube_response(tube, catalogs.hopping(), {}, nodes_on(window, nodes), window),
      catalogs.background(), catalogs.medium("water"), window);
  bool negative = false, positive = false;
  for (int j = 0; j < window.q.count; ++j)
    for (const double value : body.reduced(j, 0)) (value < 0 ? negative : positive) = true;
  CHECK((negative && positive));
  const auto sum = [&](const FrequencyDensity& d) {
    return frequency_sum(d, nodes, window.xi, {}).value;
  };
  double limit = 0.0;
  constexpr double step = 0.25;
  for (int i = 0; i < 28; ++i) {
    const double y = 0.7 * std::sinh(i * step);
    limit +=
        (i == 0 ? 1 : 2) * step * 0.7 * std::cosh(i * step) *
        sum(parallel_density(body, body, std::hypot(distance, y), window, false).first_round_trip);
  }
  const double crossed =
      sum(crossed_density(body, body, distance, 1.0, window, false).first_round_trip);
  CHECK(limit < 0);
  CHECK(crossed * std::sin(constants::pi / 180) == Approx(limit).epsilon(2e-4));
  const CrossedFurther further = crossed_further(body, body, distance, 90.0, window, false);
  CHECK(further.positive);
  CHECK(sum(further.energy) < 0);
}
