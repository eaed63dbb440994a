// A round body over a flat one: images, rows of tubes as a sheet, derivatives, wide tubes.
#include "synthetic_shell.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/over_sheet.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/join/planar.hpp>

#include <cmath>
#include <memory>
#include <vector>

#include <Eigen/Dense>
#include <boost/math/special_functions/bessel.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

/// The same reflection for all waves and frequencies.
class Mirror final : public Reflector {
 public:
  Mirror(double reflection, IndexRange xi) : reflection_(reflection), xi_(xi) {}
  const IndexRange& xi() const override { return xi_; }
  void reflection(double, double, std::span<double> out) const override {
    for (double& value : out) value = reflection_;
  }

 private:
  double reflection_;
  IndexRange xi_;
};

/// A row of parallel tubes a spacing apart, as a sheet at the plane of their axes: r = r̃/s.
class TubeRow final : public Reflector {
 public:
  TubeRow(const Scatterer& tube, const Window& window, double spacing)
      : tube_(tube), window_(window), spacing_(spacing) {}
  const IndexRange& xi() const override { return window_.xi; }
  void reflection(double axial, double wave, std::span<double> out) const override {
    const LogLattice& lattice = tube_.nodes().q;
    const int index = int(std::lround(std::log(axial) / lattice.step));
    const int j = index - tube_.window().q.first;
    const double eta = std::acosh(std::max(1.0, wave / axial));
    std::fill(out.begin(), out.end(), 0.0);
    for (int m = 0; m < window_.orders[std::size_t(index - window_.q.first)]; ++m) {
      const double factor = constants::pi / (wave * spacing_) * std::exp(tube_.log_scale(j, m)) *
                            (m == 0 ? 1.0 : 2 * std::cosh(2 * m * eta));
      for (std::size_t k = 0; k < out.size(); ++k) out[k] += factor * tube_.reduced(j, m)[k];
    }
  }

 private:
  const Scatterer& tube_;
  const Window& window_;
  double spacing_;
};

Scatterer tube_scatterer(const Tube& tube, const Nodes& nodes, const Window& window) {
  const Catalogs& catalogs = Catalogs::built_in();
  return shell_scatterer(Channel::outward,
                         tube_response(tube, catalogs.hopping(), {}, nodes, window),
                         catalogs.background(), window);
}

std::shared_ptr<const FlatResponse> flat_response(const Nodes& nodes, IndexRange xi,
                                                  double highest) {
  return std::make_shared<const FlatResponse>(Catalogs::built_in().hopping(), Conditions{}, nodes,
                                              xi, 1e-5, highest);
}

}  // namespace

TEST_CASE("a constant reflection gives image multipoles") {
  // ln det[δ - r √T_m K_{m+m'}(2qD) √T_m'], m of both signs.
  const SyntheticShell shell{0.7, 1.5, 0.2};
  const double distance = 1.1;
  const Nodes nodes = make_nodes(1e-6);
  for (const double r : {0.9, -0.6}) {
    Window window = over_sheet_window(shell.radius, distance - shell.radius, nodes);
    window.xi = {0, 1};
    const Scatterer body = shell.scatterer(nodes, window);
    const OverSheetDensity ours =
        over_sheet_density(body, Mirror(r, window.xi), distance, window, false);
    CHECK(ours.positive);
    const AxisWeights weights = trapezoid_weights(nodes.q, window.q, {});
    double log_det = 0.0, trace = 0.0;
    for (int j = 0; j < window.q.count; ++j) {
      const double q = nodes.q.node(window.q.first + j);
      const int most = window.orders[std::size_t(j)] - 1;
      const std::vector<double> logs = shell.log_t(q, most + 1);
      Eigen::MatrixXd matrix = Eigen::MatrixXd::Identity(2 * most + 1, 2 * most + 1);
      const BesselLogs image = bessel_logs(2 * q * distance, 2 * most + 1);
      double sum = 0.0;
      for (int m = -most; m <= most; ++m)
        for (int n = -most; n <= most; ++n) {
          const double u =
              std::exp(0.5 * (logs[std::size_t(std::abs(m))] + logs[std::size_t(std::abs(n))]) +
                       image.log_k[std::size_t(std::abs(m + n))]);
          matrix(m + most, n + most) -= r * u;
          if (m == n) sum += r * u;
        }
      const double weight = weights.full[std::size_t(j)] / constants::pi;
      log_det += weight * std::log(matrix.determinant());
      trace -= weight * sum;
    }
    CHECK(ours.energy.full[0] == Approx(log_det).epsilon(1e-6));
    CHECK(ours.first_round_trip.full[0] == Approx(trace).epsilon(1e-6));
  }
}

