#include "beside_row.hpp"

#include "row_notes.hpp"
#include "well.hpp"

#include <cmath>

namespace gapwright {
namespace {

/// Precision of responses read from the flat table, relative to the dispersion energy.
constexpr double share_precision = 2e-6;

/// Where a row keeps its energies.
struct EnergyFields {
  using Field = std::optional<double> Binding::*;
  Field dispersion, contact, energy, first_round_trip, share, pair_potential, depth, stiffness;
};

constexpr EnergyFields per_length{
    &Binding::dispersion_eV_per_nm,       &Binding::contact_eV_per_nm,
    &Binding::energy_eV_per_nm,           &Binding::first_round_trip_eV_per_nm,
    &Binding::electronic_share_eV_per_nm, &Binding::pair_potential_eV_per_nm,
    &Binding::well_depth_eV_per_nm,       &Binding::stiffness_eV_per_nm3};
constexpr EnergyFields in_all{&Binding::dispersion_eV,       &Binding::contact_eV,
                              &Binding::energy_eV,           &Binding::first_round_trip_eV,
                              &Binding::electronic_share_eV, &Binding::pair_potential_eV,
                              &Binding::well_depth_eV,       &Binding::stiffness_eV_per_nm2};

class BesideRow {
 public:
  BesideRow(const PairCurve& curve, const ContactTerm* contact, const EnergyFields& fields,
            Binding& row)
      : curve_(curve), contact_(contact), fields_(fields), row_(row) {}

  /// The point at the bottom of the well, if there is one; fills the well's fields.
  std::optional<CurvePoint> rest();
  void fill(const CurvePoint& point);
  void judge(const CurvePoint& point, double tolerance);

 private:
  void fill_contact(const CurvePoint& point);

  const PairCurve& curve_;
  const ContactTerm* contact_;
  const EnergyFields& fields_;
  Binding& row_;
};

std::optional<CurvePoint> BesideRow::rest() {
  const auto well =
      find_well([&](double gap) { return curve_.dispersion(gap, true); },
                [&](double gap) { return curve_.dispersion(gap, true, RoundTrips::first); },
                [&](double gap) { return curve_.contact(contact_->nominal, gap); });
  if (!well) {
    row_.status = Status::no_minimum;
    row_.message = "the energy has no minimum between gaps of 0.22 and 0.8 nm";
    return std::nullopt;
  }
  const Estimate force = contact_->estimate(
      [&](const PairFunction& pair) { return curve_.contact(pair, well->gap_nm).slope; });
  row_.gap_nm = row_.equilibrium_gap_nm = well->gap_nm;
  row_.*fields_.stiffness = well->stiffness;
  row_.equilibrium_gap_error = well->gap_error_nm + force.error / well->stiffness;
  return well->dispersion;
}

void BesideRow::fill(const CurvePoint& point) {
  const double gap = *row_.gap_nm, dispersion = point.energy.value;
  const double distance = curve_.touching_nm() + gap;
  row_.axis_distance_nm = distance;
  row_.*fields_.dispersion = dispersion;
  if (row_.temperature_K > 0) row_.thermal_share = point.static_part / dispersion;
  row_.*fields_.first_round_trip = point.first_round_trip;
  row_.*fields_.energy = dispersion;
  row_.exponent = -distance * point.slope.value / dispersion;
  row_.energy_error = point.energy.error;
  row_.relative_error = point.energy.error / std::fabs(dispersion);
  if (curve_.has_electronic_share()) {
    const Estimate share = curve_.electronic_share(gap);
    row_.*fields_.share = share.value;
    row_.electronic_share_error = share.error + share_precision * std::fabs(dispersion);
  }
  if (contact_)
    fill_contact(point);
  else
    row_.contact_target.clear();
}

void BesideRow::fill_contact(const CurvePoint& point) {
  const double gap = *row_.gap_nm;
  const Estimate contact = contact_->estimate(
      [&](const PairFunction& pair) { return curve_.contact(pair, gap).energy; });
  row_.*fields_.contact = contact.value;
  row_.*fields_.energy = point.energy.value + contact.value;
  row_.energy_error = point.energy.error + contact.error;
  row_.*fields_.pair_potential = curve_.contact(graphitic_pair_potential(), gap).energy;
  if (row_.equilibrium_gap_nm) {
    row_.*fields_.depth = -*(row_.*fields_.energy);
    row_.well_depth_error = row_.energy_error;
  }
}

void BesideRow::judge(const CurvePoint& point, double tolerance) {
  if (!point.positive) {
    row_.status = Status::outside_range;
    row_.message = "a determinant was not positive: the bodies are too close for this model";
  } else if (!(*row_.relative_error <= tolerance)) {
    row_.status = Status::not_converged;
    row_.message = "the error estimate exceeds the tolerance";
  }
}

}  // namespace

void bind_beside(const PairCurve& curve, const Placement& placement, double tolerance,
                 const ContactTerm* contact, Binding& row) {
  const bool crossed = placement.arrangement == Arrangement::crossed;
  curve.announce(placement.gap_nm.value_or(closest_visited_nm));
  row.gap_nm = placement.gap_nm;
  row.angle_deg = placement.angle_deg;
  row.offset_nm = placement.offset_nm;
  BesideRow beside(curve, contact, crossed ? in_all : per_length, row);
  const std::optional<CurvePoint> found =
      placement.gap_nm ? curve.dispersion(*placement.gap_nm, true) : beside.rest();
  if (!found) return;
  beside.fill(*found);
  beside.judge(*found, tolerance);
  row.notes = notes_of(row);
  if (std::string note = curve.note(*row.gap_nm); !note.empty()) row.notes.push_back(note);
}

}  // namespace gapwright
