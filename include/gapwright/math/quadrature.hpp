// Gauss-Legendre rules.
#pragma once

#include <vector>

namespace gapwright {

/// Nodes and weights on [-1, 1].
struct GaussRule {
  std::vector<double> nodes;
  std::vector<double> weights;
};

/// The rule with `count` >= 1 nodes, exact for polynomials of degree 2·count-1; nodes rise.
/// Accuracy a few units of rounding. Cached; safe to call from several threads.
const GaussRule& gauss_legendre(int count);

}  // namespace gapwright
