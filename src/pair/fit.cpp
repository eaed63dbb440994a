#include "fit.hpp"

#include "rows_fit.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/pair/binder.hpp>

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

bool is_vacuum(const Medium& medium) {
  return medium.name == Medium{}.name;
}

void require_walls(const Placement& placement, const Medium& around) {
  const TubeObject& object = tubes_of(placement.first);
  if (object.walls.size() < 2)
    refuse(label_of(object) + " has one wall", {}, "two or more coaxial walls, inner@outer");
  if (!is_vacuum(around))
    refuse(around.name + " stays outside the outer wall of " + label_of(object) +
               " and changes nothing between its walls",
           "medium", "vacuum for walls in walls");
}

void require_gap(const Placement& placement) {
  if (!placement.gap_nm ||
      (*placement.gap_nm >= min_gap_nm && *placement.gap_nm <= farthest_gap_nm))
    return;
  refuse(fmt::format("a gap of {} nm is out of range", *placement.gap_nm), "gap_nm",
         fmt::format("{} to {} nm", min_gap_nm, farthest_gap_nm),
         *placement.gap_nm > farthest_gap_nm ? "10000" : "0.2");
}

void require_angle(const Placement& placement) {
  if (placement.arrangement != Arrangement::crossed) {
    if (placement.angle_deg)
      refuse("an angle is for crossed tubes", "angle_deg",
             "no angle where tubes are " + arrangement_word(placement.arrangement));
    return;
  }
  const std::string range = fmt::format("{} to {} degrees", min_crossing_deg, max_crossing_deg);
  if (!placement.angle_deg) refuse("crossed tubes need an angle", "angle_deg", range);
  const double angle = *placement.angle_deg;
  if (!(angle >= min_crossing_deg && angle <= max_crossing_deg))
    refuse(fmt::format("a crossing angle of {} degrees is out of range", angle), "angle_deg", range,
           angle > max_crossing_deg ? "90" : "1");
}

void require_flat_body(const Placement& placement, const Catalogs& catalogs, const Medium& around) {
  const Object& below = *placement.second;
  if (std::holds_alternative<SheetObject>(below)) {
    if (!is_vacuum(around))
      refuse("graphene in " + around.name + " is not computed", "medium",
             "vacuum over graphene, or a half-space of a medium in a liquid");
    return;
  }
  const HalfSpaceObject* half_space = std::get_if<HalfSpaceObject>(&below);
  if (!half_space)
    refuse(label_of(below) + " is no flat body", {}, "graphene, or a medium of the catalogue");
  if (catalogs.medium(half_space->medium).name == around.name)
    refuse(fmt::format("{} in {} has no surface", half_space->medium, around.name), {},
           "two different media");
}

void require_retardable(const Placement& placement) {
  const bool coaxial = placement.arrangement == Arrangement::coaxial && !rows_take_part(placement);
  if (coaxial && tubes_of(placement.first).walls.size() <= 2) return;
  refuse("retardation is not computed for " +
             (coaxial ? std::string("more than two walls")
                      : arrangement_word(placement.arrangement) + " bodies"),
         "retarded", "two coaxial walls, inner@outer");
}

/// Without a contact term there is no well to look for.
void require_well(const Placement& placement, const Medium& around) {
  if (placement.gap_nm || placement.arrangement == Arrangement::coaxial) return;
  const bool half_space = std::holds_alternative<HalfSpaceObject>(*placement.second);
  const bool wire = rows_take_part(placement) && !rows_have_contact(placement);
  if (!half_space && !wire && is_vacuum(around)) return;
  refuse(fmt::format("no contact term exists for {} {} {}{}, so that there is no well",
                     label_of(placement.first), half_space ? "over" : "and",
                     label_of(*placement.second), is_vacuum(around) ? "" : " in " + around.name),
         "gap_nm", fmt::format("a gap, {} to {} nm", min_gap_nm, farthest_gap_nm));
}

}  // namespace

void require_fit(const Placement& placement, const Catalogs& catalogs, const Medium& around,
                 bool retarded) {
  if (retarded) require_retardable(placement);
  if (rows_take_part(placement)) {
    require_rows_fit(placement, catalogs, around);
    require_angle(placement);
    return require_gap(placement);
  }
  if (placement.offset_nm)
    refuse("an offset is for ribbons", "offset_nm", "no offset between round bodies");
  if (placement.arrangement == Arrangement::coaxial) return require_walls(placement, around);
  tubes_of(placement.first);
  if (!placement.second)
    refuse(label_of(placement.first) + " has nothing beside it", {}, "two objects");
  if (placement.arrangement == Arrangement::over)
    require_flat_body(placement, catalogs, around);
  else
    tubes_of(*placement.second);
  require_angle(placement);
  require_gap(placement);
}

void require_row(const Placement& placement, const Catalogs& catalogs, const Medium& around,
                 bool retarded) {
  require_fit(placement, catalogs, around, retarded);
  require_well(placement, around);
}

}  // namespace gapwright
