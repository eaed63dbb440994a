#include "layout_fields.hpp"

namespace gapwright {
namespace {

template <int energy, int length, bool angle = false>
Dimension fixed_dimension(TableKind) {
  return {energy, length, angle};
}
constexpr auto plain = fixed_dimension<0, 0>;
constexpr auto of_length = fixed_dimension<0, 1>;
constexpr auto of_angle = fixed_dimension<0, 0, true>;

Dimension of_energy(TableKind kind) {
  return {1, kind == TableKind::parallel ? -1 : 0, false};
}
Dimension of_force(TableKind kind) {
  return {1, kind == TableKind::parallel ? -2 : -1, false};
}

LayoutValue maybe(const std::optional<double>& value) {
  return value ? LayoutValue(*value) : LayoutValue();
}

using S = const LayoutSource&;

}  // namespace

const std::vector<LayoutField>& layout_fields() {
  constexpr LayoutType number = LayoutType::number, count = LayoutType::count,
                       text = LayoutType::text;
  static const std::vector<LayoutField> fields = {
      {"number", true, count, plain, [](S s) { return LayoutValue(s.number); }},
      {"distance", true, number, of_length, [](S s) { return LayoutValue(s.row->distance_nm); }},
      {"gap", true, number, of_length,
       [](S s) { return LayoutValue(s.row->distance_nm - s.table.touching_nm); }},
      {"angle", true, number, of_angle, [](S s) { return maybe(s.row->angle_deg); }, true},
      {"energy", true, number, of_energy, [](S s) { return maybe(s.row->energy); }},
      {"force", true, number, of_force, [](S s) { return maybe(s.row->force); }},
      {"energy_sine", true, number, of_energy, [](S s) { return maybe(s.row->energy_sine); }, true},
      {"force_sine", true, number, of_force, [](S s) { return maybe(s.row->force_sine); }, true},
      {"rows", false, count, plain, [](S s) { return LayoutValue(s.count); }},
      {"kind", false, text, plain,
       [](S s) { return LayoutValue(std::string(table_kind_word(s.table.kind))); }},
      {"object_1", false, text, plain, [](S s) { return LayoutValue(s.table.object_1); }},
      {"object_2", false, text, plain, [](S s) { return LayoutValue(s.table.object_2); }},
      {"diameter_1", false, number, of_length,
       [](S s) { return LayoutValue(s.table.diameter_1_nm); }},
      {"diameter_2", false, number, of_length,
       [](S s) { return LayoutValue(s.table.diameter_2_nm); }},
      {"first_distance", false, number, of_length,
       [](S s) { return LayoutValue(s.table.first_nm); }},
      {"last_distance", false, number, of_length, [](S s) { return LayoutValue(s.table.last_nm); }},
      {"outer_cut", false, number, of_length, [](S s) { return maybe(s.table.outer_cut_nm); }},
      {"well_distance", false, number, of_length,
       [](S s) { return maybe(s.table.well_distance_nm); }},
      {"spacing", false, number, of_length, [](S s) { return maybe(s.table.spacing_nm); }},
      {"temperature_K", false, number, plain,
       [](S s) { return LayoutValue(s.table.settings.conditions.temperature_K); }},
      {"medium", false, text, plain,
       [](S s) { return LayoutValue(s.table.settings.conditions.medium); }},
      {"contact_target", false, text, plain,
       [](S s) {
         const Settings& settings = s.table.settings;
         return LayoutValue(settings.conditions.medium == "vacuum" ? settings.contact_target
                                                                   : std::string("none"));
       }},
      {"tolerance", false, number, plain, [](S s) { return LayoutValue(s.table.tolerance); }},
      {"reading_error", false, number, plain,
       [](S s) {
         return LayoutValue(std::max(s.table.reading_error.energy, s.table.reading_error.force));
       }},
      {"dispersion_error", false, number, plain,
       [](S s) { return LayoutValue(s.table.dispersion_error); }},
  };
  return fields;
}

std::vector<std::string> layout_row_fields() {
  std::vector<std::string> names;
  for (const LayoutField& field : layout_fields())
    if (field.of_row) names.emplace_back(field.name);
  return names;
}

std::vector<std::string> layout_table_fields() {
  std::vector<std::string> names;
  for (const LayoutField& field : layout_fields())
    if (!field.of_row) names.emplace_back(field.name);
  return names;
}

}  // namespace gapwright
