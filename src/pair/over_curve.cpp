#include "over_curve.hpp"

#include "density_sums.hpp"
#include "tube_body.hpp"

#include <gapwright/contact/beside.hpp>

namespace gapwright {

double OverCurve::touching_nm() const {
  return outer_radius_nm(tube_);
}

Window OverCurve::window(double gap_nm) const {
  return over_sheet_window(touching_nm(), gap_nm, carbon_.nodes);
}

void OverCurve::announce(double closest_gap_nm) const {
  const Window window = this->window(closest_gap_nm);
  for (const Tube& wall : tube_.walls) cache_.announce(wall, window);
}

std::unique_ptr<const Reflector> OverCurve::reflector(const Window& window) const {
  if (half_space_)
    return std::make_unique<HalfSpaceReflector>(*half_space_, carbon_.medium, carbon_.nodes,
                                                window.xi);
  return std::make_unique<CarbonReflector>(cache_.shared_flat(window.xi), carbon_.background,
                                           carbon_.nodes);
}

OverSheetDensity OverCurve::densities(double gap_nm, const Window& here, Electrons electrons,
                                      bool with_slope) const {
  return over_sheet_density(*body_scatterer(tube_, electrons, here, cache_), *reflector(here),
                            touching_nm() + gap_nm, here, with_slope);
}

CurvePoint OverCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window here = window(gap_nm);
  const OverSheetDensity density = densities(gap_nm, here, Electrons::own, with_slope);
  const bool all = trips == RoundTrips::all;
  const auto sum = [&](const FrequencyDensity& part) {
    return frequency_sum(part, carbon_.nodes, here.xi, carbon_.conditions);
  };
  CurvePoint point;
  const FrequencySum energy = sum(all ? density.energy : density.first_round_trip);
  point.energy = energy;
  point.static_part = energy.static_part;
  point.first_round_trip = all ? sum(density.first_round_trip).value : point.energy.value;
  point.positive = density.positive;
  if (!with_slope) return point;
  point.slope = sum(all ? density.distance_slope : density.first_slope);
  point.first_slope = all ? sum(density.first_slope).value : point.slope.value;
  return point;
}

Estimate OverCurve::electronic_share(double gap_nm) const {
  const Window here = window(gap_nm);
  FrequencyDensity difference = densities(gap_nm, here, Electrons::own, false).energy;
  add_density(difference, densities(gap_nm, here, Electrons::flat, false).energy, -1.0);
  return frequency_sum(difference, carbon_.nodes, here.xi, carbon_.conditions);
}

SmoothEnergy OverCurve::contact(const PairFunction& pair, double gap_nm) const {
  SmoothEnergy sum;
  if (half_space_) return sum;
  const double distance = touching_nm() + gap_nm;
  for (const Tube& wall : tube_.walls) {
    const SmoothEnergy e = over_sheet_energy(pair, wall.radius_nm, distance - wall.radius_nm);
    sum.energy += e.energy;
    sum.slope += e.slope;
  }
  return sum;
}

}  // namespace gapwright
