// From how many orders the Bessel recurrences of a shell start.
#pragma once

namespace gapwright {

/// More multipoles than any row at a gap of 0.2 nm uses, always the same at one radius, so that
/// bits do not depend on the window.
inline int usual_orders(double radius_nm) {
  constexpr double orders_per_nm = 64.0;
  return 64 * (1 + int(orders_per_nm * radius_nm / 64));
}

}  // namespace gapwright
