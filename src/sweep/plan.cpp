#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/toml_reader.hpp>
#include <gapwright/sweep/plan.hpp>

#include <cmath>
#include <limits>

#include <fmt/format.h>

namespace gapwright {
namespace {

const NumberRange diameter_range{min_diameter_nm, max_diameter_nm, "nm"};
const NumberRange index_range{1, max_index, ""};
const NumberRange gap_range{min_gap_nm, max_gap_nm, "nm"};
const NumberRange fixed_gap_range{min_gap_nm, farthest_gap_nm, "nm"};

// Runs a check that knows nothing of the file, and gives its message the place of the key.
template <typename Check>
auto at_key(const TomlReader& reader, const std::string& key, Check&& check) {
  try {
    return check();
  } catch (const InputError& error) {
    const InputError::Parts& parts = error.parts();
    throw reader.error(key, parts.what, parts.expected, parts.nearest);
  }
}

std::optional<Interval> interval(const TomlReader& reader, const std::string& key,
                                 const NumberRange& range) {
  const auto bounds = reader.optional_interval(key, range);
  if (!bounds) return std::nullopt;
  return Interval{(*bounds)[0], (*bounds)[1]};
}

template <typename Entry>
std::vector<std::string> names_of(const std::vector<Entry>& entries) {
  std::vector<std::string> names;
  for (const Entry& entry : entries) names.push_back(entry.name);
  return names;
}

void read_tube(const TomlReader& reader, const std::string& key, Plan& plan,
               std::optional<Tube>& place) {
  if (const auto label = reader.optional_text(key))
    place = at_key(reader, key, [&] { return parse_single_tube(*label, key, plan.notes); });
}

void read_tubes(const TomlReader& reader, Plan& plan) {
  if (const auto word = reader.optional_text("arrangement"))
    plan.arrangement = at_key(reader, "arrangement", [&] { return sweep_arrangement(*word); });
  plan.tubes.diameter_nm = interval(reader, "diameter_nm", diameter_range);
  if (const auto bounds = reader.optional_interval("index", index_range))
    plan.tubes.index =
        at_key(reader, "index", [&] { return index_interval((*bounds)[0], (*bounds)[1]); });
  if (const auto word = reader.optional_text("kind"))
    plan.tubes.kind = at_key(reader, "kind", [&] { return parse_kind(*word); });
  plan.inner_diameter_nm = interval(reader, "inner_diameter_nm", diameter_range);
  plan.outer_diameter_nm = interval(reader, "outer_diameter_nm", diameter_range);
  read_tube(reader, "inner", plan, plan.inner);
  read_tube(reader, "outer", plan, plan.outer);
  read_tube(reader, "with", plan, plan.with);
  if (plan.arrangement == Arrangement::parallel)
    plan.fixed_gap_nm = reader.optional_number("gap_nm", fixed_gap_range);
  else
    plan.gap_nm = interval(reader, "gap_nm", gap_range);
  const auto misplaced = misplaced_key(plan);
  if (misplaced && reader.has("arrangement"))  // else a flag may settle it
    throw reader.error(misplaced->key, misplaced->what, misplaced->expected);
}

void read_settings(const TomlReader& reader, const Catalogs& catalogs, Settings& settings) {
  Conditions& conditions = settings.conditions;
  conditions.temperature_K =
      reader.optional_number("temperature_K", {0, highest_temperature_K, "K"})
          .value_or(usual_temperature_K);
  conditions.chemical_potential_eV =
      reader.optional_number("chemical_potential_eV", {-10, 10, "eV"}).value_or(0.0);
  at_key(reader, "temperature_K", [&] { validate(conditions); });
  conditions.medium =
      reader.optional_word("medium", catalogs.liquid_names()).value_or(conditions.medium);
  settings.hopping =
      reader.optional_word("hopping", names_of(catalogs.hopping_sets())).value_or("");
  at_key(reader, "chemical_potential_eV",
         [&] { validate(conditions, catalogs.hopping(settings.hopping)); });
  settings.background =
      reader.optional_word("background", names_of(catalogs.backgrounds())).value_or("");
  settings.contact_target =
      reader.optional_word("contact_target", names_of(catalogs.contact_targets())).value_or("");
  settings.tolerance = reader.optional_number("tolerance", {least_tolerance, largest_tolerance, ""})
                           .value_or(settings.tolerance);
}

std::vector<std::string> field_names() {
  std::vector<std::string> names;
  for (const BindingField& field : binding_fields()) names.emplace_back(field.name);
  return names;
}

std::string quoted(const std::string& text) {
  std::string out = "\"";
  for (const char c : text) {
    if (c == '"' || c == '\\') out += '\\';
    if (c == '\n')
      out += "\\n";
    else
      out += c;
  }
  return out + '"';
}

}  // namespace

Arrangement sweep_arrangement(std::string_view word) {
  std::vector<std::string> words;
  for (const Arrangement arrangement : {Arrangement::coaxial, Arrangement::parallel}) {
    words.push_back(arrangement_word(arrangement));
    if (word == words.back()) return arrangement;
  }
  throw InputError({.what = "arrangement '" + std::string(word) + "' is not swept by this version",
                    .where = "arrangement",
                    .excerpt = {},
                    .expected = "one of " + joined(words),
                    .nearest = nearest_word(word, words)});
}

std::optional<Misplaced> misplaced_key(const Plan& plan) {
  const bool coaxial = plan.arrangement == Arrangement::coaxial;
  const auto key = [&](const char* name, const std::string& expected) {
    return Misplaced{
        name,
        std::string(name) + " says nothing of " + arrangement_word(plan.arrangement) + " pairs",
        expected};
  };
  const std::string walls = "arrangement coaxial, or with TUBE for all pairs that hold one tube";
  const std::string ranges = "arrangement coaxial, or diameter_nm for both tubes";
  if (!coaxial && plan.inner) return key("inner", walls);
  if (!coaxial && plan.outer) return key("outer", walls);
  if (!coaxial && plan.inner_diameter_nm) return key("inner_diameter_nm", ranges);
  if (!coaxial && plan.outer_diameter_nm) return key("outer_diameter_nm", ranges);
  if (!coaxial && plan.gap_nm)
    return Misplaced{"gap_nm", "gap_nm is a range, and parallel pairs stand at one gap",
                     "one gap in nm, or none for the bottom of each well"};
  if (coaxial && plan.with) return key("with", "arrangement parallel, or inner or outer");
  if (coaxial && plan.fixed_gap_nm)
    return Misplaced{"gap_nm", "gap_nm is one gap, and walls in walls have gaps of their own",
                     "LOW:HIGH in nm"};
  return std::nullopt;
}

Interval index_interval(double low, double high) {
  if (low != std::floor(low) || high != std::floor(high))
    throw InputError({.what = "an index is a whole number",
                      .where = "index",
                      .excerpt = {},
                      .expected = "LOW:HIGH, both whole, such as 5:20",
                      .nearest = fmt::format("{:.0f}:{:.0f}", std::ceil(low), std::floor(high))});
  return {low, high};
}

Tube parse_single_tube(const std::string& label, const std::string& where,
                       std::vector<std::string>& notes) {
  const ParsedLabel parsed = parse_label(label);
  const TubeObject* object = std::get_if<TubeObject>(&parsed.object);
  if (!object || object->walls.size() != 1)
    throw InputError({.what = "'" + label + "' is not one tube",
                      .where = where,
                      .excerpt = {},
                      .expected = "one tube such as (10,10) or 10,10",
                      .nearest = object ? object->walls.front().label() : ""});
  notes.insert(notes.end(), parsed.notes.begin(), parsed.notes.end());
  return object->walls.front();
}

Plan read_plan(const std::filesystem::path& file, const Catalogs& catalogs) {
  const TomlReader reader = TomlReader::from_file(file);
  Plan plan;
  plan.title = reader.optional_text("title").value_or("");
  read_tubes(reader, plan);
  read_settings(reader, catalogs, plan.settings);
  plan.sort = reader.optional_word("sort", field_names()).value_or("");
  plan.top = static_cast<int>(
      reader.optional_integer("top", 1, std::numeric_limits<int>::max()).value_or(0));
  reader.finish();
  return plan;
}

std::string plan_text(const Plan& plan) {
  std::string text;
  const auto word = [&](const char* key, const std::string& value) {
    if (!value.empty()) text += fmt::format("{} = {}\n", key, quoted(value));
  };
  const auto range = [&](const char* key, std::optional<Interval> value) {
    if (value) text += fmt::format("{} = [{}, {}]\n", key, value->low, value->high);
  };
  word("title", plan.title);
  word("arrangement", arrangement_word(plan.arrangement));
  range("diameter_nm", plan.tubes.diameter_nm);
  range("index", plan.tubes.index);
  word("kind", kind_word(plan.tubes.kind));
  if (plan.inner) word("inner", plan.inner->label());
  if (plan.outer) word("outer", plan.outer->label());
  range("inner_diameter_nm", plan.inner_diameter_nm);
  range("outer_diameter_nm", plan.outer_diameter_nm);
  if (plan.with) word("with", plan.with->label());
  if (plan.arrangement == Arrangement::coaxial)
    range("gap_nm", plan.gap_nm.value_or(usual_gaps_nm));
  else if (plan.fixed_gap_nm)
    text += fmt::format("gap_nm = {}\n", *plan.fixed_gap_nm);
  const Settings& settings = plan.settings;
  text += fmt::format("temperature_K = {}\nchemical_potential_eV = {}\n",
                      settings.conditions.temperature_K, settings.conditions.chemical_potential_eV);
  word("medium", settings.conditions.medium);
  word("hopping", settings.hopping);
  word("background", settings.background);
  word("contact_target", settings.contact_target);
  text += fmt::format("tolerance = {}\n", settings.tolerance);
  word("sort", plan.sort);
  if (plan.top > 0) text += fmt::format("top = {}\n", plan.top);
  return text;
}

}  // namespace gapwright
