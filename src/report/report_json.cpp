#include <gapwright/report/report.hpp>

#include <functional>
#include <unordered_map>

#include <fmt/format.h>
#include <nlohmann/json.hpp>

namespace gapwright {
namespace {

std::string quoted(const std::string& text) {
  return nlohmann::json(text).dump(-1, ' ', false, nlohmann::json::error_handler_t::replace);
}

std::string number(double value) {
  return fmt::format("{:.6g}", value + 0.0);  // no "-0"
}

template <typename Item>
std::string list(const std::vector<Item>& items,
                 const std::function<std::string(const Item&)>& text) {
  std::string joined = "[";
  for (const Item& item : items) {
    if (joined.size() > 1) joined += ',';
    joined += text(item);
  }
  return joined + ']';
}

std::string numbers(const std::vector<double>& values) {
  return list<double>(values, number);
}

// Every distinct text once, and where it stands.
std::string text_column(const std::vector<FieldValue>& values) {
  std::vector<std::string> words;
  std::unordered_map<std::string, std::size_t> places;
  std::string index = "[";
  for (const FieldValue& value : values) {
    const std::string* text = std::get_if<std::string>(&value);
    const auto [place, is_new] = places.emplace(text ? *text : std::string(), words.size());
    if (is_new) words.push_back(place->first);
    index += fmt::format("{}{}", index.size() > 1 ? "," : "", place->second);
  }
  return "{\"words\":" + list<std::string>(words, quoted) + ",\"index\":" + index + "]}";
}

std::string number_column(const std::vector<FieldValue>& values) {
  std::string text = "[";
  for (const FieldValue& value : values) {
    if (text.size() > 1) text += ',';
    const double* given = std::get_if<double>(&value);
    text += given ? number(*given) : "null";
  }
  return "{\"numbers\":" + text + "]}";
}

bool all_empty(const std::vector<FieldValue>& values) {
  for (const FieldValue& value : values)
    if (!std::holds_alternative<std::monostate>(value)) return false;
  return true;
}

bool all_same(const std::vector<FieldValue>& values) {
  for (const FieldValue& value : values)
    if (value != values.front()) return false;
  return true;
}

std::string column(const std::vector<FieldValue>& values, bool is_text) {
  if (all_same(values))
    return "{\"same\":" +
           (is_text ? quoted(std::get<std::string>(values.front()))
                    : number(std::get<double>(values.front()))) +
           "}";
  return is_text ? text_column(values) : number_column(values);
}

std::string columns(const Report& report) {
  std::string text = "{";
  std::vector<FieldValue> values(report.rows.size());
  const auto add = [&](std::string_view name, bool is_text, const auto& value_of) {
    for (std::size_t i = 0; i < values.size(); ++i) values[i] = value_of(report.rows[i]);
    if (all_empty(values)) return;
    text += fmt::format("{}\"{}\":{}", text.size() > 1 ? "," : "", name, column(values, is_text));
  };
  add("rank", false, [](const ReportRow& row) { return FieldValue(double(row.rank)); });
  for (const BindingField& field : binding_fields())
    add(field.name, field.is_text, [&](const ReportRow& row) { return field.get(row.binding); });
  add("rank_spread", false,
      [](const ReportRow& row) { return FieldValue(double(row.rank_spread)); });
  add("message", true, [](const ReportRow& row) {
    return row.binding.message.empty() ? FieldValue() : FieldValue(row.binding.message);
  });
  return text + "}";
}

std::string line_json(const CurveLine& line) {
  return "{\"energy\":" + numbers(line.energy) + ",\"force\":" + numbers(line.force) + "}";
}

std::string curve_json(const GapCurve& curve) {
  std::string text = fmt::format(
      "{{\"energy_unit\":{},\"force_name\":{},\"force_unit\":{},\"gap_nm\":{},\"dispersion\":{}",
      quoted(curve.energy_unit), quoted(curve.force_name), quoted(curve.force_unit),
      numbers(curve.gap_nm), line_json(curve.dispersion));
  if (curve.contact) text += ",\"contact\":" + line_json(*curve.contact);
  if (curve.pair_potential) text += ",\"pair_potential\":" + line_json(*curve.pair_potential);
  return text + "}";
}

std::string pair_json(const PairFigures& pair) {
  std::string text =
      fmt::format("{{\"row\":{},\"tubes\":{}", pair.row, list<std::string>(pair.tubes, quoted));
  if (pair.curve) text += ",\"curve\":" + curve_json(*pair.curve);
  return text + "}";
}

std::string tube_json(const BandPicture& tube) {
  const auto band = [](const std::vector<double>& energies) {
    return list<double>(energies, [](double e) { return fmt::format("{:.5g}", e + 0.0); });
  };
  return fmt::format(
      "{{\"label\":{},\"window_eV\":{},\"zone_edge_per_nm\":{},\"k\":{},\"bands_eV\":{},"
      "\"energy_eV\":{},\"states_per_eV_atom\":{}}}",
      quoted(tube.label), number(tube.window_eV), number(tube.zone_edge_per_nm), numbers(tube.k),
      list<std::vector<double>>(tube.bands_eV, band), numbers(tube.energy_eV),
      list<double>(tube.states_per_eV_atom, [](double n) { return fmt::format("{:.4g}", n); }));
}

std::string run_json(const ReportRun& run) {
  return fmt::format(
      "{{\"started\":{},\"ended\":{},\"finished\":{},\"rows_computed\":{},\"threads\":{},"
      "\"program_version\":{},\"plan\":{}}}",
      quoted(run.started), quoted(run.ended), run.finished, run.rows_computed, run.threads,
      quoted(run.program_version), quoted(run.plan));
}

std::string without_tags(const std::string& json) {
  std::string safe;
  safe.reserve(json.size());
  for (const char c : json) {
    if (c == '<')
      safe += "\\u003c";
    else
      safe += c;
  }
  return safe;
}

}  // namespace

std::string report_json(const Report& report) {
  using Fact = std::pair<std::string, std::string>;
  const std::string facts = list<Fact>(report.facts, [](const Fact& fact) {
    return "[" + quoted(fact.first) + "," + quoted(fact.second) + "]";
  });
  return without_tags(fmt::format(
      "{{\"title\":{},\"arrangement\":{},\"facts\":{},\n\"runs\":{},\n\"order\":{{\"field\":{},"
      "\"descending\":{}}},\n\"count\":{},\"columns\":{},\n\"tubes\":{},\n\"pairs\":{}}}\n",
      quoted(report.title), quoted(report.arrangement), facts,
      list<ReportRun>(report.runs, run_json), quoted(report.order_field), report.descending,
      report.rows.size(), columns(report), list<BandPicture>(report.tubes, tube_json),
      list<PairFigures>(report.pairs, pair_json)));
}

}  // namespace gapwright
