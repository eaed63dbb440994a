// A flat sheet as a scatterer of evanescent plane waves (METHODS §4, planar limit).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/flat_response.hpp>

#include <vector>

namespace gapwright {

/// Reflection r(Q, iξ) = (αQ/2)/(1 + αQ/2) + α_⊥Q/2 on the nodes, [Q][ξ], dimensionless.
struct SheetScatterer {
  Nodes nodes;
  IndexRange wave;
  IndexRange xi;
  std::vector<double> reflection;

  const double* row(int j) const { return reflection.data() + std::size_t(j) * xi.count; }
};

/// Flat carbon sheet. The response must cover the waves of the range.
SheetScatterer carbon_sheet(const FlatResponse& flat, const Background& background,
                            const Nodes& nodes, IndexRange wave);

}  // namespace gapwright
