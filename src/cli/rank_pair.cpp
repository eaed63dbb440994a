#include "rank_pair.hpp"

#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"
#include "text_table.hpp"

#include <gapwright/sweep/store.hpp>

#include <cmath>
#include <sstream>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

struct Difference {
  std::string field;
  FieldValue stored, now;
};

std::vector<Difference> differences(const Binding& stored, const Binding& now) {
  std::vector<Difference> found;
  for (const BindingField& field : binding_fields()) {
    const FieldValue before = field.get(stored), after = field.get(now);
    if (before != after) found.push_back({std::string(field.name), before, after});
  }
  return found;
}

std::string value_text(const FieldValue& value) {
  if (const double* number = std::get_if<double>(&value)) return fmt::format("{}", *number);
  if (const std::string* text = std::get_if<std::string>(&value)) return *text;
  return "";
}

std::string relative_text(const Difference& difference) {
  const double* before = std::get_if<double>(&difference.stored);
  const double* after = std::get_if<double>(&difference.now);
  if (!before || !after || *before == 0) return "";
  return fmt::format("{:.1e}", std::abs((*after - *before) / *before));
}

Json json_value(const FieldValue& value) {
  if (const double* number = std::get_if<double>(&value)) return *number;
  if (const std::string* text = std::get_if<std::string>(&value)) return *text;
  return nullptr;
}

std::string comparison_json(const Binding& stored, const std::vector<Difference>& found) {
  Json fields = Json::array();
  for (const Difference& difference : found)
    fields.push_back({{"field", difference.field},
                      {"stored", json_value(difference.stored)},
                      {"now", json_value(difference.now)}});
  const Json object = {{"object_1", stored.object_1},
                       {"object_2", stored.object_2},
                       {"same", found.empty()},
                       {"differences", fields}};
  return object.dump() + "\n";
}

std::string comparison_text(const Binding& stored, const std::vector<Difference>& found) {
  const std::string name = pair_name(stored);
  if (found.empty())
    return fmt::format("{}: stored and computed rows are the same in all {} fields\n", name,
                       binding_fields().size());
  TextTable table({{"field", "", true}, {"stored", ""}, {"now", ""}, {"relative", ""}});
  for (const Difference& difference : found)
    table.add({difference.field, value_text(difference.stored), value_text(difference.now),
               relative_text(difference)});
  return name + ": stored and computed rows differ\n" + table.text();
}

InputError no_pair(const std::string& label) {
  return InputError({"'" + label + "' is no pair",
                     "--pair",
                     {},
                     "inner@outer such as 5,5@10,10, or two tubes such as \"6,5 10,10\"",
                     {}});
}

Placement parse_coaxial(const std::string& label) {
  const ParsedLabel parsed = parse_label(label);
  for (const std::string& remark : parsed.notes) note("note: " + remark);
  const TubeObject* walls = std::get_if<TubeObject>(&parsed.object);
  if (!walls || walls->walls.size() != 2) throw no_pair(label);
  return {Arrangement::coaxial, *walls};
}

Placement parse_parallel(const std::string& labels, const Plan& plan) {
  std::vector<std::string> parts;
  std::istringstream words(labels);
  for (std::string part; words >> part;) parts.push_back(part);
  if (parts.size() != 2) throw no_pair(labels);
  std::vector<std::string> remarks;
  const Tube first = parse_single_tube(parts[0], "--pair", remarks);
  const Tube second = parse_single_tube(parts[1], "--pair", remarks);
  for (const std::string& remark : remarks) note("note: " + remark);
  return side_by_side(first, second, plan.fixed_gap_nm);
}

Placement parse_pair(const RankRequest& request) {
  return request.plan.arrangement == Arrangement::parallel
             ? parse_parallel(request.pair, request.plan)
             : parse_coaxial(request.pair);
}

std::string name_of(const Placement& placement) {
  if (!placement.second) return label_of(placement.first);
  return label_of(placement.first) + " " + label_of(*placement.second) +
         (placement.gap_nm ? fmt::format(" at {} nm", *placement.gap_nm) : " at its well");
}

}  // namespace

int compare_pair(const Words& words, const RankRequest& request, const Catalogs& catalogs) {
  const Placement placement = parse_pair(request);
  if (!request.store)
    throw InputError({"compares with a stored row", "--pair", {}, "--store FILE.db beside it", {}});
  const Store store = Store::open_read_only(*request.store);
  // The store says how its rows were made, unless the command line does.
  const bool own = !words.operands.empty() || has_settings(words);
  const Binder binder(catalogs, own ? request.plan.settings : store.origin().settings);
  store.require_same_origin(binder);
  const auto stored = store.read({row_key(placement, binder.settings_key())});
  if (stored.empty())
    throw InputError({"no row of " + name_of(placement),
                      request.store->string(),
                      {},
                      "a pair that a finished run of this store held",
                      {}});
  const auto found = differences(stored.front(), binder.bind(placement));
  print(request.json ? comparison_json(stored.front(), found)
                     : comparison_text(stored.front(), found));
  return found.empty() ? good : fault;
}

}  // namespace gapwright::cli
