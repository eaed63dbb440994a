// How many multipoles the round trips after the first one need.
#pragma once

#include "parallel_kernel.hpp"

#include <vector>

namespace gapwright {

/// Leading rows and columns of a block at some frequencies; none: further trips do not matter.
struct LeadingPart {
  int rows = 0, columns = 0;
};

/// The fewest leading rows and columns whose -ln det - Tr falls short of that of the whole block by
/// no more than allowed[k] at each of its frequencies, from the shares that first_trip() left. For
/// 0 <= X < 1 of largest eigenvalue λ, leaving out rows of trace t costs at most 3λt/(1-λ), all of
/// it at most (Tr X)²/2(1-λ) (METHODS §8). The whole block where X is not of this kind.
LeadingPart leading_part(const MultipoleBlock& block, const std::vector<double>& allowed);

}  // namespace gapwright
