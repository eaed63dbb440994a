#include "rows_fit.hpp"

#include "rows_across_curve.hpp"
#include "rows_curve.hpp"
#include "wire_curve.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

[[noreturn]] void refuse(std::string what, std::string where, std::string expected,
                         std::string nearest = {}) {
  throw InputError({.what = std::move(what),
                    .where = std::move(where),
                    .excerpt = {},
                    .expected = std::move(expected),
                    .nearest = std::move(nearest)});
}

template <typename Kind>
bool is(const Object& object) {
  return std::holds_alternative<Kind>(object);
}

bool flat(const Object& object) {
  return is<SheetObject>(object) || is<HalfSpaceObject>(object);
}

bool of_ribbons(Arrangement arrangement) {
  return arrangement == Arrangement::stacked || arrangement == Arrangement::coplanar ||
         arrangement == Arrangement::edge_on;
}

constexpr const char* ribbon_arrangements = "stacked, coplanar, edge_on, crossed or over";

void require_computable(const Object& object) {
  const RibbonObject* ribbon = std::get_if<RibbonObject>(&object);
  if (!ribbon || ribbon->ribbon.lines <= max_energy_lines) return;
  refuse(fmt::format("{} is too wide for energies", label_of(object)), {},
         fmt::format("a ribbon of at most {} lines", max_energy_lines),
         make_ribbon(ribbon->ribbon.edge, max_energy_lines).label());
}

void require_kinds(const Placement& placement) {
  const Object &first = placement.first, &second = *placement.second;
  const bool ribbon = is<RibbonObject>(first) || is<RibbonObject>(second);
  const bool wire = is<WireObject>(first) || is<WireObject>(second);
  const std::string word = arrangement_word(placement.arrangement);
  if (of_ribbons(placement.arrangement)) {
    if (!ribbon)
      refuse(fmt::format("{} and {} are no ribbons", label_of(first), label_of(second)),
             "arrangement", word + " with a ribbon, or parallel");
    if (flat(first) || flat(second))
      refuse("a flat body has no " + word + " neighbour", "arrangement", "over");
  } else if (ribbon && (placement.arrangement == Arrangement::parallel ||
                        placement.arrangement == Arrangement::coaxial)) {
    refuse("ribbons are not placed " + word, "arrangement", ribbon_arrangements, "stacked");
  }
  if (ribbon && wire)
    refuse("a wire beside a ribbon is not computed", {},
           "two ribbons, a ribbon and a tube, a wire "
           "and a tube, or two wires");
  if (flat(first) || (flat(second) && placement.arrangement != Arrangement::over))
    refuse(label_of(flat(first) ? first : second) + " is flat", "arrangement",
           "over, the flat body second");
  if (placement.arrangement == Arrangement::over && !flat(second))
    refuse(label_of(second) + " is no flat body", {}, "graphene, or a medium of the catalogue");
}

void require_one_host(const Placement& placement, const Catalogs& catalogs) {
  const auto host = [&](const Object& object) {
    const WireObject* wire = std::get_if<WireObject>(&object);
    return wire ? catalogs.wire(wire->name).host_permittivity : 1.0;
  };
  const double one = host(placement.first), other = host(*placement.second);
  if (one == other) return;
  refuse(fmt::format("{} lies in a host of permittivity {:g}, {} in one of {:g}",
                     label_of(placement.first), one, label_of(*placement.second), other),
         {}, "two bodies in one host: carbon stands in vacuum");
}

void require_offset(const Placement& placement) {
  if (!placement.offset_nm) return;
  const double offset = *placement.offset_nm;
  if (!of_ribbons(placement.arrangement))
    refuse("an offset is for stacked, coplanar and edge-on bodies", "offset_nm",
           "no offset where bodies are " + arrangement_word(placement.arrangement));
  if (!(std::fabs(offset) <= farthest_offset_nm))
    refuse(fmt::format("an offset of {} nm is out of range", offset), "offset_nm",
           fmt::format("{} to {} nm", -farthest_offset_nm, farthest_offset_nm));
}

AxialBody axial_body(const Object& object, const Catalogs& catalogs) {
  if (const WireObject* wire = std::get_if<WireObject>(&object)) return catalogs.wire(wire->name);
  return tubes_of(object);
}

std::optional<Medium> half_space_of(const Placement& placement, const Catalogs& catalogs) {
  if (const auto* below = std::get_if<HalfSpaceObject>(&*placement.second))
    return catalogs.medium(below->medium);
  return std::nullopt;
}

}  // namespace

bool rows_take_part(const Placement& placement) {
  const auto one = [](const Object& object) {
    return is<RibbonObject>(object) || is<WireObject>(object);
  };
  return one(placement.first) || (placement.second && one(*placement.second)) ||
         of_ribbons(placement.arrangement);
}

void require_rows_fit(const Placement& placement, const Catalogs& catalogs, const Medium& around) {
  if (!placement.second)
    refuse(label_of(placement.first) + " has nothing beside it", {}, "two objects");
  require_kinds(placement);
  require_computable(placement.first);
  require_computable(*placement.second);
  require_one_host(placement, catalogs);
  require_offset(placement);
  if (around.name != Medium{}.name)
    refuse("ribbons and wires in " + around.name + " are not computed", "medium", "vacuum");
}

bool rows_have_contact(const Placement& placement) {
  return !is<WireObject>(placement.first) && !is<WireObject>(*placement.second) &&
         !is<HalfSpaceObject>(*placement.second);
}

std::unique_ptr<PairCurve> curve_of_rows(const Placement& placement, const Catalogs& catalogs,
                                         const Carbon& carbon, TubeCache& tubes,
                                         RibbonCache& ribbons) {
  const Object &first = placement.first, &second = *placement.second;
  const double angle = placement.angle_deg.value_or(0.0);
  const bool over = placement.arrangement == Arrangement::over;
  if (is<WireObject>(first) || is<WireObject>(second)) {
    std::optional<AxialBody> other;
    if (!over) other = axial_body(second, catalogs);
    return std::make_unique<WireCurve>(axial_body(first, catalogs), other, placement.arrangement,
                                       angle, half_space_of(placement, catalogs), carbon, tubes);
  }
  const RibbonObject* one = std::get_if<RibbonObject>(&first);
  const RibbonObject* other = std::get_if<RibbonObject>(&second);
  if (over)
    return std::make_unique<RowsOverCurve>(one->ribbon, half_space_of(placement, catalogs), carbon,
                                           ribbons, tubes);
  const Ribbon ribbon = (one ? one : other)->ribbon;
  const double offset = placement.offset_nm.value_or(0.0);
  if (placement.arrangement == Arrangement::crossed) {
    if (one && other)
      return std::make_unique<RowsCrossedCurve>(ribbon, other->ribbon, TubeObject{}, angle, carbon,
                                                ribbons, tubes);
    return std::make_unique<RowsCrossedCurve>(ribbon, std::nullopt, tubes_of(one ? second : first),
                                              angle, carbon, ribbons, tubes);
  }
  if (one && other)
    return std::make_unique<RowsCurve>(ribbon, other->ribbon, placement.arrangement, offset, carbon,
                                       ribbons);
  return std::make_unique<RowsTubeCurve>(ribbon, tubes_of(one ? second : first),
                                         placement.arrangement, offset, carbon, ribbons, tubes);
}

}  // namespace gapwright
