#include "builders.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/table/beads.hpp>

#include <algorithm>
#include <array>
#include <cmath>

namespace gapwright {
namespace {

// Spacings of the sliding table, times √(D/nm).
constexpr std::array sliding_shares = {0.2, 0.25, 0.315, 0.4, 0.5, 0.7};
constexpr int sums_checked = 24;

std::vector<SlidingRow> sliding(const BeadPair& beads, double distance, double spacing,
                                double widest) {
  std::vector<double> spacings = {spacing};
  for (const double share : sliding_shares) {
    const double candidate = share * std::sqrt(distance);
    if (candidate <= widest && std::fabs(candidate - spacing) > 1e-6) spacings.push_back(candidate);
  }
  std::sort(spacings.begin(), spacings.end());
  std::vector<SlidingRow> rows;
  for (const double l : spacings) rows.push_back({l, beads.corrugation(distance, l)});
  return rows;
}

/// The energies of two chains read from the finished table, against the energy they stand for.
double sum_error(const BeadPair& beads, const EnergyFunction& parallel,
                 const std::vector<TablePoint>& points, const Table& table) {
  const double floor = table_scale(parallel, table.first_nm, table.last_nm).energy;
  double largest = 0.0;
  for (int i = 0; i < sums_checked; ++i) {
    const double t = double(i) / sums_checked;
    const double distance = table.first_nm + t * t * (table.last_nm - table.first_nm);
    const double back = beads.chain_energy([&](double r) { return read_cubic(points, r).value; },
                                           distance, table.last_nm);
    const double wanted = parallel(distance).value;
    largest = std::max(largest, std::fabs(back - wanted) / std::max(std::fabs(wanted), floor));
  }
  return largest;
}

/// Points whose beads sum up to the tolerance, too: far beads are weak beside the well, but many.
PlacedPoints placed_beads(const BeadPair& beads, const EnergyFunction& parallel, Table& table) {
  const EnergyFunction function = [&](double distance) { return beads.at(distance); };
  const TableScale scale = table_scale(function, table.first_nm, table.last_nm);
  PlacedPoints placed;
  double aim = table.tolerance;
  for (int round = 0; round < 4; ++round) {
    placed = place_points(function, table.first_nm, table.last_nm, scale, std::max(aim, 1e-8));
    table.bead_sum_error = sum_error(beads, parallel, placed.points, table);
    if (*table.bead_sum_error <= table.tolerance) break;
    aim *= std::min(0.5, 0.7 * table.tolerance / *table.bead_sum_error);
  }
  return placed;
}

std::vector<CrossingRow> crossings(const Binder& binder, const TableRequest& request,
                                   const Table& table, const Potential& dispersion) {
  const auto curve =
      binder.curve({Arrangement::crossed, request.first, request.second, std::nullopt, 90.0});
  const double rest = table.well_distance_nm.value_or(table.touching_nm + 0.34);
  curve->announce(rest - table.touching_nm);
  std::vector<CrossingRow> rows;
  for (const double gap : {rest - table.touching_nm, 1.0, 5.0}) {
    const Jet beads = crossing_limit([&](double distance) { return dispersion.at(distance); },
                                     table.touching_nm + gap);
    const CurvePoint direct = curve->dispersion(gap, false);
    rows.push_back({gap, beads.value, direct.energy.value, direct.energy.error});
  }
  return rows;
}

double resting_distance(const Table& table) {
  if (table.well_distance_nm) return *table.well_distance_nm;
  throw InputError({table.object_1 + " and " + table.object_2 +
                        " have no well that a default spacing could follow from",
                    "spacing_nm",
                    {},
                    "a spacing",
                    {}});
}

}  // namespace

Table bead_table(const Binder& binder, const TableRequest& request) {
  Table table = begin_table(binder, request);
  const PairPotential potential = parallel_potential(binder, request, table, endless_gap_nm);
  const EnergyFunction bare = [&](double distance) { return potential.total.at(distance); };
  const EnergyFunction parallel = with_cut(bare, table);
  table.shift = cut_shift(bare, table);
  note_well(parallel, table);
  const double widest = std::min(table.diameter_1_nm, table.diameter_2_nm);
  const double spacing = request.spacing_nm.value_or(
      request.spacing_nm ? 0.0 : std::min(widest, usual_bead_spacing_nm(resting_distance(table))));
  table.spacing_nm = spacing;

  const BeadPair beads(parallel, spacing, spacing, table.first_nm, table.outer_cut_nm);
  const PlacedPoints placed = placed_beads(beads, parallel, table);
  for (const TablePoint& point : placed.points)
    table.rows.push_back(
        {.distance_nm = point.distance_nm, .energy = point.energy, .force = point.force});
  table.reading_error = placed.error;
  table.closest_energy = placed.points.front().energy;
  table.closest_force = placed.points.front().force;
  if (table.well_distance_nm)
    table.sliding = sliding(beads, *table.well_distance_nm, spacing, widest);
  table.crossing = crossings(binder, request, table, potential.dispersion);
  take_errors(potential, table);
  judge(table);
  return table;
}

double default_spacing_nm(const Binder& binder, const Object& first, const Object& second) {
  TableRequest request;
  request.first = first;
  request.second = second;
  Table table = begin_table(binder, request);
  table.last_nm = table.touching_nm + 1.0;  // the well is closer
  const PairPotential potential = parallel_potential(binder, request, table, 0.0);
  note_well([&](double distance) { return potential.total.at(distance); }, table);
  return std::min(
      {table.diameter_1_nm, table.diameter_2_nm, usual_bead_spacing_nm(resting_distance(table))});
}

}  // namespace gapwright
