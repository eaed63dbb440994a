#include "row_text.hpp"

#include <gapwright/pair/placement.hpp>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

Json json_value(const FieldValue& value) {
  if (const double* number = std::get_if<double>(&value)) return *number + 0.0;  // no "-0.0"
  if (const std::string* text = std::get_if<std::string>(&value)) return *text;
  return nullptr;
}

void add_fields(Json& object, const Binding& row) {
  for (const BindingField& field : binding_fields())
    object[std::string(field.name)] = json_value(field.get(row));
}

void add_message(Json& object, const Binding& row) {
  if (!row.notes.empty()) object["notes"] = row.notes;
  if (!row.message.empty()) object["message"] = row.message;
}

std::string csv_text(const std::string& text) {
  if (text.find_first_of(",\"\n") == std::string::npos) return text;
  std::string quoted = "\"";
  for (const char c : text) quoted += c == '"' ? std::string("\"\"") : std::string(1, c);
  return quoted + '"';
}

std::string csv_value(const FieldValue& value) {
  if (const double* number = std::get_if<double>(&value)) return fmt::format("{}", *number + 0.0);
  if (const std::string* text = std::get_if<std::string>(&value)) return csv_text(*text);
  return {};
}

}  // namespace

std::string comment_lines(const std::string& comment) {
  std::string lines = "# ";
  for (std::size_t i = 0; i < comment.size(); ++i) {
    lines += comment[i];
    if (comment[i] == '\n' && i + 1 < comment.size()) lines += "# ";
  }
  return lines.ends_with('\n') ? lines : lines + '\n';
}

std::string pair_name(const Binding& row) {
  const char* between = row.arrangement == arrangement_word(Arrangement::coaxial) ? "@"
                        : row.arrangement == arrangement_word(Arrangement::over)  ? " over "
                                                                                  : " ";
  return row.object_1 + between + row.object_2;
}

Json row_json(const Binding& row) {
  Json object;
  add_fields(object, row);
  add_message(object, row);
  if (row.interfaces.size() < 2) return object;  // the row itself says it
  Json interfaces = Json::array();
  for (const Interface& cut : row.interfaces)
    interfaces.push_back({{"inside", cut.inside},
                          {"outside", cut.outside},
                          {"gap_nm", cut.gap_nm},
                          {"cut_energy_eV_per_nm", cut.cut_energy_eV_per_nm},
                          {"pull_out_force_nN", cut.pull_out_force_nN}});
  object["interfaces"] = std::move(interfaces);
  return object;
}

Json ranked_json(const RankedRow& row) {
  Json object = {{"rank", row.rank}};
  add_fields(object, row.binding);
  object["rank_spread"] = row.rank_spread;
  add_message(object, row.binding);
  return object;
}

std::string ranked_csv(const std::vector<RankedRow>& rows, const std::string& comment) {
  std::string text = comment_lines(comment) + "rank";
  for (const BindingField& field : binding_fields()) text += fmt::format(",{}", field.name);
  text += ",rank_spread\n";
  for (const RankedRow& row : rows) {
    text += std::to_string(row.rank);
    for (const BindingField& field : binding_fields())
      text += "," + csv_value(field.get(row.binding));
    text += fmt::format(",{}\n", row.rank_spread);
  }
  return text;
}

}  // namespace gapwright::cli
