// Which share of an energy comes from long charge waves along a metallic axis.
#pragma once

#include <algorithm>
#include <cmath>

namespace gapwright {

/// Bound of the share at this gap [nm], found for metallic tubes: near contact the energy comes
/// from waves of the length of the gap, beyond 5 nm from charge waves alone. What is cut at small
/// wave numbers and frequencies counts by this share.
inline double charge_wave_share(double gap_nm) {
  return std::min(1.0, std::pow(gap_nm / 5.0, 1.5));
}

}  // namespace gapwright
