#include "flat_sum.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/quadrature.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

double fraction(double x) {
  return x - std::floor(x);
}

/// Panels over [from, to] that shrink geometrically towards an end where the line integral has its
/// logarithmic singularity; from the middle on where both ends have one.
void append_graded(double from, bool singular_from, double to, bool singular_to, double smallest,
                   const GaussRule& gauss, std::vector<double>& x, std::vector<double>& w) {
  constexpr double ratio = 4.0;
  if (singular_from && singular_to) {
    const double middle = 0.5 * (from + to);
    append_graded(from, true, middle, false, smallest, gauss, x, w);
    append_graded(middle, false, to, true, smallest, gauss, x, w);
    return;
  }
  std::vector<double> edges{to - from};
  while (edges.back() > smallest) edges.push_back(edges.back() / ratio);
  edges.push_back(0.0);
  for (std::size_t e = 0; e + 1 < edges.size(); ++e) {
    const double centre = 0.5 * (edges[e] + edges[e + 1]), half = 0.5 * (edges[e] - edges[e + 1]);
    for (std::size_t i = 0; i < gauss.nodes.size(); ++i) {
      const double distance = centre + half * gauss.nodes[i];
      x.push_back(singular_to ? to - distance : from + distance);
      w.push_back(half * gauss.weights[i]);
    }
  }
}

}  // namespace

FlatDirection::FlatDirection(const HoppingSet& hopping, double angle_rad, double tolerance,
                             std::span<const double> xi_eV)
    : hamiltonian_(hopping, rotated_lattice(angle_rad), 0.0),
      precision_(line_precision(tolerance, hamiltonian_.nearest_neighbour_only())),
      band_zeros_(hamiltonian_, precision_.panels.longest),
      xi_(xi_eV) {
  // Cell {s·b + z·ẑ}: strips along b stack by translations, so any direction ẑ has a cell.
  const auto& reciprocal = hamiltonian_.lattice().reciprocal;
  const bool first = std::fabs(reciprocal[0].c) >= std::fabs(reciprocal[1].c);
  const PlaneVector b = reciprocal[first ? 0 : 1], other = reciprocal[first ? 1 : 0];
  const double area =
      std::fabs(reciprocal[0].c * reciprocal[1].z - reciprocal[0].z * reciprocal[1].c);
  const double rise = other.z - b.z / b.c * other.c;  // one cell up or down
  cell_ = {std::fabs(b.c), b.z / b.c, area / std::fabs(b.c), rise > 0 ? other.c : -other.c};
  const PlaneVector dirac = hamiltonian_.dirac_point();
  constexpr int reach = 6;
  for (int i = -reach; i <= reach; ++i)
    for (int j = -reach; j <= reach; ++j)
      for (const double valley : {1.0, -1.0})
        zeros_.push_back({valley, dirac * valley + reciprocal[0] * i + reciprocal[1] * j});
  std::sort(zeros_.begin(), zeros_.end(),
            [](const Zero& a, const Zero& b2) { return a.at.z < b2.at.z; });
}

double FlatDirection::clearance(double q, double height) const {
  // Heights of the zeros above the lower edge, modulo the cell.
  const PlaneVector dirac = hamiltonian_.dirac_point();
  const double h = (dirac.z - cell_.slant * dirac.c) / cell_.length;
  double least = 1.0;
  for (const double zero : {h, -h, h - q / cell_.length, -h - q / cell_.length}) {
    const double f = fraction(zero - height / cell_.length);
    least = std::min({least, f, 1 - f});
  }
  return least;
}

FlatDirection::Cut FlatDirection::cut_for(double q) const {
  // k → -k - Q maps this cell on itself: half of the lines is enough.
  const double symmetric = -0.5 * (cell_.length + q);
  if (clearance(q, symmetric) > 0.08) return {symmetric, true};
  double best = 0.0;
  for (int i = 0; i < 24; ++i) {
    const double height = i / 24.0 * cell_.length;
    if (clearance(q, height) > clearance(q, best)) best = height;
  }
  return {best, false};
}

std::vector<double> FlatDirection::line_positions(double q, const Cut& cut,
                                                  std::vector<double>& weights) const {
  // Of each family of zeros, of F(k) and of F(k + Q) in both valleys, one lies in the cell.
  std::vector<double> singular;
  for (const double valley : {1.0, -1.0})
    for (const double shift : {0.0, q}) {
      const PlaneVector zero = hamiltonian_.dirac_point() * valley - PlaneVector{0.0, shift};
      const double row = std::floor((zero.z - cell_.slant * zero.c - cut.height) / cell_.length);
      singular.push_back(cell_.width * fraction((zero.c - row * cell_.row_shift) / cell_.width));
    }
  std::sort(singular.begin(), singular.end());
  struct Edge {
    double c;
    bool singular;
  };
  std::vector<Edge> edges;
  if (cut.halved) edges.push_back({0.0, false});
  for (const double c : singular)
    if (!cut.halved || c < 0.5 * cell_.width) edges.push_back({c, true});
  if (cut.halved)
    edges.push_back({0.5 * cell_.width, false});
  else
    edges.push_back({singular.front() + cell_.width, true});

  const double smallest = (precision_.single ? 3e-3 : 1e-5) * std::min(q, 1.0);
  const GaussRule& gauss = gauss_legendre(precision_.panels.nodes);
  std::vector<double> positions;
  for (std::size_t i = 0; i + 1 < edges.size(); ++i)
    if (edges[i + 1].c - edges[i].c > 1e-9 * cell_.width)
      append_graded(edges[i].c, edges[i].singular, edges[i + 1].c, edges[i + 1].singular, smallest,
                    gauss, positions, weights);
  if (cut.halved)
    for (double& weight : weights) weight *= 2;
  return positions;
}

void FlatDirection::strengths(double wave_per_nm, std::span<double> sums) const {
  std::fill(sums.begin(), sums.end(), 0.0);
  LineIntegrator integrator(hamiltonian_, precision_, xi_);
  std::vector<double> weights;
  const Cut cut = cut_for(wave_per_nm);
  const std::vector<double> positions = line_positions(wave_per_nm, cut, weights);
  const double margin = 2.5 * precision_.panels.longest;
  const double prefactor = 4 * constants::coulomb_eV_nm / constants::pi;
  std::vector<BranchPoint> points, shifted;
  LineNodes nodes;
  for (std::size_t i = 0; i < positions.size(); ++i) {
    const double c = positions[i];
    const double from = cell_.slant * c + cut.height, to = from + cell_.length;
    points.clear();
    shifted.clear();
    for (const Zero& zero : zeros_) {
      if (zero.at.z < from - margin || zero.at.z > to + margin + wave_per_nm) continue;
      const auto point = band_zeros_.on_line(zero.valley, zero.at.z, c - zero.at.c);
      if (!point) continue;
      points.push_back(*point);
      shifted.push_back({point->z - wave_per_nm, point->distance});
    }
    const auto by_height = [](const BranchPoint& a, const BranchPoint& b) { return a.z < b.z; };
    std::sort(points.begin(), points.end(), by_height);
    std::sort(shifted.begin(), shifted.end(), by_height);
    const auto middle = points.insert(points.end(), shifted.begin(), shifted.end());
    std::inplace_merge(points.begin(), middle, points.end(), by_height);
    nodes.clear();
    append_panels(from, to, points, precision_.panels, nodes);
    integrator.add({c, 0.0}, {0.0, wave_per_nm}, nodes, prefactor * weights[i], sums);
  }
}

}  // namespace gapwright
