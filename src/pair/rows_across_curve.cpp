#include "rows_across_curve.hpp"

#include "rows_curve.hpp"
#include "tube_body.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/join/rows_over_sheet.hpp>

#include <cmath>

namespace gapwright {
namespace {

constexpr const char* first_only =
    "first round trip: further ones, a few per cent of it near contact, are not computed for a "
    "ribbon across or over another body";

/// A point that ends with the first round trip.
CurvePoint first_point(const FrequencyDensity& energy, const FrequencyDensity& slope,
                       const Window& window, const Carbon& carbon, bool with_slope) {
  CurvePoint point;
  point.energy = frequency_sum(energy, carbon.nodes, window.xi, carbon.conditions);
  point.first_round_trip = point.energy.value;
  if (!with_slope) return point;
  point.slope = frequency_sum(slope, carbon.nodes, window.xi, carbon.conditions);
  point.first_slope = point.slope.value;
  return point;
}

}  // namespace

std::string RowsCrossedCurve::note(double /*gap_nm*/) const {
  return first_only;
}

std::string RowsOverCurve::note(double /*gap_nm*/) const {
  return first_only;
}

double RowsCrossedCurve::touching_nm() const {
  return ribbon_ ? 0.0 : outer_radius_nm(tube_);
}

Window RowsCrossedCurve::window(double gap_nm) const {
  return crossed_window(0.0, touching_nm(), touching_nm() + gap_nm, carbon_.nodes);
}

void RowsCrossedCurve::announce(double closest_gap_nm) const {
  const Window window = this->window(closest_gap_nm);
  ribbons_.announce(first_, window);
  if (ribbon_) return ribbons_.announce(*ribbon_, window);
  for (const Tube& wall : tube_.walls) tubes_.announce(wall, window);
}

CurvePoint RowsCrossedCurve::dispersion(double gap_nm, bool with_slope, RoundTrips /*all*/) const {
  const Window here = window(gap_nm);
  const double distance = touching_nm() + gap_nm;
  const auto rows = ribbons_.scatterer(first_, here);
  CrossedDensity density;
  if (ribbon_) {
    const auto other = *ribbon_ == first_ ? rows : ribbons_.scatterer(*ribbon_, here);
    density = crossed_density(*rows, *other, distance, angle_deg_, here, with_slope);
  } else {
    const auto tube = body_scatterer(tube_, Electrons::own, here, tubes_);
    density = crossed_density(*rows, *tube, distance, angle_deg_, here, with_slope);
  }
  return first_point(density.first_round_trip, density.first_slope, here, carbon_, with_slope);
}

SmoothEnergy RowsCrossedCurve::contact(const PairFunction& pair, double gap_nm) const {
  const double sine = std::sin(angle_deg_ * constants::pi / 180);
  SmoothEnergy sum;
  if (ribbon_) {
    sum = crossed_lines_energy_sine(pair, first_.atoms_per_nm(), ribbon_->atoms_per_nm(), gap_nm);
  } else {
    for (const Tube& wall : tube_.walls) {
      const SmoothEnergy e = crossed_lines_shell_energy_sine(
          pair, first_.atoms_per_nm(), wall.radius_nm, touching_nm() + gap_nm);
      sum.energy += e.energy;
      sum.slope += e.slope;
    }
  }
  return {sum.energy / sine, sum.slope / sine};
}

void RowsOverCurve::announce(double closest_gap_nm) const {
  ribbons_.announce(ribbon_, rows_window(closest_gap_nm, carbon_.nodes));
}

std::unique_ptr<const Reflector> RowsOverCurve::reflector(const Window& window) const {
  if (half_space_)
    return std::make_unique<HalfSpaceReflector>(*half_space_, Medium{}, carbon_.nodes, window.xi);
  return std::make_unique<CarbonReflector>(tubes_.shared_flat(window.xi), carbon_.background,
                                           carbon_.nodes);
}

CurvePoint RowsOverCurve::dispersion(double gap_nm, bool with_slope, RoundTrips /*all*/) const {
  const Window here = rows_window(gap_nm, carbon_.nodes);
  const RowsOverSheetDensity density = rows_over_sheet_density(
      *ribbons_.scatterer(ribbon_, here), *reflector(here), gap_nm, here, with_slope);
  return first_point(density.first_round_trip, density.first_slope, here, carbon_, with_slope);
}

SmoothEnergy RowsOverCurve::contact(const PairFunction& pair, double gap_nm) const {
  if (half_space_) return {};
  return lines_sheet_energy(pair, lines_of(ribbon_, {}), gap_nm);
}

}  // namespace gapwright
