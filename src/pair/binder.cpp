#include "coaxial_row.hpp"
#include "contact_terms.hpp"
#include "tube_cache.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>

#include <fmt/format.h>

namespace gapwright {

std::string_view numerics_version() {
  return "1";
}

namespace {

Settings checked(const Catalogs& catalogs, Settings settings) {
  validate(settings.conditions);
  settings.hopping = catalogs.hopping(settings.hopping).name;
  settings.background = catalogs.background(settings.background).name;
  settings.contact_target = catalogs.contact_target(settings.contact_target).name;
  if (!(settings.tolerance >= 1e-8 && settings.tolerance <= 1e-2))
    throw InputError({.what = fmt::format("tolerance {} is out of range", settings.tolerance),
                      .where = "tolerance",
                      .excerpt = {},
                      .expected = "1e-8 to 1e-2",
                      .nearest = settings.tolerance > 1e-2 ? "1e-2" : "1e-8"});
  return settings;
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
               settings.conditions, make_nodes(settings.tolerance)},
        cache(carbon),
        contacts(catalogs, carbon, cache) {}

  Catalogs catalogs;
  Settings settings;
  Carbon carbon;
  TubeCache cache;
  ContactTerms contacts;
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
  for (const Placement& row : rows) announce_coaxial(row.walls, impl_->carbon, impl_->cache);
}

void Binder::warm(const Tube& tube) const {
  impl_->cache.warm(tube);
}

Binding Binder::bind(const Placement& placement) const {
  const TubeObject& object = placement.walls;
  if (object.walls.size() < 2)
    throw InputError({.what = label_of(object) + " has one wall",
                      .where = {},
                      .excerpt = {},
                      .expected = "two or more coaxial walls, inner@outer",
                      .nearest = {}});
  Binding row;
  const TubeObject inside{{object.walls.begin(), object.walls.end() - 1}};
  const Tube &first = inside.walls.back(), &second = object.walls.back();
  row.object_1 = label_of(inside);
  row.object_2 = label_of(TubeObject{{second}});
  row.kind_1 = kind_of(first);
  row.kind_2 = kind_of(second);
  row.diameter_1_nm = first.diameter_nm();
  row.diameter_2_nm = second.diameter_nm();
  row.chiral_angle_1_deg = first.chiral_angle_deg();
  row.chiral_angle_2_deg = second.chiral_angle_deg();
  row.band_gap_1_eV = impl_->cache.gaps(first).band_gap_eV;
  row.band_gap_2_eV = impl_->cache.gaps(second).band_gap_eV;
  row.arrangement = arrangement_word(placement.arrangement);
  row.temperature_K = impl_->settings.conditions.temperature_K;
  row.chemical_potential_eV = impl_->settings.conditions.chemical_potential_eV;
  row.medium = impl_->settings.conditions.medium;
  row.contact_target = impl_->settings.contact_target;
  bind_coaxial(object, impl_->carbon, impl_->cache,
               impl_->contacts.term(impl_->settings.contact_target), row);
  return row;
}

double Binder::contact_eV_per_nm(const Placement& placement,
                                 const std::string& contact_target) const {
  return coaxial_contact(placement.walls, impl_->contacts.term(contact_target).nominal);
}

PairFunction Binder::contact_term(const std::string& contact_target) const {
  return impl_->contacts.term(contact_target).nominal;
}

PlanarEnergy Binder::sheets(double spacing_nm) const {
  return impl_->contacts.sheets(spacing_nm);
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
