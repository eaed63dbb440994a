#include "occupation.hpp"

#include <cmath>

namespace gapwright {

Occupation::Occupation(const Conditions& conditions)
    : kT_(thermal_energy_eV(conditions)), mu_(conditions.chemical_potential_eV) {}

double Occupation::operator()(double energy) const {
  if (kT_ == 0) return energy < mu_ ? 1.0 : 0.0;
  return 1 / (1 + std::exp((energy - mu_) / kT_));
}

double Occupation::per_energy(double low, double high, double difference) const {
  if (kT_ == 0) return low < mu_ && high >= mu_ ? 1 / difference : 0.0;
  // n(low) - n(high) = n(low)·[1 - n(high)]·(1 - e^{-(high - low)/kT})
  const double filled = 1 / (1 + std::exp((low - mu_) / kT_));
  const double empty = 1 / (1 + std::exp((mu_ - high) / kT_));
  const double x = difference / kT_;
  const double share = x > 1e-8 ? -std::expm1(-x) / x : 1.0;
  return filled * empty * share / kT_;
}

}  // namespace gapwright
