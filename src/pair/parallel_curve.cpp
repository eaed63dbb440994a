#include "parallel_curve.hpp"

#include "density_sums.hpp"
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

ParallelCurve::Bodies ParallelCurve::bodies(Electrons electrons, const Window& here) const {
  return {body_scatterer(first_, electrons, here, cache_),
          body_scatterer(second_, electrons, here, cache_)};
}

ParallelCurve::Evaluated ParallelCurve::evaluate(double gap_nm, bool with_slope,
                                                 RoundTrips trips) const {
  const Window here = window(gap_nm);
  const Bodies own = bodies(Electrons::own, here);
  Evaluated result;
  result.gap_nm = gap_nm;
  result.coupling = std::make_shared<const ParallelCoupling>(
      *own.first, *own.second, touching_nm() + gap_nm, here, with_slope);
  result.own = result.coupling->density(
      *own.first, *own.second,
      trips == RoundTrips::all ? FurtherTrips::included : FurtherTrips::left_out);
  return result;
}

CurvePoint ParallelCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window here = window(gap_nm);
  Evaluated result = evaluate(gap_nm, with_slope, trips);
  const auto sum = [&](const FrequencyDensity& part) {
    return frequency_sum(part, carbon_.nodes, here.xi, carbon_.conditions);
  };
  CurvePoint point;
  const FrequencySum energy = sum(result.own.energy);
  point.energy = energy;
  point.static_part = energy.static_part;
  point.first_round_trip = sum(result.own.first_round_trip).value;
  point.positive = result.own.positive;
  if (with_slope) {
    point.slope = sum(result.own.distance_slope);
    point.first_slope = sum(result.own.first_slope).value;
  }
  if (trips == RoundTrips::all) {
    const std::lock_guard lock(last_mutex_);
    last_ = std::move(result);
  }
  return point;
}

Estimate ParallelCurve::electronic_share(double gap_nm) const {
  Evaluated own;
  {
    const std::lock_guard lock(last_mutex_);
    own = last_;
  }
  if (own.gap_nm != gap_nm) own = evaluate(gap_nm, false, RoundTrips::all);
  const Window here = window(gap_nm);
  const Bodies flat = bodies(Electrons::flat, here);
  const FrequencyDensity less = own.coupling->density(*flat.first, *flat.second).energy;
  FrequencyDensity difference = own.own.energy;
  add_density(difference, less, -1.0);
  return frequency_sum(difference, carbon_.nodes, here.xi, carbon_.conditions);
}

SmoothEnergy ParallelCurve::contact(const PairFunction& pair, double gap_nm) const {
  const double distance = touching_nm() + gap_nm;
  SmoothEnergy sum;
  if (!has_contact()) return sum;
  for (const Tube& a : first_.walls)
    for (const Tube& b : second_.walls) {
      const SmoothEnergy e = parallel_energy(pair, a.radius_nm, b.radius_nm, distance);
      sum.energy += e.energy;
      sum.slope += e.slope;
    }
  return sum;
}

}  // namespace gapwright
