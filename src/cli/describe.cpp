#include "commands.hpp"
#include "describe_ribbon.hpp"
#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "setup.hpp"
#include "text_table.hpp"

#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>

#include <cmath>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

struct TubeReport {
  Tube tube;
  TubeGaps gaps;
  std::string response;
};

std::string shape_word(TubeKind shape) {
  switch (shape) {
    case TubeKind::armchair:
      return "armchair";
    case TubeKind::zigzag:
      return "zigzag";
    case TubeKind::chiral:
      return "chiral";
  }
  return {};
}

std::string conduction_word(const TubeReport& report) {
  if (!report.tube.metallic()) return "semiconducting";
  return report.gaps.band_gap_eV > 1e-6 ? "metallic but for a curvature gap" : "metallic";
}

// What METHODS §3 gives for the axial response as q → 0, in words.
std::string response_sentence(const Tube& tube, const TubeGaps& gaps) {
  if (!tube.metallic())
    return fmt::format(
        "Along the axis a finite polarisability, set by the gap of {} eV and steady at frequencies "
        "below it; around the tube it polarises too.",
        fixed(gaps.band_gap_eV, 3));
  if (gaps.band_gap_eV > 1e-6)
    return fmt::format(
        "Screens along the axis like a metal at frequencies above the curvature gap of {} eV, and "
        "like an insulator of very large polarisability below it; around the tube it only "
        "polarises.",
        fixed(gaps.band_gap_eV, 4));
  return "Screens along the axis like a metal at any frequency, the more the longer the wave; "
         "around "
         "the tube it only polarises.";
}

TubeReport report_of(const Tube& tube, const HoppingSet& hopping) {
  TubeReport report{tube, tube_gaps(tube, hopping), {}};
  report.response = response_sentence(tube, report.gaps);
  return report;
}

Json tube_json(const TubeReport& report) {
  const Tube& tube = report.tube;
  return {{"object", tube.label()},
          {"shape", shape_word(tube.shape)},
          {"kind", tube.metallic() ? "metallic" : "semiconducting"},
          {"diameter_nm", tube.diameter_nm()},
          {"chiral_angle_deg", tube.chiral_angle_deg()},
          {"period_nm", tube.period_nm},
          {"atoms_per_cell", tube.atoms_per_cell()},
          {"atoms_per_nm", tube.atoms_per_nm()},
          {"mass_zg_per_nm", tube.mass_per_nm_zg()},
          {"band_gap_eV", energy_or_null(report.gaps.band_gap_eV)},
          {"e11_eV", energy_or_null(report.gaps.e11_eV)},
          {"e22_eV", energy_or_null(report.gaps.e22_eV)},
          {"response", report.response}};
}

std::string tube_text(const TubeReport& report) {
  const Tube& tube = report.tube;
  return tube.label() + "\n" +
         block_line("kind", shape_word(tube.shape) + ", " + conduction_word(report)) +
         block_line("diameter", fixed(tube.diameter_nm(), 5) + " nm") +
         block_line("chiral angle", fixed(tube.chiral_angle_deg(), 4) + " deg",
                    "0 zigzag, 30 armchair") +
         block_line("cell", fmt::format("{} atoms over {} nm", tube.atoms_per_cell(),
                                        fixed(tube.period_nm, 5))) +
         block_line("mass", fixed(tube.mass_per_nm_zg(), 4) + " zg/nm",
                    fmt::format("{} atoms/nm", fixed(tube.atoms_per_nm(), 2)).c_str()) +
         block_line("gap", energy_text(report.gaps.band_gap_eV, 5)) +
         block_line("E11, E22",
                    energy_text(report.gaps.e11_eV, 4) + ", " + energy_text(report.gaps.e22_eV, 4),
                    "single-particle: excitons are not in them") +
         block_line("response", wrapped(report.response));
}

