// Symmetries of parallel rows: exchange, force against energy, walls inside.
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/bessel.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>

#include <Eigen/Dense>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Binder& binder() {
  static const Binder usual(Catalogs::built_in(), {});
  return usual;
}

Binding row(const std::string& first, const std::string& second, std::optional<double> gap) {
  return binder().bind(
      {Arrangement::parallel, parse_label(first).object, parse_label(second).object, gap});
}

/// (5.6) as it stands: one determinant of multipoles of both signs at each node.
double plain_energy(const Scatterer& a, const Scatterer& b, double distance, const Window& window) {
  const Nodes& nodes = a.nodes();
  const AxisWeights weights = trapezoid_weights(nodes.q, window.q, {});
  FrequencyDensity density;
  density.full.assign(std::size_t(window.xi.count), 0.0);
  density.halved = density.full;
  for (int j = 0; j < window.q.count; ++j) {
    const int most = window.orders[std::size_t(j)] - 1;
    const BesselLogs waves =
        bessel_logs(nodes.q.node(window.q.first + j) * distance, 2 * (most + 1));
    for (int k = 0; k < window.xi.count; ++k) {
      Eigen::MatrixXd c(2 * most + 1, 2 * most + 1);
      for (int m = -most; m <= most; ++m)
        for (int n = -most; n <= most; ++n) {
          const int u = std::abs(m), v = std::abs(n);
          const double scale = 0.5 * (a.log_scale(j, u) + b.log_scale(j, v));
          c(m + most, n + most) =
              std::sqrt(a.reduced(j, u)[std::size_t(k)] * b.reduced(j, v)[std::size_t(k)]) *
              std::exp(scale + waves.log_k[std::size_t(std::abs(m - n))]);
        }
      const Eigen::MatrixXd x = Eigen::MatrixXd::Identity(c.rows(), c.rows()) - c * c.transpose();
      const double log_det = 2 * Eigen::MatrixXd(x.llt().matrixL()).diagonal().array().log().sum();
      density.full[std::size_t(k)] += weights.full[std::size_t(j)] * log_det / M_PI;
    }
  }
  return frequency_sum(density, nodes, window.xi, {}).value;
}

}  // namespace

TEST_CASE("multipoles left out of further round trips are below 0.03 of the tolerance") {
  const Catalogs& catalogs = Catalogs::built_in();
  for (const auto& [first, second] :
       {std::pair{Chirality{5, 5}, Chirality{5, 5}}, {Chirality{8, 2}, Chirality{12, 0}}})
    for (const auto& [gap, tolerance] :
         {std::pair{0.22, 1e-4}, {0.33, 1e-4}, {2.0, 1e-4}, {0.33, 1e-3}}) {
      const Tube a = make_tube(first), b = make_tube(second);
      const double distance = a.radius_nm + b.radius_nm + gap;
      const Window window =
          parallel_window(a.radius_nm, b.radius_nm, distance, make_nodes(tolerance));
      const Nodes nodes = nodes_on(window, make_nodes(tolerance));
      const auto scatterer = [&](const Tube& tube) {
        return shell_scatterer(Channel::outward,
                               tube_response(tube, catalogs.hopping(), {}, nodes, window),
                               catalogs.background(), window);
      };
      const Scatterer one = scatterer(a), other = scatterer(b);
      const ParallelCoupling coupling(one, other, distance, window, false);
      const auto sum = [&](const FrequencyDensity& d) {
        return frequency_sum(d, nodes, window.xi, {}).value;
      };
      INFO(a.label() << " " << b.label() << " at " << gap << ", " << tolerance);
      CHECK(sum(coupling.density(one, other).energy) ==
            Approx(plain_energy(one, other, distance, window)).epsilon(0.03 * tolerance));
      const ParallelDensity only = coupling.density(one, other, FurtherTrips::left_out);
      CHECK(sum(only.energy) == sum(only.first_round_trip));
      CHECK(sum(only.energy) ==
            Approx(sum(coupling.density(one, other).first_round_trip)).epsilon(1e-13));
      if (a.radius_nm != b.radius_nm)
        CHECK_THROWS_AS(coupling.density(other, one), std::invalid_argument);
    }
}

