#include "beside_row.hpp"
#include "coaxial_row.hpp"
#include "contact_terms.hpp"
#include "parallel_curve.hpp"
#include "tube_cache.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {

std::string_view numerics_version() {
  return "2";
}

namespace {

Settings checked(const Catalogs& catalogs, Settings settings) {
  validate(settings.conditions);
  settings.hopping = catalogs.hopping(settings.hopping).name;
  validate(settings.conditions, catalogs.hopping(settings.hopping));
  settings.background = catalogs.background(settings.background).name;
  settings.contact_target = catalogs.contact_target(settings.contact_target).name;
  if (!(settings.tolerance >= least_tolerance && settings.tolerance <= largest_tolerance))
    throw InputError({.what = fmt::format("tolerance {} is out of range", settings.tolerance),
                      .where = "tolerance",
                      .excerpt = {},
                      .expected = "1e-7 to 1e-2",
                      .nearest = settings.tolerance > 1e-2 ? "1e-2" : "1e-7"});
  return settings;
}

/// Throws InputError unless the bodies fit the arrangement.
void check(const Placement& placement) {
  const TubeObject& first = tubes_of(placement.first);
  if (placement.arrangement == Arrangement::coaxial) {
    if (first.walls.size() < 2)
      throw InputError({.what = label_of(first) + " has one wall",
                        .where = {},
                        .excerpt = {},
                        .expected = "two or more coaxial walls, inner@outer",
                        .nearest = {}});
    return;
  }
  if (!placement.second)
    throw InputError({.what = label_of(first) + " has nothing beside it",
                      .where = {},
                      .excerpt = {},
                      .expected = "two objects",
                      .nearest = {}});
  if (placement.arrangement != Arrangement::parallel)
    throw InputError({.what = arrangement_word(placement.arrangement) + " is not computed yet",
                      .where = "arrangement",
                      .excerpt = {},
                      .expected = "coaxial or parallel",
                      .nearest = {}});
  tubes_of(*placement.second);
  if (placement.gap_nm &&
      !(*placement.gap_nm >= min_gap_nm && *placement.gap_nm <= farthest_gap_nm))
    throw InputError({.what = fmt::format("a gap of {} nm is out of range", *placement.gap_nm),
                      .where = "gap_nm",
                      .excerpt = {},
                      .expected = fmt::format("{} to {} nm", min_gap_nm, farthest_gap_nm),
                      .nearest = *placement.gap_nm > farthest_gap_nm ? "10000" : "0.2"});
}

/// Throws InputError for a row that retardation is not computed for.
void check_retarded(const Conditions& conditions, const Placement& placement) {
  if (!conditions.retarded) return;
  const bool coaxial = placement.arrangement == Arrangement::coaxial;
  if (coaxial && tubes_of(placement.first).walls.size() == 2) return;
  throw InputError({.what = "retardation is not computed for " +
                            (coaxial ? std::string("more than two walls")
                                     : arrangement_word(placement.arrangement) + " bodies"),
                    .where = "retarded",
                    .excerpt = {},
                    .expected = "two coaxial walls, inner@outer",
                    .nearest = {}});
}

std::string kind_of(const Tube& tube) {
  return tube.metallic() ? "metallic" : "semiconducting";
}

}  // namespace

struct Binder::Impl {
  Impl(const Catalogs& all, const Settings& wanted)
      : catalogs(all),
        settings(checked(all, wanted)),
        carbon{all.hopping(settings.hopping), all.background(settings.background),
               settings.conditions, make_nodes(settings.tolerance, settings.conditions)},
        cache(carbon),
        cold{carbon.hopping, carbon.background, {}, make_nodes(settings.tolerance)},
        cold_cache(cold),
        contacts(catalogs, cold, is_reference() ? cache : cold_cache),
        warm_sheets(catalogs, carbon, cache) {}

  /// T = 0, undoped: what the contact term is calibrated at.
  bool is_reference() const {
    return carbon.conditions.temperature_K == 0 && carbon.conditions.chemical_potential_eV == 0;
  }

  Catalogs catalogs;
  Settings settings;
  Carbon carbon;
  TubeCache cache;
  Carbon cold;
  TubeCache cold_cache;
  ContactTerms contacts;
  ContactTerms warm_sheets;  // for sheets at the conditions
};

Binder::Binder(const Catalogs& catalogs, const Settings& settings)
    : impl_(std::make_unique<Impl>(catalogs, settings)) {}
