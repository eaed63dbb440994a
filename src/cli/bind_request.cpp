#include "bind_request.hpp"

#include "output.hpp"

#include <gapwright/join/crossed.hpp>
#include <gapwright/pair/binder.hpp>

namespace gapwright::cli {
namespace {

constexpr const char* expected_objects =
    "walls in walls, inner@outer, such as 5,5@10,10, two objects such as 10,10 17,0 or 7-AGNR "
    "13-AGNR, or one object --over graphene";
const NumberRange gap_range{min_gap_nm, farthest_gap_nm, "nm"};
const NumberRange offset_range{-1000, 1000, "nm"};
const NumberRange angle_range{min_crossing_deg, max_crossing_deg, "degrees"};

InputError unfit(const std::string& what, const std::string& nearest = {}) {
  return InputError({what, "bind", {}, expected_objects, nearest});
}

bool given(const Words& words, const std::string& option) {
  return words.has(option) || words.flag(option);
}

void exclude(const Words& words, const std::vector<std::string>& options) {
  std::string first;
  for (const std::string& option : options) {
    if (!given(words, option)) continue;
    if (!first.empty())
      throw InputError({"excludes " + first, option, {}, "one of " + joined(options), {}});
    first = option;
  }
}

Object parse_object(const std::string& label) {
  const ParsedLabel parsed = parse_label(label);
  for (const std::string& remark : parsed.notes) note("note: " + remark);
  if (std::holds_alternative<SheetObject>(parsed.object))
    throw unfit("graphene lies below another object", "10,10 --over graphene");
  return parsed.object;
}

/// As the options say; else ribbons lie face to face and all others side by side.
Arrangement arrangement_of(const Words& words, const Object& first, const Object& second) {
  if (words.has("--crossed")) return Arrangement::crossed;
  if (words.flag("--parallel")) return Arrangement::parallel;
  if (words.flag("--stacked")) return Arrangement::stacked;
  if (words.flag("--coplanar")) return Arrangement::coplanar;
  if (words.flag("--edge-on")) return Arrangement::edge_on;
  const bool ribbon =
      std::holds_alternative<RibbonObject>(first) || std::holds_alternative<RibbonObject>(second);
  return ribbon ? Arrangement::stacked : Arrangement::parallel;
}

/// What can lie below a tube.
Object parse_below(const std::string& word, const Catalogs& catalogs) {
  if (word == "graphene") return SheetObject{};
  std::vector<std::string> names{"graphene", catalogs.medium().name};
  for (const Medium& medium : catalogs.media()) names.push_back(medium.name);
  for (std::size_t i = 1; i < names.size(); ++i)
    if (names[i] == word) return HalfSpaceObject{word};
  throw InputError({"nothing flat is named '" + word + "'",
                    "--over",
                    {},
                    "one of " + joined(names),
                    nearest_word(word, names)});
}

Placement parse_walls(const Words& words) {
  const Object object = parse_object(words.operands.front());
  if (!std::holds_alternative<TubeObject>(object) || tubes_of(object).walls.size() < 2)
    throw unfit(label_of(object) + " is one object", label_of(object) + " " + label_of(object));
  for (const char* option : {"--gap-nm", "--parallel", "--crossed", "--stacked", "--coplanar",
                             "--edge-on", "--offset-nm", "--distances"})
    if (given(words, option))
      throw InputError({"is for two objects; the gaps of walls in walls are those of their radii",
                        option,
                        {},
                        "no such option here",
                        {}});
  return {Arrangement::coaxial, object};
}

Placement parse_over(const Words& words, const Catalogs& catalogs) {
  const std::string below = *words.text("--over");
  if (words.operands.size() > 1)
    throw InputError({"is for one object, and there are two",
                      "--over",
                      {},
                      "one object and what lies below it",
                      words.operands.front() + " --over " + below});
  return {Arrangement::over, parse_object(words.operands.front()), parse_below(below, catalogs),
          words.number("--gap-nm", gap_range)};
}

Placement parse_placement(const Words& words, const Catalogs& catalogs) {
  if (words.operands.empty()) throw unfit("no object");
  if (words.operands.size() > 2)
    throw unfit("more than two objects", words.operands[0] + " " + words.operands[1]);
  exclude(words, {"--parallel", "--crossed", "--over", "--stacked", "--coplanar", "--edge-on"});
  exclude(words, {"--offset-nm", "--over", "--crossed", "--parallel"});
  exclude(words, {"--gap-nm", "--distances"});
  if (words.has("--over")) return parse_over(words, catalogs);
  if (words.operands.size() == 1) return parse_walls(words);
  const Object first = parse_object(words.operands[0]), second = parse_object(words.operands[1]);
  return {arrangement_of(words, first, second),
          first,
          second,
          words.number("--gap-nm", gap_range),
          words.number("--crossed", angle_range),
          words.number("--offset-nm", offset_range)};
}

}  // namespace

BindRequest read_bind_request(const Words& words, const Catalogs& catalogs) {
  BindRequest request{parse_placement(words, catalogs), words.interval("--distances", gap_range)};
  if (request.distances_nm && (*request.distances_nm)[0] == (*request.distances_nm)[1])
    throw InputError(
        {"one gap is no table",
         "--distances",
         {},
         "LOW:HIGH with LOW below HIGH",
         "--gap-nm " + words.text("--distances")->substr(0, words.text("--distances")->find(':'))});
  return request;
}

}  // namespace gapwright::cli