TEST_CASE("exchanging the two objects changes nothing") {
  for (const auto& [a, b] : {std::pair{"8,0", "6,5"}, {"10,10", "5,4"}, {"5,5@10,10", "9,1"}})
    for (const std::optional<double> gap : {std::optional<double>(), {0.34}, {3.0}}) {
      const Binding one = row(a, b, gap), other = row(b, a, gap);
      INFO(a << " " << b << " " << gap.value_or(0));
      CHECK(*one.dispersion_eV_per_nm == Approx(*other.dispersion_eV_per_nm).epsilon(1e-9));
      CHECK(*one.contact_eV_per_nm == Approx(*other.contact_eV_per_nm).epsilon(1e-9));
      CHECK(*one.gap_nm == Approx(*other.gap_nm).epsilon(1e-6));
    }
}

TEST_CASE("the distance slope is the derivative of the energy") {
  const Catalogs& catalogs = Catalogs::built_in();
  const Tube a = make_tube({8, 2}), b = make_tube({7, 7});
  for (const double gap : {0.25, 0.34, 1.0, 20.0}) {
    const double distance = a.radius_nm + b.radius_nm + gap, step = 1e-4 * gap;
    const Window window = parallel_window(a.radius_nm, b.radius_nm, distance, make_nodes(1e-4));
    const Nodes nodes = nodes_on(window, make_nodes(1e-4));
    const auto scatterer = [&](const Tube& tube) {
      return shell_scatterer(Channel::outward,
                             tube_response(tube, catalogs.hopping(), {}, nodes, window),
                             catalogs.background(), window);
    };
    const Scatterer one = scatterer(a), other = scatterer(b);
    const auto at = [&](double d, bool slope) {
      return parallel_density(one, other, d, window, slope);
    };
    const ParallelDensity here = at(distance, true), less = at(distance - step, false),
                          more = at(distance + step, false);
    const auto sum = [&](const FrequencyDensity& d) {
      return frequency_sum(d, nodes, window.xi, {}).value;
    };
    INFO("gap " << gap);
    CHECK(sum(here.distance_slope) ==
          Approx((sum(more.energy) - sum(less.energy)) / (2 * step)).epsilon(1e-5));
    CHECK(sum(here.first_slope) ==
          Approx((sum(more.first_round_trip) - sum(less.first_round_trip)) / (2 * step))
              .epsilon(1e-5));
    CHECK(sum(here.energy) == Approx(sum(at(distance, false).energy)).epsilon(1e-13));
    // Round trips beyond the first add to the attraction.
    CHECK(sum(here.energy) < sum(here.first_round_trip));
  }
}

TEST_CASE("a wall inside binds more") {
  for (const double gap : {0.34, 1.0})
    CHECK(*row("5,5@10,10", "17,0", gap).energy_eV_per_nm <
          *row("10,10", "17,0", gap).energy_eV_per_nm);
}

TEST_CASE("the bottom of the well is where bind at that gap finds no force") {
  const Binding well = row("10,10", "8,3", {});
  const double gap = *well.equilibrium_gap_nm, step = 2e-3;
  const double below = *row("10,10", "8,3", gap - step).energy_eV_per_nm;
  const double above = *row("10,10", "8,3", gap + step).energy_eV_per_nm;
  const double here = *row("10,10", "8,3", gap).energy_eV_per_nm;
  CHECK(here == Approx(-*well.well_depth_eV_per_nm).epsilon(1e-5));
  CHECK((above - 2 * here + below) / (step * step) ==
        Approx(*well.stiffness_eV_per_nm3).epsilon(0.02));
  CHECK(here < below);
  CHECK(here < above);
}
