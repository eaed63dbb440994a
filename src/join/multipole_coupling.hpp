// The coupling of the multipoles of two parallel bodies at one wave number.
#pragma once

#include <vector>

namespace gapwright {

/// K_{m-n} ± K_{m+n} between waves of the scales e^{scale} of either body, as METHODS §5 splits
/// them: e_m = (|m> ± |-m>)/√2.
struct MultipoleCoupling {
  /// Slopes by the distance [nm^-1] where asked for. 1e-12 of the larger term.
  MultipoleCoupling(const std::vector<double>& scale_1, const std::vector<double>& scale_2,
                    double wave_nm, double distance_nm, bool with_slope);

  int orders;                            ///< of either body
  std::vector<double> even, even_slope;  ///< [orders][orders]
  std::vector<double> odd, odd_slope;    ///< [orders-1][orders-1]
};

}  // namespace gapwright
