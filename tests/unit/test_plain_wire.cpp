// One-band electron gases and plain wires.
#include "../identity/synthetic_shell.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/over_sheet.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/join/plain_wire.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/math/bessel.hpp>

#include <cmath>

#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double per_mass = 0.0761996423 / 0.067;

template <typename Function>
double integrate(Function f, double low, double high) {
  return boost::math::quadrature::gauss_kronrod<double, 61>::integrate(f, low, high, 15, 1e-12);
}

/// -χ = g∫dk/2π f(k)·2Δ/(Δ² + ξ²), Δ = E(k+q) - E(k): the definition.
template <typename Occupation>
double from_bands(double g, double q, double xi, double reach, Occupation f) {
  const auto term = [&](double k) {
    const double gap = 0.5 * per_mass * q * (2 * k + q);
    return f(k) * 2 * gap / (gap * gap + xi * xi);
  };
  // The principal value at k = -q/2 is not needed: ξ > 0.
  return g / (2 * M_PI) * (integrate(term, -reach, -0.5 * q) + integrate(term, -0.5 * q, reach));
}

ElectronGasWire gas() {
  ElectronGasWire wire;
  wire.mass = 0.067;
  wire.density_per_nm = 0.06;
  wire.radius_nm = 5.0;
  wire.host_permittivity = 12.9;
  return wire;
}

}  // namespace

TEST_CASE("response of the electron gas at T = 0") {
  const double k_fermi = gas().fermi_wave_per_nm();
  CHECK(k_fermi == Approx(M_PI * 0.03));
  for (const double q : {0.01, 0.1, 0.5})
    for (const double xi : {0.003, 0.02, 0.5})
      CHECK(gas_response(0.067, 2, k_fermi, q, xi) ==
            Approx(from_bands(2, q, xi, k_fermi, [](double) { return 1.0; })).epsilon(1e-9));
  // f-sum rule: -χ → n (ħ²/m) q²/ξ².
  CHECK(gas_response(0.067, 2, k_fermi, 0.01, 10.0) ==
        Approx(0.06 * per_mass * 1e-4 / 100).epsilon(1e-6));
  // Density of states g m/(πħ²k_F) for q, ξ → 0.
  CHECK(gas_response(0.067, 2, k_fermi, 1e-6, 0.0) ==
        Approx(2 / (M_PI * per_mass * k_fermi)).epsilon(1e-6));
  CHECK_THROWS_AS(gas_response(0.067, 2, 0.0, 1.0, 1.0), std::domain_error);
  CHECK_THROWS_AS(gas_response(0.067, 2, 1.0, 0.0, 1.0), std::domain_error);
}

TEST_CASE("response of the electron gas at a temperature") {
  for (const double kelvin : {4.0, 77.0, 1000.0}) {
    const GasResponse response(gas(), kelvin);
    const double thermal = 8.617333262145179e-5 * kelvin, mu = response.chemical_potential_eV();
    const auto fermi = [&](double k) {
      return 1 / (1 + std::exp((0.5 * per_mass * k * k - mu) / thermal));
    };
    const double reach = std::sqrt(2 * (std::max(mu, 0.0) + 45 * thermal) / per_mass);
    CHECK(2 / M_PI * integrate(fermi, 0.0, reach) == Approx(0.06).epsilon(1e-8));
    for (const double q : {0.02, 0.19, 0.7})
      for (const double xi : {0.01, 0.3})
        CHECK(response(q, xi) == Approx(from_bands(2, q, xi, reach, fermi)).epsilon(1e-7));
  }
  const GasResponse cold(gas(), 0.5);
  CHECK(cold(0.05, 0.01) ==
        Approx(gas_response(0.067, 2, gas().fermi_wave_per_nm(), 0.05, 0.01)).epsilon(1e-4));
  CHECK_THROWS_AS(GasResponse(gas(), -1.0), std::domain_error);
}

