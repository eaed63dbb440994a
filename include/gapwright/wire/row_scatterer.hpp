// A ribbon as a scatterer: what its rows answer to a potential from outside (METHODS §4, rows).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/lattice/ribbon.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/ribbon_response.hpp>

#include <functional>
#include <span>
#include <vector>

namespace gapwright {

/// The two halves that the mirror across the width leaves: with rows j and rows - 1 - j, the
/// vectors
/// (|j> ± |rows-1-j>)/√2, j rising from the lower edge, and for odd numbers of rows the middle one
/// itself, last of the even half.
enum class Mirror { even, odd };

/// -X = U Uᵀ of the charges on the rows of a ribbon, U upper triangular in either half, and the
/// normal dipoles -X^⊥ = d²·1, at each (q, ξ) of a window (its orders are not used).
class RowScatterer {
 public:
  RowScatterer() = default;
  RowScatterer(std::vector<RibbonRow> rows, Nodes nodes, Window window);

  const std::vector<RibbonRow>& rows() const { return rows_; }
  const Nodes& nodes() const { return nodes_; }
  const Window& window() const { return window_; }
  int half_size(Mirror half) const {
    const int count = int(rows_.size());
    return half == Mirror::even ? (count + 1) / 2 : count / 2;
  }

  /// Packed U of one half and wave number (j = index minus window().q.first): the entry (i, k),
  /// i <= k, starts at [(k(k+1)/2 + i)·ξ-count], ξ fastest. [1/√eV·nm: χ is 1/(eV·nm)]
  std::span<double> factor(int j, Mirror half);
  std::span<const double> factor(int j, Mirror half) const;

  /// d = √(α_⊥w/4πk_e) at every frequency.
  std::span<double> dipole() { return dipole_; }
  std::span<const double> dipole() const { return dipole_; }

  std::size_t bytes() const;

 private:
  std::size_t start(int j, Mirror half) const;
  std::size_t length(Mirror half) const;

  std::vector<RibbonRow> rows_;
  Nodes nodes_;
  Window window_;
  std::vector<double> factors_;  // [j][half][entry][ξ]
  std::vector<double> dipole_;
};

/// Writes χ^π_jj'(q, iξ) [1/(eV·nm)], rows × rows with ξ fastest ([(j·rows + j')·count + k]), of
/// the wave number with this lattice index at `count` frequencies from a lattice index on.
using RowResponseSource = std::function<void(int q_index, IndexRange xi, std::span<double> chi)>;

/// X = (1 - (χ^π + χ^σ)V)^{-1}(χ^π + χ^σ) with the background's share χ^σ and the strip-averaged
/// Coulomb matrix V. A charge mode whose -χ is not positive (rounding of Σχ ∝ q²) is left out.
/// Cost rows³ a node. Throws std::domain_error for fewer than two rows.
RowScatterer row_scatterer(const std::vector<RibbonRow>& rows, const RowResponseSource& response,
                           const Background& background, const Nodes& nodes, const Window& window);

/// From the response of a ribbon, which must cover the window: std::invalid_argument.
RowScatterer row_scatterer(const RibbonResponse& response, const Background& background,
                           const Window& window);

/// V_jj' = k_e[⟨K₀(q|y_j-y'|)⟩ over strip j' + ⟨K₀(q|y-y_j'|)⟩ over strip j] [eV·nm], row-major.
std::vector<double> row_coulomb_eV_nm(const std::vector<RibbonRow>& rows, double q_per_nm);

/// -4πk_e χ^σ/α_σ = q²w_j δ_jj' + 𝓛_jj', 𝓛 the graph Laplacian with free ends [nm^-1], row-major.
std::vector<double> row_background_per_nm(const std::vector<RibbonRow>& rows, double q_per_nm);

}  // namespace gapwright
