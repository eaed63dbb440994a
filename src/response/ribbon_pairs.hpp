// Which pairs of rows symmetry leaves, and where their atoms stand along the ribbon.
#pragma once

#include <gapwright/lattice/ribbon.hpp>

#include <cstddef>
#include <vector>

namespace gapwright {

/// row <= other, row + other <= rows - 1: the other pairs follow by exchange and by reversing the
/// order of the rows. In the order of RibbonResponse::pair_of.
struct RowPair {
  int row = 0;
  int other = 0;
};
std::vector<RowPair> row_pairs(int rows);

/// Position along x [periods] of the first atom of a row (armchair: the left one of its dimer), and
/// of the right one.
double left_position(const Ribbon& ribbon, int row);
double right_position(const Ribbon& ribbon, int row);

}  // namespace gapwright