TEST_CASE("the two perfect mirrors together are the tube and its image") {
  // Reflections +1 and -1 are the even and the odd half of two tubes twice as far apart.
  const Tube tube = make_tube({10, 10});
  const double gap = 0.35, distance = tube.radius_nm + gap;
  const Nodes nodes = make_nodes(1e-6);
  const Window window = united(parallel_window(tube.radius_nm, tube.radius_nm, 2 * distance, nodes),
                               over_sheet_window(tube.radius_nm, gap, nodes));
  const Scatterer body = tube_scatterer(tube, nodes, window);
  const ParallelDensity two = parallel_density(body, body, 2 * distance, window, true);
  const OverSheetDensity plus =
      over_sheet_density(body, Mirror(1.0, window.xi), distance, window, true);
  const OverSheetDensity minus =
      over_sheet_density(body, Mirror(-1.0, window.xi), distance, window, true);
  for (std::size_t k = 0; k < two.energy.full.size(); ++k) {
    CHECK(plus.energy.full[k] + minus.energy.full[k] == Approx(two.energy.full[k]).epsilon(2e-6));
    CHECK(plus.distance_slope.full[k] + minus.distance_slope.full[k] ==
          Approx(2 * two.distance_slope.full[k]).epsilon(2e-5));
  }
}

TEST_CASE("a dense row of tubes is a sheet") {
  const Tube tube = make_tube({10, 10}), other = make_tube({7, 2});
  const double distance = 2.6;
  Nodes nodes = make_nodes(1e-5);
  const Window window = parallel_window(tube.radius_nm, other.radius_nm, distance, nodes);
  nodes = nodes_on(window, nodes);
  const Scatterer body = tube_scatterer(tube, nodes, window);
  const Scatterer member = tube_scatterer(other, nodes, window);
  double last = 10.0;
  for (const double spacing : {3.2, 1.6, 0.8}) {
    // The row's tubes at y = j·spacing, first round trips only.
    double sum = 0.0;
    for (int j = -int(150 / spacing); j <= int(150 / spacing); ++j) {
      const ParallelDensity at =
          parallel_density(body, member, std::hypot(distance, j * spacing), window, false);
      sum += frequency_sum(at.first_round_trip, nodes, window.xi, {}).value;
    }
    const OverSheetDensity sheet =
        over_sheet_density(body, TubeRow(member, window, spacing), distance, window, false);
    const double ours = frequency_sum(sheet.first_round_trip, nodes, window.xi, {}).value;
    const double off = std::fabs(sum / ours - 1);
    INFO("spacing " << spacing << ", off by " << off);
    CHECK(off < std::max(0.1 * last, 5e-5));
    last = off;
  }
  CHECK(last < 5e-5);
}

TEST_CASE("slopes over a sheet are derivatives by the distance") {
  const Tube tube = make_tube({8, 4});
  const double gap = 0.35, distance = tube.radius_nm + gap;
  const Nodes nodes = make_nodes(1e-5);
  const Window window = over_sheet_window(tube.radius_nm, gap, nodes);
  const Scatterer body = tube_scatterer(tube, nodes, window);
  const CarbonReflector sheet(flat_response(nodes, window.xi, 40.0),
                              Catalogs::built_in().background(), nodes);
  const auto sum = [&](const FrequencyDensity& d) {
    return frequency_sum(d, nodes, window.xi, {}).value;
  };
  const auto at = [&](double shift) {
    return over_sheet_density(body, sheet, distance + shift, window, false);
  };
  const OverSheetDensity here = over_sheet_density(body, sheet, distance, window, true);
  const double step = 2e-3;
  const auto derivative = [&](FrequencyDensity OverSheetDensity::*part) {
    return (8 * (sum(at(step).*part) - sum(at(-step).*part)) - sum(at(2 * step).*part) +
            sum(at(-2 * step).*part)) /
           (12 * step);
  };
  CHECK(sum(here.distance_slope) == Approx(derivative(&OverSheetDensity::energy)).epsilon(2e-5));
  CHECK(sum(here.first_slope) ==
        Approx(derivative(&OverSheetDensity::first_round_trip)).epsilon(2e-5));
  CHECK(sum(here.energy) < sum(here.first_round_trip));
}

