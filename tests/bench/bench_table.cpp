// Time, achieved errors and rows of tables on one thread, the tubes' responses given.
#include <gapwright/math/kernel.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/table/table.hpp>

#include <algorithm>
#include <chrono>
#include <exception>
#include <string>
#include <vector>

#include <fmt/format.h>

using namespace gapwright;

namespace {

struct Case {
  const char* name;
  const char* first;
  const char* second;
  TableKind kind;
  std::vector<double> angles_deg;
  int repeats;
};

void run(const Binder& binder, const Case& item) {
  using Clock = std::chrono::steady_clock;
  TableRequest request;
  request.kind = item.kind;
  request.first = parse_label(item.first).object;
  request.second = parse_label(item.second).object;
  request.angles_deg = item.angles_deg;
  Table table = make_table(binder, request);  // responses are kept
  std::vector<double> times;
  for (int i = 0; i < item.repeats; ++i) {
    const auto start = Clock::now();
    table = make_table(binder, request);
    times.push_back(std::chrono::duration<double, std::milli>(Clock::now() - start).count());
  }
  std::sort(times.begin(), times.end());
  fmt::print("{:<36}{:>9.1f} ms{:>9.1f} ms{:>10.1e}{:>10.1e}{:>8}\n", item.name, times.front(),
             times[times.size() / 2],
             std::max(table.reading_error.energy, table.reading_error.force),
             table.dispersion_error, table.rows.size());
}

}  // namespace

int main() {
  try {
    set_inner_threads(1);
    const Binder binder(Catalogs::built_in(), {});
    fmt::print("kernel {}\n{:<36}{:>12}{:>12}{:>10}{:>10}{:>8}\n", kernel_word(kernel_variant()),
               "table", "best", "median", "reading", "disp.", "rows");
    run(binder, {"parallel (10,10) (10,10)", "10,10", "10,10", TableKind::parallel, {}, 9});
    run(binder, {"parallel (10,10) (17,0)", "10,10", "17,0", TableKind::parallel, {}, 9});
    run(binder, {"beads (10,10) (10,10)", "10,10", "10,10", TableKind::beads, {}, 3});
    run(binder, {"crossed (10,10) (10,10), 90", "10,10", "10,10", TableKind::crossed, {90}, 1});
    run(binder,
        {"crossed (10,10) (10,10), 5 20 45", "10,10", "10,10", TableKind::crossed, {5, 20, 45}, 1});
  } catch (const std::exception& error) {
    fmt::print(stderr, "bench_table: {}\n", error.what());
    return 1;
  }
  return 0;
}
