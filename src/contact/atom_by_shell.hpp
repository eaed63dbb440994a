// One atom outside a smooth shell.
#pragma once

#include "shell_integrals.hpp"

#include <gapwright/contact/short_range.hpp>

#include <cmath>

namespace gapwright {

/// Energy of one atom at a distance s > R from the axis of a shell, and its derivative by s: mean
/// of ρ^{-2a} over the circle, (s² - R²)^{1-2a} s^{2a-2} F(1-a, 1-a; 1; z) with z = (R/s)².
class AtomByShell {
 public:
  AtomByShell(const PairFunction& pair, double radius)
      : radius_(radius),
        front_(carbon_density_per_nm2 * 2 * constants::pi * radius),
        power_(pair.power),
        repulsion_(pair.repulsion_eV_nm12 * line_factor(repulsive_power)),
        attraction_(pair.attraction_eV_nmp * line_factor(pair.power)) {}

  SmoothEnergy at(double s) const {
    const SmoothEnergy steep = mean(repulsive_power - 1, s), soft = mean(power_ - 1, s);
    return {front_ * (repulsion_ * steep.energy - attraction_ * soft.energy),
            front_ * (repulsion_ * steep.slope - attraction_ * soft.slope)};
  }

 private:
  SmoothEnergy mean(int twice_a, double s) const {
    const double a = 0.5 * twice_a;
    const double z = radius_ * radius_ / (s * s);
    const CircleSeries series = circle_series(a, z);
    const double difference = s * s - radius_ * radius_;
    const double front = std::pow(difference, 1 - twice_a) * std::pow(s, twice_a - 2);
    const double rate = (1 - twice_a) * 2 * s / difference + (twice_a - 2) / s;
    return {front * series.value, front * (rate * series.value - 2 * z / s * series.slope)};
  }

  double radius_, front_;
  int power_;
  double repulsion_, attraction_;
};

}  // namespace gapwright
