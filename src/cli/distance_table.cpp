#include "distance_table.hpp"

#include "binding_text.hpp"
#include "text_table.hpp"

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

/// A column of numbers: shown where a row has one.
struct NumberColumn {
  const char* title;
  const char* unit;
  std::optional<double> (*value)(const Binding&);
  std::string (*text)(std::optional<double>);
};

std::string five_digits(std::optional<double> value) {
  return value ? fmt::format("{:#.5g}", *value) : "";
}
std::string four_decimals(std::optional<double> value) {
  return fixed(value, 4);
}
std::string three_decimals(std::optional<double> value) {
  return fixed(value, 3);
}
std::string one_digit(std::optional<double> value) {
  return value ? fmt::format("{:.0e}", *value) : "";
}

template <auto field>
std::optional<double> get(const Binding& row) {
  return row.*field;
}

constexpr NumberColumn columns[] = {
    {"gap", "nm", get<&Binding::gap_nm>, four_decimals},
    {"axis distance", "nm", get<&Binding::axis_distance_nm>, four_decimals},
    {"dispersion", "eV/nm", get<&Binding::dispersion_eV_per_nm>, five_digits},
    {"dispersion", "eV", get<&Binding::dispersion_eV>, five_digits},
    {"contact", "eV/nm", get<&Binding::contact_eV_per_nm>, five_digits},
    {"contact", "eV", get<&Binding::contact_eV>, five_digits},
    {"total", "eV/nm", get<&Binding::energy_eV_per_nm>, five_digits},
    {"total", "eV", get<&Binding::energy_eV>, five_digits},
    {"exponent", "", get<&Binding::exponent>, three_decimals},
    {"by electrons", "eV/nm", get<&Binding::electronic_share_eV_per_nm>, five_digits},
    {"by electrons", "eV", get<&Binding::electronic_share_eV>, five_digits},
    {"thermal", "share", get<&Binding::thermal_share>, three_decimals},
    {"relative", "error", get<&Binding::relative_error>, one_digit},
};

}  // namespace

std::string distance_table(const std::vector<Binding>& rows) {
  std::vector<const NumberColumn*> used;
  std::vector<TextTable::Column> titles;
  bool contact = false;
  for (const Binding& row : rows) contact = contact || row.contact_eV_per_nm || row.contact_eV;
  for (const NumberColumn& column : columns) {
    // Without a contact term the total is the dispersion.
    if (!contact && std::string(column.title) == "total") continue;
    bool some = false;
    for (const Binding& row : rows) some = some || column.value(row);
    if (!some) continue;
    used.push_back(&column);
    titles.push_back({column.title, column.unit});
  }
  TextTable table(titles);
  for (const Binding& row : rows) {
    std::vector<std::string> cells;
    for (const NumberColumn* column : used) cells.push_back(column->text(column->value(row)));
    table.add(cells);
  }
  return heading_text(rows.front()) + "\n\n" + table.text() +
         "dispersion falls as (axis distance)^-exponent\n";
}

}  // namespace gapwright::cli
