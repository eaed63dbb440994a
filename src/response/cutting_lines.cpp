#include "cutting_lines.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/quadrature.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

constexpr double on_line = 1e-9;  // closer than this a zero lies on the line [nm^-1]

struct Ellipse {
  double major, minor;  // semi-axes for a panel of half length one
};

Ellipse bernstein(double rho) {
  return {0.5 * (rho + 1 / rho), 0.5 * (rho - 1 / rho)};
}

/// The longest half length of a panel starting `ahead` before a branch point that keeps the point
/// outside: the positive root of ((ahead - a)/A)² + (distance/B)² = a².
double longest_half(double ahead, double distance, const Ellipse& e) {
  const double curvature = 1 - 1 / (e.major * e.major);
  const double b = ahead / (e.major * e.major);
  const double c =
      (ahead / e.major) * (ahead / e.major) + (distance / e.minor) * (distance / e.minor);
  return (-b + std::sqrt(b * b + curvature * c)) / curvature;
}

/// The same for points everywhere from `ahead` to `ahead` + length.
double longest_half(double ahead, double length, double distance, const Ellipse& e) {
  const double beside = distance / e.minor;  // where the points go on
  const double end = ahead + length;
  if (end <= 0) return longest_half(end, distance, e);
  if (ahead >= 0) return std::max(beside, std::min(longest_half(ahead, distance, e), ahead));
  return beside < end ? beside : longest_half(end, distance, e);
}

void append_gauss(double from, double to, const GaussRule& gauss, LineNodes& out) {
  const double centre = 0.5 * (from + to), half = 0.5 * (to - from);
  const std::size_t at = out.z.size(), count = gauss.nodes.size();
  out.z.resize(at + count);
  out.weight.resize(at + count);
  for (std::size_t i = 0; i < count; ++i) {
    out.z[at + i] = centre + half * gauss.nodes[i];
    out.weight[at + i] = half * gauss.weights[i];
  }
}

double wrapped(double z, double period) {
  double r = std::fmod(z, period);
  if (r < 0) r += period;
  return r < period ? r : 0.0;
}

int modulo(int a, int b) {
  return ((a % b) + b) % b;
}

/// Integers with x·n + y·m = gcd(n, m).
void extended_gcd(int n, int m, int& x, int& y) {
  if (m == 0) {
    x = 1;
    y = 0;
    return;
  }
  int x1, y1;
  extended_gcd(m, n % m, x1, y1);
  x = y1;
  y = x1 - (n / m) * y1;
}

}  // namespace

void append_panels(double from, double to, std::span<const BranchPoint> points,
                   const PanelRule& rule, LineNodes& out) {
  const Ellipse ellipse = bernstein(rule.ellipse);
  const GaussRule& gauss = gauss_legendre(rule.nodes);
  const double inverse_major2 = 1 / (ellipse.major * ellipse.major);
  const double inverse_minor2 = 1 / (ellipse.minor * ellipse.minor);
  const double behind = rule.longest * (ellipse.major - 1);
  std::size_t lowest = 0;
  double left = from;
  while (left < to) {
    while (lowest < points.size() && points[lowest].end() < left - behind) ++lowest;
    double half = rule.longest;
    double stop = to;
    for (std::size_t i = lowest; i < points.size(); ++i) {
      const double ahead = points[i].z - left;
      if (ahead > (1 + ellipse.major) * half) break;
      const double distance = points[i].distance;
      if (points[i].length > 0) {
        half = std::min(half, longest_half(ahead, points[i].length, distance, ellipse));
        continue;
      }
      if (distance < on_line) {
        // On the line the functions are smooth on either side: cut there, nothing else.
        if (ahead > on_line && points[i].z < stop) stop = points[i].z;
        continue;
      }
      const double offset = ahead - half;
      if (offset * offset * inverse_major2 + distance * distance * inverse_minor2 < half * half)
        half = longest_half(ahead, distance, ellipse);
    }
    double right = left + 2 * half;
    if (right >= stop - on_line)
      right = stop;
    else if (right > stop - half)
      right = 0.5 * (left + stop);  // two even panels rather than a long and a tiny one
    append_gauss(left, right, gauss, out);
    left = right;
  }
}

HelicalLines::HelicalLines(const Tube& tube, const SheetHamiltonian& hamiltonian, double reach)
    : symmetry_(tube.symmetry), inverse_radius_(1 / tube.radius_nm), zeros_(hamiltonian, reach) {
  const auto& b = hamiltonian.lattice().reciprocal;
  const int n = tube.chirality.n, m = tube.chirality.m;
  period_ = std::fabs((m * b[0].z - n * b[1].z) / symmetry_);
  int x, y;
  extended_gcd(n, m, x, y);
  helix_step_ = x * b[0].z + y * b[1].z;
}

std::vector<BranchPoint> HelicalLines::branch_points(int line, int shift_order) const {
  std::vector<BranchPoint> points;
  const double spacing = symmetry_ * inverse_radius_;
  const double reach = zeros_.lateral_reach();
  const PlaneVector dirac = zeros_.dirac_point();
  for (const double valley : {1.0, -1.0}) {
    // Zeros sit at ±K plus reciprocal vectors, whose k_c are multiples of the line spacing.
    const double base = valley * dirac.c - (line + shift_order) * inverse_radius_;
    const int low = int(std::ceil((-reach - base) / spacing));
    const int high = int(std::floor((reach - base) / spacing));
    for (int p = low; p <= high; ++p) {
      const double height = valley * dirac.z + p * helix_step_;
      if (const auto point = zeros_.on_line(valley, height, -(base + p * spacing)))
        points.push_back({wrapped(point->z, period_), point->distance});
    }
  }
  std::sort(points.begin(), points.end(),
            [](const BranchPoint& a, const BranchPoint& b) { return a.z < b.z; });
  return points;
}

HelicalLines::Moved HelicalLines::moved(int line) const {
  const int base = modulo(line, symmetry_);
  return {base, (line - base) / symmetry_ * helix_step_};
}

double HelicalLines::into_period(double z) const {
  return wrapped(z, period_);
}

int HelicalLines::image(int line, int order) const {
  return modulo(-line - order, symmetry_);
}

double HelicalLines::mirror_sum(int line, int order) const {
  return (2 * line + order) / symmetry_ * helix_step_;
}

void unroll(std::span<const BranchPoint> points, double period, double shift, double from,
            double to, double margin, std::vector<BranchPoint>& out) {
  out.clear();
  if (points.empty()) return;
  const int first = int(std::floor((from - margin - shift) / period)) - 1;
  const int last = int(std::floor((to + margin - shift) / period));
  for (int turn = first; turn <= last; ++turn)
    for (const BranchPoint& p : points) {
      const double z = p.z + shift + turn * period;
      if (z + p.length >= from - margin && z <= to + margin)
        out.push_back({z, p.distance, p.length, p.slope});
    }
}

}  // namespace gapwright
