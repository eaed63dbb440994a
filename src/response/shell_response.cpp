#include "cutting_lines.hpp"
#include "fermi_lines.hpp"
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
  TubeSum(const Tube& tube, const HoppingSet& hopping, const Conditions& conditions,
          double tolerance, std::span<const double> xi)
      : radius_(tube.radius_nm),
        hamiltonian_(tube_hamiltonian(tube, hopping)),
        precision_(line_precision(tolerance, hamiltonian_.nearest_neighbour_only())),
        lines_(tube, hamiltonian_, precision_.panels.longest),
        filling_{Occupation(conditions), Occupation(conditions).trivial()},
        xi_(xi) {
    for (int line = 0; line < lines_.count(); ++line)
      initial_.push_back(lines_.branch_points(line, 0));
    if (!filling_.trivial) find_fermi_points();
  }

  LineIntegrator integrator() const { return {hamiltonian_, precision_, filling_, xi_}; }

  /// What all wave numbers of one signed order share.
  struct Order {
    int order;
    struct Line {
      int index;
      bool whole;         ///< false: mapped on itself by k → -k - Q, half of it is enough
      double mirror_sum;  ///< of a point and its image at q = 0
      std::vector<BranchPoint> final_points;
    };
    std::vector<Line> lines;
  };
  Order prepare(int order) const {
    Order prepared{order, {}};
    for (int line = 0; line < lines_.count(); ++line) {
      const int image = lines_.image(line, order);
      if (image < line) continue;  // time reversal: its image stands for it
      prepared.lines.push_back(
          {line, image != line, lines_.mirror_sum(line, order), final_points(line, order)});
    }
    return prepared;
  }

  /// Scratch space of one thread.
  struct Scratch {
    std::vector<BranchPoint> initial, shifted, points;
    LineNodes nodes;
  };

  /// Adds factor·(4k_e/πR)∫W ΔE/(ΔE² + ξ²) of wave vector (order/R, q) to sums.
  void add(const Order& order, double q, double factor, LineIntegrator& integrator,
           Scratch& scratch, std::span<double> sums) const {
    const double prefactor = 4 * constants::coulomb_eV_nm / (constants::pi * radius_);
    const double margin = 2.5 * precision_.panels.longest;
    for (const Order::Line& line : order.lines) {
      double from = 0.0, to = lines_.period();
      if (!line.whole) {
        from = 0.5 * (line.mirror_sum - q);
        to = from + 0.5 * lines_.period();
      }
      unroll(initial_[std::size_t(line.index)], lines_.period(), 0.0, from, to, margin,
             scratch.initial);
      unroll(line.final_points, lines_.period(), -q, from, to, margin, scratch.shifted);
      scratch.points.resize(scratch.initial.size() + scratch.shifted.size());
      std::merge(scratch.initial.begin(), scratch.initial.end(), scratch.shifted.begin(),
                 scratch.shifted.end(), scratch.points.begin(),
                 [](const BranchPoint& a, const BranchPoint& b) { return a.z < b.z; });
      if (!filling_.trivial && filling_.occupation.kT() == 0)
        add_resonances(scratch.initial, scratch.shifted, least_xi(), scratch.points);
      scratch.nodes.clear();
      append_panels(from, to, scratch.points, precision_.panels, scratch.nodes);
      integrator.add({line.index / radius_, 0.0}, {order.order / radius_, q}, scratch.nodes,
                     2 * factor * prefactor, sums);
    }
  }

 private:
  double least_xi() const { return xi_.empty() ? 0.0 : *std::min_element(xi_.begin(), xi_.end()); }

  void find_fermi_points() {
    const FermiLines fermi(hamiltonian_, filling_.occupation);
    const double kT = filling_.occupation.kT();
    if (kT > 0) {
      double nearest = 1e3;
      for (int line = 0; line < lines_.count(); ++line)
        nearest = fermi.nearest(line / radius_, 0.0, lines_.period(), nearest);
      filling_.nearest = nearest;
      // No state to excite or to block within a band, to rounding.
      constexpr double frozen = 40.0;
      filling_.trivial = nearest > frozen * kT;
      if (filling_.trivial) return;
    }
    for (int line = 0; line < lines_.count(); ++line) {
      std::vector<BranchPoint>& points = initial_[std::size_t(line)];
      points = with_fermi_points(
          points, fermi.along(line / radius_, 0.0, lines_.period(), filling_.nearest));
    }
  }

  std::vector<BranchPoint> final_points(int line, int order) const {
    if (filling_.trivial) return lines_.branch_points(line, order);
    const HelicalLines::Moved moved = lines_.moved(line + order);
    std::vector<BranchPoint> points = initial_[std::size_t(moved.line)];
    for (BranchPoint& point : points) point.z = lines_.into_period(point.z + moved.shift);
    std::sort(points.begin(), points.end(),
              [](const BranchPoint& a, const BranchPoint& b) { return a.z < b.z; });
    return points;
  }

  double radius_;
  SheetHamiltonian hamiltonian_;
  LinePrecision precision_;
  HelicalLines lines_;
  Filling filling_;
  std::span<const double> xi_;
  std::vector<std::vector<BranchPoint>> initial_;
};

}  // namespace

ShellResponse tube_response(const Tube& tube, const HoppingSet& hopping,
                            const Conditions& conditions, const Nodes& nodes,
                            const Window& window) {
  validate(conditions, hopping);
  std::vector<double> xi;
  for (int k = 0; k < window.xi.count; ++k) xi.push_back(nodes.xi.node(window.xi.first + k));

  ShellResponse response(tube.radius_nm, nodes, window);
  const TubeSum sum(tube, hopping, conditions, nodes.tolerance, xi);
  // Both signs of an order; one is enough where the tube is its own mirror image.
  const bool chiral = tube.shape == TubeKind::chiral;
#pragma omp parallel num_threads(inner_threads())
  {
    LineIntegrator integrator = sum.integrator();
    TubeSum::Scratch scratch;
#pragma omp for schedule(dynamic, 1)
    for (int m = window.max_order() - 1; m >= 0; --m) {
      const bool both = chiral && m > 0;
      const TubeSum::Order plus = sum.prepare(m), minus = sum.prepare(both ? -m : m);
      for (int j = 0; j < window.q.count && m < window.orders[std::size_t(j)]; ++j) {
        const double q = nodes.q.node(window.q.first + j);
        const std::span<double> out = response.cell(j, m);
        sum.add(plus, q, both ? 0.5 : 1.0, integrator, scratch, out);
        if (both) sum.add(minus, q, 0.5, integrator, scratch, out);
      }
    }
  }
  return response;
}

}  // namespace gapwright
