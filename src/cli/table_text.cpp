#include "table_text.hpp"

#include "row_text.hpp"
#include "text_table.hpp"

#include <gapwright/math/kernel.hpp>
#include <gapwright/sweep/store.hpp>
#include <gapwright/table/outer_cut.hpp>

#include <array>
#include <cmath>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

struct Column {
  std::string name;
  std::optional<double> (*value)(const Table&, const TableRow&);
};

void add_sine_columns(std::vector<Column>& columns) {
  columns.push_back(
      {"energy_sine_eV", [](const Table&, const TableRow& r) { return r.energy_sine; }});
  columns.push_back(
      {"force_sine_eV_per_nm", [](const Table&, const TableRow& r) { return r.force_sine; }});
}

std::vector<Column> columns_of(TableKind kind) {
  const bool parallel = kind == TableKind::parallel;
  std::vector<Column> columns;
  if (kind == TableKind::crossed)
    columns.push_back({"angle_deg", [](const Table&, const TableRow& r) { return r.angle_deg; }});
  columns.push_back({"distance_nm",
                     [](const Table&, const TableRow& r) { return std::optional(r.distance_nm); }});
  columns.push_back({"gap_nm", [](const Table& t, const TableRow& r) {
                       return std::optional(r.distance_nm - t.touching_nm);
                     }});
  columns.push_back({parallel ? "energy_eV_per_nm" : "energy_eV",
                     [](const Table&, const TableRow& r) { return r.energy; }});
  columns.push_back({parallel ? "force_eV_per_nm2" : "force_eV_per_nm",
                     [](const Table&, const TableRow& r) { return r.force; }});
  if (kind == TableKind::crossed) add_sine_columns(columns);
  if (kind != TableKind::beads)
    columns.push_back({parallel ? "pair_potential_eV_per_nm" : "pair_potential_eV",
                       [](const Table&, const TableRow& r) { return r.pair_potential; }});
  return columns;
}

std::string subject(const Table& table) {
  const std::string pair = table.object_1 + " and " + table.object_2;
  switch (table.kind) {
    case TableKind::parallel:
      return pair + " parallel: energy per length against the distance of the axes\n";
    case TableKind::crossed:
      return pair +
             " crossed: energy against the distance of the axes and the angle between them; rows "
             "of angle 0 hold the limit of energy times the sine of the angle\n";
    case TableKind::beads:
      return fmt::format(
          "{} as beads {:.6g} nm apart along their axes: energy of two beads, one of each tube, "
          "against their distance\n",
          pair, *table.spacing_nm);
  }
  return {};
}

std::string cut_lines(const Table& table) {
  const bool beads = table.kind == TableKind::beads;
  std::string text = fmt::format(
      "inner cut {:.6g} nm, gap {:.6g} nm; closer, the energy goes on as a straight line{}\n",
      table.first_nm, table.first_nm - table.touching_nm,
      beads ? fmt::format(" up to {:.9g} eV at distance 0",
                          *table.closest_energy + *table.closest_force * table.first_nm)
            : "");
  if (!table.outer_cut_nm)
    return text + fmt::format("outer cut none; the table ends at the gap {:.6g} nm\n",
                              table.last_nm - table.touching_nm);
  const double cut = *table.outer_cut_nm;
  text += fmt::format(
      "outer cut {0:.6g} nm: {1} times 1 - x^3 (10 - 15 x + 6 x^2), x = (distance - {2:.6g} "
      "nm)/{3:.6g} nm from 0 to 1",
      cut, beads ? "the force between the tubes, before it is shared out to beads," : "force",
      switch_begin * cut, (1 - switch_begin) * cut);
  if (table.shift)
    text +=
        fmt::format("; moves {} below {:.6g} nm by {:.6g} eV/nm",
                    beads ? "the energy per length" : "energies", switch_begin * cut, *table.shift);
  return text + "\n";
}

