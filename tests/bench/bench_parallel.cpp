// Time, achieved error and number of operations of tubes side by side, on one thread.
// Usage: bench_parallel [WELLS]   that many wells of the thinnest tubes are computed, too (1000).
#include "timing.hpp"

#include <gapwright/join/parallel.hpp>
#include <gapwright/lattice/candidates.hpp>
#include <gapwright/math/kernel.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>
#include <cstdio>
#include <ctime>
#include <exception>
#include <random>
#include <string>
#include <vector>

#include <fmt/format.h>

using namespace gapwright;
using bench::print_row;
using bench::timed;
using bench::Timing;

namespace {

constexpr double tolerance = 1e-4;
constexpr double fine_tolerance = 1e-7;
constexpr std::size_t tubes_of_sweep = 200;

/// Multiplications of all determinants of a window were none cut short: S and its factors cost
/// 2/3 n³ for each parity, the slope n³ more.
double multiplications(const Window& window, bool with_slope) {
  double sum = 0.0;
  for (const int n : window.orders) sum += 2 * (with_slope ? 5.0 / 3 : 2.0 / 3) * std::pow(n, 3);
  return sum * window.xi.count;
}

struct Side {
  Side(const Tube& first, const Tube& second, double gap_nm, double asked)
      : nodes(make_nodes(asked)),
        distance_nm(first.radius_nm + second.radius_nm + gap_nm),
        window(parallel_window(first.radius_nm, second.radius_nm, distance_nm, nodes)),
        one(scatterer(first)),
        other(scatterer(second)) {}

  Scatterer scatterer(const Tube& tube) const {
    const Catalogs& catalogs = Catalogs::built_in();
    return shell_scatterer(Channel::outward,
                           tube_response(tube, catalogs.hopping(), {}, nodes, window),
                           catalogs.background(), window);
  }
  ParallelDensity density(bool with_slope) const {
    return parallel_density(one, other, distance_nm, window, with_slope);
  }
  double energy() const { return frequency_sum(density(false).energy, nodes, window.xi, {}).value; }

  Nodes nodes;
  double distance_nm;
  Window window;
  Scatterer one, other;
};

void bench_energy(Chirality a, Chirality b, double gap_nm, const std::string& goal) {
  const Tube first = make_tube(a), second = make_tube(b);
  const Side side(first, second, gap_nm, tolerance);
  const double error =
      std::fabs(side.energy() / Side(first, second, gap_nm, fine_tolerance).energy() - 1);
  for (const bool slope : {false, true}) {
    const Timing time = timed([&] { side.density(slope); });
    print_row(fmt::format("{} {} at {} nm{}", first.label(), second.label(), gap_nm,
                          slope ? ", with slope" : ""),
              time, goal, error, multiplications(side.window, slope),
              fmt::format("{} waves x {} frequencies, {} multipoles", side.window.q.count,
                          side.window.xi.count, side.window.max_order()));
  }
}

Placement beside(const Tube& first, const Tube& second) {
  return {Arrangement::parallel, TubeObject{{first}}, TubeObject{{second}}, {}};
}

void bench_well(Chirality a, Chirality b) {
  const Placement pair = beside(make_tube(a), make_tube(b));
  Settings fine;
  fine.tolerance = 1e-6;
  const Binder binder(Catalogs::built_in(), {}), exact(Catalogs::built_in(), fine);
  Binding row = binder.bind(pair);
  const double error =
      std::fabs(*row.well_depth_eV_per_nm / *exact.bind(pair).well_depth_eV_per_nm - 1);
  const Timing time = timed([&] { row = binder.bind(pair); });
  print_row(fmt::format("well of {} {}", row.object_1, row.object_2), time, "30 ms", error, 0,
            "all fields of the row, responses there; error against tolerance 1e-6");
}

/// Some wells among all pairs of the thinnest tubes of 0.6 nm and more, chosen by a fixed seed.
void bench_wells(std::size_t count) {
  TubeFilter filter;
  filter.diameter_nm = Interval{0.6, 3.0};
  std::vector<Tube> tubes = candidate_tubes(filter);
  tubes.resize(tubes_of_sweep, tubes.front());
  const Binder binder(Catalogs::built_in(), {});
  std::mt19937 random(11);
  std::vector<Placement> rows;
  while (rows.size() < count) {
    const std::size_t i = random() % tubes.size(), j = random() % tubes.size();
    if (i <= j) rows.push_back(beside(tubes[i], tubes[j]));
  }
  const auto seconds = [] { return double(std::clock()) / CLOCKS_PER_SEC; };
  const double start = seconds();
  // As a sweep of all pairs does: each tube's response once.
  for (const Tube& tube : tubes) binder.announce({beside(tube, tube), beside(tube, tubes.back())});
  for (const Tube& tube : tubes) binder.bind(beside(tube, tube));
  const double prepared = seconds() - start;
  double largest = 0.0;
  std::size_t failed = 0;
  for (const Placement& row : rows) {
    const Binding well = binder.bind(row);
    failed += well.status != Status::ok;
    largest = std::max(largest, well.relative_error.value_or(0));
  }
  const double each = (seconds() - start - prepared) / double(count);
  print_row("a well of the 200 thinnest, CPU time", {each, each}, "48 ms", largest, 0,
            fmt::format("mean of {} wells, {} not ok; error: largest estimate; {:.1f} s before "
                        "for responses and like pairs; 20,100 wells: {:.0f} s of CPU",
                        count, failed, prepared, prepared + each * 20100));
}

void run(int argc, char** argv) {
  set_inner_threads(1);
  fmt::print("kernel {}, tolerance {}, lattice step {:.4f}; errors against tolerance {}\n",
             kernel_word(kernel_variant()), tolerance, make_nodes(tolerance).q.step,
             fine_tolerance);
  bench::print_header();
  bench_energy({10, 10}, {10, 10}, 0.32, "2 ms");
  bench_energy({10, 10}, {10, 10}, 1.0, "");
  bench_energy({5, 5}, {17, 0}, 0.32, "");
  bench_energy({40, 40}, {40, 40}, 0.32, "");
  bench_well({10, 10}, {10, 10});
  bench_well({5, 5}, {17, 0});
  bench_wells(argc > 1 ? std::stoul(argv[1]) : 1000);
}

}  // namespace

int main(int argc, char** argv) {
  try {
    run(argc, argv);
    return 0;
  } catch (const std::exception& error) {
    fmt::print(stderr, "bench_parallel: {}\n", error.what());
    return 1;
  }
}
