#include <gapwright/math/quadrature.hpp>
#include <gapwright/table/outer_cut.hpp>

#include <algorithm>
#include <vector>

namespace gapwright {

Jet outer_switch(double distance_nm, double cut_nm) {
  const double width = (1 - switch_begin) * cut_nm;
  const double x = std::clamp((distance_nm - switch_begin * cut_nm) / width, 0.0, 1.0);
  const double rest = x * (1 - x);
  return {1 - x * x * x * (10 - x * (15 - 6 * x)), -30 * rest * rest / width, 0.0};
}

OuterCut::OuterCut(EnergyFunction function, double cut_nm)
    : function_(std::move(function)), cut_nm_(cut_nm) {
  constexpr int knots = 41;
  const GaussRule& rule = gauss_legendre(8);
  const double begin = switch_begin * cut_nm, step = (cut_nm - begin) / (knots - 1);
  std::vector<double> x(knots), energy(knots), slope(knots);
  const auto switched = [&](double distance) {
    return outer_switch(distance, cut_nm_).value * function_(distance).slope;
  };
  x.back() = cut_nm;
  for (int i = knots - 2; i >= 0; --i) {
    x[i] = begin + i * step;
    energy[i] = energy[i + 1];
    for (std::size_t k = 0; k < rule.nodes.size(); ++k)
      energy[i] -= 0.5 * step * rule.weights[k] * switched(x[i] + 0.5 * step * (1 + rule.nodes[k]));
    slope[i] = switched(x[i]);
  }
  shift_ = energy.front() - function_(begin).value;
  in_switch_ = SlopeSpline(std::move(x), energy, slope);
}

Jet OuterCut::at(double distance_nm) const {
  if (distance_nm >= cut_nm_) return {};
  Jet jet = function_(distance_nm);
  if (distance_nm < switch_begin * cut_nm_) {
    jet.value += shift_;
    return jet;
  }
  const Jet s = outer_switch(distance_nm, cut_nm_);
  return {in_switch_.at(distance_nm).value, s.value * jet.slope,
          s.slope * jet.slope + s.value * jet.curvature};
}

}  // namespace gapwright