Binder::~Binder() = default;

const Settings& Binder::settings() const {
  return impl_->settings;
}
const Catalogs& Binder::catalogs() const {
  return impl_->catalogs;
}

void Binder::announce(const std::vector<Placement>& rows) const {
  for (const Placement& row : rows) {
    check(row);
    check_retarded(impl_->settings.conditions, row);
    if (row.arrangement == Arrangement::coaxial)
      announce_coaxial(tubes_of(row.first), impl_->carbon, impl_->cache);
    else
      curve(row)->announce(row.gap_nm.value_or(closest_visited_nm));
  }
}

void Binder::warm(const Tube& tube) const {
  impl_->cache.warm(tube);
}

Binding Binder::bind(const Placement& placement) const {
  const bool coaxial = placement.arrangement == Arrangement::coaxial;
  check(placement);
  check_retarded(impl_->settings.conditions, placement);
  const TubeObject& object = tubes_of(placement.first);
  const TubeObject first =
      coaxial ? TubeObject{{object.walls.begin(), object.walls.end() - 1}} : object;
  const TubeObject second =
      coaxial ? TubeObject{{object.walls.back()}} : tubes_of(*placement.second);

  Binding row;
  row.object_1 = label_of(first);
  row.object_2 = label_of(second);
  // Of several walls, the outermost one stands for the body.
  const Tube &one = first.walls.back(), &other = second.walls.back();
  row.kind_1 = kind_of(one);
  row.kind_2 = kind_of(other);
  row.diameter_1_nm = one.diameter_nm();
  row.diameter_2_nm = other.diameter_nm();
  row.chiral_angle_1_deg = one.chiral_angle_deg();
  row.chiral_angle_2_deg = other.chiral_angle_deg();
  row.band_gap_1_eV = impl_->cache.gaps(one).band_gap_eV;
  row.band_gap_2_eV = impl_->cache.gaps(other).band_gap_eV;
  row.arrangement = arrangement_word(placement.arrangement);
  row.temperature_K = impl_->settings.conditions.temperature_K;
  row.chemical_potential_eV = impl_->settings.conditions.chemical_potential_eV;
  row.medium = impl_->settings.conditions.medium;
  row.contact_target = impl_->settings.contact_target;
  const ContactTerm& contact = impl_->contacts.term(impl_->settings.contact_target);
  if (coaxial)
    bind_coaxial(object, impl_->carbon, impl_->cache, contact, row);
  else
    bind_beside(*curve(placement), placement.gap_nm, impl_->settings.tolerance, contact, row);
  return row;
}

std::unique_ptr<PairCurve> Binder::curve(const Placement& placement) const {
  if (placement.arrangement == Arrangement::coaxial)
    throw std::invalid_argument("Binder::curve: the arrangement must leave the gap free");
  check(placement);
  check_retarded(impl_->settings.conditions, placement);
  return std::make_unique<ParallelCurve>(tubes_of(placement.first), tubes_of(*placement.second),
                                         impl_->carbon, impl_->cache);
}

double Binder::contact_eV_per_nm(const Placement& placement,
                                 const std::string& contact_target) const {
  const PairFunction pair = impl_->contacts.term(contact_target).nominal;
  if (placement.arrangement == Arrangement::coaxial)
    return coaxial_contact(tubes_of(placement.first), pair);
  if (!placement.gap_nm)
    throw std::invalid_argument("Binder::contact_eV_per_nm: a gap is required");
  return curve(placement)->contact(pair, *placement.gap_nm).energy;
}

PairFunction Binder::contact_term(const std::string& contact_target) const {
  return impl_->contacts.term(contact_target).nominal;
}

PlanarEnergy Binder::sheets(double spacing_nm) const {
  return (impl_->is_reference() ? impl_->contacts : impl_->warm_sheets).sheets(spacing_nm);
}

std::string Binder::settings_key() const {
  const Settings& s = impl_->settings;
  ContentHash hash;
  hash.add(numerics_version()).add(impl_->catalogs.hash());
  hash.add(s.hopping).add(s.background).add(s.contact_target).add(s.tolerance);
  hash.add(s.conditions.temperature_K).add(s.conditions.chemical_potential_eV);
  hash.add(s.conditions.medium).add(std::int64_t(s.conditions.retarded));
  return hash.hex();
}

}  // namespace gapwright
