// Compiled once per instruction set with GAPWRIGHT_KERNEL naming the namespace.
#include "line_kernel.hpp"

#include <bit>
#include <cmath>
#include <cstdint>

namespace gapwright::GAPWRIGHT_KERNEL {
namespace {

#if defined(__AVX512F__)
constexpr int vector_bytes = 64;
#elif defined(__AVX2__)
constexpr int vector_bytes = 32;
#else
constexpr int vector_bytes = 16;
#endif

/// sin and cos of 2π·turns by quarter-turn reduction and Taylor series on |θ| <= π/4: to 1e-16, or
/// to 4e-13 with two terms fewer.
template <bool full>
inline void sincos_turns(double turns, double& sine, double& cosine) {
  constexpr double round_constant = 6755399441055744.0;  // 1.5·2^52: adding it rounds
  const double quarters = 4.0 * turns;
  const double shifted = quarters + round_constant;
  const double nearest = shifted - round_constant;
  const double theta = (quarters - nearest) * 1.5707963267948966;
  const double t = theta * theta;
  double s = 1.0 / 6227020800.0, c = 1.0 / 479001600.0;
  if constexpr (full) {
    s += t * (-1.0 / 1307674368000.0);
    c += t * (-1.0 / 87178291200.0 + t / 20922789888000.0);
  }
  s = 1.0 / 362880 + t * (-1.0 / 39916800 + t * s);
  s = theta * (1 + t * (-1.0 / 6 + t * (1.0 / 120 + t * (-1.0 / 5040 + t * s))));
  c = 1.0 / 40320 + t * (-1.0 / 3628800 + t * c);
  c = 1 + t * (-1.0 / 2 + t * (1.0 / 24 + t * (-1.0 / 720 + t * c)));
  // nearest mod 4 without integer conversion: half = nearest/2 rounded down, odd = its remainder.
  const double half = (0.5 * nearest - 0.25 + round_constant) - round_constant;
  const double odd = nearest - 2.0 * half;  // 0 or 1
  const double half_odd = half - 2.0 * ((0.5 * half - 0.25 + round_constant) - round_constant);
  const double sign = 1.0 - 2.0 * half_odd;
  sine = sign * (odd != 0.0 ? c : s);
  cosine = sign * (odd != 0.0 ? -s : c);
}

template <bool full, bool with_levels>
inline void nodes_of_line(const LineBonds& bonds, const double* __restrict z,
                          const double* __restrict w, int count, double* __restrict strength,
                          double* __restrict energy2, double* __restrict levels) {
  const double t0 = bonds.hopping[0], t1 = bonds.hopping[1], t2 = bonds.hopping[2];
  const double a0 = bonds.turns[0], a1 = bonds.turns[1];
  const double b0 = bonds.turns_per_z[0], b1 = bonds.turns_per_z[1];
  const double u0 = bonds.shift[0].real(), v0 = bonds.shift[0].imag();
  const double u1 = bonds.shift[1].real(), v1 = bonds.shift[1].imag();
  const double u2 = bonds.shift[2].real(), v2 = bonds.shift[2].imag();
#pragma GCC ivdep
  for (int i = 0; i < count; ++i) {
    double s0, c0, s1, c1;
    sincos_turns<full>(a0 + b0 * z[i], s0, c0);
    sincos_turns<full>(a1 + b1 * z[i], s1, c1);
    // The three bonds add up to zero, so the third phase is the conjugate of the product.
    const double c2 = c0 * c1 - s0 * s1, s2 = -(s0 * c1 + c0 * s1);
    const double x0 = t0 * c0, y0 = t0 * s0, x1 = t1 * c1, y1 = t1 * s1, x2 = t2 * c2, y2 = t2 * s2;
    const double fx = x0 + x1 + x2, fy = y0 + y1 + y2;
    const double dx = (x0 * u0 - y0 * v0) + (x1 * u1 - y1 * v1) + (x2 * u2 - y2 * v2);
    const double dy = (x0 * v0 + y0 * u0) + (x1 * v1 + y1 * u1) + (x2 * v2 + y2 * u2);
    const double gx = fx + dx, gy = fy + dy;
    const double f2 = fx * fx + fy * fy, g2 = gx * gx + gy * gy;
    const double f = std::sqrt(f2), g = std::sqrt(g2);
    const double sum = f + g, product = f * g;
    // W = ½(1 - cos Δφ), Δφ between f and f + Δf; the sine form keeps it for small shifts.
    const double scalar = fx * gx + fy * gy;
    const double vector = fx * dy - fy * dx;
    const bool small = scalar > 0;
    const double overlap = (small ? vector * vector : product - scalar) /
                           ((small ? product + scalar : 1.0) * (2 * product));
    strength[i] = w[i] * overlap * sum;
    energy2[i] = sum * sum;
    if constexpr (with_levels) {
      levels[i] = f;
      levels[count + i] = g;
      levels[2 * count + i] = -((fx + gx) * dx + (fy + gy) * dy) / sum;
      levels[3 * count + i] = overlap;
    }
  }
}

template <bool full>
void transitions(const LineBonds& bonds, const double* z, const double* w, int count,
                 double* strength, double* energy2) {
  nodes_of_line<full, false>(bonds, z, w, count, strength, energy2, nullptr);
}

template <bool full>
void levels(const LineBonds& bonds, const double* z, const double* w, int count, double* strength,
            double* energy2, double* level_values) {
  nodes_of_line<full, true>(bonds, z, w, count, strength, energy2, level_values);
}

/// e^x to 1e-15, x cut to ±700.
inline double exponential(double x) {
  constexpr double round_constant = 6755399441055744.0;  // 1.5·2^52
  constexpr double per_bit = 1.4426950408889634;
  constexpr double bit_high = 0.693147180369123816490, bit_low = 1.90821492927058770002e-10;
  x = x < -700.0 ? -700.0 : x;
  x = x > 700.0 ? 700.0 : x;
  const double shifted = x * per_bit + round_constant;
  const double bits = shifted - round_constant;
  const double r = (x - bits * bit_high) - bits * bit_low;
  double p = 1.0 / 479001600.0;
  p = 1.0 / 3628800 + r * (1.0 / 39916800 + r * p);
  p = 1.0 / 40320 + r * (1.0 / 362880 + r * p);
  p = 1.0 / 720 + r * (1.0 / 5040 + r * p);
  p = 1.0 / 24 + r * (1.0 / 120 + r * p);
  p = 1 + r * (1 + r * (0.5 + r * (1.0 / 6 + r * p)));
  const auto exponent = (std::bit_cast<std::uint64_t>(shifted) + 1023) << 52;
  return p * std::bit_cast<double>(exponent);
}

template <bool doped>
void fermi_factors(const double* __restrict f, const double* __restrict g,
                   const double* __restrict change, int count, double mu, double kT,
                   double* __restrict across, double* __restrict within) {
  const double beta = 1 / kT;
#pragma GCC ivdep
  for (int i = 0; i < count; ++i) {
    const double low = f[i] < g[i] ? f[i] : g[i], high = f[i] < g[i] ? g[i] : f[i];
    const double n_low = 1 / (1 + exponential((low - mu) * beta));
    const double n_high = 1 / (1 + exponential((high - mu) * beta));
    const double p_low = doped ? 1 / (1 + exponential((low + mu) * beta)) : n_low;
    const double p_high = doped ? 1 / (1 + exponential((high + mu) * beta)) : n_high;
    const double x = std::fabs(change[i]) * beta;
    const double series =
        1 - x * (0.5 - x * (1.0 / 6 - x * (1.0 / 24 - x * (1.0 / 120 - x * (1.0 / 720)))));
    const double direct = (1 - exponential(-x)) / (x < 0.05 ? 1.0 : x);
    const double share = x < 0.05 ? series : direct;
    across[i] = 1 - 0.5 * (n_low + n_high + p_low + p_high);
    within[i] = (n_low * (1 - n_high) + p_low * (1 - p_high)) * share * beta;
  }
}

void factors(const double* f, const double* g, const double* change, int count, double mu,
             double kT, double* across, double* within) {
  (mu == 0 ? fermi_factors<false> : fermi_factors<true>)(f, g, change, count, mu, kT, across,
                                                         within);
}

template <typename Real>
void accumulate(const double* strength, const double* energy2, int count, const double* xi2,
                int frequencies, double* sum) {
  constexpr int lanes = vector_bytes / int(sizeof(Real));
  constexpr int group = 4;  // vectors of frequencies held in registers
  constexpr int block = 32;
  typedef Real Vector __attribute__((vector_size(vector_bytes)));
  for (int first = 0; first < frequencies; first += lanes * group) {
    Vector x[group];
    for (int v = 0; v < group; ++v)
      for (int l = 0; l < lanes; ++l) {
        const int index = first + v * lanes + l;
        x[v][l] = index < frequencies ? Real(xi2[index]) : Real(1);
      }
    const int used = (frequencies - first + lanes - 1) / lanes;
    for (int start = 0; start < count; start += block) {
      const int stop = start + block < count ? start + block : count;
      Vector acc[group] = {};
      if (used >= group) {
        int i = start;
        for (; i + 1 < stop; i += 2) {
          const Vector a = Vector{} + Real(strength[i]), c = Vector{} + Real(strength[i + 1]);
          const Vector b = Vector{} + Real(energy2[i]), d = Vector{} + Real(energy2[i + 1]);
          for (int v = 0; v < group; ++v) {
            const Vector p = b + x[v], q = d + x[v];
            acc[v] += (a * q + c * p) / (p * q);
          }
        }
        for (; i < stop; ++i) {
          const Vector a = Vector{} + Real(strength[i]);
          const Vector b = Vector{} + Real(energy2[i]);
          for (int v = 0; v < group; ++v) acc[v] += a / (b + x[v]);
        }
      } else {
        int i = start;
        for (; i + 1 < stop; i += 2) {
          const Vector a = Vector{} + Real(strength[i]), c = Vector{} + Real(strength[i + 1]);
          const Vector b = Vector{} + Real(energy2[i]), d = Vector{} + Real(energy2[i + 1]);
          for (int v = 0; v < used; ++v) {
            const Vector p = b + x[v], q = d + x[v];
            acc[v] += (a * q + c * p) / (p * q);
          }
        }
        for (; i < stop; ++i) {
          const Vector a = Vector{} + Real(strength[i]);
          const Vector b = Vector{} + Real(energy2[i]);
          for (int v = 0; v < used; ++v) acc[v] += a / (b + x[v]);
        }
      }
      for (int v = 0; v < group && v < used; ++v)
        for (int l = 0; l < lanes; ++l) {
          const int index = first + v * lanes + l;
          if (index < frequencies) sum[index] += double(acc[v][l]);
        }
    }
  }
}

}  // namespace

extern const LineKernel line_kernel;
const LineKernel line_kernel{transitions<false>, transitions<true>, levels<false>,
                             levels<true>,       factors,           accumulate<float>,
                             accumulate<double>};

}  // namespace gapwright::GAPWRIGHT_KERNEL
