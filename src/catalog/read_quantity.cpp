#include "readers.hpp"

#include <algorithm>
#include <limits>

namespace gapwright {
namespace {

constexpr double any = std::numeric_limits<double>::max();

bool name_character(char c) {
  return (c >= 'a' && c <= 'z') || (c >= '0' && c <= '9') || c == '-';
}

}  // namespace

std::string read_name(const TomlReader& entry, const std::vector<std::string>& taken) {
  std::string name = entry.text("name");
  if (!std::all_of(name.begin(), name.end(), name_character))
    throw entry.error("name", "'" + name + "' is not a name",
                      "small letters, digits and hyphens only");
  if (std::find(taken.begin(), taken.end(), name) != taken.end())
    throw entry.error("name", "the name '" + name + "' is used twice", "a name of its own");
  return name;
}

Quantity read_quantity(const TomlReader& entry, const std::string& key,
                       const std::vector<std::string>& units, std::size_t most) {
  const TomlReader table = entry.table(key);
  const auto range = table.interval("range", {-any, any, ""});
  Quantity quantity;
  quantity.unit = table.word("unit", units);
  quantity.values = table.numbers("value", 1, most, {range[0], range[1], quantity.unit});
  quantity.source = table.text("source");
  table.finish();
  return quantity;
}

}  // namespace gapwright
