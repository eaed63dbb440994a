#include "shell_integrals.hpp"

#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {

void require_power(const char* function, int power) {
  if (power < 3)
    throw std::domain_error(fmt::format("{}: power = {}, required: >= 3", function, power));
}

double line_factor(int power) {
  double factor = power % 2 == 0 ? constants::pi : 2.0;
  for (int p = power % 2 == 0 ? 2 : 3; p < power; p += 2) factor *= (p - 1.0) / p;
  return factor;
}

CircleSeries circle_series(double s, double z) {
  constexpr double small = 1e-15;
  CircleSeries sum;
  double coefficient = 1.0;  // of z^k, times z^{k-1}
  for (int k = 1;; ++k) {
    const double ratio = (k - s) / k;
    coefficient *= ratio * ratio;
    sum.slope += k * coefficient;
    coefficient *= z;
    sum.value += coefficient;
    // Beyond k = s the terms of both sums fall monotonically, in ratio below z.
    if (k > s && k * coefficient <= small * (1 - z) * sum.value) return sum;
  }
}

}  // namespace gapwright
