// The blocks of a retarded shell against Maxwell's boundary conditions, solved as they stand.
#include <gapwright/shell/retarded_shell.hpp>

#include <cmath>

#include <Eigen/Dense>
#include <boost/math/special_functions/bessel.hpp>
#include <boost/math/special_functions/bessel_prime.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

using Real = long double;
using Vector4 = Eigen::Matrix<Real, 4, 1>;
using Matrix2 = Eigen::Matrix<Real, 2, 2>;
using Columns = Eigen::Matrix<Real, 4, 2>;

/// A wave and its derivative by r at a wall.
struct Radial {
  Real value, slope;
};

Radial regular(const RetardedCell& c, Real kappa, Real radius) {
  const Real x = kappa * radius;
  return {boost::math::cyl_bessel_i(c.order, x),
          kappa * boost::math::cyl_bessel_i_prime(c.order, x)};
}

Radial outgoing(const RetardedCell& c, Real kappa, Real radius) {
  const Real x = kappa * radius;
  return {boost::math::cyl_bessel_k(c.order, x),
          kappa * boost::math::cyl_bessel_k_prime(c.order, x)};
}

Real kappa_of(const RetardedCell& c) {
  return std::hypot(Real(c.wave_per_nm), Real(c.delay_per_nm));
}

/// (E_z, E_φ, H_z, H_φ) at r = radius of a TM and a TE wave of amplitude one, METHODS (9.2).
Columns fields(const RetardedCell& c, Real radius, const Radial& f) {
  const Real q = c.wave_per_nm, s = c.delay_per_nm, kappa2 = kappa_of(c) * kappa_of(c);
  const Real around = q * c.order / radius;
  Columns all;
  all << f.value, 0,                                     //
      around * f.value / kappa2, -s * f.slope / kappa2,  //
      0, f.value,                                        //
      s * f.slope / kappa2, around * f.value / kappa2;
  return all;
}

/// What the current of a sheet makes of the fields at its inner side: the jumps of METHODS (9.3).
Columns jumps(const RetardedCell& c, const Columns& inside) {
  const Real strength = Real(c.delay_per_nm) * c.strength_nm;
  Columns all = Columns::Zero();
  all.row(2) = -strength * inside.row(1);
  all.row(3) = strength * inside.row(0);
  return all;
}

/// Jumps of (E_z, E_φ) across a layer of dipoles α_⊥E_r of the wave that comes in. From
/// ∇×E = -sH with E_r = -i[qE_z' - (ms/r)H_z]/κ².
Columns dipole_jumps(const RetardedCell& c, const Radial& f) {
  const Real q = c.wave_per_nm, s = c.delay_per_nm, radius = c.radius_nm;
  const Real kappa2 = kappa_of(c) * kappa_of(c);
  Columns all = Columns::Zero();
  const Real normal[2] = {q * f.slope, -c.order * s / radius * f.value};
  for (int wave = 0; wave < 2; ++wave) {
    all(0, wave) = -q * c.normal_nm * normal[wave] / kappa2;
    all(1, wave) = -c.order / radius * c.normal_nm * normal[wave] / kappa2;
  }
  return all;
}

/// Amplitudes that a single wall sends back, times -1; the TE amplitude of K counts downwards.
Matrix2 solved(Channel channel, const RetardedCell& c, bool dipoles) {
  const Real radius = c.radius_nm, kappa = kappa_of(c);
  const Radial i = regular(c, kappa, radius), k = outgoing(c, kappa, radius);
  const Columns of_i = fields(c, radius, i), of_k = fields(c, radius, k);
  const bool outward = channel == Channel::outward;
  // Outward: inside c·I, outside a·I + b·K. Inward: inside a·K + b·I, outside c·K.
  // outside - inside = jumps(inside).
  Eigen::Matrix<Real, 4, 4> system;
  Columns right;
  if (outward) {
    system << of_k, -(of_i + jumps(c, of_i));
    right = -of_i;
  } else {
    system << -(of_i + jumps(c, of_i)), of_k;
    right = of_k + jumps(c, of_k);
  }
  if (dipoles) right += dipole_jumps(c, outward ? i : k);
  const Columns amplitudes = system.fullPivLu().solve(right);
  Matrix2 t = -amplitudes.topRows<2>();
  if (outward)
    t.row(1) *= -1;
  else
    t.col(1) *= -1;
  return t;
}

Matrix2 ours(Channel channel, const RetardedCell& c) {
  const BesselLogs waves = bessel_logs(double(kappa_of(c)) * c.radius_nm, c.order + 1);
  const RetardedBlock b = retarded_block(channel, c, waves);
  Matrix2 t;
  t << b.reduced.tm, b.reduced.mixed, b.reduced.mixed, b.reduced.te;
  return t * std::exp(Real(b.log_scale));
}

void check_close(const Matrix2& a, const Matrix2& b, Real accuracy) {
  // TM and TE have units of their own: each entry against its diagonal.
  for (int i = 0; i < 2; ++i)
    for (int j = 0; j < 2; ++j)
      CHECK(std::fabs(double(a(i, j) - b(i, j))) <=
            double(accuracy * std::sqrt(std::fabs(b(i, i) * b(j, j)))));
}

