#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/short_range.hpp>
#include <gapwright/sweep/ranking.hpp>

#include <cmath>

namespace gapwright {
namespace {

Placement placement_of(const Binding& row) {
  const Arrangement arrangement = parse_arrangement(row.arrangement);
  if (arrangement == Arrangement::coaxial)
    return {arrangement, parse_label(row.object_1 + "@" + row.object_2).object};
  return {arrangement, parse_label(row.object_1).object, parse_label(row.object_2).object,
          row.gap_nm};
}

void change_coaxial(const Binding& row, const Binder& binder, Binding& changed) {
  const double contact = binder.contact_eV_per_nm(placement_of(row), changed.contact_target);
  const double energy = *row.dispersion_eV_per_nm + contact;
  const double inner_radius_nm = row.diameter_1_nm.value() / 2;
  const double outer_radius_nm = row.diameter_2_nm.value() / 2;
  const double mid_circumference_nm = constants::pi * (inner_radius_nm + outer_radius_nm);
  const double per_area = energy / mid_circumference_nm;  // eV/nm²
  changed.contact_eV_per_nm = contact;
  changed.energy_eV_per_nm = energy;
  changed.energy_mJ_per_m2 = per_area * constants::mJ_per_m2_per_eV_per_nm2;
  changed.energy_meV_per_atom = per_area * constants::atom_area_nm2 * 1e3;
  if (row.cut_energy_eV_per_nm) changed.cut_energy_eV_per_nm = energy;
  if (row.pull_out_force_nN) changed.pull_out_force_nN = -energy * constants::nN_per_eV_per_nm;
  if (row.pressure_GPa && row.pressure_dispersion_GPa) {
    const double slope = coaxial_energy(binder.contact_term(changed.contact_target),
                                        inner_radius_nm, outer_radius_nm)
                             .slope;
    changed.pressure_GPa =
        *row.pressure_dispersion_GPa - slope / mid_circumference_nm * constants::GPa_per_eV_per_nm3;
  }
}

/// The dispersion near a gap: ln|E| a parabola in ln g.
class NearWell {
 public:
  NearWell(double gap, double energy, double slope, double curvature)
      : centre_(std::log(gap)), height_(std::log(-energy)), rise_(gap * slope / energy) {
    bend_ = rise_ + gap * gap * curvature / energy - rise_ * rise_;
  }

  SmoothEnergy at(double gap) const {
    const double x = std::log(gap) - centre_;
    const double energy = -std::exp(height_ + x * (rise_ + 0.5 * x * bend_));
    return {energy, energy * (rise_ + x * bend_) / gap};
  }

 private:
  double centre_, height_, rise_, bend_;
};

void change_well(const Binding& row, const Binder& binder, Binding& changed) {
  constexpr double step = 1e-5;  // of derivatives
  constexpr double farthest_shift = 0.1, settled = 1e-7;
  const auto curve = binder.curve(placement_of(row));
  const auto slope_under = [&](const std::string& target, double gap) {
    return curve->contact(binder.contact_term(target), gap).slope;
  };
  const auto stiffness_of = [&](const auto& slope, double gap) {
    return (slope(gap + step) - slope(gap - step)) / (2 * step);
  };
  const double rest = *row.equilibrium_gap_nm;
  const auto own = [&](double gap) { return slope_under(row.contact_target, gap); };
  const NearWell dispersion(rest, *row.dispersion_eV_per_nm, -own(rest),
                            *row.stiffness_eV_per_nm3 - stiffness_of(own, rest));
  const auto slope = [&](double gap) {
    return dispersion.at(gap).slope + slope_under(changed.contact_target, gap);
  };
  double gap = rest;
  for (int round = 0; round < 20; ++round) {
    const double stiffness = stiffness_of(slope, gap);
    const double next = gap - slope(gap) / stiffness;
    if (!(stiffness > 0) || !(std::fabs(next - rest) < farthest_shift)) break;
    const bool found = std::fabs(next - gap) < settled;
    gap = next;
    if (!found) continue;
    const double contact = curve->contact(binder.contact_term(changed.contact_target), gap).energy;
    changed.gap_nm = changed.equilibrium_gap_nm = gap;
    changed.axis_distance_nm = curve->touching_nm() + gap;
    changed.dispersion_eV_per_nm = dispersion.at(gap).energy;
    changed.contact_eV_per_nm = contact;
    changed.energy_eV_per_nm = *changed.dispersion_eV_per_nm + contact;
    changed.well_depth_eV_per_nm = -*changed.energy_eV_per_nm;
    changed.stiffness_eV_per_nm3 = stiffness;
    return;
  }
  for (auto* field :
       {&changed.gap_nm, &changed.equilibrium_gap_nm, &changed.axis_distance_nm,
        &changed.dispersion_eV_per_nm, &changed.contact_eV_per_nm, &changed.energy_eV_per_nm,
        &changed.well_depth_eV_per_nm, &changed.stiffness_eV_per_nm3})
    field->reset();
}

}  // namespace

Binding under_target(const Binding& row, const Binder& binder, const std::string& contact_target) {
  if (row.contact_target.empty()) return row;  // no contact term exists for it
  Binding changed = row;
  changed.contact_target = contact_target;
  if (!row.energy_eV_per_nm || !row.dispersion_eV_per_nm) return changed;
  if (row.energy_mJ_per_m2) {
    change_coaxial(row, binder, changed);
  } else if (row.equilibrium_gap_nm && row.stiffness_eV_per_nm3) {
    change_well(row, binder, changed);
  } else {
    changed.contact_eV_per_nm = binder.contact_eV_per_nm(placement_of(row), contact_target);
    changed.energy_eV_per_nm = *row.dispersion_eV_per_nm + *changed.contact_eV_per_nm;
  }
  return changed;
}

}  // namespace gapwright
