#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/ribbon.hpp>

#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {

namespace {

using constants::bond_nm;
using constants::lattice_nm;

/// From row j to row j + 1; zigzag: inside a chain, then along a bond between two chains.
double spacing_nm(const Ribbon& ribbon, int j) {
  if (ribbon.edge == RibbonEdge::armchair) return 0.5 * lattice_nm;
  return j % 2 == 0 ? 0.5 * bond_nm : bond_nm;
}

}  // namespace

double Ribbon::period_nm() const {
  return edge == RibbonEdge::armchair ? 3 * bond_nm : lattice_nm;
}

double Ribbon::strip_nm() const {
  return edge == RibbonEdge::armchair ? 0.5 * lattice_nm : 0.75 * bond_nm;
}

double Ribbon::width_nm() const {
  return rows() * strip_nm();
}

double Ribbon::nuclei_width_nm() const {
  return edge == RibbonEdge::armchair ? 0.5 * lattice_nm * (lines - 1)
                                      : bond_nm * (1.5 * lines - 1);
}

double Ribbon::atoms_per_nm() const {
  return atoms_per_cell() / period_nm();
}

double Ribbon::mass_per_nm_zg() const {
  constexpr double zg_per_kg = 1e24;
  return atoms_per_nm() * constants::atom_mass_kg * zg_per_kg;
}

std::string Ribbon::label() const {
  return fmt::format("{}-{}GNR", lines, edge == RibbonEdge::armchair ? 'A' : 'Z');
}

Ribbon make_ribbon(RibbonEdge edge, int lines) {
  const int least = edge == RibbonEdge::armchair ? min_armchair_lines : min_zigzag_lines;
  if (lines < least || lines > max_gap_lines)
    throw std::domain_error(
        fmt::format("make_ribbon: lines = {}, required: {} … {}", lines, least, max_gap_lines));
  return {edge, lines};
}

std::vector<RibbonRow> ribbon_rows(const Ribbon& ribbon) {
  const int count = ribbon.rows();
  std::vector<RibbonRow> rows(static_cast<std::size_t>(count));
  double y = -0.5 * ribbon.nuclei_width_nm();
  for (int j = 0; j < count; ++j) {
    // All strips but those at the ends lie midway between rows, and all are equally wide.
    rows[j] = {y, j * ribbon.strip_nm() - 0.5 * ribbon.width_nm(),
               (j + 1) * ribbon.strip_nm() - 0.5 * ribbon.width_nm()};
    y += spacing_nm(ribbon, j);
  }
  return rows;
}

std::vector<double> row_conductances_per_nm(const std::vector<RibbonRow>& rows) {
  std::vector<double> conductances;
  for (std::size_t j = 1; j < rows.size(); ++j)
    conductances.push_back(1 / (rows[j].y_nm - rows[j - 1].y_nm));
  return conductances;
}

}  // namespace gapwright