std::string walls_text(const TubeObject& object, const HoppingSet& hopping) {
  std::string text;
  if (object.walls.size() > 1) {
    text += label_of(object) + "\n";
    for (std::size_t i = 1; i < object.walls.size(); ++i)
      text += fmt::format("  gap {} to {}   {} nm\n", object.walls[i - 1].label(),
                          object.walls[i].label(),
                          fixed(object.walls[i].radius_nm - object.walls[i - 1].radius_nm, 5));
  }
  for (const Tube& tube : object.walls) text += tube_text(report_of(tube, hopping));
  return text;
}

Json walls_json(const TubeObject& object, const HoppingSet& hopping) {
  if (object.walls.size() == 1) return tube_json(report_of(object.walls.front(), hopping));
  Json walls = Json::array(), gaps = Json::array();
  for (std::size_t i = 0; i < object.walls.size(); ++i) {
    walls.push_back(tube_json(report_of(object.walls[i], hopping)));
    if (i > 0) gaps.push_back(object.walls[i].radius_nm - object.walls[i - 1].radius_nm);
  }
  return {{"object", label_of(object)}, {"gaps_nm", gaps}, {"walls", walls}};
}

constexpr const char* sheet_response =
    "In the plane a conductivity that is the same at all frequencies far below the hopping, "
    "e²/4ħ for one hopping without overlap; across it small dipoles.";

Json sheet_json() {
  return {{"object", "graphene"},
          {"kind", "semimetallic"},
          {"atoms_per_cell", 2},
          {"atoms_per_nm2", 1 / constants::atom_area_nm2},
          {"mass_zg_per_nm2", constants::atom_mass_kg * 1e24 / constants::atom_area_nm2},
          {"band_gap_eV", 0.0},
          {"response", sheet_response}};
}

std::string sheet_text() {
  return fmt::format(
      "graphene\n  kind          semimetallic, the gap is zero\n  cell          2 atoms, lattice "
      "constant {} nm\n  mass          {} zg/nm2   {} atoms/nm2\n  response      {}\n",
      fixed(constants::lattice_nm, 5),
      fixed(constants::atom_mass_kg * 1e24 / constants::atom_area_nm2, 4),
      fixed(1 / constants::atom_area_nm2, 3), wrapped(sheet_response));
}

Json object_json(const Object& object, const Catalogs& catalogs, const HoppingSet& hopping) {
  if (const auto* walls = std::get_if<TubeObject>(&object)) return walls_json(*walls, hopping);
  if (const auto* ribbon = std::get_if<RibbonObject>(&object))
    return ribbon_json(ribbon->ribbon, hopping, catalogs.ribbon_edges());
  return sheet_json();
}

std::string object_text(const Object& object, const Catalogs& catalogs, const HoppingSet& hopping) {
  if (const auto* walls = std::get_if<TubeObject>(&object)) return walls_text(*walls, hopping);
  if (const auto* ribbon = std::get_if<RibbonObject>(&object))
    return ribbon_text(ribbon->ribbon, hopping, catalogs.ribbon_edges());
  return sheet_text();
}

}  // namespace

int describe(const Words& words) {
  if (words.operands.empty())
    throw InputError(
        {"no object", "describe", {}, "labels such as (10,10), 5,5@10,10, graphene, 13-AGNR", {}});
  const Catalogs catalogs = load_catalogs(words);
  const Settings settings = read_settings(words, catalogs);
  const HoppingSet& hopping = catalogs.hopping(settings.hopping);
  std::vector<ParsedLabel> objects;
  for (const std::string& label : words.operands) objects.push_back(parse_label(label));

  std::string out;
  for (const ParsedLabel& parsed : objects) {
    for (const std::string& remark : parsed.notes) note("note: " + remark);
    if (words.flag("--json"))
      out += object_json(parsed.object, catalogs, hopping).dump() + "\n";
    else
      out += (out.empty() ? "" : "\n") + object_text(parsed.object, catalogs, hopping);
  }
  print(out);
  return good;
}

}  // namespace gapwright::cli
