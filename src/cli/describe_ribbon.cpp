#include "describe_ribbon.hpp"

#include "row_text.hpp"
#include "text_table.hpp"

#include <gapwright/bands/ribbon_bands.hpp>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

const char* edge_word(const Ribbon& ribbon) {
  return ribbon.edge == RibbonEdge::armchair ? "armchair" : "zigzag";
}

const char* kind_word(const RibbonGaps& gaps) {
  return gaps.band_gap_eV > 0 ? "semiconducting" : "metallic";
}

/// What makes the gap more than a matter of width.
std::string edge_remark(const Ribbon& ribbon, const RibbonEdges& edges) {
  if (ribbon.edge == RibbonEdge::armchair) return fmt::format("edge dimers {} t", edges.edge_bond);
  return edges.repulsion_eV > 0
             ? fmt::format("spins opposed across the ribbon, U = {} eV", edges.repulsion_eV)
             : "flat bands at the edges, no repulsion";
}

std::string response_sentence(const RibbonGaps& gaps) {
  if (gaps.band_gap_eV > 0)
    return fmt::format(
        "Along the axis a finite polarisability, set by the gap of {} eV and steady at frequencies "
        "below it; across the ribbon charge moves between its rows.",
        fixed(gaps.band_gap_eV, 3));
  return "Screens along the axis like a metal at any frequency, the more the longer the wave; "
         "across "
         "the ribbon charge moves between its rows.";
}

}  // namespace

Json ribbon_json(const Ribbon& ribbon, const HoppingSet& hopping, const RibbonEdges& edges) {
  const RibbonGaps gaps = ribbon_gaps(RibbonHamiltonian(ribbon, hopping, edges));
  return {{"object", ribbon.label()},
          {"shape", edge_word(ribbon)},
          {"kind", kind_word(gaps)},
          {"width_nm", ribbon.width_nm()},
          {"nuclei_width_nm", ribbon.nuclei_width_nm()},
          {"period_nm", ribbon.period_nm()},
          {"atoms_per_cell", ribbon.atoms_per_cell()},
          {"atoms_per_nm", ribbon.atoms_per_nm()},
          {"mass_zg_per_nm", ribbon.mass_per_nm_zg()},
          {"edges", edge_remark(ribbon, edges)},
          {"band_gap_eV", gaps.band_gap_eV},
          {"e11_eV", energy_or_null(gaps.e11_eV)},
          {"e22_eV", energy_or_null(gaps.e22_eV)},
          {"response", response_sentence(gaps)}};
}

std::string ribbon_text(const Ribbon& ribbon, const HoppingSet& hopping, const RibbonEdges& edges) {
  const RibbonGaps gaps = ribbon_gaps(RibbonHamiltonian(ribbon, hopping, edges));
  return ribbon.label() + "\n" +
         block_line("kind", fmt::format("{} ribbon, {}", edge_word(ribbon), kind_word(gaps))) +
         block_line(
             "width", fixed(ribbon.width_nm(), 5) + " nm",
             fmt::format("{} nm between edge nuclei", fixed(ribbon.nuclei_width_nm(), 5)).c_str()) +
         block_line("cell", fmt::format("{} atoms over {} nm", ribbon.atoms_per_cell(),
                                        fixed(ribbon.period_nm(), 5))) +
         block_line("mass", fixed(ribbon.mass_per_nm_zg(), 4) + " zg/nm",
                    fmt::format("{} atoms/nm", fixed(ribbon.atoms_per_nm(), 2)).c_str()) +
         block_line("edges", edge_remark(ribbon, edges)) +
         block_line("gap", energy_text(gaps.band_gap_eV, 5)) +
         block_line("E11, E22", energy_text(gaps.e11_eV, 4) + ", " + energy_text(gaps.e22_eV, 4),
                    "single-particle: excitons are not in them") +
         block_line("response", wrapped(response_sentence(gaps)));
}

}  // namespace gapwright::cli
