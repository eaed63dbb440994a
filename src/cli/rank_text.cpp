#include "rank_text.hpp"

#include "text_table.hpp"

#include <gapwright/math/kernel.hpp>
#include <gapwright/sweep/store.hpp>

#include <algorithm>
#include <array>
#include <cmath>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

// A numeric column of the table.
struct Shown {
  const char* field;
  const char* title;
  const char* unit;
  int decimals;
};

constexpr std::array shown_fields = {
    Shown{"gap_nm", "gap", "nm", 4},
    Shown{"energy_mJ_per_m2", "energy", "mJ/m2", 2},
    Shown{"energy_eV_per_nm", "energy", "eV/nm", 4},
    Shown{"dispersion_eV_per_nm", "dispersion", "eV/nm", 4},
    Shown{"electronic_share_eV_per_nm", "electronic", "eV/nm", 5},
    Shown{"contact_eV_per_nm", "contact", "eV/nm", 4},
    Shown{"pull_out_force_nN", "pull-out", "nN", 3},
};

bool is_shown(const std::string& field) {
  return std::any_of(shown_fields.begin(), shown_fields.end(),
                     [&](const Shown& shown) { return field == shown.field; });
}

std::optional<double> number_of(const Binding& row, std::string_view field) {
  const FieldValue value = binding_field(field).get(row);
  const double* number = std::get_if<double>(&value);
  return number ? std::optional(*number) : std::nullopt;
}

constexpr std::string_view error_after = "energy_mJ_per_m2";

// The numerical error of the energy per area: that per length in the same proportion.
std::optional<double> area_error(const Binding& row) {
  if (!row.energy_error || !row.energy_eV_per_nm || !row.energy_mJ_per_m2) return std::nullopt;
  return std::abs(*row.energy_error / *row.energy_eV_per_nm * *row.energy_mJ_per_m2);
}

std::string extra_cell(const Binding& row, const std::string& field) {
  const FieldValue value = binding_field(field).get(row);
  if (const std::string* text = std::get_if<std::string>(&value)) return *text;
  return significant(number_of(row, field), 6);
}

std::string kinds(const Binding& row) {
  const auto letter = [](const std::string& kind) { return kind == "metallic" ? "M" : "S"; };
  return std::string(letter(row.kind_1)) + "@" + letter(row.kind_2);
}

}  // namespace

std::string ranking_table(const std::vector<RankedRow>& rows, const Order& order) {
  const bool extra = !is_shown(order.field);
  const bool failures = std::any_of(rows.begin(), rows.end(), [](const RankedRow& row) {
    return row.binding.status != Status::ok;
  });
  std::vector<TextTable::Column> columns = {{"rank", ""}, {"pair", "", true}, {"kind", "", true}};
  for (const Shown& shown : shown_fields) {
    columns.push_back({shown.title, shown.unit});
    if (error_after == shown.field) columns.push_back({"error", shown.unit});
  }
  if (extra) columns.push_back({order.field, ""});
  columns.push_back({"spread", "ranks"});
  if (failures) columns.push_back({"status", "", true});
  TextTable table(columns);
  for (const RankedRow& row : rows) {
    const Binding& pair = row.binding;
    std::vector<std::string> cells = {std::to_string(row.rank), pair.object_1 + "@" + pair.object_2,
                                      kinds(pair)};
    for (const Shown& shown : shown_fields) {
      cells.push_back(fixed(number_of(pair, shown.field), shown.decimals));
      if (error_after == shown.field) cells.push_back(significant(area_error(pair), 1));
    }
    if (extra) cells.push_back(extra_cell(pair, order.field));
    cells.push_back(std::to_string(row.rank_spread));
    if (failures) cells.emplace_back(status_word(pair.status));
    table.add(std::move(cells));
  }
  return table.text();
}

std::string how_to_read(std::size_t shown, std::size_t rows, const Order& order) {
  return fmt::format(
      "{} of {} rows by {}, {} first. Negative energies attract; dispersion less electronic is "
      "what "
      "geometry alone gives; M metallic, S semiconducting; spread: ranks a pair moves between "
      "contact targets.",
      shown, rows, order.field, order.descending ? "highest" : "lowest");
}

std::string making_of(const RankRequest& request, const Binder& binder, const Order& order) {
  Plan plan = request.plan;
  plan.settings = binder.settings();
  plan.top = 0;  // a file holds all rows
  std::string text = fmt::format(
      "gapwright {}, numbers {}, catalogues {}, kernel {}\n"
      "ranked by {}, {} first; negative energies attract; rank_spread: ranks a pair moves between "
      "contact targets\n",
      program_version(), numerics_version(), binder.catalogs().hash(),
      kernel_word(kernel_variant()), order.field, order.descending ? "highest" : "lowest");
  if (request.parts > 1) text += fmt::format("part {}/{}\n", request.part, request.parts);
  return text + plan_text(plan);
}

}  // namespace gapwright::cli
