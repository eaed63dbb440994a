// Fermi factors of transitions (METHODS §3).
#pragma once

#include <gapwright/response/conditions.hpp>

namespace gapwright {

/// Occupation n(E) at a temperature and a chemical potential, and its differences without
/// cancellation.
class Occupation {
 public:
  explicit Occupation(const Conditions& conditions);

  double kT() const { return kT_; }
  double chemical_potential() const { return mu_; }
  /// T = 0 without doping: all of one band and nothing of the other.
  bool trivial() const { return kT_ == 0 && mu_ == 0; }

  double operator()(double energy) const;
  /// [n(low) - n(high)]/(high - low) > 0, for equal energies -∂n/∂E; `difference` = high - low >=
  /// 0.
  double per_energy(double low, double high, double difference) const;

 private:
  double kT_, mu_;
};

}  // namespace gapwright
