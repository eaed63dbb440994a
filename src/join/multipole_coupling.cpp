#include "multipole_coupling.hpp"

#include <gapwright/math/bessel.hpp>

#include <cmath>
#include <cstdlib>

namespace gapwright {
namespace {

/// e^{scale/2 + m·tilt}: tilted so that no factor leaves the range of doubles.
std::vector<double> tilted(const std::vector<double>& scale, double tilt) {
  std::vector<double> factor(scale.size());
  for (std::size_t m = 0; m < scale.size(); ++m)
    factor[m] = std::exp(0.5 * scale[m] + double(m) * tilt);
  return factor;
}

}  // namespace

MultipoleCoupling::MultipoleCoupling(const std::vector<double>& scale_1,
                                     const std::vector<double>& scale_2, double wave_nm,
                                     double distance_nm, bool with_slope)
    : orders(int(scale_1.size())) {
  const BesselLogs waves = bessel_logs(wave_nm * distance_nm, 2 * orders);
  const std::size_t count = scale_1.size();
  // ln K rises with the order: its mean rise leaves it for the two scales, which fall as much.
  const double tilt = (waves.log_k.back() - waves.log_k.front()) / double(2 * orders - 1);
  const std::vector<double> one = tilted(scale_1, tilt), other = tilted(scale_2, tilt);
  std::vector<double> k(2 * count), slope(2 * count), fall(count);
  for (std::size_t p = 0; p < k.size(); ++p) {
    k[p] = std::exp(waves.log_k[p] - double(p) * tilt);
    slope[p] = wave_nm * waves.slope_k[p];
  }
  for (std::size_t m = 0; m < count; ++m) fall[m] = std::exp(-2 * double(m) * tilt);
  even.resize(count * count);
  odd.resize((count - 1) * (count - 1));
  if (with_slope) {
    even_slope.resize(even.size());
    odd_slope.resize(odd.size());
  }
  for (std::size_t m = 0; m < count; ++m)
    for (std::size_t n = 0; n < count; ++n) {
      const std::size_t low = m < n ? n - m : m - n, high = m + n;
      const double scale = one[m] * other[n];
      const double minus = scale * fall[m < n ? m : n] * k[low], plus = scale * k[high];
      const double norm = m == 0 && n == 0 ? 0.5 : (m == 0 || n == 0 ? std::sqrt(0.5) : 1.0);
      even[m * count + n] = norm * (minus + plus);
      const bool inside = m > 0 && n > 0;
      const std::size_t at_odd = inside ? (m - 1) * (count - 1) + n - 1 : 0;
      if (inside) odd[at_odd] = minus - plus;
      if (!with_slope) continue;
      const double minus_slope = slope[low] * minus, plus_slope = slope[high] * plus;
      even_slope[m * count + n] = norm * (minus_slope + plus_slope);
      if (inside) odd_slope[at_odd] = minus_slope - plus_slope;
    }
}

}  // namespace gapwright
