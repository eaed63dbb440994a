// A flat sheet as a mirror of TM and TE waves (METHODS §9).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/flat_response.hpp>

#include <vector>

namespace gapwright {

/// α(Q, iξ) and α_⊥(iξ) [nm] on the nodes, Q outer: what reflects, with
/// r_TM = (ακ_z/2)/(1 + ακ_z/2) + α_⊥Q²/2κ_z and r_TE = (αs²/2κ_z)/(1 + αs²/2κ_z).
struct RetardedSheet {
  Nodes nodes;
  IndexRange wave;
  IndexRange xi;
  std::vector<double> strength_nm;  ///< [Q][ξ]
  std::vector<double> normal_nm;    ///< [ξ]
};

/// Flat carbon sheet. The response must cover the waves of the range.
RetardedSheet retarded_carbon_sheet(const FlatResponse& flat, const Background& background,
                                    const Nodes& nodes, IndexRange wave);

}  // namespace gapwright
