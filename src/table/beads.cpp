#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/quadrature.hpp>
#include <gapwright/table/beads.hpp>
#include <gapwright/table/outer_cut.hpp>

#include <algorithm>
#include <cmath>
#include <initializer_list>

namespace gapwright {
namespace {

using constants::pi;

// Panels in s of distances r cosh s: fine where the steep part is passed, and as far as e^{-2s}
// counts.
constexpr double panel_ends[] = {0.1, 0.22, 0.4, 0.65, 1.0, 1.5, 2.2, 3.2, 4.5, 7.0, 10.0, 13.0};
constexpr int panel_nodes = 12;

struct Sums {
  double first = 0.0, second = 0.0;
};

/// ∫₀^end f(s) ds of a function with two values, over the panels, split at `breaks` as well.
template <typename Function>
Sums integral(double end, std::initializer_list<double> breaks, Function f) {
  const GaussRule& rule = gauss_legendre(panel_nodes);
  Sums sum;
  double low = 0.0;
  const auto panel = [&](double high) {
    const double half = 0.5 * (high - low);
    for (std::size_t i = 0; i < rule.nodes.size(); ++i) {
      const Sums part = f(low + half * (1 + rule.nodes[i]));
      sum.first += half * rule.weights[i] * part.first;
      sum.second += half * rule.weights[i] * part.second;
    }
    low = high;
  };
  for (double high : panel_ends) {
    for (const double place : breaks)
      if (low < place && place < std::min(high, end)) panel(place);
    if (low < end) panel(std::min(high, end));
  }
  return sum;
}

constexpr double endless = 13.0;
// Of forces, which fall faster.
constexpr double endless_force = 7.0;

double arc(double ratio) {
  return ratio > 1 ? std::acosh(ratio) : 0.0;
}

}  // namespace

BeadPair::BeadPair(EnergyFunction parallel, double spacing_1_nm, double spacing_2_nm,
                   double closest_nm, std::optional<double> cut_nm)
    : parallel_(std::move(parallel)),
      product_(spacing_1_nm * spacing_2_nm),
      closest_nm_(closest_nm),
      cut_nm_(cut_nm),
      closest_(inverted(closest_nm)) {}

Jet BeadPair::inverted(double distance_nm) const {
  const double end = cut_nm_ ? arc(*cut_nm_ / distance_nm) : endless_force;
  const double begin = cut_nm_ ? arc(switch_begin * *cut_nm_ / distance_nm) : end;
  const double middle = 0.5 * (begin + end);  // the switch bends within its width
  const Sums sum = integral(end, {begin, middle}, [&](double s) {
    const double stretch = std::cosh(s);
    const Jet energy = parallel_(distance_nm * stretch);
    return Sums{energy.slope, stretch * energy.curvature};
  });
  return {-product_ / pi * sum.first, -product_ / pi * sum.second, 0.0};
}

Jet BeadPair::at(double distance_nm) const {
  if (cut_nm_ && distance_nm >= *cut_nm_) return {};
  if (distance_nm < closest_nm_)
    return {closest_.value + closest_.slope * (distance_nm - closest_nm_), closest_.slope, 0.0};
  return inverted(distance_nm);
}

double BeadPair::chain_energy(const std::function<double(double)>& bead_energy, double distance_nm,
                              double reach_nm) const {
  // z = D sinh t, so that r = D cosh t.
  const auto part = [&](double t) {
    return Sums{distance_nm * std::cosh(t) * bead_energy(distance_nm * std::cosh(t)), 0.0};
  };
  const double end = arc(reach_nm / distance_nm);
  const double begin = arc(switch_begin * reach_nm / distance_nm);
  return 2 / product_ * integral(end, {begin, 0.5 * (begin + end)}, part).first;
}

double BeadPair::corrugation(double distance_nm, double spacing_nm) const {
  // A trapezoid in z resolves a wave as long as û is nil at the waves it takes for it, 7 times as
  // short. Far beads answer to no wave.
  constexpr int points_a_wave = 8;
  constexpr double reach = 8.0;
  const double step = spacing_nm / points_a_wave;
  double wave = 0.5 * at(distance_nm).value;
  for (int j = 1; j * step < reach * distance_nm; ++j)
    wave += at(std::hypot(distance_nm, j * step)).value * std::cos(2 * pi * j / points_a_wave);
  return 4 * std::fabs(2 * step * wave / (product_ * parallel_(distance_nm).value));
}

double usual_bead_spacing_nm(double distance_nm) {
  return 0.25 * std::sqrt(distance_nm);
}

Jet crossing_limit(const EnergyFunction& parallel, double distance_nm) {
  // y = D sinh t; r = D cosh t, dr/dD = 1/cosh t at a fixed y.
  const double D = distance_nm;
  const Sums sum = integral(endless, {}, [&](double t) {
    const Jet energy = parallel(D * std::cosh(t));
    return Sums{D * std::cosh(t) * energy.value, D * energy.slope};
  });
  return {2 * sum.first, 2 * sum.second, 0.0};
}

}  // namespace gapwright
