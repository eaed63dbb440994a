// The smooth outer end of a table.
#pragma once

#include <gapwright/table/placing.hpp>

namespace gapwright {

/// The cut's switch on the force is 1 up to this share of the cut distance.
inline constexpr double switch_begin = 0.8;

/// S = 1 - x³(10 - 15x + 6x²), x = (D - 0.8r_c)/0.2r_c between 0 and 1, and its derivative by D;
/// curvature stays empty.
Jet outer_switch(double distance_nm, double cut_nm);

/// The function with the switch on its force, -S·dE/dD (METHODS §10): forces below 0.8 r_c stay
/// as they are, energies move by one constant, and both end at zero at r_c.
class OuterCut {
 public:
  /// The cut must lie beyond every singularity of the function: it is called in 0.8 r_c … r_c.
  OuterCut(EnergyFunction function, double cut_nm);

  Jet at(double distance_nm) const;
  double cut_nm() const { return cut_nm_; }
  /// What is added to every energy below 0.8 r_c.
  double shift() const { return shift_; }

 private:
  EnergyFunction function_;
  double cut_nm_;
  double shift_ = 0.0;
  SlopeSpline in_switch_;
};

}  // namespace gapwright
