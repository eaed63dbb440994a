#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/bundle.hpp>
#include <gapwright/pair/potential.hpp>

#include <algorithm>
#include <cmath>
#include <map>

namespace gapwright {
namespace {

constexpr double closest_gap_nm = 0.22;
constexpr double farthest_rest_nm = 0.8;

/// Neighbours at √square lattice constants.
struct Shell {
  int square;
  int count;
};

std::vector<Shell> shells_within(double lattice_constants) {
  const int reach = int(std::ceil(2 * lattice_constants / std::sqrt(3.0)));
  const int largest = int(lattice_constants * lattice_constants);
  std::map<int, int> counts;
  for (int i = -reach; i <= reach; ++i)
    for (int j = -reach; j <= reach; ++j) {
      const int square = i * i + i * j + j * j;
      if (square > 0 && square <= largest) ++counts[square];
    }
  std::vector<Shell> shells;
  for (const auto& [square, count] : counts) shells.push_back({square, count});
  return shells;
}

/// Energy per tube against the lattice constant.
Jet bundle_energy(const Potential& pair, const std::vector<Shell>& shells, double a) {
  Jet sum;
  for (const Shell& shell : shells) {
    const double ratio = std::sqrt(double(shell.square)), half = 0.5 * shell.count;
    const Jet jet = pair.at(ratio * a);
    sum.value += half * jet.value;
    sum.slope += half * ratio * jet.slope;
    sum.curvature += half * ratio * ratio * jet.curvature;
  }
  return sum;
}

std::optional<PotentialWell> rest(const Potential& pair, const std::vector<Shell>& shells) {
  const double touching = pair.touching_nm();
  return first_well([&](double a) { return bundle_energy(pair, shells, a); },
                    touching + closest_gap_nm, touching + farthest_rest_nm);
}

BundleEnergy energy_at(const PotentialWell& well, const Potential& pair) {
  return {well.distance_nm, well.energy.value, 3 * pair.at(well.distance_nm).value};
}

/// Half of ∫U 2πD dD/cell beyond a distance where U falls as a power.
double beyond(const Potential& pair, double distance, double a) {
  const Jet jet = pair.at(distance);
  const double power = -distance * jet.slope / jet.value;
  const double cell = 0.5 * std::sqrt(3.0) * a * a;
  return constants::pi / cell * jet.value * distance * distance / std::max(power - 2, 0.5);
}

}  // namespace

Bundle hexagonal_bundle(const Binder& binder, const Object& object) {
  const Tube& outer = tubes_of(object).walls.back();
  Bundle bundle;
  bundle.object = label_of(object);
  bundle.diameter_nm = outer.diameter_nm();
  const auto curve = binder.curve({Arrangement::parallel, object, object, std::nullopt});
  if (!curve->has_contact())
    throw InputError({.what = "a bundle rests where contact holds it, and none is known in " +
                              binder.settings().conditions.medium,
                      .where = "medium",
                      .excerpt = {},
                      .expected = "vacuum",
                      .nearest = "vacuum"});
  const double touching = curve->touching_nm();
  const double reach = (touching + bundle_reach_nm) / (touching + 0.3);
  const std::vector<Shell> shells = shells_within(reach);
  const double farthest = reach * (touching + farthest_rest_nm) - touching;
  for (const Shell& shell : shells) bundle.neighbours += shell.count;

  const PairFunction contact = binder.contact_term(binder.settings().contact_target);
  const PairPotential pair =
      pair_potential(*curve, contact, closest_gap_nm, farthest, binder.settings().tolerance);
  const Potential blind =
      contact_potential(*curve, graphitic_pair_potential(), closest_gap_nm, farthest);
  const auto well = rest(pair.total, shells), blind_well = rest(blind, shells);
  if (!well || !blind_well || !pair.positive) {
    bundle.status = pair.positive ? Status::no_minimum : Status::outside_range;
    bundle.message = pair.positive ? "the energy has no minimum between gaps of 0.22 and 0.8 nm"
                                   : "a determinant was not positive: bodies too close";
    return bundle;
  }
  bundle.model = energy_at(*well, pair.total);
  bundle.pair_potential = energy_at(*blind_well, blind);
  const Jet dispersion = bundle_energy(pair.dispersion, shells, well->distance_nm);
  bundle.energy_error = pair.dispersion_error * std::fabs(dispersion.value);
  bundle.lattice_constant_error_nm =
      pair.slope_error * std::fabs(dispersion.slope) / well->energy.curvature;
  bundle.beyond_eV_per_nm = beyond(pair.total, reach * well->distance_nm, well->distance_nm);
  if (pair.dispersion_error > binder.settings().tolerance) {
    bundle.status = Status::not_converged;
    bundle.message = "the error estimate exceeds the tolerance";
  }
  return bundle;
}

}  // namespace gapwright
