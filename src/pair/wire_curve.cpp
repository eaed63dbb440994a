#include "wire_curve.hpp"

#include "tube_body.hpp"

#include <gapwright/join/crossed.hpp>
#include <gapwright/join/over_sheet.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/join/plain_wire.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

double radius_of(const AxialBody& body) {
  if (const auto* wire = std::get_if<ElectronGasWire>(&body)) return wire->radius_nm;
  return outer_radius_nm(std::get<TubeObject>(body));
}

template <typename Density>
CurvePoint point_of(const Density& density, const Window& window, const Carbon& carbon,
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

double WireCurve::touching_nm() const {
  return radius_of(first_) + (second_ ? radius_of(*second_) : 0.0);
}

std::string WireCurve::note(double gap_nm) const {
  double wider = radius_of(first_);
  if (second_) wider = std::max(wider, radius_of(*second_));
  return axial_note(touching_nm() + gap_nm, wider, false);
}

Window WireCurve::window(double gap_nm) const {
  const double distance = touching_nm() + gap_nm;
  const auto all = [&] {
    if (!second_) return over_sheet_window(radius_of(first_), gap_nm, carbon_.nodes);
    const double r1 = radius_of(first_), r2 = radius_of(*second_);
    return arrangement_ == Arrangement::crossed ? crossed_window(r1, r2, distance, carbon_.nodes)
                                                : parallel_window(r1, r2, distance, carbon_.nodes);
  }();
  const bool tube = std::holds_alternative<TubeObject>(first_) ||
                    (second_ && std::holds_alternative<TubeObject>(*second_));
  return tube ? all : axial_window(all);
}

void WireCurve::announce(double closest_gap_nm) const {
  const Window window = this->window(closest_gap_nm);
  for (const AxialBody* body : {&first_, second_ ? &*second_ : nullptr}) {
    if (!body) continue;
    if (const auto* tubes = std::get_if<TubeObject>(body))
      for (const Tube& wall : tubes->walls) cache_.announce(wall, window);
  }
}

std::shared_ptr<const Scatterer> WireCurve::scatterer(const AxialBody& body,
                                                      const Window& window) const {
  if (const auto* tubes = std::get_if<TubeObject>(&body))
    return body_scatterer(*tubes, Electrons::own, window, cache_);
  return std::make_shared<const Scatterer>(
      gas_wire_scatterer(std::get<ElectronGasWire>(body), carbon_.conditions.temperature_K,
                         nodes_on(window, carbon_.nodes), window));
}

CurvePoint WireCurve::dispersion(double gap_nm, bool with_slope, RoundTrips trips) const {
  const Window here = window(gap_nm);
  const bool all = trips == RoundTrips::all;
  if (arrangement_ == Arrangement::crossed) return crossed(gap_nm, here, with_slope, all);
  const double distance = touching_nm() + gap_nm;
  const auto first = scatterer(first_, here);
  if (second_)
    return point_of(
        parallel_density(*first, *scatterer(*second_, here), distance, here, with_slope), here,
        carbon_, with_slope, all);
  if (below_) {
    const HalfSpaceReflector half_space(*below_, Medium{}, carbon_.nodes, here.xi);
    return point_of(over_sheet_density(*first, half_space, distance, here, with_slope), here,
                    carbon_, with_slope, all);
  }
  const CarbonReflector sheet(cache_.shared_flat(here.xi), carbon_.background, carbon_.nodes);
  return point_of(over_sheet_density(*first, sheet, distance, here, with_slope), here, carbon_,
                  with_slope, all);
}

CurvePoint WireCurve::crossed(double gap_nm, const Window& here, bool with_slope, bool all) const {
  const double distance = touching_nm() + gap_nm;
  const auto a = scatterer(first_, here), b = scatterer(*second_, here);
  const auto sum = [&](const FrequencyDensity& part) {
    return frequency_sum(part, carbon_.nodes, here.xi, carbon_.conditions);
  };
  const CrossedDensity first = crossed_density(*a, *b, distance, angle_deg_, here, with_slope);
  CurvePoint point;
  point.energy = sum(first.first_round_trip);
  point.first_round_trip = point.energy.value;
  if (with_slope) {
    point.slope = sum(first.first_slope);
    point.first_slope = point.slope.value;
  }
  if (!all) return point;
  const CrossedFurther further = crossed_further(*a, *b, distance, angle_deg_, here, with_slope);
  point.positive = further.positive;
  const double precision = further.angle_share + 0.3 * carbon_.nodes.tolerance;
  const auto add = [&](Estimate& to, const FrequencyDensity& density) {
    const Estimate more = sum(density);
    to.error += more.error + precision * std::fabs(to.value);
    to.value += more.value;
  };
  add(point.energy, further.energy);
  if (with_slope) add(point.slope, further.slope);
  return point;
}

}  // namespace gapwright