const RetardedCell cells[] = {
    {0, 0.4, 0.3, 0.7, 2.0, 0.0},     {1, 0.4, 0.3, 0.7, 2.0, 0.0}, {3, 2.0, 5.0, 1.3, 0.5, 0.0},
    {5, 0.01, 0.9, 2.2, 30.0, 0.0},   {2, 1.0, 1e-3, 0.6, 9., 0.0}, {9, 3.0, 0.2, 1.1, 0.02, 0.0},
    {1, 0.003, 0.05, 50., 400., 0.0},
};

/// |boundary conditions| of two walls, columns scaled by the waves themselves.
Real determinant(const RetardedCell& c, Real inner_strength, Real outer_radius,
                 Real outer_strength) {
  const Real kappa = kappa_of(c), inner_radius = c.radius_nm;
  RetardedCell one = c, two = c;
  one.strength_nm = double(inner_strength);
  two.strength_nm = double(outer_strength);
  const Radial i1 = regular(c, kappa, inner_radius), k1 = outgoing(c, kappa, inner_radius);
  const Radial i2 = regular(c, kappa, outer_radius), k2 = outgoing(c, kappa, outer_radius);
  Eigen::Matrix<Real, 8, 8> system = Eigen::Matrix<Real, 8, 8>::Zero();
  const Columns inside = fields(one, inner_radius, i1);
  system.block<4, 2>(0, 0) = -(inside + jumps(one, inside));
  system.block<4, 2>(0, 2) = inside;
  system.block<4, 2>(0, 4) = fields(one, inner_radius, k1);
  const Columns i_at_outer = fields(two, outer_radius, i2),
                k_at_outer = fields(two, outer_radius, k2);
  system.block<4, 2>(4, 2) = -(i_at_outer + jumps(two, i_at_outer));
  system.block<4, 2>(4, 4) = -(k_at_outer + jumps(two, k_at_outer));
  system.block<4, 2>(4, 6) = k_at_outer;
  return system.fullPivLu().determinant();
}

}  // namespace

TEST_CASE("retarded shells solve the boundary conditions") {
  for (const RetardedCell& cell : cells)
    for (const Channel channel : {Channel::outward, Channel::inward}) {
      INFO("m " << cell.order << ", q " << cell.wave_per_nm << ", s " << cell.delay_per_nm);
      check_close(ours(channel, cell), solved(channel, cell, false), 1e-12L);
      // Dipoles answer the incident wave only: they add up with the current.
      RetardedCell dipoles = cell;
      dipoles.strength_nm = 0.0;
      dipoles.normal_nm = 0.2;
      check_close(ours(channel, dipoles), solved(channel, dipoles, true), 1e-12L);
      RetardedCell both = cell;
      both.normal_nm = 0.2;
      check_close(ours(channel, both), ours(channel, cell) + ours(channel, dipoles), 1e-13L);
    }
}

TEST_CASE("two retarded walls have the raw determinant of their boundary conditions") {
  for (const RetardedCell& cell : cells)
    for (const double ratio : {1.03, 1.4, 3.0}) {
      RetardedCell outer = cell;
      outer.radius_nm *= ratio;
      outer.strength_nm *= 1.7;
      const Real radius = outer.radius_nm, a = cell.strength_nm, b = outer.strength_nm;
      const Real raw = determinant(cell, a, radius, b) / determinant(cell, a, radius, 0) *
                       (determinant(cell, 0, radius, 0) / determinant(cell, 0, radius, b));
      const Matrix2 one =
          Matrix2::Identity() - ours(Channel::outward, cell) * ours(Channel::inward, outer);
      INFO("m " << cell.order << ", q " << cell.wave_per_nm << ", ratio " << ratio);
      CHECK(double(one.determinant() / raw) == Approx(1.0).margin(1e-12));
    }
}

TEST_CASE("the determinant of a retarded block is that of its entries") {
  for (RetardedCell cell : cells)
    for (const Channel channel : {Channel::outward, Channel::inward}) {
      cell.normal_nm = 0.2;
      const double kappa = std::hypot(cell.wave_per_nm, cell.delay_per_nm);
      const RetardedBlock b =
          retarded_block(channel, cell, bessel_logs(kappa * cell.radius_nm, cell.order + 1));
      const double diagonal = b.reduced.tm * b.reduced.te;
      CHECK(b.determinant ==
            Approx(diagonal - b.reduced.mixed * b.reduced.mixed).margin(1e-14 * diagonal));
      CHECK(b.determinant > 0);
    }
}

