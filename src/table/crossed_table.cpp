#include "round_trips.hpp"

#include <gapwright/catalog/constants.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

/// E·sin γ of one angle, and in the limit γ → 0 (angle 0).
struct AngleEnergy {
  double angle_deg = 0.0;
  Potential sine;
  EnergyFunction function;  // with the table's cut
  TableScale scale;
};

double sine_of(double angle_deg) {
  return std::sin(angle_deg * constants::pi / 180);
}

/// Crossed tables of one request under work.
class CrossedWork {
 public:
  CrossedWork(const Binder& binder, const TableRequest& request, Table& table)
      : binder_(binder),
        request_(request),
        table_(table),
        low_(table.first_nm - table.touching_nm),
        high_(table.last_nm - table.touching_nm) {}

  std::vector<AngleEnergy> energies() {
    const FurtherRoundTrips further(binder_, request_, low_, high_);
    if (!further.positive()) note_too_close(table_);
    const Potential contact = contact_sine();
    std::vector<AngleEnergy> all = {limit(contact)};
    for (const double angle : request_.angles_deg) all.push_back(at_angle(angle, further, contact));
    table_.dispersion_error =
        std::max(table_.dispersion_error, further.point_error()) + further.between_error();
    table_.slope_error += further.point_error() + further.between_error();
    for (AngleEnergy& energy : all) {
      const EnergyFunction bare = [potential = energy.sine](double distance) {
        return potential.at(distance);
      };
      energy.function = with_cut(bare, table_);
      energy.scale = table_scale(energy.function, table_.first_nm, table_.last_nm);
      note_angle(energy, cut_shift(bare, table_));
    }
    return all;
  }

 private:
  // Contact energies times sin γ are the same at all angles.
  Potential contact_sine() const {
    const double angle = request_.angles_deg.front();
    const auto curve =
        binder_.curve({Arrangement::crossed, request_.first, request_.second, std::nullopt, angle});
    if (!curve->has_contact()) return {table_.touching_nm, {}};
    const PairFunction pair = binder_.contact_term(table_.settings.contact_target);
    return contact_potential(*curve, pair, low_, high_).scaled(sine_of(angle));
  }

  AngleEnergy limit(const Potential& contact) {
    const PairPotential parallel = parallel_potential(binder_, request_, table_, endless_gap_nm);
    take_errors(parallel, table_);
    const Potential dispersion(table_.touching_nm, {limit_term(parallel.dispersion, low_, high_)});
    return {0.0, sum_of(dispersion, contact), {}, {}};
  }

  AngleEnergy at_angle(double angle, const FurtherRoundTrips& further, const Potential& contact) {
    const auto curve =
        binder_.curve({Arrangement::crossed, request_.first, request_.second, std::nullopt, angle});
    const PairPotential first =
        pair_potential(*curve, {}, low_, high_, table_.tolerance, RoundTrips::first);
    take_errors(first, table_);
    const auto all = [&](double gap) {
      const Jet once = first.dispersion.at(table_.touching_nm + gap);
      const SmoothEnergy ratio = further.ratio(angle, gap);
      return SmoothEnergy{once.value * ratio.energy,
                          once.slope * ratio.energy + once.value * ratio.slope};
    };
    // A product of interpolants, itself interpolated to far better than they are.
    const PotentialTerm term = sample_term(all, low_, high_, {1e-9, 1e-8, 33, 4}).term;
    const Potential dispersion = Potential(table_.touching_nm, {term}).scaled(sine_of(angle));
    return {angle, sum_of(dispersion, contact), {}, {}};
  }

  void note_angle(const AngleEnergy& energy, std::optional<double> shift) {
    AngleSummary summary{.angle_deg = energy.angle_deg, .sine_shift_eV = shift};
    const double farthest = table_.outer_cut_nm ? switch_begin * table_.last_nm : table_.last_nm;
    if (const auto well = first_well(energy.function, table_.first_nm, farthest)) {
      summary.well_distance_nm = well->distance_nm;
      summary.well_energy_sine_eV = well->energy.value;
    }
    table_.angles.push_back(summary);
  }

  const Binder& binder_;
  const TableRequest& request_;
  Table& table_;
  double low_, high_;
};

/// Distances that serve all angles, placed at the widest one: the others bend alike.
std::vector<double> shared_distances(const std::vector<AngleEnergy>& energies, Table& table) {
  std::vector<double> distances;
  double aim = table.tolerance;
  for (int round = 0; round < 8; ++round, aim *= 0.7) {
    const AngleEnergy& last = energies.back();
    const PlacedPoints placed =
        place_points(last.function, table.first_nm, table.last_nm, last.scale, aim);
    table.reading_error = {};
    for (const AngleEnergy& energy : energies) {
      std::vector<TablePoint> points;
      for (const TablePoint& point : placed.points) {
        const Jet jet = energy.function(point.distance_nm);
        points.push_back({point.distance_nm, jet.value, -jet.slope});
      }
      const ReadingError error = reading_error(energy.function, points, energy.scale);
      table.reading_error.energy = std::max(table.reading_error.energy, error.energy);
      table.reading_error.force = std::max(table.reading_error.force, error.force);
    }
    distances.clear();
    for (const TablePoint& point : placed.points) distances.push_back(point.distance_nm);
    if (std::max(table.reading_error.energy, table.reading_error.force) <= table.tolerance) break;
  }
  return distances;
}

void add_rows(const AngleEnergy& energy, const std::vector<double>& distances, Table& table) {
  const double sine = sine_of(energy.angle_deg);
  for (const double distance : distances) {
    const Jet jet = energy.function(distance);
    TableRow row{.distance_nm = distance,
                 .angle_deg = energy.angle_deg,
                 .energy_sine = jet.value,
                 .force_sine = -jet.slope};
    if (energy.angle_deg > 0) {
      row.energy = jet.value / sine;
      row.force = -jet.slope / sine;
    }
    table.rows.push_back(row);
  }
}

}  // namespace

Table crossed_table(const Binder& binder, const TableRequest& request) {
  Table table = begin_table(binder, request);
  const std::vector<AngleEnergy> energies = CrossedWork(binder, request, table).energies();
  const std::vector<double> distances = shared_distances(energies, table);
  for (const AngleEnergy& energy : energies) add_rows(energy, distances, table);
  judge(table);
  return table;
}

}  // namespace gapwright
