// The response at finite temperature and doping against the plain zone-folding sum, and its limits.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/response/flat_response.hpp>
#include <gapwright/response/shell_response.hpp>

#include <cmath>
#include <complex>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

Conditions conditions(double kelvin, double mu) {
  Conditions result;
  result.temperature_K = kelvin;
  result.chemical_potential_eV = mu;
  return result;
}

/// (αQ²)_π of one sign of m by its definition (METHODS (3.1)): zone-folding lines, uniform k.
double plain_strength(const Tube& tube, const SheetHamiltonian& h, const Conditions& at, int m,
                      double q, double xi, int points) {
  const double kT = thermal_energy_eV(at);
  const auto n = [&](double e) { return 1 / (1 + std::exp((e - at.chemical_potential_eV) / kT)); };
  double sum = 0.0;
  for (int mu = 0; mu < tube.hexagons; ++mu)
    for (int p = 0; p < points; ++p) {
      const double k = (p + 0.5) / points * 2 * constants::pi / tube.period_nm;
      const BandState a = h.at({mu / tube.radius_nm, k});
      const BandState b = h.at({(mu + m) / tube.radius_nm, k + q});
      const std::complex<double> phase =
          std::polar(1.0, std::arg(b.coupling_eV) - std::arg(a.coupling_eV));
      for (const int s : {-1, 1})
        for (const int t : {-1, 1}) {
          const double from = a.midpoint_eV + s * std::abs(a.coupling_eV);
          const double to = b.midpoint_eV + t * std::abs(b.coupling_eV);
          const double weight = 0.25 * std::norm(1.0 + double(s * t) * phase);
          const double energy = from - to;
          if (std::fabs(energy) < 1e-9)
            sum -= xi == 0 ? weight * n(from) * (1 - n(from)) / kT : 0.0;
          else
            sum += weight * (n(from) - n(to)) * energy / (energy * energy + xi * xi);
        }
    }
  const double step = 2 * constants::pi / tube.period_nm / points;
  const double chi = 2 / (2 * constants::pi * tube.radius_nm) * sum * step / (2 * constants::pi);
  return -4 * constants::pi * constants::coulomb_eV_nm * chi;
}

double strength(const Tube& tube, const Conditions& at, double tolerance, int m, int q, int xi) {
  const Window window{{q, 1}, {m + 1}, {xi, 1}};
  return tube_response(tube, Catalogs::built_in().hopping(), at, make_nodes(tolerance, at), window)
      .cell(0, m)[0];
}

}  // namespace

TEST_CASE("response at T > 0 equals the zone-folding sum, the static node included") {
  const Catalogs& catalogs = Catalogs::built_in();
  for (const char* name : {"nearest-neighbour", "third-neighbour-overlap"})
    for (const Chirality chirality : {Chirality{5, 5}, {7, 0}, {6, 4}})
      for (const double mu : {0.0, 0.3, -1.7}) {
        const HoppingSet& hopping = catalogs.hopping(name);
        if (!hopping.nearest_neighbour_only() && chirality != Chirality{7, 0}) continue;
        const Tube tube = make_tube(chirality);
        const SheetHamiltonian h = tube_hamiltonian(tube, hopping);
        const Conditions at = conditions(1500.0, mu);
        for (const double tolerance : {1e-4, 1e-6}) {
          const Nodes nodes = make_nodes(tolerance, at);
          for (const double wave : {0.01, 1.0, 8.0})
            for (const int m : {0, 2}) {
              const int j = nodes.q.index_above(wave);
              const double q = nodes.q.node(j);
              const Window window{{j, 1}, {m + 1}, {-1, 8}};
              const ShellResponse ours = tube_response(tube, hopping, at, nodes, window);
              const int points = 40 + int(450 * tube.period_nm);
              for (const int k : {-1, 0, 6}) {
                const double xi = nodes.xi.node(k);
                const double plain = 0.5 * (plain_strength(tube, h, at, m, q, xi, points) +
                                            plain_strength(tube, h, at, -m, q, xi, points));
                INFO(name << " " << tube.label() << " mu " << mu << " m " << m << " q " << q
                          << " xi " << xi);
                CHECK(ours.cell(0, m)[std::size_t(k + 1)] ==
                      Approx(plain).epsilon(tolerance < 1e-5 ? 1e-7 : 2e-5));
              }
            }
        }
      }
}

