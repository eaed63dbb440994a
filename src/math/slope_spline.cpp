#include <gapwright/math/slope_spline.hpp>

#include <algorithm>
#include <stdexcept>

namespace gapwright {
namespace {

struct Knot {
  double x, y, s;
};

// Second derivative at `a` of the quintic through values and slopes at three knots (divided
// differences with repeated nodes).
double end_curvature(const Knot& a, const Knot& b, const Knot& c) {
  const double ab = b.x - a.x, ac = c.x - a.x, bc = c.x - b.x;
  const double first[5] = {a.s, (b.y - a.y) / ab, b.s, (c.y - b.y) / bc, c.s};
  const double second[4] = {(first[1] - first[0]) / ab, (first[2] - first[1]) / ab,
                            (first[3] - first[2]) / bc, (first[4] - first[3]) / bc};
  const double third[3] = {(second[1] - second[0]) / ab, (second[2] - second[1]) / ac,
                           (second[3] - second[2]) / bc};
  const double fourth[2] = {(third[1] - third[0]) / ac, (third[2] - third[1]) / ac};
  const double fifth = (fourth[1] - fourth[0]) / ac;
  return 2 * (second[0] - ab * (third[0] - ab * (fourth[0] - ac * fifth)));
}

// Second derivatives at the knots that make the third one continuous: a tridiagonal system.
std::vector<double> curvatures(const std::vector<Knot>& k) {
  const std::size_t n = k.size();
  std::vector<double> m(n), above(n), right(n);
  m.front() = end_curvature(k[0], k[1], k[2]);
  m.back() = end_curvature(k[n - 1], k[n - 2], k[n - 3]);
  right[0] = m.front();
  for (std::size_t i = 1; i + 1 < n; ++i) {
    const double l = k[i].x - k[i - 1].x, r = k[i + 1].x - k[i].x;
    const double from_left = 60 * (k[i].y - k[i - 1].y) - l * (24 * k[i - 1].s + 36 * k[i].s);
    const double from_right = 60 * (k[i + 1].y - k[i].y) - r * (36 * k[i].s + 24 * k[i + 1].s);
    const double below = -3 / l;
    const double diagonal = 9 / l + 9 / r - below * above[i - 1];
    above[i] = -3 / r / diagonal;
    right[i] =
        (from_right / (r * r * r) - from_left / (l * l * l) - below * right[i - 1]) / diagonal;
  }
  for (std::size_t i = n - 1; i-- > 1;) m[i] = right[i] - above[i] * m[i + 1];
  return m;
}

}  // namespace

SlopeSpline::SlopeSpline(std::vector<double> knots, std::span<const double> values,
                         std::span<const double> slopes)
    : knots_(std::move(knots)) {
  const std::size_t n = knots_.size();
  if (n < 3 || values.size() != n || slopes.size() != n)
    throw std::domain_error(
        "SlopeSpline: three or more knots, each with value and slope, required");
  std::vector<Knot> k(n);
  for (std::size_t i = 0; i < n; ++i) {
    if (i > 0 && !(knots_[i] > knots_[i - 1]))
      throw std::domain_error("SlopeSpline: knots must rise");
    k[i] = {knots_[i], values[i], slopes[i]};
  }
  const std::vector<double> m = curvatures(k);
  for (std::size_t i = 0; i + 1 < n; ++i) {
    const double h = k[i + 1].x - k[i].x, rise = k[i + 1].y - k[i].y;
    const double s0 = h * k[i].s, s1 = h * k[i + 1].s, m0 = h * h * m[i], m1 = h * h * m[i + 1];
    pieces_.push_back(
        {{k[i].y, s0, 0.5 * m0, 10 * rise - 6 * s0 - 4 * s1 - 1.5 * m0 + 0.5 * m1,
          -15 * rise + 8 * s0 + 7 * s1 + 1.5 * m0 - m1, 6 * rise - 3 * (s0 + s1) + 0.5 * (m1 - m0)},
         h});
  }
}

Jet SlopeSpline::at(double x) const {
  const double inside = std::clamp(x, knots_.front(), knots_.back());
  const auto above = std::upper_bound(knots_.begin() + 1, knots_.end() - 1, inside);
  const std::size_t i = std::size_t(above - knots_.begin()) - 1;
  const Piece& p = pieces_[i];
  const double t = (inside - knots_[i]) / p.h;
  const double value =
      p.c[0] + t * (p.c[1] + t * (p.c[2] + t * (p.c[3] + t * (p.c[4] + t * p.c[5]))));
  const double slope =
      (p.c[1] + t * (2 * p.c[2] + t * (3 * p.c[3] + t * (4 * p.c[4] + t * 5 * p.c[5])))) / p.h;
  if (x != inside) return {value + slope * (x - inside), slope, 0.0};
  const double curvature =
      (2 * p.c[2] + t * (6 * p.c[3] + t * (12 * p.c[4] + t * 20 * p.c[5]))) / (p.h * p.h);
  return {value, slope, curvature};
}

}  // namespace gapwright
