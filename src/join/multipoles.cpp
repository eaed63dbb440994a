#include "multipoles.hpp"

#include <gapwright/join/density.hpp>

#include <cmath>

namespace gapwright {

double multipole_exponent(int m, double x) {
  if (m == 0) return x;
  const double root = std::sqrt(double(m) * m + x * x);
  return root + m * std::log(x / (m + root));
}

int largest_multipole(double q, double near_nm, double far_nm, double limit, int start) {
  const auto exponent = [&](int m) {
    return 2 * (multipole_exponent(m, q * far_nm) - multipole_exponent(m, q * near_nm));
  };
  int m = start;
  while (m > 0 && exponent(m) > limit) --m;
  while (exponent(m + 1) <= limit) ++m;
  return m;
}

int least_multipole(double gap_nm) {
  return far_apart(gap_nm) ? 1 : 0;
}

}  // namespace gapwright
