#include "label_text.hpp"
#include "nearest_tube.hpp"
#include "ribbon_label.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/lattice/label.hpp>

#include <algorithm>

#include <fmt/format.h>

namespace gapwright {

namespace {

using label_text::blanks_removed;
using label_text::quoted;

constexpr const char* expected_object =
    "a tube such as (10,10) or 10,10, walls such as 5,5@10,10 (inner@outer), graphene, a ribbon "
    "such as 13-AGNR or 6-ZGNR, or wire:NAME";

/// Indices as typed, before they are made canonical; capped far outside the accepted range.
struct TypedIndices {
  long n = 0;
  long m = 0;
};

/// Reads one tube of a label; knows how to name it in messages.
class WallReader {
 public:
  WallReader(std::string_view label, std::size_t wall, std::size_t walls)
      : where_(walls > 1 ? fmt::format("wall {} of {}", wall, quoted(label))
                         : fmt::format("label {}", quoted(label))) {}

  Tube read(std::string_view text, std::vector<std::string>& notes) const;

 private:
  TypedIndices indices(std::string_view text) const;
  TypedIndices canonical(TypedIndices typed, std::vector<std::string>& notes) const;
  [[noreturn]] void refuse_text(std::string_view text) const;
  [[noreturn]] void refuse(std::string what, std::string expected, std::string nearest = {}) const {
    throw InputError({std::move(what), where_, {}, std::move(expected), std::move(nearest)});
  }

