#include "check_quantities.hpp"
#include "commands.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"
#include "text_table.hpp"

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

struct Checked {
  CheckRow row;
  double ours = 0.0;

  bool judged() const { return row.uncertainty > 0; }
  bool inside() const { return std::abs(ours - row.value) <= row.uncertainty; }
  bool failed() const { return row.weight == CheckWeight::gated && !(judged() && inside()); }
};

std::string weight_word(CheckWeight weight) {
  switch (weight) {
    case CheckWeight::gated:
      return "gated";
    case CheckWeight::informative:
      return "informative";
    case CheckWeight::from_memory:
      return "from memory";
  }
  return {};
}

std::string verdict(const Checked& checked) {
  if (checked.judged()) return checked.inside() ? "inside" : "outside";
  return fmt::format("{:+.1f} %", 100 * (checked.ours / checked.row.value - 1));
}

std::string theirs(const CheckRow& row) {
  const std::string value = significant(row.value, 7);
  return row.uncertainty > 0 ? value + " ± " + significant(row.uncertainty, 3) : value;
}

Json checked_json(const Checked& checked) {
  const CheckRow& row = checked.row;
  return {{"name", row.name},
          {"quantity", row.quantity},
          {"object", row.object},
          {"condition", row.condition},
          {"ours", checked.ours},
          {"theirs", row.value},
          {"uncertainty", row.uncertainty > 0 ? Json(row.uncertainty) : Json(nullptr)},
          {"unit", row.unit},
          {"weight", weight_word(row.weight)},
          {"verdict", verdict(checked)},
          {"source", row.source},
          {"remark", row.remark}};
}

// Sources repeat: they are numbered in order of appearance and listed once.
std::size_t source_number(std::vector<std::string>& sources, const std::string& source) {
  const auto place = std::find(sources.begin(), sources.end(), source);
  if (place == sources.end()) {
    sources.push_back(source);
    return sources.size();
  }
  return static_cast<std::size_t>(place - sources.begin()) + 1;
}

std::string checked_text(const std::vector<Checked>& all) {
  std::vector<std::string> sources;
  TextTable table({{"value", "", true},
                   {"ours", ""},
                   {"theirs", "", true},
                   {"unit", "", true},
                   {"verdict", "", true},
                   {"weight", "", true},
                   {"source", ""},
                   {"remark", "", true}});
  for (const Checked& checked : all) {
    const CheckRow& row = checked.row;
    table.add({row.name, significant(checked.ours, 7), theirs(row), row.unit, verdict(checked),
               weight_word(row.weight), fmt::format("[{}]", source_number(sources, row.source)),
               row.remark});
  }
  std::string text = table.text() + "\n";
  for (std::size_t i = 0; i < sources.size(); ++i)
    text += fmt::format("[{}] {}\n", i + 1, sources[i]);
  return text;
}

}  // namespace

int check(const Words& words) {
  if (!words.operands.empty())
    throw InputError(
        {"unexpected '" + words.operands.front() + "'", "check", {}, "options only", {}});
  const Catalogs catalogs = load_catalogs(words);
  CheckBench bench(catalogs, read_settings(words, catalogs));
  std::vector<Checked> all;
  for (const CheckRow& row : catalogs.checks()) all.push_back({row, our_value(row, bench)});

  std::string out;
  if (words.flag("--json"))
    for (const Checked& checked : all) out += checked_json(checked).dump() + "\n";
  else
    out = checked_text(all);
  print(out);
  const auto outside = std::count_if(all.begin(), all.end(),
                                     [](const Checked& checked) { return checked.failed(); });
  const auto gated = std::count_if(all.begin(), all.end(), [](const Checked& checked) {
    return checked.row.weight == CheckWeight::gated;
  });
  note(fmt::format("{} of {} gated values inside, {} values in all", gated - outside, gated,
                   all.size()));
  return outside > 0 ? fault : good;
}

}  // namespace gapwright::cli
