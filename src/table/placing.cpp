#include "column_spline.hpp"

#include <gapwright/table/placing.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

// Where the derivative of a cubic through two ends is worst, and the middle.
constexpr std::array places = {0.2113, 0.5, 0.7887};
// Steps grow no faster than this, so that splines through a column do not suffer.
constexpr double largest_growth = 1.3;

double on_grain(double distance) {
  constexpr double grains = 1 / distance_grain_nm;
  return std::round(distance * grains) / grains;  // the number nearest to the decimal one
}

TablePoint point_at(const EnergyFunction& function, double distance) {
  const Jet jet = function(distance);
  return {distance, jet.value, -jet.slope};
}

Jet cubic_between(const TablePoint& a, const TablePoint& b, double distance) {
  const double h = b.distance_nm - a.distance_nm, t = (distance - a.distance_nm) / h;
  const double rise = b.energy - a.energy, s0 = -h * a.force, s1 = -h * b.force;
  const double c2 = 3 * rise - 2 * s0 - s1, c3 = -2 * rise + s0 + s1;
  return {a.energy + t * (s0 + t * (c2 + t * c3)), (s0 + t * (2 * c2 + 3 * t * c3)) / h,
          (2 * c2 + 6 * t * c3) / (h * h)};
}

double energy_off(double found, const Jet& wanted, const TableScale& scale) {
  return std::fabs(found - wanted.value) / std::max(std::fabs(wanted.value), scale.energy);
}

double force_off(double found, const Jet& wanted, const TableScale& scale) {
  return std::fabs(found + wanted.slope) / std::max(std::fabs(wanted.slope), scale.force);
}

bool good_between(const EnergyFunction& function, const TablePoint& a, const TablePoint& b,
                  const TableScale& scale, double tolerance) {
  return std::all_of(places.begin(), places.end(), [&](double t) {
    const double distance = a.distance_nm + t * (b.distance_nm - a.distance_nm);
    const Jet wanted = function(distance), found = cubic_between(a, b, distance);
    return energy_off(found.value, wanted, scale) <= tolerance &&
           force_off(-found.slope, wanted, scale) <= tolerance;
  });
}

std::vector<TablePoint> march(const EnergyFunction& function, double low, double high,
                              const TableScale& scale, double tolerance) {
  std::vector<TablePoint> points = {point_at(function, low)};
  double step = std::min(0.01, 0.1 * (high - low));
  const double shortest = 4 * distance_grain_nm;
  while (points.back().distance_nm < high) {
    const TablePoint& last = points.back();
    step *= largest_growth;
    TablePoint next;
    for (;; step *= 0.9) {
      // The rest in one step or two, none of them tiny.
      const double left = high - last.distance_nm;
      const double here = step >= left ? left : step > 0.6 * left ? 0.5 * left : step;
      next = point_at(function, here == left ? high : on_grain(last.distance_nm + here));
      if (here < shortest || good_between(function, last, next, scale, tolerance)) break;
    }
    points.push_back(next);
  }
  return points;
}

}  // namespace

TableScale table_scale(const EnergyFunction& function, double low_nm, double high_nm) {
  constexpr int samples = 400;
  double deepest = 0.0, pull = 0.0, largest = 0.0, strongest = 0.0;
  for (int i = 0; i <= samples; ++i) {
    // Dense at the close end.
    const double t = double(i) / samples;
    const Jet jet = function(low_nm + (high_nm - low_nm) * t * t * t);
    deepest = std::max(deepest, -jet.value);
    pull = std::max(pull, jet.slope);
    largest = std::max(largest, std::fabs(jet.value));
    strongest = std::max(strongest, std::fabs(jet.slope));
  }
  return {1e-3 * (deepest > 0 ? deepest : largest), 1e-3 * (pull > 0 ? pull : strongest)};
}

ReadingError reading_error(const EnergyFunction& function, const std::vector<TablePoint>& points,
                           const TableScale& scale) {
  std::vector<double> x, e, f;
  for (const TablePoint& point : points) {
    x.push_back(point.distance_nm);
    e.push_back(point.energy);
    f.push_back(point.force);
  }
  const ColumnSpline energies(x, std::move(e)), forces(x, std::move(f));
  ReadingError error;
  for (std::size_t i = 0; i + 1 < points.size(); ++i)
    for (const double t : {0.1, 0.2113, 0.35, 0.5, 0.65, 0.7887, 0.9}) {
      const double distance = x[i] + t * (x[i + 1] - x[i]);
      const Jet wanted = function(distance);
      const Jet cubic = cubic_between(points[i], points[i + 1], distance);
      error.energy = std::max({error.energy, energy_off(cubic.value, wanted, scale),
                               energy_off(energies.at(distance, i), wanted, scale)});
      error.force = std::max({error.force, force_off(-cubic.slope, wanted, scale),
                              force_off(forces.at(distance, i), wanted, scale)});
    }
  return error;
}

PlacedPoints place_points(const EnergyFunction& function, double low_nm, double high_nm,
                          const TableScale& scale, double tolerance) {
  if (!(low_nm < high_nm) || !(tolerance >= 1e-8 && tolerance <= 0.1))
    throw std::domain_error("place_points: low < high and a tolerance of 1e-8 … 0.1 required");
  PlacedPoints placed;
  double aim = 0.9 * tolerance;
  for (int round = 0; round < 12; ++round, aim *= 0.7) {
    placed.points = march(function, low_nm, high_nm, scale, aim);
    if (placed.points.size() < 4) continue;
    placed.error = reading_error(function, placed.points, scale);
    if (std::max(placed.error.energy, placed.error.force) <= tolerance) break;
  }
  return placed;
}

Jet read_cubic(const std::vector<TablePoint>& points, double distance_nm) {
  const auto place = std::upper_bound(
      points.begin() + 1, points.end() - 1, distance_nm,
      [](double distance, const TablePoint& point) { return distance < point.distance_nm; });
  const TablePoint &a = place[-1], &b = place[0];
  if (distance_nm < a.distance_nm)
    return {a.energy - a.force * (distance_nm - a.distance_nm), -a.force, 0};
  if (distance_nm > b.distance_nm)
    return {b.energy - b.force * (distance_nm - b.distance_nm), -b.force, 0};
  return cubic_between(a, b, distance_nm);
}

}  // namespace gapwright