TEST_CASE("a gas on a cylinder scatters by the plain formula") {
  const Nodes nodes = make_nodes(1e-3);
  const Window window = axial_window(parallel_window(5.0, 5.0, 30.0, nodes));
  const Scatterer wire = gas_wire_scatterer(gas(), 0.0, nodes_on(window, nodes), window);
  const Nodes used = wire.nodes();
  const ParallelDensity pair = parallel_density(wire, wire, 30.0, window, false);
  std::vector<double> expected(std::size_t(window.xi.count), 0.0);
  const AxisWeights weights = trapezoid_weights(used.q, window.q, {});
  for (int j = 0; j < window.q.count; ++j) {
    const double q = used.q.node(window.q.first + j), x = 5.0 * q;
    using boost::math::cyl_bessel_i;
    using boost::math::cyl_bessel_k;
    for (int k = 0; k < window.xi.count; ++k) {
      const double xi = used.xi.node(window.xi.first + k);
      const double a =
          2 * 1.439964548 / 12.9 * gas_response(0.067, 2, gas().fermi_wave_per_nm(), q, xi);
      const double i0 = cyl_bessel_i(0, x), k0 = cyl_bessel_k(0, x);
      const double t = a * i0 * i0 / (1 + a * i0 * k0);
      const double c = t * cyl_bessel_k(0, 30.0 * q);
      expected[std::size_t(k)] += weights.full[std::size_t(j)] / M_PI * std::log1p(-c * c);
    }
  }
  for (std::size_t k = 0; k < expected.size(); k += 3)
    CHECK(pair.energy.full[k] == Approx(expected[k]).epsilon(1e-7));
}

TEST_CASE("a plain wire goes where tubes go") {
  const Nodes nodes = make_nodes(1e-3);
  const Window window = parallel_window(0.7, 0.6, 2.0, nodes);
  const Scatterer tube = SyntheticShell{0.7, 1.5, 0.2}.scatterer(nodes, window);
  const Scatterer wire = axial_scatterer(SyntheticShell{0.6, 2.0, 0.0}.scatterer(nodes, window));
  const ParallelDensity pair = parallel_density(tube, wire, 2.0, window, true);
  const ParallelDensity turned = parallel_density(wire, tube, 2.0, window, true);
  // One multipole against many: ln[1 - T_0 Σ_m T_m K_m²].
  std::vector<double> expected(std::size_t(window.xi.count), 0.0), first = expected;
  const AxisWeights weights = trapezoid_weights(nodes.q, window.q, {});
  for (int j = 0; j < window.q.count; ++j) {
    const int orders = window.orders[std::size_t(j)];
    const BesselLogs waves = bessel_logs(nodes.q.node(window.q.first + j) * 2.0, orders);
    for (std::size_t k = 0; k < expected.size(); ++k) {
      double sum = 0.0;
      for (int m = 0; m < orders; ++m)
        sum +=
            (m == 0 ? 1.0 : 2.0) * tube.reduced(j, m)[k] *
            std::exp(tube.log_scale(j, m) + 2 * waves.log_k[std::size_t(m)] + wire.log_scale(j, 0));
      expected[k] += weights.full[std::size_t(j)] / M_PI * std::log1p(-sum * wire.reduced(j, 0)[k]);
      first[k] -= weights.full[std::size_t(j)] / M_PI * sum * wire.reduced(j, 0)[k];
    }
  }
  CHECK(pair.positive);
  // Round trips beyond the first are cut below the tolerance.
  CHECK(pair.energy.full[3] == Approx(expected[3]).epsilon(1e-4));
  CHECK(turned.energy.full[3] == Approx(expected[3]).epsilon(1e-4));
  CHECK(pair.first_round_trip.full[3] == Approx(first[3]).epsilon(1e-8));
  CHECK(turned.first_round_trip.full[3] == Approx(first[3]).epsilon(1e-8));
  CHECK(std::isfinite(turned.distance_slope.full[3]));
  CHECK(turned.distance_slope.full[3] == Approx(pair.distance_slope.full[3]).epsilon(1e-4));
}

TEST_CASE("what is said of an energy by m = 0 alone") {
  CHECK(axial_note(100.0, 1.0, false).empty());
  CHECK_THAT(axial_note(3.0, 1.0, false), Catch::Contains("axial share"));
  CHECK_THAT(axial_note(100.0, 1.0, true), Catch::Contains("lower bound"));
}

TEST_CASE("wires by label and from the catalogue") {
  const Object object = parse_label(" wire:gaas-etched ").object;
  CHECK(label_of(object) == "wire:gaas-etched");
  const Catalogs& catalogs = Catalogs::built_in();
  const ElectronGasWire& wire = catalogs.wire(std::get<WireObject>(object).name);
  CHECK(wire.density_per_nm == Approx(0.056));
  CHECK(wire.fermi_energy_eV() == Approx(0.5 * per_mass * std::pow(M_PI * 0.028, 2)).epsilon(1e-9));
  CHECK_THROWS_WITH(catalogs.wire("gaas-etch"), Catch::Contains("nearest: gaas-etched"));
  CHECK_THROWS_WITH(parse_label("wire:"), Catch::Contains("has no name"));
  CHECK_THROWS_WITH(parse_label("wire:GaAs!"), Catch::Contains("not the name of a wire"));
  CHECK_THROWS_WITH(parse_label("5,5@wire:gaas-etched"), Catch::Contains("no wall"));
}