std::string well_lines(const Table& table) {
  std::string text;
  if (table.well_distance_nm)
    text += fmt::format("well {}distance {:.6f} nm, gap {:.6f} nm, energy {:.7g} eV/nm\n",
                        table.kind == TableKind::beads ? "of the parallel tubes: " : "",
                        *table.well_distance_nm, *table.well_distance_nm - table.touching_nm,
                        *table.well_energy);
  for (const AngleSummary& angle : table.angles) {
    text += angle.angle_deg == 0 ? std::string("limit of angle 0:")
                                 : fmt::format("angle {:.6g} deg:", angle.angle_deg);
    if (angle.well_distance_nm)
      text += fmt::format(" well distance {:.6f} nm, energy times sine {:.7g} eV",
                          *angle.well_distance_nm, *angle.well_energy_sine_eV);
    else
      text += " no well";
    if (angle.sine_shift_eV)
      text += fmt::format("; the cut moves energies times sine by {:.6g} eV", *angle.sine_shift_eV);
    text += "\n";
  }
  return text;
}

std::string error_lines(const Table& table) {
  return fmt::format(
             "tolerance {:g} of max(|E|, 1e-3 of the well), for forces of max(|F|, 1e-3 of the "
             "strongest attraction)\n",
             table.tolerance) +
         fmt::format(
             "reading errors at most {:.1e} (energy), {:.1e} (force): a cubic between two rows "
             "through energies and forces and its derivative, or a not-a-knot cubic spline "
             "through a column\n",
             table.reading_error.energy, table.reading_error.force) +
         fmt::format(
             "dispersion error at most {:.1e} of the dispersion energy, {:.1e} of its force\n",
             table.dispersion_error, table.slope_error);
}

std::string bead_lines(const Table& table) {
  std::string text;
  if (table.bead_sum_error)
    text += fmt::format(
        "beads of this table summed back along parallel tubes are off by at most {:.1e} of "
        "max(|U|, 1e-3 of its well), averaged over how the chains lie\n",
        *table.bead_sum_error);
  for (const SlidingRow& row : table.sliding)
    text +=
        fmt::format("sliding at the well: spacing {:.4f} nm, corrugation {:.2e} peak to peak{}\n",
                    row.spacing_nm, row.corrugation,
                    std::fabs(row.spacing_nm - *table.spacing_nm) < 1e-12 ? " (this table)" : "");
  for (const CrossingRow& row : table.crossing)
    text += fmt::format(
        "crossed at 90 deg, gap {:.4f} nm, dispersion without cut: beads {:.6g} eV, tubes {:.6g} ± "
        "{:.1g} eV, beads over tubes {:.3f}\n",
        row.gap_nm, row.beads_eV, row.direct_eV, row.direct_error_eV, row.beads_eV / row.direct_eV);
  return text;
}

std::string conditions(const Table& table, const Catalogs& catalogs) {
  const Settings& s = table.settings;
  return fmt::format("gapwright {}, numbers {}, catalogues {}, kernel {}\n", program_version(),
                     numerics_version(), catalogs.hash(), kernel_word(kernel_variant())) +
         subject(table) +
         "energies are negative where the tubes attract; force = -dE/d(distance)\n" +
         fmt::format("diameters {:.6f} and {:.6f} nm; gap = distance - {:.6f} nm\n",
                     table.diameter_1_nm, table.diameter_2_nm, table.touching_nm) +
         fmt::format("temperature {:g} K, chemical potential {:g} eV, {}, without retardation\n",
                     s.conditions.temperature_K, s.conditions.chemical_potential_eV,
                     s.conditions.medium) +
         fmt::format("hopping {}, background {}, contact target {}\n", s.hopping, s.background,
                     s.conditions.medium == "vacuum" ? s.contact_target : "none in a liquid");
}

}  // namespace