TEST_CASE("doped response at T = 0 is the limit of small temperatures") {
  // Sommerfeld: the rest falls as T².
  for (const Chirality chirality : {Chirality{5, 5}, {7, 0}, {6, 4}})
    for (const double mu : {0.9, 1.4}) {
      const Tube tube = make_tube(chirality);
      for (const int m : {0, 1, 2})
        for (const int j : {-9, -2, 2, 5}) {
          const Conditions cold = conditions(0.0, mu);
          const Nodes nodes = make_nodes(1e-6);
          const int k = nodes.xi.index_above(0.3);
          const double exact = strength(tube, cold, 1e-6, m, j, k);
          const auto warm = [&](double kelvin) {
            // The frequency as the first Matsubara frequency's lattice has it is another one: set
            // the nodes' origin, keep the temperature.
            const Conditions at = conditions(kelvin, mu);
            Nodes same = make_nodes(1e-6, at);
            same.xi.origin = nodes.xi.node(k);
            const Window window{{j, 1}, {m + 1}, {0, 1}};
            return tube_response(tube, Catalogs::built_in().hopping(), at, same, window)
                .cell(0, m)[0];
          };
          INFO(tube.label() << " mu " << mu << " m " << m << " j " << j);
          const double at_20 = warm(20.0) - exact, at_40 = warm(40.0) - exact;
          CHECK(std::fabs(at_20) < 3e-4 * exact);
          if (std::fabs(at_20) > 1e-6 * exact) CHECK(at_40 / at_20 == Approx(4.0).epsilon(0.1));
        }
    }
}

TEST_CASE("without carriers to excite the response is that of T = 0") {
  const Tube tube = make_tube({7, 0});
  const Conditions at = conditions(50.0, 0.0);
  Nodes warm = make_nodes(1e-6, at);
  const Nodes cold = make_nodes(1e-6);
  warm.xi.step = cold.xi.step;
  warm.xi.origin = cold.xi.node(-3);
  const Window window{{-6, 8}, std::vector<int>(8, 4), {0, 10}};
  Window shifted = window;
  shifted.xi.first = -3;
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  const ShellResponse a = tube_response(tube, hopping, at, warm, window);
  const ShellResponse b = tube_response(tube, hopping, {}, cold, shifted);
  for (int j = 0; j < 8; ++j)
    for (int m = 0; m < 4; ++m)
      for (int k = 0; k < 10; ++k)
        CHECK(a.cell(j, m)[std::size_t(k)] == Approx(b.cell(j, m)[std::size_t(k)]).epsilon(1e-12));
}

TEST_CASE("response passes the first subband edge without a jump") {
  const Tube tube = make_tube({7, 0});
  double previous = 0.0, largest = 0.0, change = 0.0;
  for (double mu = 0.55; mu < 0.85; mu += 0.005) {
    const double value = strength(tube, conditions(300.0, mu), 1e-4, 0, -4, -1);
    CHECK(value > 0);
    if (previous > 0) change = std::max(change, std::fabs(value - previous));
    largest = std::max(largest, value);
    previous = value;
  }
  CHECK(change < 0.12 * largest);
}

TEST_CASE("the static sheet screens as its density of states") {
  // αQ² → 4πk_e·∂n/∂μ for Q → 0; undoped Dirac cones: ∂n/∂μ = (4 ln 2/π)·kT/(ħv)² [METHODS (3.9)].
  const double velocity = 1.5 * 2.7 * constants::bond_nm;
  for (const double kelvin : {77.0, 300.0}) {
    const Conditions at = conditions(kelvin, 0.0);
    const Nodes nodes = make_nodes(1e-4, at);
    const FlatResponse flat(Catalogs::built_in().hopping(), at, nodes, {-1, 2}, 1e-6, 1e-4);
    std::vector<double> strength_nm(2);
    for (const double wave : {2e-6, 5e-5}) {
      flat.strength_nm(wave, strength_nm);
      const double states =
          4 * std::log(2.0) / constants::pi * thermal_energy_eV(at) / (velocity * velocity);
      INFO(kelvin << " K, Q " << wave);
      CHECK(strength_nm[0] * wave * wave ==
            Approx(4 * constants::pi * constants::coulomb_eV_nm * states).epsilon(5e-4));
    }
  }
}

TEST_CASE("the static doped sheet screens with the density of states at the Fermi energy") {
  // ∂n/∂μ = 2|μ|/[π(ħv)²]; trigonal warping adds an order (μ/t)².
  const double velocity = 1.5 * 2.7 * constants::bond_nm, mu = 0.2;
  const Conditions at = conditions(20.0, mu);
  const Nodes nodes = make_nodes(1e-4, at);
  const FlatResponse flat(Catalogs::built_in().hopping(), at, nodes, {-1, 2}, 1e-4, 1e-2);
  std::vector<double> strength_nm(2);
  flat.strength_nm(1e-3, strength_nm);
  CHECK(strength_nm[0] * 1e-6 ==
        Approx(8 * constants::coulomb_eV_nm * mu / (velocity * velocity)).epsilon(5e-3));
}

TEST_CASE("conditions out of range are refused by name") {
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  CHECK_NOTHROW(validate(conditions(3000.0, 2.16), hopping));
  CHECK_NOTHROW(validate(conditions(0.0, -2.16), hopping));
  CHECK_THROWS_AS(validate(conditions(300.0, 2.17), hopping), InputError);
  CHECK_THROWS_AS(validate(conditions(3001.0, 0.0)), InputError);
  CHECK_THROWS_AS(validate(conditions(1e-5, 0.0)), InputError);
  CHECK_THROWS_AS(validate(conditions(-1.0, 0.0)), InputError);
  CHECK_THROWS_AS(validate(conditions(std::nan(""), 0.0)), InputError);
}
