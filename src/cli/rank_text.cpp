#include "rank_text.hpp"

#include "row_text.hpp"
#include "text_table.hpp"

#include <gapwright/math/kernel.hpp>
#include <gapwright/sweep/store.hpp>

#include <algorithm>
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

const std::vector<Shown>& shown_fields(Arrangement arrangement) {
  static const std::vector<Shown> coaxial = {
      {"gap_nm", "gap", "nm", 4},
      {"energy_mJ_per_m2", "energy", "mJ/m2", 2},
      {"energy_eV_per_nm", "energy", "eV/nm", 4},
      {"dispersion_eV_per_nm", "dispersion", "eV/nm", 4},
      {"electronic_share_eV_per_nm", "electronic", "eV/nm", 5},
      {"contact_eV_per_nm", "contact", "eV/nm", 4},
      {"pull_out_force_nN", "pull-out", "nN", 3},
  };
  static const std::vector<Shown> parallel = {
      {"gap_nm", "gap", "nm", 4},
      {"well_depth_eV_per_nm", "well", "eV/nm", 4},
      {"energy_eV_per_nm", "energy", "eV/nm", 4},
      {"dispersion_eV_per_nm", "dispersion", "eV/nm", 4},
      {"electronic_share_eV_per_nm", "electronic", "eV/nm", 5},
      {"contact_eV_per_nm", "contact", "eV/nm", 4},
      {"stiffness_eV_per_nm3", "stiffness", "eV/nm3", 1},
      {"pair_potential_eV_per_nm", "pair pot.", "eV/nm", 4},
  };
  return arrangement == Arrangement::coaxial ? coaxial : parallel;
}

bool is_shown(const std::vector<Shown>& fields, const std::string& field) {
  return std::any_of(fields.begin(), fields.end(),
                     [&](const Shown& shown) { return field == shown.field; });
}

std::optional<double> number_of(const Binding& row, std::string_view field) {
  const FieldValue value = binding_field(field).get(row);
  const double* number = std::get_if<double>(&value);
  return number ? std::optional(*number) : std::nullopt;
}

std::string_view error_after(Arrangement arrangement) {
  return arrangement == Arrangement::coaxial ? "energy_mJ_per_m2" : "energy_eV_per_nm";
}

// The numerical error of the energy; per area in the same proportion.
std::optional<double> shown_error(const Binding& row) {
  if (!row.energy_error || !row.energy_eV_per_nm) return std::nullopt;
  if (!row.energy_mJ_per_m2) return row.energy_error;
  return std::abs(*row.energy_error / *row.energy_eV_per_nm * *row.energy_mJ_per_m2);
}

std::string extra_cell(const Binding& row, const std::string& field) {
  const FieldValue value = binding_field(field).get(row);
  if (const std::string* text = std::get_if<std::string>(&value)) return *text;
  return significant(number_of(row, field), 6);
}

std::string kinds(const Binding& row) {
  const auto letter = [](const std::string& kind) { return kind == "metallic" ? "M" : "S"; };
  const char* between = row.arrangement == arrangement_word(Arrangement::coaxial) ? "@" : " ";
  return std::string(letter(row.kind_1)) + between + letter(row.kind_2);
}

}  // namespace

std::string ranking_table(const std::vector<RankedRow>& rows, Arrangement arrangement,
                          const Order& order) {
  const std::vector<Shown>& fields = shown_fields(arrangement);
  const bool extra = !is_shown(fields, order.field);
  const bool failures = std::any_of(rows.begin(), rows.end(), [](const RankedRow& row) {
    return row.binding.status != Status::ok;
  });
  std::vector<TextTable::Column> columns = {{"rank", ""}, {"pair", "", true}, {"kind", "", true}};
  for (const Shown& shown : fields) {
    columns.push_back({shown.title, shown.unit});
    if (error_after(arrangement) == shown.field) columns.push_back({"error", shown.unit});
  }
  if (extra) columns.push_back({order.field, ""});
  columns.push_back({"spread", "ranks"});
  if (failures) columns.push_back({"status", "", true});
  TextTable table(columns);
  for (const RankedRow& row : rows) {
    const Binding& pair = row.binding;
    std::vector<std::string> cells = {std::to_string(row.rank), pair_name(pair), kinds(pair)};
    for (const Shown& shown : fields) {
      cells.push_back(fixed(number_of(pair, shown.field), shown.decimals));
      if (error_after(arrangement) == shown.field)
        cells.push_back(significant(shown_error(pair), 1));
    }
    if (extra) cells.push_back(extra_cell(pair, order.field));
    cells.push_back(std::to_string(row.rank_spread));
    if (failures) cells.emplace_back(status_word(pair.status));
    table.add(std::move(cells));
  }
  return table.text();
}

std::string how_to_read(std::size_t shown, std::size_t rows, Arrangement arrangement,
                        const Order& order) {
  const char* compared = arrangement == Arrangement::coaxial
                             ? ""
                             : "pair pot.: the chirality-blind pair potential at the same gap; ";
  return fmt::format(
      "{} of {} rows by {}, {} first. Negative energies attract; dispersion less electronic is "
      "what geometry alone gives; {}M metallic, S semiconducting; spread: ranks a pair moves "
      "between contact targets.",
      shown, rows, order.field, order.descending ? "highest" : "lowest", compared);
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
