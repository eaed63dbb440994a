// What further round trips make of the first one between crossed tubes.
#pragma once

#include "builders.hpp"

#include <map>

namespace gapwright {

/// Full dispersion over that of the first round trip at a request's angles. It varies by a few per
/// cent and is dear at small angles, so it is computed at few gaps, there at those of 15°, 30°, 60°
/// and 90° that the grid of two wave numbers carries and from parallel tubes for γ → 0, and read as
/// a spline in ln g and a polynomial in sin γ. Requests for such angles alone need no others.
class FurtherRoundTrips {
 public:
  FurtherRoundTrips(const Binder& binder, const TableRequest& request, double low_gap_nm,
                    double high_gap_nm);

  /// The ratio and its derivative by the gap at one of the request's angles.
  SmoothEnergy ratio(double angle_deg, double gap_nm) const;
  /// Relative to the full energy: of the points, which includes that of the first round trip …
  double point_error() const;
  /// … and between gaps and angles.
  double between_error() const { return between_error_; }
  bool positive() const { return positive_; }

 private:
  using Nodes = std::map<double, SmoothEnergy>;  // by angle; 0: the limit

  void add_angles(const Binder& binder, const TableRequest& request);
  void add_limit(const Binder& binder, const TableRequest& request);
  void read_angles(const std::vector<double>& wanted);
  void check_gaps(const Binder& binder, const TableRequest& request);
  SmoothEnergy computed(const PairCurve& curve, double gap_nm);

  std::vector<double> gaps_;
  std::vector<Nodes> nodes_;  // one a gap
  std::map<double, PotentialTerm> at_angle_;
  std::vector<double> point_errors_;
  double between_error_ = 0.0;
  bool positive_ = true;
};

/// E·sin γ for γ → 0 of a parallel dispersion, between two gaps.
PotentialTerm limit_term(const Potential& parallel, double low_gap_nm, double high_gap_nm);

}  // namespace gapwright
