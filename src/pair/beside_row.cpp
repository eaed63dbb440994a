#include "beside_row.hpp"

#include "well.hpp"

#include <cmath>

namespace gapwright {
namespace {

/// Precision of responses read from the flat table, relative to the dispersion energy.
constexpr double share_precision = 2e-6;

/// The point at the bottom of the well, if there is one; fills the well's fields.
std::optional<CurvePoint> rest(const PairCurve& curve, const ContactTerm& contact, Binding& row) {
  const auto well =
      find_well([&](double gap) { return curve.dispersion(gap, true); },
                [&](double gap) { return curve.dispersion(gap, true, RoundTrips::first); },
                [&](double gap) { return curve.contact(contact.nominal, gap); });
  if (!well) {
    row.status = Status::no_minimum;
    row.message = "the energy has no minimum between gaps of 0.22 and 0.8 nm";
    return std::nullopt;
  }
  const Estimate force = contact.estimate(
      [&](const PairFunction& pair) { return curve.contact(pair, well->gap_nm).slope; });
  row.gap_nm = row.equilibrium_gap_nm = well->gap_nm;
  row.stiffness_eV_per_nm3 = well->stiffness_eV_per_nm3;
  row.equilibrium_gap_error = well->gap_error_nm + force.error / well->stiffness_eV_per_nm3;
  return well->dispersion;
}

void judge(const CurvePoint& point, double tolerance, Binding& row) {
  if (!point.positive) {
    row.status = Status::outside_range;
    row.message = "a determinant was not positive: the bodies are too close for this model";
  } else if (!(*row.relative_error <= tolerance)) {
    row.status = Status::not_converged;
    row.message = "the error estimate exceeds the tolerance";
  }
}

}  // namespace

void bind_beside(const PairCurve& curve, std::optional<double> gap_nm, double tolerance,
                 const ContactTerm& contact, Binding& row) {
  curve.announce(gap_nm.value_or(closest_visited_nm));
  row.gap_nm = gap_nm;
  const std::optional<CurvePoint> found =
      gap_nm ? curve.dispersion(*gap_nm, false) : rest(curve, contact, row);
  if (!found) return;
  const CurvePoint& point = *found;
  const double gap = *row.gap_nm, dispersion = point.energy.value;
  const Estimate contact_energy =
      contact.estimate([&](const PairFunction& pair) { return curve.contact(pair, gap).energy; });
  const Estimate share = curve.electronic_share(gap);
  row.axis_distance_nm = curve.touching_nm() + gap;
  row.dispersion_eV_per_nm = dispersion;
  if (row.temperature_K > 0) row.thermal_share = point.static_part / dispersion;
  row.first_round_trip_eV_per_nm = point.first_round_trip;
  row.contact_eV_per_nm = contact_energy.value;
  row.energy_eV_per_nm = dispersion + contact_energy.value;
  row.energy_error = point.energy.error + contact_energy.error;
  row.relative_error = point.energy.error / std::fabs(dispersion);
  row.electronic_share_eV_per_nm = share.value;
  row.electronic_share_error = share.error + share_precision * std::fabs(dispersion);
  row.pair_potential_eV_per_nm = curve.contact(graphitic_pair_potential(), gap).energy;
  if (row.equilibrium_gap_nm) {
    row.well_depth_eV_per_nm = -*row.energy_eV_per_nm;
    row.well_depth_error = row.energy_error;
  }
  judge(point, tolerance, row);
}

}  // namespace gapwright
