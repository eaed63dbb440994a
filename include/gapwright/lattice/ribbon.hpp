// Graphene nanoribbons and their rows of atoms (METHODS §1).
#pragma once

#include <string>
#include <vector>

namespace gapwright {

enum class RibbonEdge { armchair, zigzag };

/// A flat ribbon along x: armchair with N dimer lines (N-AGNR) or zigzag with N chains (N-ZGNR).
struct Ribbon {
  RibbonEdge edge = RibbonEdge::armchair;
  int lines = 0;  ///< N
  auto operator<=>(const Ribbon&) const = default;

  int rows() const { return edge == RibbonEdge::armchair ? lines : 2 * lines; }
  int atoms_per_row() const { return edge == RibbonEdge::armchair ? 2 : 1; }  ///< in one cell
  int atoms_per_cell() const { return 2 * lines; }
  double period_nm() const;  ///< 3a_cc armchair, a zigzag
  double strip_nm() const;   ///< w_j = A_at·(atoms of a row per nm): a/2 armchair, 3a_cc/4 zigzag
  double width_nm() const;   ///< w = Σ w_j
  double nuclei_width_nm() const;  ///< between the nuclei of the edge rows
  double atoms_per_nm() const;
  double mass_per_nm_zg() const;  ///< [1e-21 g]
  std::string label() const;      ///< "13-AGNR"
};

inline constexpr int min_armchair_lines = 3;
inline constexpr int min_zigzag_lines = 2;
inline constexpr int max_energy_lines = 100;  ///< responses and energies
inline constexpr int max_gap_lines = 3000;    ///< bands and gaps

/// Throws std::domain_error unless N >= 3 (armchair) or N >= 2 (zigzag), N <= 3000.
Ribbon make_ribbon(RibbonEdge edge, int lines);

/// Atoms of one height y, spread over a strip of the ribbon. Strips meet midway between rows; the
/// two at the ends reach outwards to the width w_j that all of them have.
struct RibbonRow {
  double y_nm = 0.0;  ///< 0 in the middle of the ribbon, rising
  double strip_low_nm = 0.0;
  double strip_high_nm = 0.0;
};

/// The rows in rising y; the mirror image of row j is row rows() - 1 - j.
std::vector<RibbonRow> ribbon_rows(const Ribbon& ribbon);

/// Conductances 1/(y_{j+1} - y_j) [nm^-1] between neighbouring rows, one fewer than rows: the graph
/// Laplacian with free ends of what flows across the ribbon.
std::vector<double> row_conductances_per_nm(const std::vector<RibbonRow>& rows);

}  // namespace gapwright
