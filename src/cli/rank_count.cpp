#include "rank_count.hpp"

#include "exit_code.hpp"
#include "output.hpp"
#include "progress.hpp"
#include "row_text.hpp"

#include <gapwright/math/nodes.hpp>

#include <algorithm>
#include <cmath>
#include <set>
#include <thread>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

// One core, at a tolerance of 1e-4; estimates, not promises.
constexpr double seconds_to_start = 0.3;        // calibration of the contact targets
constexpr double seconds_per_tube_nm2 = 0.004;  // response: by the diameter squared
constexpr double seconds_per_pair = 0.0002;
// Side by side: responses on wider windows, own and flat; energies by the diameters, a row at one
// gap two of them, at its well seven.
constexpr double seconds_per_tube_beside_nm2 = 0.012;
constexpr double seconds_per_energy = 0.0004;
constexpr double seconds_per_energy_nm2 = 0.0006;
constexpr double energies_at_gap = 2, energies_of_well = 7;
constexpr double bytes_per_row = 370;
constexpr double bytes_per_store = 30e3;

struct Estimates {
  std::size_t pairs = 0;
  std::size_t tubes = 0;
  double seconds = 0.0;
  double bytes = 0.0;
};

Estimates estimate(const RankRequest& request, const PlanRows& rows) {
  const bool beside = request.plan.arrangement == Arrangement::parallel;
  const double each_tube = beside ? seconds_per_tube_beside_nm2 : seconds_per_tube_nm2;
  const double energies = request.plan.fixed_gap_nm ? energies_at_gap : energies_of_well;
  std::set<Chirality> tubes;
  Estimates sum;
  const auto add = [&](const Tube& tube) {
    if (tubes.insert(tube.chirality).second)
      sum.seconds += each_tube * tube.diameter_nm() * tube.diameter_nm();
  };
  const auto step = static_cast<std::size_t>(request.parts);
  for (std::size_t k = static_cast<std::size_t>(request.part - 1); k < rows.size(); k += step) {
    add(rows.inner(k));
    add(rows.outer(k));
    ++sum.pairs;
    sum.seconds += beside ? energies * (seconds_per_energy + seconds_per_energy_nm2 *
                                                                 rows.inner(k).diameter_nm() *
                                                                 rows.outer(k).diameter_nm())
                          : seconds_per_pair;
  }
  // Nodes grow along both axes.
  const Nodes wanted = make_nodes(request.plan.settings.tolerance), usual = make_nodes(1e-4);
  sum.seconds *= usual.q.step * usual.xi.step / (wanted.q.step * wanted.xi.step);
  const unsigned cores = std::max(1U, std::thread::hardware_concurrency());
  sum.seconds /= request.threads > 0 ? std::min(request.threads, int(cores)) : int(cores);
  sum.seconds += seconds_to_start;
  sum.tubes = tubes.size();
  sum.bytes = bytes_per_store + bytes_per_row * static_cast<double>(sum.pairs);
  return sum;
}

std::string size_text(double bytes) {
  if (bytes < 1e6) return fmt::format("{:.0f} kB", bytes / 1e3);
  if (bytes < 1e9) return fmt::format("{:.1f} MB", bytes / 1e6);
  return fmt::format("{:.1f} GB", bytes / 1e9);
}

}  // namespace

int count_rows(const RankRequest& request, const PlanRows& rows) {
  const Estimates sum = estimate(request, rows);
  if (request.json) {
    const Json object = {{"pairs", sum.pairs},
                         {"tubes", sum.tubes},
                         {"estimated_time_s", sum.seconds},
                         {"estimated_store_bytes", sum.bytes}};
    print(object.dump() + "\n");
  } else {
    print(fmt::format("{} pairs of {} tubes\n{} on this machine, estimated\n{} as a store\n",
                      sum.pairs, sum.tubes, duration_text(sum.seconds), size_text(sum.bytes)));
  }
  return good;
}

}  // namespace gapwright::cli