std::string table_csv(const Table& table, const Catalogs& catalogs) {
  const std::string comment = conditions(table, catalogs) + cut_lines(table) + well_lines(table) +
                              error_lines(table) + bead_lines(table);
  std::string text = comment_lines(comment);
  const std::vector<Column> columns = columns_of(table.kind);
  for (const Column& column : columns)
    text += (&column == &columns.front() ? "" : ",") + column.name;
  text += "\n";
  for (const TableRow& row : table.rows)
    for (const Column& column : columns) {
      if (&column != &columns.front()) text += ",";
      if (const auto value = column.value(table, row)) text += fmt::format("{}", *value + 0.0);
      if (&column == &columns.back()) text += "\n";
    }
  return text;
}

namespace {

Json maybe(const std::optional<double>& value) {
  return value ? Json(*value + 0.0) : Json(nullptr);
}

void add_beads(const Table& table, Json& object) {
  if (table.kind != TableKind::beads) return;
  object["spacing_nm"] = maybe(table.spacing_nm);
  object["bead_sum_error"] = maybe(table.bead_sum_error);
  object["sliding"] = Json::array();
  for (const SlidingRow& row : table.sliding)
    object["sliding"].push_back({{"spacing_nm", row.spacing_nm}, {"corrugation", row.corrugation}});
  object["crossing"] = Json::array();
  for (const CrossingRow& row : table.crossing)
    object["crossing"].push_back({{"gap_nm", row.gap_nm},
                                  {"angle_deg", 90.0},
                                  {"beads_dispersion_eV", row.beads_eV},
                                  {"dispersion_eV", row.direct_eV},
                                  {"dispersion_error_eV", row.direct_error_eV}});
}

void add_angles(const Table& table, Json& object) {
  if (table.kind != TableKind::crossed) return;
  object["angles"] = Json::array();
  for (const AngleSummary& angle : table.angles)
    object["angles"].push_back({{"angle_deg", angle.angle_deg},
                                {"well_distance_nm", maybe(angle.well_distance_nm)},
                                {"well_energy_sine_eV", maybe(angle.well_energy_sine_eV)},
                                {"sine_shift_eV", maybe(angle.sine_shift_eV)}});
}

}  // namespace

std::string table_json(const Table& table, const Catalogs& catalogs) {
  const Settings& s = table.settings;
  Json object = {
      {"table", std::string(table_kind_word(table.kind))},
      {"object_1", table.object_1},
      {"object_2", table.object_2},
      {"diameter_1_nm", table.diameter_1_nm},
      {"diameter_2_nm", table.diameter_2_nm},
      {"temperature_K", s.conditions.temperature_K},
      {"chemical_potential_eV", s.conditions.chemical_potential_eV},
      {"medium", s.conditions.medium},
      {"hopping", s.hopping},
      {"background", s.background},
      {"contact_target", s.conditions.medium == "vacuum" ? Json(s.contact_target) : Json(nullptr)},
      {"version", program_version()},
      {"numerics_version", numerics_version()},
      {"catalog_hash", catalogs.hash()},
      {"inner_cut_nm", table.first_nm},
      {"last_distance_nm", table.last_nm},
      {"outer_cut_nm", maybe(table.outer_cut_nm)},
      {"cut_shift_eV_per_nm", maybe(table.shift)},
      {"well_distance_nm", maybe(table.well_distance_nm)},
      {"well_energy_eV_per_nm", maybe(table.well_energy)},
      {"tolerance", table.tolerance},
      {"reading_error_energy", table.reading_error.energy},
      {"reading_error_force", table.reading_error.force},
      {"dispersion_error", table.dispersion_error},
      {"dispersion_force_error", table.slope_error}};
  add_angles(table, object);
  add_beads(table, object);
  object["status"] = std::string(status_word(table.status));
  for (const Column& column : columns_of(table.kind)) {
    Json values = Json::array();
    for (const TableRow& row : table.rows) values.push_back(maybe(column.value(table, row)));
    object[column.name] = std::move(values);
  }
  return object.dump() + "\n";
}

}  // namespace gapwright::cli