TEST_CASE("wide tubes over a sheet are strips of two sheets") {
  // ∫dx E(gap + R - √(R² - x²)) of two sheets per area; the rest falls as gap/R.
  const double gap = 0.4;
  const Nodes nodes = make_nodes(1e-5);
  const IndexRange xi = contact_frequencies(nodes);
  const Background& background = Catalogs::built_in().background();
  const auto flat = flat_response(nodes, xi, 60.0);
  const IndexRange waves = planar_waves(gap, 20 * gap, nodes);
  const SheetScatterer sheet = carbon_sheet(*flat, background, nodes, waves);
  const CarbonReflector mirror(flat, background, nodes);
  double last_off = 0.0, last_radius = 0.0;
  for (const int n : {10, 20, 40, 80}) {
    const double radius = make_tube({n, n}).radius_nm;
    Window window = over_sheet_window(radius, gap, nodes);
    window.xi = xi;
    const Scatterer body = shell_scatterer(
        Channel::outward, flat_shell_response(*flat, radius, nodes, window), background, window);
    const double energy =
        frequency_sum(over_sheet_density(body, mirror, radius + gap, window, false).energy, nodes,
                      xi, {})
            .value;
    double strips = 0.0;
    const int count = 400;
    for (int i = 0; i < count; ++i) {
      const double angle = 0.5 * constants::pi * (i + 0.5) / count;
      const double spacing = gap + radius * (1 - std::cos(angle));
      if (spacing > 20 * gap) break;
      strips += 2 * radius * std::cos(angle) * 0.5 * constants::pi / count *
                planar_energy(sheet, sheet, spacing, {}).energy_eV_per_nm2.value;
    }
    const double off = energy / strips - 1;
    INFO("R " << radius << ", off by " << off);
    CHECK(std::fabs(off) < 0.3 * gap / radius);
    if (last_radius > 1.0)
      CHECK(std::log(last_off / off) / std::log(radius / last_radius) == Approx(1.0).margin(0.15));
    last_off = off;
    last_radius = radius;
  }
}

TEST_CASE("a tube over a half-space in vacuum and in water") {
  const Catalogs& catalogs = Catalogs::built_in();
  const Tube tube = make_tube({10, 10});
  const double gap = 1.0, distance = tube.radius_nm + gap;
  const Nodes nodes = make_nodes(1e-4);
  const Window window = over_sheet_window(tube.radius_nm, gap, nodes);
  const ShellResponse response = tube_response(tube, catalogs.hopping(), {}, nodes, window);
  const auto energy = [&](const Medium& body, const Medium& outside) {
    const Scatterer shell =
        liquid_shell_scatterer(Channel::outward, response, catalogs.background(), outside, window);
    const HalfSpaceReflector wall(body, outside, nodes, window.xi);
    const OverSheetDensity density = over_sheet_density(shell, wall, distance, window, false);
    CHECK(density.positive);
    return frequency_sum(density.energy, nodes, window.xi, {}).value;
  };
  const Medium &silica = catalogs.medium("silica"), &water = catalogs.medium("water"),
               &vacuum = catalogs.medium();
  CHECK(energy(silica, vacuum) < 0);
  CHECK(energy(silica, water) < 0);
  CHECK(energy(silica, water) > energy(silica, vacuum));
  CHECK(energy(water, water) == 0.0);
  CHECK(energy(vacuum, vacuum) == 0.0);
  // The tube is denser than water, an empty half-space is not: they repel.
  CHECK(energy(vacuum, water) > 0);
}

TEST_CASE("bodies that touch a sheet are refused") {
  const Nodes nodes = make_nodes(1e-4);
  CHECK_THROWS_AS(over_sheet_window(0.5, 0.0, nodes), std::domain_error);
  CHECK_THROWS_AS(over_sheet_window(0.5, std::nan(""), nodes), std::domain_error);
  Window window = over_sheet_window(0.7, 0.34, nodes);
  window.xi = {0, 1};
  const Scatterer body = SyntheticShell{}.scatterer(nodes, window);
  CHECK_THROWS_AS(over_sheet_density(body, Mirror(1.0, window.xi), 0.7, window, false),
                  std::domain_error);
  CHECK_THROWS_AS(over_sheet_density(body, Mirror(1.0, {5, 1}), 1.1, window, false),
                  std::invalid_argument);
}
