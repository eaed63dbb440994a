#include "crossed_further.hpp"
#include "multipoles.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/parallel.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

/// Bent walls see each other along a length √(R·gap)/sin γ: the wider it is, the sooner the ratio
/// of further round trips to the first is that of parallel bodies.
constexpr double grid_angle_deg = 20.0, least_grid_angle_deg = 15.0, most_grid_angle_deg = 45.0;

/// Of the change of the ratio between γ → 0 and the lowest grid angle: how far it is from linear in
/// sin γ, found for tubes from contact to 50 nm.
constexpr double curvature_share = 0.1;

/// Lateral offset, in lengths of the closest approach, beyond which parallel bodies count nothing.
constexpr double largest_offset = 100.0;

/// The part of a crossed window that parallel bodies at this distance need.
Window parallel_part(const Crossing& row, double distance_nm) {
  const Nodes& nodes = row.first.nodes();
  const double limit = largest_exponent(nodes.tolerance), wider = row.wider_radius();
  const double touch = row.first.radius_nm() + row.second.radius_nm();
  const double far = distance_nm - touch + wider;
  Window part;
  part.xi = row.window.xi;
  part.fine = row.window.fine;
  const int end = nodes.q.index_above(limit / (2 * (distance_nm - touch))) + 1;
  part.q = {row.window.q.first, std::min(end, row.window.q.end()) - row.window.q.first};
  const int least = least_multipole(distance_nm - touch);
  int largest = 0;
  for (int j = 0; j < part.q.count; ++j) {
    const int m = largest_multipole(nodes.q.node(part.q.first + j), wider, far, limit, largest);
    largest = std::min(j == 0 ? m : std::min(m, largest), row.window.orders[std::size_t(j)] - 1);
    part.orders.push_back(std::max(largest, least) + 1);
  }
  return part;
}

void add(FrequencyDensity& to, const FrequencyDensity& from, double factor) {
  to.full.resize(from.full.size());
  to.halved.resize(from.full.size());
  for (std::size_t x = 0; x < from.full.size(); ++x) {
    to.full[x] += factor * from.full[x];
    to.halved[x] += factor * from.halved[x];
  }
}

}  // namespace

SmallAngle small_angle(const Crossing& row, bool with_slope) {
  // ∫dy f(√(D² + y²)) with y = L·sinh u: f is singular where the bodies touch, at u = ±iπ/2.
  const double touch = row.first.radius_nm() + row.second.radius_nm();
  const double length = std::sqrt(row.gap() * (row.distance_nm + touch));
  const double step = row.first.nodes().q.step;
  SmallAngle limit;
  for (int i = 0; std::cosh(i * step) <= largest_offset; ++i) {
    const double y = length * std::sinh(i * step);
    const double dy = (i == 0 ? 1.0 : 2.0) * step * length * std::cosh(i * step);
    const double distance = std::hypot(row.distance_nm, y);
    const ParallelDensity at =
        parallel_density(row.first, row.second, distance, parallel_part(row, distance), with_slope);
    limit.positive = limit.positive && at.positive;
    add(limit.first, at.first_round_trip, dy);
    add(limit.further, at.energy, dy);
    add(limit.further, at.first_round_trip, -dy);
    if (!with_slope) continue;
    const double turn = dy * row.distance_nm / distance;
    add(limit.first_slope, at.first_slope, turn);
    add(limit.further_slope, at.distance_slope, turn);
    add(limit.further_slope, at.first_slope, -turn);
  }
  return limit;
}

double lowest_grid_angle_deg(double radius_1_nm, double radius_2_nm, double distance_nm) {
  const double gap = distance_nm - radius_1_nm - radius_2_nm;
  return std::clamp(grid_angle_deg * std::sqrt(std::max(radius_1_nm, radius_2_nm) / gap),
                    least_grid_angle_deg, most_grid_angle_deg);
}

namespace {

/// Further over first round trip and its derivative by the distance.
struct Ratio {
  double value = 0.0, slope = 0.0;
};

Ratio ratio(double further, double further_slope, double first, double first_slope) {
  if (first == 0) return {};
  return {further / first, (further_slope - further / first * first_slope) / first};
}

using Values = std::vector<double> FrequencyDensity::*;

/// Fills one set of values of `result` at the angle of `row`; the largest change of the ratio.
void interpolate(Values values, const CrossedDensity& here, const CrossedDensity& grid_first,
                 const CrossedFurther& grid, const SmallAngle& limit, double share, bool with_slope,
                 CrossedFurther& result) {
  const auto get = [&](const FrequencyDensity& density, std::size_t x) {
    return with_slope || density.derivatives == 0 ? (density.*values)[x] : 0.0;
  };
  const std::size_t frequencies = (here.first_round_trip.*values).size();
  (result.energy.*values).resize(frequencies);
  if (with_slope) (result.slope.*values).resize(frequencies);
  for (std::size_t x = 0; x < frequencies; ++x) {
    const Ratio at_grid =
        ratio(get(grid.energy, x), get(grid.slope, x), get(grid_first.first_round_trip, x),
              get(grid_first.first_slope, x));
    const Ratio at_zero = ratio(get(limit.further, x), get(limit.further_slope, x),
                                get(limit.first, x), get(limit.first_slope, x));
    const double value = at_zero.value + share * (at_grid.value - at_zero.value);
    const double slope = at_zero.slope + share * (at_grid.slope - at_zero.slope);
    const double first = (here.first_round_trip.*values)[x];
    (result.energy.*values)[x] = first * value;
    if (with_slope)
      (result.slope.*values)[x] = first * slope + (here.first_slope.*values)[x] * value;
  }
}

double total(const FrequencyDensity& density, const Crossing& row) {
  return frequency_sum(density, row.first.nodes(), row.window.xi).value;
}

}  // namespace

CrossedFurther crossed_further(const Scatterer& first, const Scatterer& second, double distance_nm,
                               double angle_deg, const Window& window, bool with_slope) {
  const Crossing row{first, second, window, distance_nm, angle_deg};
  row.require("crossed_further");
  const double lowest = lowest_grid_angle_deg(first.radius_nm(), second.radius_nm(), distance_nm);
  if (angle_deg >= lowest) return further_on_grid(row, with_slope);

  const Crossing at_grid{first, second, window, distance_nm, lowest};
  const CrossedFurther grid = further_on_grid(at_grid, with_slope);
  const CrossedDensity grid_first =
      crossed_density(first, second, distance_nm, lowest, window, with_slope);
  const CrossedDensity here =
      crossed_density(first, second, distance_nm, angle_deg, window, with_slope);
  SmallAngle limit = small_angle(row, with_slope);
  limit.first_slope.derivatives = limit.further_slope.derivatives = 1;
  const auto sine = [](double degrees) { return std::sin(degrees * constants::pi / 180); };
  const double share = sine(angle_deg) / sine(lowest);

  CrossedFurther result;
  result.slope.derivatives = 1;
  result.positive = grid.positive && limit.positive;
  for (const Values values : {&FrequencyDensity::full, &FrequencyDensity::halved})
    interpolate(values, here, grid_first, grid, limit, share, with_slope, result);
  const double change = total(grid.energy, row) / total(grid_first.first_round_trip, row) -
                        total(limit.further, row) / total(limit.first, row);
  result.angle_share = curvature_share * std::fabs(change) * 4 * share * (1 - share);
  return result;
}

}  // namespace gapwright
