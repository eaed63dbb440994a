// The row Hamiltonian of the π electrons of a nanoribbon (METHODS §2).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/lattice/ribbon.hpp>

#include <vector>

namespace gapwright {

/// Real symmetric band matrix by its diagonal and the `reach` diagonals above it.
struct BandMatrix {
  int size = 0;
  int reach = 0;
  std::vector<double> values;  ///< [r·size + i] = H(i, i + r)

  BandMatrix(int n, int r) : size(n), reach(r), values(static_cast<std::size_t>(n) * (r + 1)) {}
  double& at(int i, int r) { return values[static_cast<std::size_t>(r) * size + i]; }
  double at(int i, int r) const { return values[static_cast<std::size_t>(r) * size + i]; }
};

/// H(k) of a ribbon with one hopping, real by the mirror x → -x together with time reversal. Bloch
/// phases are those of the atoms' own positions.
///
/// Armchair: two sectors, rows even (0) and odd (1) under y → -y, of ceil(N/2) and floor(N/2) rows.
/// Index 2j, 2j+1 of a sector are (L+R)/√2 and i(L-R)/√2 of its row j, L and R being the left and
/// right atom of a dimer; row j of a sector is (row j ± row N-1-j)/√2, the middle row of an odd N
/// itself. L and R are the two sublattices: H = [[Re F, Im F], [Im F, -Re F]] with F symmetric.
/// Zigzag: one sector, index = row, of the spin that is up on the lower edge; the other spin has it
/// with the rows in reverse order. Its mean field is that of half filling at T = 0.
///
/// The spectrum is symmetric about 0 in every sector.
class RibbonHamiltonian {
 public:
  /// Throws InputError for a hopping set with overlap or more than first neighbours, or when the
  /// mean field of a zigzag ribbon does not settle to 1e-9 eV.
  RibbonHamiltonian(const Ribbon& ribbon, const HoppingSet& hopping, const RibbonEdges& edges);

  const Ribbon& ribbon() const { return ribbon_; }
  double hopping_eV() const { return hopping_eV_; }
  const RibbonEdges& edges() const { return edges_; }
  int sectors() const { return ribbon_.edge == RibbonEdge::armchair ? 2 : 1; }
  int sector_size(int sector) const;
  /// H(k) of a sector [eV], k [nm^-1].
  BandMatrix matrix(int sector, double k_per_nm) const;
  /// dH/dk of a sector [eV·nm].
  BandMatrix slope(int sector, double k_per_nm) const;
  /// Mean-field potential on each row [eV] for the spin of matrix(); empty when there is none.
  const std::vector<double>& potential_eV() const { return potential_eV_; }
  double potential_error_eV() const { return potential_error_eV_; }

 private:
  BandMatrix armchair(int sector, double k, bool slope) const;
  BandMatrix zigzag(double k, bool slope) const;

  Ribbon ribbon_;
  double hopping_eV_;
  RibbonEdges edges_;
  std::vector<double> potential_eV_;
  double potential_error_eV_ = 0.0;
};

}  // namespace gapwright
