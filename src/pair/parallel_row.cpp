#include "parallel_row.hpp"

#include "tube_body.hpp"
#include "well.hpp"

#include <gapwright/contact/beside.hpp>
#include <gapwright/join/parallel.hpp>

#include <cmath>

namespace gapwright {
namespace {

/// Responses serve a whole well: the closest gap its search visits.
constexpr double closest_visited_nm = 0.28;
/// Precision of responses read from the flat table, relative to the dispersion energy.
constexpr double share_precision = 2e-6;

/// The dispersion energy of two tubes against their gap.
class ParallelCurve {
 public:
  ParallelCurve(const TubeObject& first, const TubeObject& second, const Carbon& carbon,
                TubeCache& cache)
      : first_(first), second_(second), carbon_(carbon), cache_(cache) {}

  double touching() const { return outer_radius_nm(first_) + outer_radius_nm(second_); }
  Window window(double gap) const {
    return parallel_window(outer_radius_nm(first_), outer_radius_nm(second_), touching() + gap,
                           carbon_.nodes);
  }

  DispersionPoint at(double gap, bool with_slope) const {
    const Window here = window(gap);
    const ParallelDensity density = densities(gap, here, Electrons::own, with_slope);
    DispersionPoint point;
    point.energy = sum(density.energy, here);
    point.first_round_trip = sum(density.first_round_trip, here).value;
    if (with_slope) point.slope = sum(density.distance_slope, here);
    return point;
  }

  /// Own electrons less those of flat graphene, summed on the nodes: what the two share cancels in
  /// the error, too.
  Estimate electronic_share(double gap) const {
    const Window here = window(gap);
    FrequencyDensity difference = densities(gap, here, Electrons::own, false).energy;
    const FrequencyDensity flat = densities(gap, here, Electrons::flat, false).energy;
    for (std::size_t k = 0; k < difference.full.size(); ++k) {
      difference.full[k] -= flat.full[k];
      difference.halved[k] -= flat.halved[k];
    }
    return sum(difference, here);
  }

  bool positive() const { return positive_; }

 private:
  ParallelDensity densities(double gap, const Window& here, Electrons electrons,
                            bool with_slope) const {
    const auto a = body_scatterer(first_, electrons, here, cache_);
    const auto b = body_scatterer(second_, electrons, here, cache_);
    ParallelDensity density = parallel_density(*a, *b, touching() + gap, here, with_slope);
    positive_ = positive_ && density.positive;
    return density;
  }
  Estimate sum(const FrequencyDensity& density, const Window& here) const {
    return frequency_sum(density, carbon_.nodes, here.xi, carbon_.conditions);
  }

  const TubeObject& first_;
  const TubeObject& second_;
  const Carbon& carbon_;
  TubeCache& cache_;
  mutable bool positive_ = true;
};

}  // namespace

void announce_parallel(const Placement& placement, const Carbon& carbon, TubeCache& cache) {
  const TubeObject &first = tubes_of(placement.first), &second = tubes_of(*placement.second);
  const Window window = ParallelCurve(first, second, carbon, cache)
                            .window(placement.gap_nm.value_or(closest_visited_nm));
  for (const TubeObject* object : {&first, &second})
    for (const Tube& wall : object->walls) cache.announce(wall, window);
}

SmoothEnergy parallel_contact(const TubeObject& first, const TubeObject& second,
                              const PairFunction& pair, double gap_nm) {
  const double distance = outer_radius_nm(first) + outer_radius_nm(second) + gap_nm;
  SmoothEnergy sum;
  for (const Tube& a : first.walls)
    for (const Tube& b : second.walls) {
      const SmoothEnergy e = parallel_energy(pair, a.radius_nm, b.radius_nm, distance);
      sum.energy += e.energy;
      sum.slope += e.slope;
    }
  return sum;
}

void bind_parallel(const Placement& placement, const Carbon& carbon, TubeCache& cache,
                   const ContactTerm& contact, Binding& row) {
  const TubeObject &first = tubes_of(placement.first), &second = tubes_of(*placement.second);
  const ParallelCurve curve(first, second, carbon, cache);
  announce_parallel(placement, carbon, cache);

  DispersionPoint point;
  if (placement.gap_nm) {
    row.gap_nm = *placement.gap_nm;
    point = curve.at(*row.gap_nm, false);
  } else {
    const auto well = find_well(
        [&](double gap) { return curve.at(gap, true); },
        [&](double gap) { return parallel_contact(first, second, contact.nominal, gap); });
    if (!well) {
      row.status = Status::no_minimum;
      row.message = "the energy has no minimum between gaps of 0.22 and 0.8 nm";
      return;
    }
    row.gap_nm = row.equilibrium_gap_nm = well->gap_nm;
    row.stiffness_eV_per_nm3 = well->stiffness_eV_per_nm3;
    point = well->dispersion;
    const Estimate force = contact.estimate([&](const PairFunction& pair) {
      return parallel_contact(first, second, pair, well->gap_nm).slope;
    });
    row.equilibrium_gap_error = well->gap_error_nm + force.error / well->stiffness_eV_per_nm3;
  }
  const double gap = *row.gap_nm;
  const Estimate contact_energy = contact.estimate(
      [&](const PairFunction& pair) { return parallel_contact(first, second, pair, gap).energy; });
  const Estimate share = curve.electronic_share(gap);
  const double dispersion = point.energy.value;
  row.axis_distance_nm = curve.touching() + gap;
  row.dispersion_eV_per_nm = dispersion;
  row.first_round_trip_eV_per_nm = point.first_round_trip;
  row.contact_eV_per_nm = contact_energy.value;
  row.energy_eV_per_nm = dispersion + contact_energy.value;
  row.energy_error = point.energy.error + contact_energy.error;
  row.relative_error = point.energy.error / std::fabs(dispersion);
  row.electronic_share_eV_per_nm = share.value;
  row.electronic_share_error = share.error + share_precision * std::fabs(dispersion);
  row.pair_potential_eV_per_nm =
      parallel_contact(first, second, graphitic_pair_potential(), gap).energy;
  if (row.equilibrium_gap_nm) {
    row.well_depth_eV_per_nm = -*row.energy_eV_per_nm;
    row.well_depth_error = row.energy_error;
  }
  if (!curve.positive()) {
    row.status = Status::outside_range;
    row.message = "a determinant was not positive: the bodies are too close for this model";
  } else if (!(*row.relative_error <= carbon.nodes.tolerance)) {
    row.status = Status::not_converged;
    row.message = "the error estimate exceeds the tolerance";
  }
}

}  // namespace gapwright
