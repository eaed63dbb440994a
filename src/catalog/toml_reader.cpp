#include "number_text.hpp"
#include "toml_source.hpp"

#include <gapwright/catalog/toml_reader.hpp>

#include <algorithm>
#include <cmath>
#include <fstream>
#include <sstream>

namespace gapwright {

struct TomlReader::Table {
  std::shared_ptr<const TomlSource> source;
  std::shared_ptr<const toml::table> root;  // keeps `table` alive
  const toml::table* table = nullptr;
  std::vector<std::string> asked;

  bool was_asked(std::string_view key) const {
    return std::find(asked.begin(), asked.end(), key) != asked.end();
  }
  const toml::node* find(const std::string& key) {
    if (!was_asked(key)) asked.push_back(key);
    return table->get(key);
  }
  TomlReader inner(const toml::table& other) const {
    return TomlReader(std::make_shared<Table>(Table{source, root, &other, {}}));
  }
  [[noreturn]] void refuse(const toml::node& node, const std::string& what,
                           const std::string& expected, const std::string& nearest = {}) const {
    throw source->error(node.source().begin, what, expected, nearest);
  }

  double number(const toml::node& node, const std::string& key, const NumberRange& range) const {
    const std::string expected = "a number " + range_text(range);
    const auto value = node.is_number() ? node.value<double>() : std::nullopt;
    if (!value) refuse(node, "'" + key + "' is not a number", expected);
    if (!in_range(*value, range)) refuse(node, "'" + key + "' is out of range", expected);
    return *value;
  }
  std::array<double, 2> interval(const toml::node& node, const std::string& key,
                                 const NumberRange& range) const;
};

std::array<double, 2> TomlReader::Table::interval(const toml::node& node, const std::string& key,
                                                  const NumberRange& range) const {
  const std::string expected =
      "\"LOW:HIGH\" or [LOW, HIGH], LOW not above HIGH, " + range_text(range);
  if (const auto* text = node.as_string()) {
    if (const auto both = read_interval(text->get(), range)) return *both;
    refuse(node, "'" + key + "' is not an interval in range", expected);
  }
  const auto* array = node.as_array();
  if (array == nullptr || array->size() != 2)
    refuse(node, "'" + key + "' is not an interval", expected);
  const std::array<double, 2> both{number(*array->get(0), key, range),
                                   number(*array->get(1), key, range)};
  if (both[0] > both[1]) refuse(node, "'" + key + "' ends below its start", expected);
  return both;
}

TomlReader TomlReader::from_text(std::string_view text, const std::string& name) {
  const auto source = std::make_shared<const TomlSource>(text, name);
  try {
    const auto root = std::make_shared<const toml::table>(toml::parse(text, name));
    return TomlReader(std::make_shared<Table>(Table{source, root, root.get(), {}}));
  } catch (const toml::parse_error& error) {
    throw source->error(error.source().begin, std::string(error.description()), "valid TOML", {});
  }
}

TomlReader TomlReader::from_file(const std::filesystem::path& file) {
  std::ifstream stream(file, std::ios::binary);
  std::ostringstream text;
  if (stream) text << stream.rdbuf();
  if (!stream || std::filesystem::is_directory(file))
    throw InputError({"cannot be read", file.string(), {}, "a readable TOML file", {}});
  return from_text(text.str(), file.string());
}

bool TomlReader::has(const std::string& key) const {
  return table_->find(key) != nullptr;
}

std::optional<double> TomlReader::optional_number(const std::string& key,
                                                  const NumberRange& range) const {
  const toml::node* node = table_->find(key);
  if (node == nullptr) return std::nullopt;
  return table_->number(*node, key, range);
}

double TomlReader::number(const std::string& key, const NumberRange& range) const {
  if (const auto value = optional_number(key, range)) return *value;
  throw missing(key, "a number " + range_text(range));
}

std::optional<long> TomlReader::optional_integer(const std::string& key, long low,
                                                 long high) const {
  const toml::node* node = table_->find(key);
  if (node == nullptr) return std::nullopt;
  const auto* value = node->as_integer();
  if (value == nullptr || value->get() < low || value->get() > high)
    table_->refuse(*node, "'" + key + "' is not a whole number in range",
                   integer_range_text(low, high));
  return static_cast<long>(value->get());
}

long TomlReader::integer(const std::string& key, long low, long high) const {
  if (const auto value = optional_integer(key, low, high)) return *value;
  throw missing(key, integer_range_text(low, high));
}

std::optional<bool> TomlReader::optional_flag(const std::string& key) const {
  const toml::node* node = table_->find(key);
  if (node == nullptr) return std::nullopt;
  const auto* value = node->as_boolean();
  if (value == nullptr) table_->refuse(*node, "'" + key + "' is not a flag", "true or false");
  return value->get();
}

bool TomlReader::flag(const std::string& key) const {
  if (const auto value = optional_flag(key)) return *value;
  throw missing(key, "true or false");
}

std::optional<std::string> TomlReader::optional_text(const std::string& key) const {
  const toml::node* node = table_->find(key);
  if (node == nullptr) return std::nullopt;
  const auto* value = node->as_string();
  if (value == nullptr) table_->refuse(*node, "'" + key + "' is not text", "text in quotes");
  if (value->get().find_first_not_of(" \t\r\n") == std::string::npos)
    table_->refuse(*node, "'" + key + "' is blank", "text in quotes");
  return value->get();
}

std::string TomlReader::text(const std::string& key) const {
  if (auto value = optional_text(key)) return *std::move(value);
  throw missing(key, "text in quotes");
}

std::optional<std::string> TomlReader::optional_word(
    const std::string& key, const std::vector<std::string>& choices) const {
  auto value = optional_text(key);
  if (value && std::find(choices.begin(), choices.end(), *value) == choices.end())
    throw error(key, "'" + *value + "' is not known as '" + key + "'", "one of " + joined(choices),
                nearest_word(*value, choices));
  return value;
}

std::string TomlReader::word(const std::string& key,
                             const std::vector<std::string>& choices) const {
  if (auto value = optional_word(key, choices)) return *std::move(value);
  throw missing(key, "one of " + joined(choices));
}

std::optional<std::array<double, 2>> TomlReader::optional_interval(const std::string& key,
                                                                   const NumberRange& range) const {
  const toml::node* node = table_->find(key);
  if (node == nullptr) return std::nullopt;
  return table_->interval(*node, key, range);
}

std::array<double, 2> TomlReader::interval(const std::string& key, const NumberRange& range) const {
  if (const auto both = optional_interval(key, range)) return *both;
  throw missing(key, "an interval " + range_text(range));
}

std::vector<double> TomlReader::numbers(const std::string& key, std::size_t least, std::size_t most,
                                        const NumberRange& range) const {
  const std::string expected =
      std::to_string(least) + " to " + std::to_string(most) + " numbers " + range_text(range);
  const toml::node* node = table_->find(key);
  if (node == nullptr) throw missing(key, expected);
  const auto* array = node->as_array();
  if (array == nullptr) {
    if (least > 1) table_->refuse(*node, "'" + key + "' is not an array", expected);
    return {table_->number(*node, key, range)};
  }
  if (array->size() < least || array->size() > most)
    table_->refuse(*node, "'" + key + "' has " + std::to_string(array->size()) + " values",
                   expected);
  std::vector<double> values;
  for (const toml::node& item : *array) values.push_back(table_->number(item, key, range));
  return values;
}

std::optional<TomlReader> TomlReader::optional_table(const std::string& key) const {
  const toml::node* node = table_->find(key);
  if (node == nullptr) return std::nullopt;
  const auto* inner = node->as_table();
  if (inner == nullptr) table_->refuse(*node, "'" + key + "' is not a table", "a table");
  return table_->inner(*inner);
}

TomlReader TomlReader::table(const std::string& key) const {
  if (auto inner = optional_table(key)) return *std::move(inner);
  throw missing(key, "a table [" + key + "]");
}

std::vector<TomlReader> TomlReader::tables(const std::string& key) const {
  const std::string expected = "one or more tables [[" + key + "]]";
  const toml::node* node = table_->find(key);
  if (node == nullptr) throw missing(key, expected);
  const auto* array = node->as_array();
  if (array == nullptr || !array->is_array_of_tables())
    table_->refuse(*node, "'" + key + "' is not a list of tables", expected);
  std::vector<TomlReader> readers;
  for (const toml::node& item : *array) readers.push_back(table_->inner(*item.as_table()));
  return readers;
}

void TomlReader::finish() const {
  for (const auto& [key, node] : *table_->table) {
    if (table_->was_asked(key.str())) continue;
    throw table_->source->error(key.source().begin, "unknown key '" + std::string(key.str()) + "'",
                                "one of " + joined(table_->asked),
                                nearest_word(key.str(), table_->asked));
  }
}

InputError TomlReader::error(const std::string& key, const std::string& what,
                             const std::string& expected, const std::string& nearest) const {
  const toml::node* node = table_->find(key);
  const toml::node& place = node != nullptr ? *node : *table_->table;
  return table_->source->error(place.source().begin, what, expected, nearest);
}

// A misspelled key is missed before finish() meets it: look for it among the keys not asked for.
InputError TomlReader::missing(const std::string& key, const std::string& expected) const {
  for (const auto& [present, node] : *table_->table) {
    if (table_->was_asked(present.str()) || nearest_word(present.str(), {key}).empty()) continue;
    return table_->source->error(present.source().begin,
                                 "unknown key '" + std::string(present.str()) + "'",
                                 "key '" + key + "', " + expected, key);
  }
  return table_->source->error(table_->table->source().begin, "key '" + key + "' is missing",
                               key + " = " + expected, {});
}

}  // namespace gapwright
