#include "ribbon_pairs.hpp"

namespace gapwright {

std::vector<RowPair> row_pairs(int rows) {
  std::vector<RowPair> pairs;
  for (int row = 0; 2 * row < rows; ++row)
    for (int other = row; other <= rows - 1 - row; ++other) pairs.push_back({row, other});
  return pairs;
}

// Dimers of odd rows stand half a period further; L sits left of its partner inside the dimer in
// even rows as in odd ones. Rows of a zigzag chain alternate by half a period, and a bond across
// joins rows at the same x.
double left_position(const Ribbon& ribbon, int row) {
  if (ribbon.edge == RibbonEdge::zigzag) return (row + 1) / 2 % 2 * 0.5;
  return row % 2 == 0 ? -1.0 / 6 : 1.0 / 3;
}

double right_position(const Ribbon& ribbon, int row) {
  return left_position(ribbon, row) + 1.0 / 3;
}

}  // namespace gapwright
