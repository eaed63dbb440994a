#include "parallel_curve.hpp"

#include "tube_body.hpp"

#include <gapwright/contact/beside.hpp>

namespace gapwright {

double ParallelCurve::touching_nm() const {
  return outer_radius_nm(first_) + outer_radius_nm(second_);
}

Window ParallelCurve::window(double gap_nm) const {
  return parallel_window(outer_radius_nm(first_), outer_radius_nm(second_), touching_nm() + gap_nm,
                         carbon_.nodes);
}

void ParallelCurve::announce(double closest_gap_nm) const {
  const Window window = this->window(closest_gap_nm);
  for (const TubeObject* object : {&first_, &second_})
    for (const Tube& wall : object->walls) cache_.announce(wall, window);
}

ParallelDensity ParallelCurve::densities(double gap_nm, const Window& here, Electrons electrons,
                                         bool with_slope) const {
  const auto a = body_scatterer(first_, electrons, here, cache_);
  const auto b = body_scatterer(second_, electrons, here, cache_);
  return parallel_density(*a, *b, touching_nm() + gap_nm, here, with_slope);
}

CurvePoint ParallelCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window here = window(gap_nm);
  const ParallelDensity density = densities(gap_nm, here, Electrons::own, with_slope);
  const bool all = trips == RoundTrips::all;
  const auto sum = [&](const FrequencyDensity& part) {
    return frequency_sum(part, carbon_.nodes, here.xi, carbon_.conditions);
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

Estimate ParallelCurve::electronic_share(double gap_nm) const {
  const Window here = window(gap_nm);
  FrequencyDensity difference = densities(gap_nm, here, Electrons::own, false).energy;
  const FrequencyDensity flat = densities(gap_nm, here, Electrons::flat, false).energy;
  for (std::size_t k = 0; k < difference.full.size(); ++k) {
    difference.full[k] -= flat.full[k];
    difference.halved[k] -= flat.halved[k];
  }
  return frequency_sum(difference, carbon_.nodes, here.xi, carbon_.conditions);
}

SmoothEnergy ParallelCurve::contact(const PairFunction& pair, double gap_nm) const {
  const double distance = touching_nm() + gap_nm;
  SmoothEnergy sum;
  for (const Tube& a : first_.walls)
    for (const Tube& b : second_.walls) {
      const SmoothEnergy e = parallel_energy(pair, a.radius_nm, b.radius_nm, distance);
      sum.energy += e.energy;
      sum.slope += e.slope;
    }
  return sum;
}

}  // namespace gapwright