TEST_CASE("an ideal metal turns every wave back") {
  for (RetardedCell cell : cells) {
    cell.strength_nm = 1e30;
    const double x = std::hypot(cell.wave_per_nm, cell.delay_per_nm) * cell.radius_nm;
    const BesselLogs waves = bessel_logs(x, cell.order + 1);
    const auto m = std::size_t(cell.order);
    const double te = waves.slope_i[m] / -waves.slope_k[m];
    const RetardedBlock out = retarded_block(Channel::outward, cell, waves);
    const RetardedBlock in = retarded_block(Channel::inward, cell, waves);
    CHECK(out.reduced.tm == Approx(1.0).epsilon(1e-13));
    CHECK(out.reduced.te == Approx(te).epsilon(1e-13));
    CHECK(in.reduced.tm == Approx(1.0).epsilon(1e-13));
    CHECK(in.reduced.te == Approx(1 / te).epsilon(1e-13));
    CHECK(std::fabs(out.reduced.mixed) < 1e-13);
    CHECK(std::fabs(in.reduced.mixed) < 1e-13);
  }
}

TEST_CASE("without delay a retarded shell is the potential's, in value and slope") {
  const Nodes nodes = make_nodes(1e-4);
  Window window;
  window.q = {-6, 6};
  window.orders.assign(6, 5);
  window.xi = {2, 1};
  ShellResponse response(0.8, nodes, window);
  for (int j = 0; j < window.q.count; ++j)
    for (int m = 0; m < 5; ++m) response.cell(j, m)[0] = 0.3 + 0.1 * j + 2.0 * m;
  Background background;
  background.in_plane_strength_nm = 0.4;
  background.in_plane_energy_eV = 13.0;
  background.normal_strength_nm = 0.2;
  background.normal_energy_eV = 32.0;
  // ξ/ħc underflows to nothing.
  const RetardedShell shell(response, background, {1e200});
  for (const Channel channel : {Channel::outward, Channel::inward}) {
    const Scatterer usual = shell_scatterer(channel, response, background, window);
    std::vector<RetardedBlock> blocks(5);
    for (int j = 0; j < window.q.count; ++j) {
      shell.blocks(channel, j, 0, blocks);
      for (int m = 0; m < 5; ++m) {
        const RetardedBlock& b = blocks[std::size_t(m)];
        CHECK(b.log_scale == Approx(usual.log_scale(j, m)).epsilon(1e-13));
        CHECK(b.reduced.tm == Approx(usual.reduced(j, m)[0]).epsilon(1e-13));
        CHECK(b.radius_slope.tm / b.reduced.tm ==
              Approx(usual.radius_slope(j, m)[0]).epsilon(1e-11));
        CHECK(std::fabs(b.reduced.te) < 1e-100);
        CHECK(b.determinant < 1e-100);
      }
    }
  }
}

// The same matrices written out, (αQ²) and α_⊥ kept while the radius moves.
TEST_CASE("the radius slope of retarded blocks is a derivative") {
  const auto displaced = [](Channel channel, const RetardedCell& c, Real radius) {
    const Real kappa = kappa_of(c), s = c.delay_per_nm, q = c.wave_per_nm;
    const Real h = q * c.order / (kappa * radius);
    const auto wave2 = [&](Real r) { return q * q + (c.order / r) * (c.order / r); };
    const Real strength = c.strength_nm * wave2(c.radius_nm) / wave2(radius);
    const Radial i = regular(c, kappa, radius), k = outgoing(c, kappa, radius);
    Matrix2 m, g = Matrix2::Zero(), d = Matrix2::Zero();
    m << kappa * kappa + h * h, -s * h, -s * h, s * s;
    m *= strength * radius;
    g(0, 0) = i.value * k.value;
    g(1, 1) = -i.slope * k.slope / (kappa * kappa);
    const bool outward = channel == Channel::outward;
    d(0, 0) = outward ? i.value : k.value;
    d(1, 1) = (outward ? i.slope : -k.slope) / kappa;
    Eigen::Matrix<Real, 2, 1> normal;
    normal << q * d(1, 1), -c.order * s / (kappa * radius) * d(0, 0);
    const Matrix2 p = (Matrix2::Identity() + m * g).inverse() * m;
    return Matrix2(d * p * d + c.normal_nm * radius * normal * normal.transpose());
  };
  for (RetardedCell cell : cells)
    for (const Channel channel : {Channel::outward, Channel::inward}) {
      cell.normal_nm = 0.2;
      const Real step = 1e-6L * cell.radius_nm, radius = cell.radius_nm;
      const Matrix2 slope =
          (displaced(channel, cell, radius + step) - displaced(channel, cell, radius - step)) /
          (2 * step);
      const double kappa = double(kappa_of(cell));
      const RetardedBlock b =
          retarded_block(channel, cell, bessel_logs(kappa * cell.radius_nm, cell.order + 1));
      Matrix2 exact;
      exact << b.radius_slope.tm, b.radius_slope.mixed, b.radius_slope.mixed, b.radius_slope.te;
      exact *= std::exp(Real(b.log_scale));
      INFO("m " << cell.order << ", q " << cell.wave_per_nm);
      check_close(exact, slope, 1e-8L);
      check_close(displaced(channel, cell, radius), ours(channel, cell), 1e-12L);
    }
}

TEST_CASE("what a retarded block refuses") {
  CHECK_THROWS_AS(retarded_block(Channel::through, cells[0], bessel_logs(1.0, 1)),
                  std::invalid_argument);
}
