// What further round trips make of the first one between crossed tubes.
#pragma once

#include "builders.hpp"

#include <map>

namespace gapwright {

/// Full dispersion over that of the first round trip at any of a request's angles. It varies by a
/// few per cent and is dear at small angles, so it is computed at few gaps and at 15°, 30°, 60° and
/// 90°, with γ → 0 from parallel tubes, and read as a spline in ln g and a polynomial in sin γ.
/// Angles that are all among the four need no others.
class FurtherRoundTrips {
 public:
  FurtherRoundTrips(const Binder& binder, const TableRequest& request, double low_gap_nm,
                    double high_gap_nm);

  /// The ratio and its derivative by the gap.
  SmoothEnergy ratio(double angle_deg, double gap_nm) const;
  /// Relative to the energy: of points, between gaps and between angles.
  double error() const { return error_; }
  bool positive() const { return positive_; }

 private:
  void add_angle(const Binder& binder, const TableRequest& request, double angle_deg);
  void add_limit(const Binder& binder, const TableRequest& request);
  void check_gaps(const Binder& binder, const TableRequest& request, double angle_deg);
  void check_angles(const std::vector<double>& wanted);
  SmoothEnergy between(double angle_deg, double gap_nm, double left_out_deg) const;

  std::vector<double> gaps_;
  std::map<double, PotentialTerm> at_angle_;  // 0: the limit
  double error_ = 0.0;
  bool positive_ = true;
};

/// E·sin γ for γ → 0 of a parallel dispersion, between two gaps.
PotentialTerm limit_term(const Potential& parallel, double low_gap_nm, double high_gap_nm);

}  // namespace gapwright
