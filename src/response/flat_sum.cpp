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

/// What the line integral does at an end of a range of lines.
enum class Edge { smooth, logarithm, root };

/// Panels over [from, to] that shrink geometrically towards an end where the line integral is
/// singular, in the root of the distance next to a root; from the middle on where both ends are.
void append_graded(double from, Edge at_from, double to, Edge at_to, double smallest,
                   const GaussRule& gauss, std::vector<double>& x, std::vector<double>& w) {
  constexpr double ratio = 4.0;
  const bool singular_from = at_from != Edge::smooth, singular_to = at_to != Edge::smooth;
  if (singular_from && singular_to) {
    const double middle = 0.5 * (from + to);
    append_graded(from, at_from, middle, Edge::smooth, smallest, gauss, x, w);
    append_graded(middle, Edge::smooth, to, at_to, smallest, gauss, x, w);
    return;
  }
  const bool root = at_from == Edge::root || at_to == Edge::root;
  std::vector<double> edges{to - from};
  while (edges.back() > smallest) edges.push_back(edges.back() / ratio);
  edges.push_back(0.0);
  for (std::size_t e = 0; e + 1 < edges.size(); ++e) {
    const double centre = 0.5 * (edges[e] + edges[e + 1]), half = 0.5 * (edges[e] - edges[e + 1]);
    for (std::size_t i = 0; i < gauss.nodes.size(); ++i) {
      double distance = centre + half * gauss.nodes[i], weight = half * gauss.weights[i];
      if (root && e + 2 == edges.size()) {
        const double y = 0.5 * (1 + gauss.nodes[i]);
        distance = edges[e] * y * y;
        weight = edges[e] * y * gauss.weights[i];
      }
      x.push_back(singular_to ? to - distance : from + distance);
      w.push_back(weight);
    }
  }
}

}  // namespace

FlatDirection::FlatDirection(const HoppingSet& hopping, const Conditions& conditions,
                             double angle_rad, double tolerance, std::span<const double> xi_eV)
    : hamiltonian_(hopping, rotated_lattice(angle_rad), 0.0),
      precision_(line_precision(tolerance, hamiltonian_.nearest_neighbour_only())),
      band_zeros_(hamiltonian_, precision_.panels.longest),
      filling_{Occupation(conditions), Occupation(conditions).trivial()},
      fermi_lines_(hamiltonian_, filling_.occupation),
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
  if (conditions.chemical_potential_eV != 0) find_tangents();
}

// Outwards from the Dirac point, the least |E| along z on each line is followed until it passes the
// chemical potential.
void FlatDirection::find_tangents() {
  constexpr double step = 0.2, difference = 1e-3, reach = 12.0;
  const double mu = filling_.occupation.chemical_potential();
  const int band = mu < 0 ? -1 : 1;
  const PlaneVector dirac = hamiltonian_.dirac_point();
  const auto excess = [&](PlaneVector k) {
    const BandState state = hamiltonian_.at(k);
    return band * (state.midpoint_eV - mu) + std::abs(state.coupling_eV);
  };
  const auto square = [&](double c, double z) {
    return std::norm(hamiltonian_.at({c, z}).coupling_eV);
  };
  const auto lowest = [&](double c, double z) {
    for (int i = 0; i < 30; ++i) {
      const double up = square(c, z + difference), here = square(c, z),
                   down = square(c, z - difference);
      const double bend = up - 2 * here + down;
      if (!(bend > 0)) break;
      const double move = -0.5 * difference * (up - down) / bend;
      z += std::clamp(move, -step, step);
      if (std::fabs(move) < 1e-11) break;
    }
    return z;
  };
  for (const double side : {1.0, -1.0}) {
    double inner = 0.0, z = dirac.z;
    while (inner < reach) {
      const double next = lowest(dirac.c + side * (inner + step), z);
      if (excess({dirac.c + side * (inner + step), next}) > 0) break;
      inner += step;
      z = next;
    }
    double outer = inner + step;
    while (outer - inner > 1e-12) {
      const double at = 0.5 * (inner + outer);
      z = lowest(dirac.c + side * at, z);
      (excess({dirac.c + side * at, z}) > 0 ? outer : inner) = at;
    }
    const PlaneVector tangent{dirac.c + side * inner, z};
    for (const double valley : {1.0, -1.0}) tangents_.push_back(tangent * valley);
    contour_ = inner;
  }
}

