#include "builders.hpp"

#include <algorithm>
#include <cmath>
#include <memory>
#include <stdexcept>

namespace gapwright {

std::string_view table_kind_word(TableKind kind) {
  switch (kind) {
    case TableKind::parallel:
      return "parallel";
    case TableKind::crossed:
      return "crossed";
    case TableKind::beads:
      return "beads";
  }
  throw std::invalid_argument("table_kind_word: kind outside the enumeration");
}

std::string_view energy_unit(TableKind kind) {
  return kind == TableKind::parallel ? "eV/nm" : "eV";
}

std::string_view force_unit(TableKind kind) {
  return kind == TableKind::parallel ? "eV/nm2" : "eV/nm";
}

namespace {

// Distances of our own choice are whole multiples of this.
double rounded_up(double distance_nm) {
  constexpr double grains = 1 / distance_grain_nm;
  return std::ceil(distance_nm * grains) / grains;
}

}  // namespace

Table begin_table(const Binder& binder, const TableRequest& request) {
  check_request(request);
  const Tube &one = tubes_of(request.first).walls.back(),
             &other = tubes_of(request.second).walls.back();
  Table table;
  table.kind = request.kind;
  table.object_1 = label_of(request.first);
  table.object_2 = label_of(request.second);
  table.diameter_1_nm = one.diameter_nm();
  table.diameter_2_nm = other.diameter_nm();
  table.touching_nm = one.radius_nm + other.radius_nm;
  table.settings = binder.settings();
  table.tolerance = table.settings.tolerance;
  const double first = table.touching_nm + min_gap_nm, last = table.touching_nm + last_gap_nm;
  table.first_nm = request.inner_cut_nm.value_or(rounded_up(first));
  table.outer_cut_nm = request.outer_cut_nm;
  if (request.kind == TableKind::beads && !table.outer_cut_nm)
    table.outer_cut_nm = rounded_up(std::max(last, table.first_nm + last_gap_nm / 2));
  table.last_nm = table.outer_cut_nm.value_or(
      rounded_up(table.first_nm < last - last_gap_nm / 2 ? last : table.first_nm + last_gap_nm));
  return table;
}

PairPotential parallel_potential(const Binder& binder, const TableRequest& request,
                                 const Table& table, double reach_gap_nm) {
  const auto curve =
      binder.curve({Arrangement::parallel, request.first, request.second, std::nullopt});
  const double first = table.first_nm - table.touching_nm, last = table.last_nm - table.touching_nm;
  return pair_potential(*curve, binder.contact_term(table.settings.contact_target), first,
                        std::max(last, reach_gap_nm), table.tolerance);
}

EnergyFunction with_cut(EnergyFunction function, const Table& table) {
  if (!table.outer_cut_nm) return function;
  const auto cut = std::make_shared<const OuterCut>(std::move(function), *table.outer_cut_nm);
  return [cut](double distance) { return cut->at(distance); };
}

std::optional<double> cut_shift(const EnergyFunction& function, const Table& table) {
  if (!table.outer_cut_nm) return std::nullopt;
  return OuterCut(function, *table.outer_cut_nm).shift();
}

void note_well(const EnergyFunction& function, Table& table) {
  const double farthest = table.outer_cut_nm ? switch_begin * table.last_nm : table.last_nm;
  const auto well = first_well(function, table.first_nm, farthest);
  if (!well) return;
  table.well_distance_nm = well->distance_nm;
  table.well_energy = well->energy.value;
}

void take_errors(const PairPotential& potential, Table& table) {
  table.dispersion_error = std::max(table.dispersion_error, potential.dispersion_error);
  table.slope_error = std::max(table.slope_error, potential.slope_error);
  if (!potential.positive) note_too_close(table);
}

void note_too_close(Table& table) {
  table.status = Status::outside_range;
  table.message = "a determinant was not positive: the first distances are too close";
}

void judge(Table& table) {
  if (table.status != Status::ok) return;
  const double reading = std::max(
      {table.reading_error.energy, table.reading_error.force, table.bead_sum_error.value_or(0.0)});
  if (table.dispersion_error <= table.tolerance && reading <= table.tolerance) return;
  table.status = Status::not_converged;
  table.message = "an error exceeds the tolerance";
}

Table parallel_table(const Binder& binder, const TableRequest& request) {
  Table table = begin_table(binder, request);
  const PairPotential potential = parallel_potential(binder, request, table, 0.0);
  const EnergyFunction bare = [&](double distance) { return potential.total.at(distance); };
  const EnergyFunction function = with_cut(bare, table);
  table.shift = cut_shift(bare, table);
  note_well(function, table);
  const TableScale scale = table_scale(function, table.first_nm, table.last_nm);
  const PlacedPoints placed =
      place_points(function, table.first_nm, table.last_nm, scale, table.tolerance);
  for (const TablePoint& point : placed.points)
    table.rows.push_back(
        {.distance_nm = point.distance_nm, .energy = point.energy, .force = point.force});
  table.reading_error = placed.error;
  take_errors(potential, table);
  judge(table);
  return table;
}

namespace {

// The pair potential beside parallel and crossed rows, where tubes have a contact term at all.
Table with_pair_potential(Table table, const Binder& binder, const TableRequest& request) {
  const bool crossed = table.kind == TableKind::crossed;
  Placement placement{crossed ? Arrangement::crossed : Arrangement::parallel, request.first,
                      request.second};
  std::unique_ptr<PairCurve> curve;
  for (TableRow& row : table.rows) {
    if (row.angle_deg && *row.angle_deg == 0) continue;
    if (!curve || row.angle_deg != placement.angle_deg) {
      placement.angle_deg = row.angle_deg;
      curve = binder.curve(placement);
    }
    if (!curve->has_contact()) return table;
    row.pair_potential =
        curve->contact(graphitic_pair_potential(), row.distance_nm - table.touching_nm).energy;
  }
  return table;
}

}  // namespace

Table make_table(const Binder& binder, const TableRequest& request) {
  switch (request.kind) {
    case TableKind::parallel:
      return with_pair_potential(parallel_table(binder, request), binder, request);
    case TableKind::crossed:
      return with_pair_potential(crossed_table(binder, request), binder, request);
    case TableKind::beads:
      return bead_table(binder, request);
  }
  throw std::invalid_argument("make_table: kind outside the enumeration");
}

}  // namespace gapwright
