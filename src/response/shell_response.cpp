#include "cutting_lines.hpp"
#include "line_integral.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/response/shell_response.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

ShellResponse::ShellResponse(double radius_nm, Nodes nodes, Window window)
    : radius_nm_(radius_nm), nodes_(nodes), window_(std::move(window)) {
  std::size_t cells = 0;
  for (const int orders : window_.orders) {
    offsets_.push_back(cells);
    cells += std::size_t(orders);
  }
  values_.assign(cells * std::size_t(window_.xi.count), 0.0);
}

std::span<double> ShellResponse::cell(int j, int m) {
  const std::size_t count = std::size_t(window_.xi.count);
  return {values_.data() + (offsets_[std::size_t(j)] + std::size_t(m)) * count, count};
}

std::span<const double> ShellResponse::cell(int j, int m) const {
  const std::size_t count = std::size_t(window_.xi.count);
  return {values_.data() + (offsets_[std::size_t(j)] + std::size_t(m)) * count, count};
}

namespace {

/// The integrals of one tube over its helical lines.
class TubeSum {
 public:
  TubeSum(const Tube& tube, const HoppingSet& hopping, double tolerance, std::span<const double> xi)
      : radius_(tube.radius_nm),
        hamiltonian_(tube_hamiltonian(tube, hopping)),
        precision_(line_precision(tolerance, hamiltonian_.nearest_neighbour_only())),
        lines_(tube, hamiltonian_, 1.2 * precision_.panels.longest),
        xi_(xi) {
    for (int line = 0; line < lines_.count(); ++line)
      initial_.push_back(lines_.branch_points(line, 0));
  }

  LineIntegrator integrator() const { return {hamiltonian_, precision_, xi_}; }

  /// Adds factor·(4k_e/πR)∫W ΔE/(ΔE² + ξ²) of wave vector (order/R, q) to sums.
  void add(int order, double q, double factor, LineIntegrator& integrator,
           std::span<double> sums) const {
    const PlaneVector wave{order / radius_, q};
    std::vector<BranchPoint> points, shifted;
    LineNodes nodes;
    for (int line = 0; line < lines_.count(); ++line) {
      // Time reversal maps k on -k - Q: half of the lines, or half of a line, is enough.
      const int image = lines_.image(line, order);
      if (image < line) continue;
      double from = 0.0, to = lines_.period();
      if (image == line) {
        from = 0.5 * (lines_.mirror_sum(line, order) - q);
        to = from + 0.5 * lines_.period();
      }
      const double margin = 2.5 * precision_.panels.longest;
      unroll(initial_[std::size_t(line)], lines_.period(), 0.0, from, to, margin, points);
      unroll(lines_.branch_points(line, order), lines_.period(), -q, from, to, margin, shifted);
      const auto middle = points.insert(points.end(), shifted.begin(), shifted.end());
      std::inplace_merge(points.begin(), middle, points.end(),
                         [](const BranchPoint& a, const BranchPoint& b) { return a.z < b.z; });
      nodes.clear();
      append_panels(from, to, points, precision_.panels, nodes);
      integrator.add({line / radius_, 0.0}, wave, nodes, 2 * factor * prefactor(), sums);
    }
  }

 private:
  double prefactor() const { return 4 * constants::coulomb_eV_nm / (constants::pi * radius_); }

  double radius_;
  SheetHamiltonian hamiltonian_;
  LinePrecision precision_;
  HelicalLines lines_;
  std::span<const double> xi_;
  std::vector<std::vector<BranchPoint>> initial_;
};

}  // namespace

ShellResponse tube_response(const Tube& tube, const HoppingSet& hopping,
                            const Conditions& conditions, const Nodes& nodes,
                            const Window& window) {
  validate(conditions);
  std::vector<double> xi;
  for (int k = 0; k < window.xi.count; ++k) xi.push_back(nodes.xi.node(window.xi.first + k));

  ShellResponse response(tube.radius_nm, nodes, window);
  const TubeSum sum(tube, hopping, nodes.tolerance, xi);
  struct Cell {
    int j, m;
  };
  std::vector<Cell> cells;
  for (int j = 0; j < window.q.count; ++j)
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) cells.push_back({j, m});

#pragma omp parallel num_threads(inner_threads())
  {
    LineIntegrator integrator = sum.integrator();
#pragma omp for schedule(dynamic, 4)
    for (std::size_t c = 0; c < cells.size(); ++c) {
      const auto [j, m] = cells[c];
      const double q = nodes.q.node(window.q.first + j);
      const std::span<double> out = response.cell(j, m);
      if (m == 0 || tube.shape != TubeKind::chiral) {
        sum.add(m, q, 1.0, integrator, out);
      } else {
        sum.add(m, q, 0.5, integrator, out);
        sum.add(-m, q, 0.5, integrator, out);
      }
    }
  }
  return response;
}

}  // namespace gapwright
