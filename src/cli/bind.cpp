#include "binding_text.hpp"
#include "commands.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"

namespace gapwright::cli {
namespace {

constexpr const char* expected_walls =
    "one label of walls in walls, inner@outer, such as 5,5@10,10";

TubeObject parse_walls(const Words& words) {
  if (words.operands.size() != 1)
    throw InputError(
        {words.operands.empty()
             ? "no object"
             : "objects beside each other; this version computes coaxial walls only",
         "bind",
         {},
         expected_walls,
         words.operands.size() == 2 ? words.operands[0] + "@" + words.operands[1] : std::string()});
  const ParsedLabel parsed = parse_label(words.operands.front());
  for (const std::string& remark : parsed.notes) note("note: " + remark);
  const TubeObject* object = std::get_if<TubeObject>(&parsed.object);
  if (!object || object->walls.size() < 2)
    throw InputError(
        {label_of(parsed.object) + " is one object; this version computes coaxial walls only",
         "bind",
         {},
         expected_walls,
         {}});
  return *object;
}

}  // namespace

int bind(const Words& words) {
  const Catalogs catalogs = load_catalogs(words);
  const Settings settings = read_settings(words, catalogs);
  const TubeObject walls = parse_walls(words);
  const Binder binder(catalogs, settings);
  const Binding row = binder.bind({Arrangement::coaxial, walls});
  print(words.flag("--json") ? row_json(row).dump() + "\n" : binding_text(row));
  if (row.status == Status::ok) return good;
  note("gapwright: " + row.object_1 + "@" + row.object_2 + ": " +
       std::string(status_word(row.status)) + ", " + row.message);
  return some_failed;
}

}  // namespace gapwright::cli