double FlatDirection::folded(PlaneVector point, const Cut& cut) const {
  const double row = std::floor((point.z - cell_.slant * point.c - cut.height) / cell_.length);
  return cell_.width * fraction((point.c - row * cell_.row_shift) / cell_.width);
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
  struct Place {
    double c;
    Edge edge;
  };
  std::vector<Place> singular;
  for (const double shift : {0.0, q}) {
    for (const double valley : {1.0, -1.0})
      singular.push_back(
          {folded(hamiltonian_.dirac_point() * valley - PlaneVector{0.0, shift}, cut),
           Edge::logarithm});
    for (const PlaneVector& tangent : tangents_)
      singular.push_back({folded(tangent - PlaneVector{0.0, shift}, cut), Edge::root});
  }
  std::sort(singular.begin(), singular.end(),
            [](const Place& a, const Place& b) { return a.c < b.c; });
  std::vector<Place> edges;
  if (cut.halved) edges.push_back({0.0, Edge::smooth});
  for (const Place& place : singular)
    if (!cut.halved || place.c < 0.5 * cell_.width) edges.push_back(place);
  if (cut.halved)
    edges.push_back({0.5 * cell_.width, Edge::smooth});
  else
    edges.push_back({singular.front().c + cell_.width, singular.front().edge});

  const double smallest =
      (precision_.single ? 3e-3 : 1e-5) * std::min({q, 1.0, tangents_.empty() ? 1.0 : contour_});
  const GaussRule& gauss = gauss_legendre(precision_.panels.nodes);
  std::vector<double> positions;
  for (std::size_t i = 0; i + 1 < edges.size(); ++i)
    if (edges[i + 1].c - edges[i].c > 1e-9 * cell_.width)
      append_graded(edges[i].c, edges[i].edge, edges[i + 1].c, edges[i + 1].edge, smallest, gauss,
                    positions, weights);
  if (cut.halved)
    for (double& weight : weights) weight *= 2;
  return positions;
}

void FlatDirection::add_fermi_points(double c, double from, double to, double q,
                                     std::vector<BranchPoint>& initial,
                                     std::vector<BranchPoint>& final) const {
  const std::vector<BranchPoint> fermi = fermi_lines_.along(c, from, to + q, 0.0);
  std::vector<BranchPoint> moved = fermi;
  for (BranchPoint& point : moved) point.z -= q;
  initial = with_fermi_points(initial, fermi);
  final = with_fermi_points(final, moved);
}

void FlatDirection::strengths(double wave_per_nm, std::span<double> sums) const {
  std::fill(sums.begin(), sums.end(), 0.0);
  LineIntegrator integrator(hamiltonian_, precision_, filling_, xi_);
  std::vector<double> weights;
  const Cut cut = cut_for(wave_per_nm);
  const std::vector<double> positions = line_positions(wave_per_nm, cut, weights);
  const double margin = 2.5 * precision_.panels.longest;
  const double prefactor = 4 * constants::coulomb_eV_nm / constants::pi;
  const double least_xi = xi_.empty() ? 0.0 : *std::min_element(xi_.begin(), xi_.end());
  std::vector<BranchPoint> points, shifted, initial;
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
    if (!filling_.trivial)
      add_fermi_points(c, from - margin, to + margin, wave_per_nm, points, shifted);
    if (!filling_.trivial && filling_.occupation.kT() == 0) initial = points;
    const auto middle = points.insert(points.end(), shifted.begin(), shifted.end());
    std::inplace_merge(points.begin(), middle, points.end(), by_height);
    if (!filling_.trivial && filling_.occupation.kT() == 0)
      add_resonances(initial, shifted, least_xi, points);
    nodes.clear();
    append_panels(from, to, points, precision_.panels, nodes);
    integrator.add({c, 0.0}, {0.0, wave_per_nm}, nodes, prefactor * weights[i], sums);
  }
}

}  // namespace gapwright
