#include "binding_text.hpp"
#include "commands.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"

namespace gapwright::cli {
namespace {

constexpr const char* expected_objects =
    "walls in walls, inner@outer, such as 5,5@10,10, or two tubes such as 10,10 17,0";
const NumberRange gap_range{min_gap_nm, farthest_gap_nm, "nm"};

InputError unfit(const std::string& what, const std::string& nearest = {}) {
  return InputError({what, "bind", {}, expected_objects, nearest});
}

Object parse_object(const std::string& label) {
  const ParsedLabel parsed = parse_label(label);
  for (const std::string& remark : parsed.notes) note("note: " + remark);
  if (!std::holds_alternative<TubeObject>(parsed.object))
    throw unfit(label_of(parsed.object) + " is no tube; this version binds tubes");
  return parsed.object;
}

Placement parse_walls(const Words& words) {
  const Object object = parse_object(words.operands.front());
  if (tubes_of(object).walls.size() < 2)
    throw unfit(label_of(object) + " is one object", label_of(object) + " " + label_of(object));
  for (const char* option : {"--gap-nm", "--parallel"})
    if (words.has(option) || words.flag(option))
      throw InputError({std::string(option) + " is for two objects; the gaps of walls in walls are "
                                              "those of their radii",
                        option,
                        {},
                        "no such option here",
                        {}});
  return {Arrangement::coaxial, object};
}

Placement parse_placement(const Words& words) {
  if (words.operands.empty()) throw unfit("no object");
  if (words.operands.size() == 1) return parse_walls(words);
  if (words.operands.size() > 2)
    throw unfit("more than two objects", words.operands[0] + " " + words.operands[1]);
  return {Arrangement::parallel, parse_object(words.operands[0]), parse_object(words.operands[1]),
          words.number("--gap-nm", gap_range)};
}

}  // namespace

int bind(const Words& words) {
  const Catalogs catalogs = load_catalogs(words);
  const Settings settings = read_settings(words, catalogs);
  const Placement placement = parse_placement(words);
  const Binder binder(catalogs, settings);
  const Binding row = settings.conditions.retarded
                          ? at_option("--retarded", [&] { return binder.bind(placement); })
                          : binder.bind(placement);
  print(words.flag("--json") ? row_json(row).dump() + "\n" : binding_text(row));
  if (row.status == Status::ok) return good;
  note("gapwright: " + pair_text(row) + ": " + std::string(status_word(row.status)) + ", " +
       row.message);
  return some_failed;
}

}  // namespace gapwright::cli
