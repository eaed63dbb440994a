// The density response of the π electrons of a nanoribbon, row by row (METHODS §3, §8).
#pragma once

#include <gapwright/bands/ribbon_hamiltonian.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/conditions.hpp>

#include <cstddef>
#include <span>
#include <vector>

namespace gapwright {

/// χ^π_jj'(q, iξ) [1/(eV·nm)] between the rows of a ribbon, per length, both spins: the number per
/// nm that gathers on row j per eV of potential energy on row j'. Real, symmetric, negative
/// semidefinite; the same with the rows in reverse order. Σ_jj' → -c q² for q → 0.
class RibbonResponse {
 public:
  RibbonResponse() = default;
  RibbonResponse(const Ribbon& ribbon, const Nodes& nodes, IndexRange q, IndexRange xi);

  const Ribbon& ribbon() const { return ribbon_; }
  const Nodes& nodes() const { return nodes_; }
  const IndexRange& q() const { return q_; }
  const IndexRange& xi() const { return xi_; }
  int rows() const { return ribbon_.rows(); }

  /// The rows × rows matrix at one node; i, k count from the start of q(), xi(). Throws
  /// std::invalid_argument unless out.size() == rows()².
  void matrix(int i, int k, std::span<double> out) const;
  /// One element of it.
  double at(int i, int k, int row, int other_row) const;

  /// Pairs of rows that symmetry leaves, and the place of any two rows among them.
  std::size_t pairs() const { return pairs_; }
  std::size_t pair_of(int row, int other_row) const;
  /// The values of one node by pair.
  std::span<double> node(int i, int k);
  std::span<const double> node(int i, int k) const;

  /// How it was summed: k points of the zone, imaginary times, and the error of both relative to
  /// vᵀχv for any v.
  int waves = 0;
  int times = 0;
  double relative_error = 0.0;

 private:
  Ribbon ribbon_;
  Nodes nodes_;
  IndexRange q_, xi_;
  std::size_t pairs_ = 0;
  std::vector<std::size_t> first_;  // of the pairs (row, ≥ row)
  std::vector<double> values_;
};

/// Response of a gapped ribbon without free carriers (T = 0 with μ inside the gap, or T so low that
/// they do not count at the tolerance) by χ(τ) = G(τ)G(-τ): one set of eigenvectors on a
/// uniform grid of k serves every q, for the product is taken along the ribbon. The grid is doubled
/// until the static polarisability settles. Accuracy: below half of nodes.tolerance, see
/// relative_error; the cost grows as N³. Parallel with OpenMP unless called from a task; a value
/// does not depend on the ranges. Throws InputError for more than 100 lines, for a gap below 1 meV
/// and for conditions with free carriers; std::invalid_argument for empty ranges.
RibbonResponse ribbon_response(const RibbonHamiltonian& hamiltonian, const Conditions& conditions,
                               const Nodes& nodes, IndexRange q, IndexRange xi);

}  // namespace gapwright
