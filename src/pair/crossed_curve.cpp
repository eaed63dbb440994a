#include "crossed_curve.hpp"

#include "density_sums.hpp"
#include "tube_body.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/beside.hpp>

#include <cmath>

namespace gapwright {
namespace {

/// What further round trips are off by beyond the estimate of their own grid, in tolerances and as
/// a share of the first round trip.
constexpr double further_precision = 0.3;

}  // namespace

struct CrossedCurve::Bodies {
  std::shared_ptr<const Scatterer> first, second;
};

double CrossedCurve::touching_nm() const {
  return outer_radius_nm(first_) + outer_radius_nm(second_);
}

Window CrossedCurve::window(double gap_nm) const {
  return crossed_window(outer_radius_nm(first_), outer_radius_nm(second_), touching_nm() + gap_nm,
                        carbon_.nodes);
}

void CrossedCurve::announce(double closest_gap_nm) const {
  const Window window = this->window(closest_gap_nm);
  for (const TubeObject* object : {&first_, &second_})
    for (const Tube& wall : object->walls) cache_.announce(wall, window);
}

CrossedCurve::Bodies CrossedCurve::bodies(const Window& window, Electrons electrons) const {
  const auto first = body_scatterer(first_, electrons, window, cache_);
  return {first, first_ == second_ ? first : body_scatterer(second_, electrons, window, cache_)};
}

FrequencySum CrossedCurve::sum(const FrequencyDensity& density, const Window& window) const {
  return frequency_sum(density, carbon_.nodes, window.xi, carbon_.conditions);
}

CurvePoint CrossedCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window here = window(gap_nm);
  const double distance = touching_nm() + gap_nm;
  const Bodies body = bodies(here, Electrons::own);
  const CrossedDensity first =
      crossed_density(*body.first, *body.second, distance, angle_deg_, here, with_slope);
  CurvePoint point;
  const FrequencySum trip = sum(first.first_round_trip, here);
  point.energy = trip;
  point.static_part = trip.static_part;
  point.first_round_trip = point.energy.value;
  if (with_slope) {
    point.slope = sum(first.first_slope, here);
    point.first_slope = point.slope.value;
  }
  if (trips == RoundTrips::first) return point;
  const CrossedFurther further =
      crossed_further(*body.first, *body.second, distance, angle_deg_, here, with_slope);
  point.positive = further.positive;
  // Two grids: their errors have nothing to do with each other.
  const double precision = further.angle_share + further_precision * carbon_.nodes.tolerance;
  const double static_weight = 0.5 * thermal_energy_eV(carbon_.conditions);
  const auto add = [&](Estimate& to, const FrequencySum& more, double static_error) {
    to.error += more.error + precision * std::fabs(to.value) + static_weight * static_error;
    to.value += more.value;
  };
  const FrequencySum more = sum(further.energy, here);
  add(point.energy, more, further.static_error);
  point.static_part += more.static_part;
  if (with_slope) add(point.slope, sum(further.slope, here), further.static_slope_error);
  return point;
}

Estimate CrossedCurve::electronic_share(double gap_nm) const {
  const Window here = window(gap_nm);
  const double distance = touching_nm() + gap_nm;
  const auto density = [&](Electrons electrons) {
    const Bodies body = bodies(here, electrons);
    FrequencyDensity all =
        crossed_density(*body.first, *body.second, distance, angle_deg_, here, false)
            .first_round_trip;
    add_density(
        all, crossed_further(*body.first, *body.second, distance, angle_deg_, here, false).energy);
    return all;
  };
  FrequencyDensity difference = density(Electrons::own);
  add_density(difference, density(Electrons::flat), -1.0);
  return sum(difference, here);
}

SmoothEnergy CrossedCurve::contact(const PairFunction& pair, double gap_nm) const {
  const double distance = touching_nm() + gap_nm;
  const double sine = std::sin(angle_deg_ * constants::pi / 180);
  SmoothEnergy sum;
  if (!has_contact()) return sum;
  for (const Tube& a : first_.walls)
    for (const Tube& b : second_.walls) {
      const SmoothEnergy e = crossed_energy_sine(pair, a.radius_nm, b.radius_nm, distance);
      sum.energy += e.energy / sine;
      sum.slope += e.slope / sine;
    }
  return sum;
}

}  // namespace gapwright
