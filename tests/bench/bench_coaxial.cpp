// Time, achieved error and number of operations of the coaxial line of work, on one thread.
// Usage: bench_coaxial [PLAN]   PLAN is also ranked as a whole, on all cores.
#include "line_nodes.hpp"
#include "timing.hpp"

#include <gapwright/contact/short_range.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/math/kernel.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/pair/binder.hpp>
#include <gapwright/response/flat_response.hpp>
#include <gapwright/sweep/runner.hpp>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <cstdio>
#include <exception>
#include <string>
#include <vector>

#include <fmt/format.h>

using namespace gapwright;
using bench::print_header;
using bench::print_row;
using bench::timed;
using bench::Timing;

namespace {

constexpr double tolerance = 1e-4;
constexpr double fine_tolerance = 1e-7;

const HoppingSet& hopping() {
  return Catalogs::built_in().hopping();
}

/// The same nodes, for responses of a far finer tolerance.
Nodes finer(Nodes nodes) {
  nodes.tolerance = fine_tolerance;
  return nodes;
}

/// The largest relative error of a node.
double worst_error(const ShellResponse& ours, const ShellResponse& exact) {
  double worst = 0.0;
  for (int j = 0; j < ours.window().q.count; ++j)
    for (int m = 0; m < ours.window().orders[std::size_t(j)]; ++m) {
      const auto a = ours.cell(j, m), b = exact.cell(j, m);
      for (std::size_t k = 0; k < a.size(); ++k)
        worst = std::max(worst, std::fabs(a[k] / b[k] - 1));
    }
  return worst;
}

/// Response of a tube as inner wall at the default tolerance; its best time.
double bench_response(Chirality chirality, const std::string& goal) {
  const Tube tube = make_tube(chirality);
  const Nodes nodes = make_nodes(tolerance);
  const Window window = coaxial_window(tube.radius_nm, tube.radius_nm + 0.34, nodes);
  ShellResponse response;
  const Timing time = timed([&] { response = tube_response(tube, hopping(), {}, nodes, window); });
  const double error =
      worst_error(response, tube_response(tube, hopping(), {}, finer(nodes), window));
  const std::size_t points = bench::line_nodes(tube, hopping(), nodes, window);
  print_row("response of " + tube.label(), time, goal, error, double(points) * window.xi.count,
            fmt::format("{} line nodes x {} frequencies ({} cells)", points, window.xi.count,
                        window.cells()));
  return time.best_s;
}

void bench_flat_table() {
  const Nodes nodes = make_nodes(tolerance);
  const IndexRange xi = contact_frequencies(nodes);
  const double low = 1e-3, high = 4 * largest_exponent(tolerance);
  const auto table = [&](const Nodes& n) { return FlatResponse(hopping(), {}, n, xi, low, high); };
  const Timing time = timed([&] { table(nodes); });
  const FlatResponse ours = table(nodes), exact = table(finer(nodes));
  std::vector<double> a(std::size_t(xi.count)), b = a;
  double error = 0.0;
  int points = 0;
  for (double wave = low; wave < 10.0; wave *= 1.07, ++points) {
    ours.strength_nm(wave, a);
    exact.strength_nm(wave, b);
    for (std::size_t k = 0; k < a.size(); ++k) error = std::max(error, std::fabs(a[k] / b[k] - 1));
  }
  print_row("table of the flat sheet", time, "", error, 0,
            fmt::format("{} frequencies, error at {} waves below 10 /nm", xi.count, points));
}

Placement usual_pair() {
  Placement placement;
  placement.first = parse_label("5,5@10,10").object;
  return placement;
}

double exact_dispersion() {
  Settings settings;
  settings.tolerance = fine_tolerance;
  return *Binder(Catalogs::built_in(), settings).bind(usual_pair()).dispersion_eV_per_nm;
}

/// Everything after the responses: four scatterers, energy with slope, flat energy, contact.
void bench_pair_from_responses(double exact) {
  const Placement pair = usual_pair();
  const Tube &inner = tubes_of(pair.first).walls[0], &outer = tubes_of(pair.first).walls[1];
  const Nodes nodes = make_nodes(tolerance);
  const Window window = coaxial_window(inner.radius_nm, outer.radius_nm, nodes);
  const Background& background = Catalogs::built_in().background();
  const FlatResponse flat(hopping(), {}, nodes, window.xi, 1e-3, 4 * largest_exponent(tolerance));
  std::vector<ShellResponse> own, uncurved;
  for (const Tube& tube : {inner, outer}) {
    own.push_back(tube_response(tube, hopping(), {}, nodes, window));
    uncurved.push_back(flat_shell_response(flat, tube.radius_nm, nodes, window));
  }
  const PairFunction contact = graphitic_pair_potential();
  double dispersion = 0.0, rest = 0.0;
  const auto interface = [&](const std::vector<ShellResponse>& responses, bool with_slope) {
    return coaxial_density(shell_scatterer(Channel::outward, responses[0], background, window),
                           shell_scatterer(Channel::inward, responses[1], background, window),
                           window, with_slope);
  };
  const Timing time = timed([&] {
    const CoaxialDensity density = interface(own, true), flat_density = interface(uncurved, false);
    dispersion = frequency_sum(density.energy, nodes, window.xi, {}).value;
    rest = frequency_sum(density.gap_slope, nodes, window.xi, {}).value +
           frequency_sum(flat_density.energy, nodes, window.xi, {}).value +
           coaxial_energy(contact, inner.radius_nm, outer.radius_nm).energy;
  });
  if (!std::isfinite(rest)) throw std::runtime_error("bench_pair_from_responses: not finite");
  const double terms = 2.0 * double(window.cells()) * window.xi.count;
  print_row("fields of (5,5)@(10,10) from responses", time, "150 µs",
            std::fabs(dispersion / exact - 1), terms,
            fmt::format("2 x {} cells x {} frequencies", window.cells(), window.xi.count));
}

void bench_pair_kept(double exact) {
  const Binder binder(Catalogs::built_in(), {});
  Binding row = binder.bind(usual_pair());
  const Timing time = timed([&] { row = binder.bind(usual_pair()); });
  print_row("bind (5,5)@(10,10), scatterers kept", time, "150 µs",
            std::fabs(*row.dispersion_eV_per_nm / exact - 1), 0, "all fields of the row");
}

void bench_cold_bind(double exact) {
  double dispersion = 0.0;
  const Timing time = timed([&] {
    const Binder binder(Catalogs::built_in(), {});
    dispersion = *binder.bind(usual_pair()).dispersion_eV_per_nm;
  });
  print_row("first bind (5,5)@(10,10), calibration too", time, "500 ms",
            std::fabs(dispersion / exact - 1), 0, "two responses, flat table, contact term");
}

void bench_plan(const std::string& file) {
  set_inner_threads(0);
  const Catalogs& catalogs = Catalogs::built_in();
  const Plan plan = read_plan(file, catalogs);
  const PlanRows rows(plan);
  const Binder binder(catalogs, plan.settings);
  const auto start = std::chrono::steady_clock::now();
  const SweepResult result = run_plan(rows, plan_text(plan), binder, {});
  const double seconds =
      std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
  double largest = 0.0;
  for (const Binding& row : result.rows) largest = std::max(largest, *row.relative_error);
  print_row("plan, all cores", {seconds, seconds}, "20 s", largest, 0,
            fmt::format("{} rows, {} not ok; error: largest estimate", result.rows.size(),
                        result.failed));
}

void run(int argc, char** argv) {
  set_inner_threads(1);
  fmt::print("kernel {}, tolerance {}, lattice step {:.4f}; errors against tolerance {}\n",
             kernel_word(kernel_variant()), tolerance, make_nodes(tolerance).q.step,
             fine_tolerance);
  print_header();
  bench_response({6, 5}, "3 ms");
  bench_response({10, 10}, "6 ms");
  bench_response({20, 20}, "18 ms");
  const double chiral = bench_response({27, 4}, "18 ms");
  const double armchair = bench_response({17, 17}, "");
  fmt::print("{:<42}{:>11.2f}{:>11}{:>10}\n", "(27,4) over (17,17), as wide to 1 %",
             chiral / armchair, "", "2.5");
  bench_flat_table();
  const double exact = exact_dispersion();
  bench_pair_from_responses(exact);
  bench_pair_kept(exact);
  bench_cold_bind(exact);
  if (argc > 1) bench_plan(argv[1]);
}

}  // namespace

int main(int argc, char** argv) {
  try {
    run(argc, argv);
    return 0;
  } catch (const std::exception& error) {
    fmt::print(stderr, "bench_coaxial: {}\n", error.what());
    return 1;
  }
}
