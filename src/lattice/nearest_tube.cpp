#include "nearest_tube.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/candidates.hpp>

#include <cmath>
#include <cstdlib>
#include <tuple>
#include <vector>

namespace gapwright {

namespace {

int index_steps(Chirality a, Chirality b) {
  return std::abs(a.n - b.n) + std::abs(a.m - b.m);
}

/// The candidate of least cost among tubes with diameters in the interval.
template <class Cost>
std::optional<Tube> cheapest(Interval diameter_nm, const Cost& cost) {
  std::optional<Tube> best;
  for (const Tube& tube : candidate_tubes({diameter_nm, std::nullopt, TubeFilter::Kind::any}))
    if (!best || cost(tube) < cost(*best)) best = tube;
  return best;
}

}  // namespace

double diameter_nm_of(long n, long m) {
  const double x = static_cast<double>(n), y = static_cast<double>(m);
  return constants::lattice_nm * std::sqrt(x * x + x * y + y * y) / constants::pi;
}

Tube nearest_tube_in_range(long n, long m) {
  // Wide enough for every direction: neighbouring tubes of one direction differ by at most this.
  constexpr double shell_nm = 0.2;
  const double diameter = diameter_nm_of(n, m);
  const bool wide = diameter > max_diameter_nm;
  const double limit = wide ? max_diameter_nm : min_diameter_nm;
  const Interval shell =
      wide ? Interval{limit - shell_nm, limit} : Interval{limit, limit + shell_nm};
  // The typed point pulled along its direction to the limit.
  const double x = static_cast<double>(n) * limit / diameter;
  const double y = static_cast<double>(m) * limit / diameter;
  const auto cost = [&](const Tube& tube) {
    const double dx = tube.chirality.n - x, dy = tube.chirality.m - y;
    const bool same_shape = (n == m) == (tube.shape == TubeKind::armchair) &&
                            (m == 0) == (tube.shape == TubeKind::zigzag);
    return std::tuple(!same_shape, dx * dx + dx * dy + dy * dy);
  };
  return *cheapest(shell, cost);
}

std::optional<Tube> nearest_outer_wall(const Tube& inner, const Tube& outer) {
  const double least_nm = 2 * (inner.radius_nm + min_gap_nm);
  const auto cost = [&](const Tube& tube) {
    return std::tuple(index_steps(tube.chirality, outer.chirality), tube.shape != outer.shape,
                      tube.radius_nm);
  };
  return cheapest({least_nm, least_nm + 0.5}, cost);
}

}  // namespace gapwright
