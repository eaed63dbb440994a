// The response along helical lines against the plain zone-folding sum, and its exact limits.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/response/shell_response.hpp>

#include <cmath>
#include <complex>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

/// χ_m(q, iξ) by its definition (METHODS §3): N zone-folding lines of length 2π/T, uniform k.
double plain_strength(const Tube& tube, const SheetHamiltonian& h, int m, double q, double xi,
                      int points) {
  double sum = 0.0;
  for (int mu = 0; mu < tube.hexagons; ++mu)
    for (int p = 0; p < points; ++p) {
      const double k = (p + 0.5) / points * 2 * constants::pi / tube.period_nm;
      const BandState a = h.at({mu / tube.radius_nm, k});
      const BandState b = h.at({(mu + m) / tube.radius_nm, k + q});
      const std::complex<double> phase =
          std::polar(1.0, std::arg(b.coupling_eV) - std::arg(a.coupling_eV));
      const double weight = 0.25 * std::norm(1.0 - phase);
      for (const int from : {-1, 1}) {  // valence of k up to conduction of k + q, and back
        const double energy_a = a.midpoint_eV + from * std::abs(a.coupling_eV);
        const double energy_b = b.midpoint_eV - from * std::abs(b.coupling_eV);
        const double occupation = from < 0 ? 1.0 : -1.0;
        sum += (occupation * weight / std::complex<double>(energy_a - energy_b, xi)).real();
      }
    }
  const double step = 2 * constants::pi / tube.period_nm / points;
  const double chi = 2 / (2 * constants::pi * tube.radius_nm) * sum * step / (2 * constants::pi);
  return -4 * constants::pi * constants::coulomb_eV_nm * chi;
}

/// One node of the library's response.
double strength(const Tube& tube, const HoppingSet& hopping, const Nodes& nodes, int m, int q,
                int xi) {
  const Window window{{q, 1}, {m + 1}, {xi, 1}};
  return tube_response(tube, hopping, {}, nodes, window).cell(0, m)[0];
}

}  // namespace

// The plain sum converges exponentially for gapped tubes only.
TEST_CASE("response along helical lines equals the zone-folding sum") {
  const Catalogs& catalogs = Catalogs::built_in();
  for (const HoppingSet& hopping : catalogs.hopping_sets())
    for (const Chirality chirality : {Chirality{7, 0}, {6, 5}, {8, 4}, {10, 2}}) {
      const Tube tube = make_tube(chirality);
      const SheetHamiltonian h = tube_hamiltonian(tube, hopping);
      for (const double tolerance : {1e-4, 1e-6}) {
        const Nodes nodes = make_nodes(tolerance);
        const int xi = nodes.xi.index_above(1.0);
        for (const double wave : {0.3, 4.0, 15.0})
          for (const int m : {0, 1, 3}) {
            const int j = nodes.q.index_above(wave);
            const double q = nodes.q.node(j), x = nodes.xi.node(xi);
            const int points = 40 + 4000 / tube.hexagons;
            const double plain = 0.5 * (plain_strength(tube, h, m, q, x, points) +
                                        plain_strength(tube, h, -m, q, x, points));
            INFO(hopping.name << " " << tube.label() << " m " << m << " q " << q);
            CHECK(strength(tube, hopping, nodes, m, j, xi) ==
                  Approx(plain).epsilon(tolerance < 1e-5 ? 1e-8 : 2e-5));
          }
      }
    }
}

TEST_CASE("a metallic tube without curvature has the linear-band response at small q") {
  // 2πR·χ₀ → -(4/πħv)(ħvq)²/[(ħvq)² + ξ²] plus a smooth interband part of order q².
  const HoppingSet& hopping = Catalogs::built_in().hopping("zone-folding");
  const Nodes nodes = make_nodes(1e-6);
  const double velocity = 1.5 * 2.7 * constants::bond_nm;
  for (const Chirality chirality : {Chirality{10, 10}, {9, 0}, {7, 4}}) {
    const Tube tube = make_tube(chirality);
    double previous = 0.0;
    for (const int j : {-10, -12, -14, -16}) {
      const double q = nodes.q.node(j), vq = velocity * q;
      const int k = nodes.xi.index_below(vq);
      const double xi = nodes.xi.node(k);
      const double expected = 4 / (constants::pi * velocity) * vq * vq / (vq * vq + xi * xi);
      const double ours =
          strength(tube, hopping, nodes, 0, j, k) * tube.radius_nm / (2 * constants::coulomb_eV_nm);
      const double excess = ours / expected - 1;
      INFO(tube.label() << " q " << q);
      CHECK(std::fabs(excess) < q * q);
      if (previous != 0) {
        // The rest falls as q²: two nodes further down by e^{-4h}.
        CHECK(excess / previous == Approx(std::exp(-4 * nodes.q.step)).epsilon(0.05));
      }
      previous = excess;
    }
  }
}

TEST_CASE("a node's response does not depend on the window it is computed with") {
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  const Nodes nodes = make_nodes(1e-4);
  const Tube tube = make_tube({6, 4});
  const Window wide{{-8, 12}, std::vector<int>(12, 7), {-10, 20}};
  const Window narrow{{-2, 3}, {4, 3, 2}, {-10, 20}};
  const ShellResponse a = tube_response(tube, hopping, {}, nodes, wide);
  const ShellResponse b = tube_response(tube, hopping, {}, nodes, narrow);
  for (int j = 0; j < 3; ++j)
    for (int m = 0; m < narrow.orders[std::size_t(j)]; ++m)
      for (int k = 0; k < 20; ++k)
        REQUIRE(b.cell(j, m)[std::size_t(k)] == a.cell(j + 6, m)[std::size_t(k)]);
}
