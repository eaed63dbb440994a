#include "beside_row.hpp"
#include "coaxial_row.hpp"
#include "contact_terms.hpp"
#include "crossed_curve.hpp"
#include "fit.hpp"
#include "over_curve.hpp"
#include "parallel_curve.hpp"
#include "rows_fit.hpp"
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
  settings.conditions.medium = catalogs.liquid(settings.conditions.medium).name;
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

std::string kind_of(const Tube& tube) {
  return tube.metallic() ? "metallic" : "semiconducting";
}

/// What a row says of one body.
struct BodyFields {
  std::string label, kind;
  std::optional<double> diameter_nm, chiral_angle_deg, band_gap_eV;
};

}  // namespace

struct Binder::Impl {
  Impl(const Catalogs& all, const Settings& wanted)
      : catalogs(all),
        settings(checked(all, wanted)),
        carbon{all.hopping(settings.hopping), all.background(settings.background),
               settings.conditions, make_nodes(settings.tolerance, settings.conditions),
               all.liquid(settings.conditions.medium)},
        cache(carbon),
        ribbons(carbon, all.ribbon_edges()),
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
  RibbonCache ribbons;
  Carbon cold;
  TubeCache cold_cache;
  ContactTerms contacts;
  ContactTerms warm_sheets;  // for sheets at the conditions

  BodyFields fields_of(const Object& object);
  /// A row with all that is known of it before its energies.
  Binding described(const Placement& placement);
};

BodyFields Binder::Impl::fields_of(const Object& object) {
  BodyFields fields;
  fields.label = label_of(object);
  if (const TubeObject* tubes = std::get_if<TubeObject>(&object)) {
    // Of several walls, the outermost one stands for the body.
    const Tube& wall = tubes->walls.back();
    fields.kind = kind_of(wall);
    fields.diameter_nm = wall.diameter_nm();
    fields.chiral_angle_deg = wall.chiral_angle_deg();
    fields.band_gap_eV = cache.gaps(wall).band_gap_eV;
  } else if (const RibbonObject* ribbon = std::get_if<RibbonObject>(&object)) {
    fields.kind = ribbon->ribbon.edge == RibbonEdge::armchair ? "armchair ribbon" : "zigzag ribbon";
    fields.band_gap_eV = ribbons.band_gap_eV(ribbon->ribbon);
  } else if (const WireObject* wire = std::get_if<WireObject>(&object)) {
    fields.kind = "wire";
    fields.diameter_nm = 2 * catalogs.wire(wire->name).radius_nm;
    fields.band_gap_eV = 0.0;
  } else {
    fields.kind = std::holds_alternative<SheetObject>(object) ? "sheet" : "half-space";
  }
  return fields;
}

Binding Binder::Impl::described(const Placement& placement) {
  BodyFields first, second;
  if (placement.arrangement == Arrangement::coaxial) {
    const TubeObject& object = tubes_of(placement.first);
    first = fields_of(TubeObject{{object.walls.begin(), object.walls.end() - 1}});
    second = fields_of(TubeObject{{object.walls.back()}});
  } else {
    first = fields_of(placement.first);
    second = fields_of(*placement.second);
  }
  Binding row;
  row.object_1 = first.label;
  row.kind_1 = first.kind;
  row.diameter_1_nm = first.diameter_nm;
  row.chiral_angle_1_deg = first.chiral_angle_deg;
  row.band_gap_1_eV = first.band_gap_eV;
  row.object_2 = second.label;
  row.kind_2 = second.kind;
  row.diameter_2_nm = second.diameter_nm;
  row.chiral_angle_2_deg = second.chiral_angle_deg;
  row.band_gap_2_eV = second.band_gap_eV;
  row.arrangement = arrangement_word(placement.arrangement);
  row.temperature_K = settings.conditions.temperature_K;
  row.chemical_potential_eV = settings.conditions.chemical_potential_eV;
  row.medium = settings.conditions.medium;
  row.contact_target = settings.contact_target;
  return row;
}

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
    require_row(row, impl_->catalogs, impl_->carbon.medium, impl_->settings.conditions.retarded);
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
  require_row(placement, impl_->catalogs, impl_->carbon.medium,
              impl_->settings.conditions.retarded);
  Binding row = impl_->described(placement);
  if (placement.arrangement == Arrangement::coaxial) {
    bind_coaxial(tubes_of(placement.first), impl_->carbon, impl_->cache,
                 impl_->contacts.term(impl_->settings.contact_target), row);
    return row;
  }
  const auto curve = this->curve(placement);
  const ContactTerm* contact = nullptr;
  if (curve->has_contact()) contact = &impl_->contacts.term(impl_->settings.contact_target);
  bind_beside(*curve, placement, impl_->settings.tolerance, contact, row);
  return row;
}

std::unique_ptr<PairCurve> Binder::curve(const Placement& placement) const {
  const Carbon& carbon = impl_->carbon;
  require_fit(placement, impl_->catalogs, carbon.medium, carbon.conditions.retarded);
  if (rows_take_part(placement))
    return curve_of_rows(placement, impl_->catalogs, carbon, impl_->cache, impl_->ribbons);
  const TubeObject& first = tubes_of(placement.first);
  switch (placement.arrangement) {
    case Arrangement::coaxial:
    case Arrangement::stacked:
    case Arrangement::coplanar:
    case Arrangement::edge_on:
      break;
    case Arrangement::parallel:
      return std::make_unique<ParallelCurve>(first, tubes_of(*placement.second), carbon,
                                             impl_->cache);
    case Arrangement::crossed:
      return std::make_unique<CrossedCurve>(first, tubes_of(*placement.second),
                                            *placement.angle_deg, carbon, impl_->cache);
    case Arrangement::over: {
      std::optional<Medium> half_space;
      if (const auto* below = std::get_if<HalfSpaceObject>(&*placement.second))
        half_space = impl_->catalogs.medium(below->medium);
      return std::make_unique<OverCurve>(first, half_space, carbon, impl_->cache);
    }
  }
  throw std::invalid_argument("Binder::curve: the arrangement must leave the gap free");
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
