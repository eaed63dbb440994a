// Time, achieved error and number of operations of ribbon responses and gaps, on one thread.
// Times are those of the processor, so that other work on the machine does not count.
#include <gapwright/bands/ribbon_bands.hpp>
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/density.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/response/ribbon_response.hpp>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <ctime>
#include <exception>
#include <vector>

#include <fmt/format.h>

using namespace gapwright;

namespace {

constexpr double tolerance = 1e-4;
constexpr double fine_tolerance = 1e-8;
constexpr double contact_gap_nm = 0.34;

double processor_s() {
  timespec now{};
  clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &now);
  return double(now.tv_sec) + 1e-9 * double(now.tv_nsec);
}

/// The best of several runs of a piece of work.
template <class Work>
double timed(Work work) {
  double best = INFINITY, total = 0;
  for (int runs = 0; runs < 3 || (total < 0.3 && runs < 500); ++runs) {
    const double start = processor_s();
    work();
    const double taken = processor_s() - start;
    best = std::min(best, taken);
    total += taken;
    if (total > 10) break;
  }
  return best;
}

RibbonHamiltonian usual(RibbonEdge edge, int lines) {
  const Catalogs& catalogs = Catalogs::built_in();
  return {make_ribbon(edge, lines), catalogs.hopping(), catalogs.ribbon_edges()};
}

IndexRange contact_waves(const Ribbon& ribbon, const Nodes& nodes) {
  const int first = nodes.q.index_below(lowest_wave(ribbon.width_nm(), nodes.tolerance));
  const double highest = 1.2 * std::log(1 / nodes.tolerance) / (2 * contact_gap_nm);
  return {first, nodes.q.index_above(highest) - first + 1};
}

/// The largest difference of a node's matrix from a fine computation, relative to its norm, at a
/// few nodes of the grid.
double achieved_error(const RibbonHamiltonian& hamiltonian, const RibbonResponse& response) {
  Nodes fine = response.nodes();
  fine.tolerance = fine_tolerance;
  const std::size_t size = std::size_t(response.rows()) * std::size_t(response.rows());
  std::vector<double> ours(size), exact(size);
  double largest = 0;
  for (int i = 0; i < response.q().count; i += 5) {
    const IndexRange q{response.q().first + i, 1};
    const RibbonResponse reference = ribbon_response(hamiltonian, {}, fine, q, response.xi());
    for (int k = 0; k < response.xi().count; k += 3) {
      response.matrix(i, k, ours);
      reference.matrix(0, k, exact);
      double difference = 0, norm = 0;
      for (std::size_t e = 0; e < size; ++e) {
        difference += (ours[e] - exact[e]) * (ours[e] - exact[e]);
        norm += exact[e] * exact[e];
      }
      largest = std::max(largest, std::sqrt(difference / norm));
    }
  }
  return largest;
}

void bench_response(RibbonEdge edge, int lines, const char* goal, bool check) {
  const RibbonHamiltonian hamiltonian = usual(edge, lines);
  const Ribbon& ribbon = hamiltonian.ribbon();
  const Nodes nodes = make_nodes(tolerance);
  const IndexRange q = contact_waves(ribbon, nodes), xi = contact_frequencies(nodes);
  RibbonResponse response;
  const double seconds = timed([&] { response = ribbon_response(hamiltonian, {}, nodes, q, xi); });
  // The propagators: (2·rows of a sector)²/2 · states for each k, time and sector.
  double products = 0;
  for (int s = 0; s < hamiltonian.sectors(); ++s)
    products += std::pow(hamiltonian.sector_size(s), 3) / 4;
  products *= (response.waves / 2 + 1) * double(response.times);
  fmt::print(
      "{:<34}{:>10.1f} ms{:>10}{:>11}{:>10.1e}  {:.1e} in propagators, {} k, {} times, {} q, "
      "{} xi\n",
      "response of " + ribbon.label(), 1e3 * seconds, goal,
      check ? fmt::format("{:.1e}", achieved_error(hamiltonian, response)) : "",
      response.relative_error, products, response.waves, response.times, q.count, xi.count);
}

void bench_gap(RibbonEdge edge, int lines) {
  const Ribbon ribbon = make_ribbon(edge, lines);
  double gap = 0;
  const double seconds = timed([&] { gap = ribbon_gaps(usual(edge, lines)).band_gap_eV; });
  fmt::print("{:<34}{:>10.1f} ms{:>10}{:>11}{:>10}  {:.6f} eV\n", "gap of " + ribbon.label(),
             1e3 * seconds, "", "", "", gap);
}

/// Where the few sparse states become faster than all dense ones.
void bench_crossover(RibbonEdge edge, int lines) {
  const Catalogs& catalogs = Catalogs::built_in();
  const RibbonHamiltonian hamiltonian(make_ribbon(edge, lines), catalogs.hopping(),
                                      catalogs.ribbon_edges("uniform"));
  const double k = edge == RibbonEdge::armchair ? 0.1 : 8.6;
  double best[2];
  for (const EigenMethod method : {EigenMethod::dense, EigenMethod::sparse})
    best[method == EigenMethod::sparse] =
        timed([&] { conduction_energies_eV(hamiltonian, 0, k, 2, method); });
  fmt::print("{:<34}{:>10.3f} ms{:>10.3f} ms\n",
             fmt::format("2 states of {}, size {}", hamiltonian.ribbon().label(),
                         hamiltonian.sector_size(0)),
             1e3 * best[0], 1e3 * best[1]);
}

void run() {
  set_inner_threads(1);
  fmt::print("tolerance {}; errors against tolerance {}\n", tolerance, fine_tolerance);
  fmt::print("{:<34}{:>13}{:>10}{:>11}{:>10}  {}\n", "item", "best", "goal", "error", "estimate",
             "operations");
  bench_response(RibbonEdge::armchair, 7, "", true);
  bench_response(RibbonEdge::armchair, 13, "500 ms", true);
  bench_response(RibbonEdge::armchair, 20, "", true);
  bench_response(RibbonEdge::armchair, 40, "8000 ms", false);
  bench_response(RibbonEdge::armchair, 80, "", false);
  bench_response(RibbonEdge::zigzag, 6, "", true);
  bench_response(RibbonEdge::zigzag, 20, "", false);
  bench_gap(RibbonEdge::armchair, 13);
  bench_gap(RibbonEdge::armchair, 2999);
  bench_gap(RibbonEdge::zigzag, 16);
  bench_gap(RibbonEdge::zigzag, 500);
  fmt::print("\n{:<34}{:>13}{:>13}\n", "", "dense", "sparse");
  for (const int lines : {40, 60, 80, 120, 200}) bench_crossover(RibbonEdge::armchair, lines);
  for (const int lines : {20, 40, 60, 100, 200}) bench_crossover(RibbonEdge::zigzag, lines);
}

}  // namespace

int main() {
  try {
    run();
    return 0;
  } catch (const std::exception& error) {
    fmt::print(stderr, "bench_ribbon: {}\n", error.what());
    return 1;
  }
}