  std::string where_;
};

Tube WallReader::read(std::string_view text, std::vector<std::string>& notes) const {
  const TypedIndices typed = canonical(indices(text), notes);
  const double diameter = diameter_nm_of(typed.n, typed.m);
  if (diameter < min_diameter_nm || diameter > max_diameter_nm)
    refuse(diameter < 1000 ? fmt::format("the tube is {:.4g} nm wide", diameter)
                           : "the tube is over 1000 nm wide",
           fmt::format("a diameter of {} to {} nm", min_diameter_nm, max_diameter_nm),
           nearest_tube_in_range(typed.n, typed.m).label());
  return make_tube({static_cast<int>(typed.n), static_cast<int>(typed.m)});
}

TypedIndices WallReader::indices(std::string_view text) const {
  if (text.empty()) refuse("no tube stands here", expected_object);
  std::string_view inside = text;
  const bool opened = inside.front() == '(', closed = inside.back() == ')';
  if (opened) inside.remove_prefix(1);
  if (closed && !inside.empty()) inside.remove_suffix(1);
  const auto numbers = label_text::whole_numbers(inside, ',');
  if (!numbers) refuse_text(text);
  if (numbers->size() != 2)
    refuse(fmt::format("a tube has two indices, here are {}", numbers->size()), expected_object);
  const TypedIndices typed{(*numbers)[0], (*numbers)[1]};
  if (opened != closed)
    refuse(opened ? "a closing bracket is missing" : "an opening bracket is missing",
           expected_object, fmt::format("({},{})", typed.n, typed.m));
  return typed;
}

TypedIndices WallReader::canonical(TypedIndices typed, std::vector<std::string>& notes) const {
  const auto [n, m] = typed;
  if (n == 0 && m == 0)
    refuse("(0,0) is no tube: its circumference is zero", "indices n >= m >= 0 with n >= 1");
  if (n < 0 || m < 0) {
    // Sixth turns of the lattice bring every index pair into the sector n, m >= 0.
    TypedIndices turned = typed;
    while (turned.n < 0 || turned.m < 0) turned = {-turned.m, turned.n + turned.m};
    refuse(fmt::format("({},{}) has a negative index", n, m), "indices n >= m >= 0",
           fmt::format("({},{}), the same lattice vector but for symmetry",
                       std::max(turned.n, turned.m), std::min(turned.n, turned.m)));
  }
  if (n >= m) return typed;
  notes.push_back(
      fmt::format("({},{}) is the mirror image of ({},{}) and taken as it", n, m, m, n));
  return {m, n};
}

void WallReader::refuse_text(std::string_view text) const {
  if (text == "graphene") refuse("graphene is flat and no wall", expected_object);
  if (label_text::is_ribbon(text))
    refuse(fmt::format("{} is a ribbon and no wall", quoted(text)), expected_object);
  if (text.starts_with("wire"))
    refuse(fmt::format("{} is a wire and no wall", quoted(text)), expected_object);
  const bool comma = text.find(',') != std::string_view::npos;
  if (const auto pair = label_text::two_numbers(text))
    refuse(quoted(text) + (comma ? " holds more than two indices and a comma"
                                 : " does not separate its two indices by a comma"),
           expected_object, fmt::format("({},{})", (*pair)[0], (*pair)[1]));
  if (comma) refuse(fmt::format("{} is not two whole numbers", quoted(text)), expected_object);
  refuse(fmt::format("{} names no object", quoted(text)), expected_object,
         nearest_word(text, {"graphene"}));
}

/// Walls that fit, near to two that do not: in the other order, or with a wider outer wall.
std::string nearest_walls(const Tube& inner, const Tube& outer) {
  if (inner.radius_nm - outer.radius_nm >= min_gap_nm) return outer.label() + "@" + inner.label();
  const auto roomy = nearest_outer_wall(inner, outer);
  return roomy ? inner.label() + "@" + roomy->label() : "";
}

void require_room(std::string_view label, const Tube& inner, const Tube& outer) {
  const double gap = outer.radius_nm - inner.radius_nm;
  if (gap >= min_gap_nm) return;
  const std::string what =
      gap < 0 ? fmt::format("{} is {:.3f} nm wider than {}", inner.label(), -2 * gap, outer.label())
              : fmt::format("the gap between {} and {} is {:.3f} nm", inner.label(), outer.label(),
                            gap);
  throw InputError(
      {what,
       fmt::format("label {}", quoted(label)),
       {},
       fmt::format("walls in rising order (inner@outer) with gaps of at least {} nm", min_gap_nm),
       nearest_walls(inner, outer)});
}

}  // namespace

namespace {

constexpr std::string_view wire_prefix = "wire:";

WireObject read_wire(std::string_view label, const std::string& text) {
  const std::string name = text.substr(wire_prefix.size());
  const auto fits = [](char c) {
    return (c >= 'a' && c <= 'z') || (c >= '0' && c <= '9') || c == '-';
  };
  if (name.empty() || !std::all_of(name.begin(), name.end(), fits))
    throw InputError(
        {name.empty() ? "the wire has no name" : quoted(name) + " is not the name of a wire",
         fmt::format("label {}", quoted(label)),
         {},
         expected_object,
         {}});
  return {name};
}

}  // namespace

bool TubeObject::operator==(const TubeObject& other) const {
  if (walls.size() != other.walls.size()) return false;
  for (std::size_t i = 0; i < walls.size(); ++i)
    if (walls[i].chirality != other.walls[i].chirality) return false;
  return true;
}

ParsedLabel parse_label(std::string_view label) {
  const std::string text = blanks_removed(label);
  if (text.empty()) throw InputError({"the label is empty", "label ''", {}, expected_object, {}});
  if (text == "graphene") return {SheetObject{}, {}};
  if (label_text::is_ribbon(text) && text.find('@') == std::string::npos)
    return {RibbonObject{read_ribbon(text)}, {}};

  if (text.starts_with(wire_prefix) && text.find('@') == std::string::npos)
    return {read_wire(label, text), {}};

  const std::vector<std::string> parts = label_text::split(text, '@');
  ParsedLabel parsed;
  TubeObject object;
  for (std::size_t i = 0; i < parts.size(); ++i) {
    const WallReader reader(label, i + 1, parts.size());
    object.walls.push_back(reader.read(parts[i], parsed.notes));
    if (i > 0) require_room(label, object.walls[i - 1], object.walls[i]);
  }
  parsed.object = std::move(object);
  return parsed;
}

std::string label_of(const Object& object) {
  if (std::holds_alternative<SheetObject>(object)) return "graphene";
  if (const auto* ribbon = std::get_if<RibbonObject>(&object)) return ribbon->ribbon.label();
  if (const HalfSpaceObject* below = std::get_if<HalfSpaceObject>(&object)) return below->medium;
  if (const auto* wire = std::get_if<WireObject>(&object)) return "wire:" + wire->name;
  std::string text;
  for (const Tube& wall : std::get<TubeObject>(object).walls)
    text += (text.empty() ? "" : "@") + wall.label();
  return text;
}

}  // namespace gapwright
