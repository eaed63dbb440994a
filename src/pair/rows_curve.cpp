#include "rows_curve.hpp"

#include "tube_body.hpp"

#include <gapwright/catalog/constants.hpp>

namespace gapwright {
namespace {

CurvePoint point_of(const RowDensity& density, const Window& window, const Carbon& carbon,
                    bool with_slope, bool all) {
  const auto sum = [&](const FrequencyDensity& part) {
    return frequency_sum(part, carbon.nodes, window.xi, carbon.conditions);
  };
  CurvePoint point;
  point.energy = sum(all ? density.energy : density.first_round_trip);
  point.first_round_trip = all ? sum(density.first_round_trip).value : point.energy.value;
  point.positive = density.positive;
  if (!with_slope) return point;
  point.slope = sum(all ? density.distance_slope : density.first_slope);
  point.first_slope = all ? sum(density.first_slope).value : point.slope.value;
  return point;
}

}  // namespace

std::vector<AtomLine> lines_of(const Ribbon& ribbon, const RowPose& pose) {
  std::vector<AtomLine> lines;
  const double atoms = ribbon.strip_nm() / constants::atom_area_nm2;
  for (const RowPoint& point : placed_rows(ribbon_rows(ribbon), pose))
    lines.push_back({point.y_nm, point.z_nm, atoms});
  return lines;
}

RowPose RowsCurve::pose(double gap_nm) const {
  if (arrangement_ == Arrangement::coplanar)
    return coplanar_pose(first_, second_, gap_nm, offset_nm_);
  if (arrangement_ == Arrangement::edge_on) return edge_on_pose(second_, gap_nm, offset_nm_);
  return stacked_pose(gap_nm, offset_nm_);
}

double RowsCurve::touching_nm() const {
  const RowPose touching = pose(0.0);
  return touching.y_nm * touching.away_y + touching.z_nm * touching.away_z;
}

void RowsCurve::announce(double closest_gap_nm) const {
  const Window window = rows_window(closest_gap_nm, carbon_.nodes);
  for (const Ribbon& ribbon : {first_, second_}) cache_.announce(ribbon, window);
}

CurvePoint RowsCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window window = rows_window(gap_nm, carbon_.nodes);
  const auto a = cache_.scatterer(first_, window);
  const auto b = first_ == second_ ? a : cache_.scatterer(second_, window);
  const RowDensity density = rows_density(*a, *b, pose(gap_nm), window, with_slope);
  return point_of(density, window, carbon_, with_slope, trips == RoundTrips::all);
}

SmoothEnergy RowsCurve::contact(const PairFunction& pair, double gap_nm) const {
  const RowPose here = pose(gap_nm);
  return lines_energy(pair, lines_of(first_, {}), lines_of(second_, here), here.away_y,
                      here.away_z);
}

RowPose RowsTubeCurve::pose(double gap_nm) const {
  const double radius = outer_radius_nm(tube_);
  return arrangement_ == Arrangement::stacked
             ? tube_over_pose(radius, gap_nm, offset_nm_)
             : tube_beside_pose(ribbon_, radius, gap_nm, offset_nm_);
}

Window RowsTubeCurve::window(double gap_nm) const {
  return rows_tube_window(outer_radius_nm(tube_), gap_nm, carbon_.nodes);
}

double RowsTubeCurve::touching_nm() const {
  const RowPose touching = pose(0.0);
  return touching.y_nm * touching.away_y + touching.z_nm * touching.away_z;
}

void RowsTubeCurve::announce(double closest_gap_nm) const {
  const Window window = this->window(closest_gap_nm);
  ribbons_.announce(ribbon_, window);
  for (const Tube& wall : tube_.walls) tubes_.announce(wall, window);
}

CurvePoint RowsTubeCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window window = this->window(gap_nm);
  const auto rows = ribbons_.scatterer(ribbon_, window);
  const auto tube = body_scatterer(tube_, Electrons::own, window, tubes_);
  const RowDensity density = rows_tube_density(*rows, *tube, pose(gap_nm), window, with_slope);
  return point_of(density, window, carbon_, with_slope, trips == RoundTrips::all);
}

SmoothEnergy RowsTubeCurve::contact(const PairFunction& pair, double gap_nm) const {
  const RowPose here = pose(gap_nm);
  const std::vector<AtomLine> lines = lines_of(ribbon_, {});
  SmoothEnergy sum;
  for (const Tube& wall : tube_.walls) {
    const SmoothEnergy e = lines_shell_energy(pair, lines, wall.radius_nm, here.y_nm, here.z_nm,
                                              here.away_y, here.away_z);
    sum.energy += e.energy;
    sum.slope += e.slope;
  }
  return sum;
}

}  // namespace gapwright
