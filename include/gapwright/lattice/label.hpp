// Object labels as the trade writes them, and back.
#pragma once

#include <gapwright/lattice/ribbon.hpp>
#include <gapwright/lattice/tube.hpp>

#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace gapwright {

/// One or more coaxial tubes, innermost first.
struct TubeObject {
  std::vector<Tube> walls;
  bool operator==(const TubeObject& other) const;
};

/// The flat carbon sheet.
struct SheetObject {
  bool operator==(const SheetObject&) const = default;
};

/// A graphene nanoribbon.
struct RibbonObject {
  Ribbon ribbon;
  bool operator==(const RibbonObject&) const = default;
};

/// A medium that fills all below a plane surface, by its catalogue name.
struct HalfSpaceObject {
  std::string medium;
  bool operator==(const HalfSpaceObject&) const = default;
};

/// A wire of the catalogue, by its name.
struct WireObject {
  std::string name;
  bool operator==(const WireObject&) const = default;
};

/// What takes part in a row. Labels name all but the half-space.
using Object = std::variant<TubeObject, SheetObject, RibbonObject, WireObject, HalfSpaceObject>;

struct ParsedLabel {
  Object object;
  std::vector<std::string> notes;  ///< e.g. "(5,8) is the mirror image of (8,5)"
};

/// Parses (10,10), 10,10, 5,5@10,10 (inner@outer, more by more @), graphene, 13-AGNR, 6-ZGNR,
/// wire:NAME (which entry that is, the catalogue knows). m > n is accepted as the mirror image and
/// noted. Blanks around parts are allowed. Throws InputError naming the label and, where there is
/// one, the nearest object that is accepted, when it is anything else, when a diameter is outside
/// 0.3 … 20 nm, when walls are not in rising order with gaps of at least 0.2 nm, or when a ribbon
/// has fewer than 3 (AGNR), 2 (ZGNR) or more than 3000 lines.
ParsedLabel parse_label(std::string_view label);

/// "(5,5)@(10,10)", "graphene", "13-AGNR", "wire:gaas-etched", the name of the medium.
std::string label_of(const Object& object);

}  // namespace gapwright
