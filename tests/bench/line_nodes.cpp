#include "line_nodes.hpp"

#include "cutting_lines.hpp"
#include "line_integral.hpp"

#include <algorithm>
#include <vector>

namespace gapwright::bench {
namespace {

std::size_t nodes_of_cell(const HelicalLines& lines, const PanelRule& rule, int order, double q) {
  std::vector<BranchPoint> points, shifted;
  LineNodes nodes;
  for (int line = 0; line < lines.count(); ++line) {
    const int image = lines.image(line, order);
    if (image < line) continue;
    double from = 0.0, to = lines.period();
    if (image == line) {
      from = 0.5 * (lines.mirror_sum(line, order) - q);
      to = from + 0.5 * lines.period();
    }
    const double margin = 2.5 * rule.longest;
    unroll(lines.branch_points(line, 0), lines.period(), 0.0, from, to, margin, points);
    unroll(lines.branch_points(line, order), lines.period(), -q, from, to, margin, shifted);
    points.insert(points.end(), shifted.begin(), shifted.end());
    std::sort(points.begin(), points.end(),
              [](const BranchPoint& a, const BranchPoint& b) { return a.z < b.z; });
    append_panels(from, to, points, rule, nodes);
  }
  return nodes.z.size();
}

}  // namespace

std::size_t line_nodes(const Tube& tube, const HoppingSet& hopping, const Nodes& nodes,
                       const Window& window) {
  const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, hopping);
  const PanelRule rule =
      line_precision(nodes.tolerance, hamiltonian.nearest_neighbour_only()).panels;
  const HelicalLines lines(tube, hamiltonian, rule.longest);
  std::size_t count = 0;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) {
      count += nodes_of_cell(lines, rule, m, q);
      if (m > 0 && tube.shape == TubeKind::chiral) count += nodes_of_cell(lines, rule, -m, q);
    }
  }
  return count;
}

}  // namespace gapwright::bench
