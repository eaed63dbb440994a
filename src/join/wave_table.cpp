#include "wave_table.hpp"

#include "multipoles.hpp"

#include <gapwright/math/kernel.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

const CrossedKernel& crossed_kernel() {
#if defined(__x86_64__)
  if (kernel_variant() == KernelVariant::avx512) return avx512::crossed_kernel;
  if (kernel_variant() == KernelVariant::avx2) return avx2::crossed_kernel;
#endif
  return portable::crossed_kernel;
}

WavePlace::WavePlace(double log_q, double step) {
  const double x = log_q / step;
  below = int(std::floor(x));
  const double fraction = x - below;
  above = fraction > 0;
  for (std::size_t moved = 0; moved < weights.size(); ++moved)
    for (int i = 0; i < wave_nodes; ++i) {
      double weight = 1.0;
      // Nodes stand at wave_nodes/2 - 1 + moved below, in steps, and upwards.
      const double at = fraction + wave_nodes / 2 - 1 + double(moved);
      for (int l = 0; l < wave_nodes; ++l)
        if (l != i) weight *= (at - l) / (i - l);
      weights[moved][std::size_t(i)] = weight;
    }
}

WaveTable::WaveTable(const Scatterer& scatterer, const Window& window, int lowest_index)
    : radius_(scatterer.radius_nm()),
      tolerance_(scatterer.nodes().tolerance),
      frequencies_(window.xi.count),
      orders_(window.max_order()) {
  if (scatterer.channel() != Channel::outward || !scatterer.window().covers(window))
    throw std::invalid_argument("WaveTable: an outward scatterer on the window is required");
  first_ = std::min(lowest_index, window.q.first) - wave_nodes / 2;
  const std::size_t rows = std::size_t(window.q.end() - first_);
  curves_.assign(rows * std::size_t(orders_) * std::size_t(frequencies_), 0.0);
  scales_.assign(rows * std::size_t(orders_), 0.0);
  sign_.assign(std::size_t(orders_) * std::size_t(frequencies_), 0.0);
  linear_.assign(sign_.size(), 0.0);
  for (int m = 0; m < orders_; ++m) fill(m, scatterer, window);
}

void WaveTable::fill(int m, const Scatterer& scatterer, const Window& window) {
  const int start = window.q.first - first_;
  int count = 0;
  while (count < window.q.count && window.orders[std::size_t(count)] > m) ++count;
  last_row_.push_back(start + count - 1);
  const int shift = window.q.first - scatterer.window().q.first;
  const int xi = window.xi.first - scatterer.window().xi.first;
  for (int j = 0; j < count; ++j) {
    const double q = scatterer.nodes().q.node(window.q.first + j);
    scales_[cell(start + j, m)] =
        scatterer.log_scale(j + shift, m) - 2 * multipole_exponent(m, q * radius_);
  }
  const std::size_t frequencies = std::size_t(frequencies_);
  for (std::size_t k = 0; k < frequencies; ++k) {
    const auto value = [&](int j) { return scatterer.reduced(j + shift, m)[std::size_t(xi) + k]; };
    bool same_sign = value(0) != 0;
    for (int j = 1; j < count; ++j) same_sign = same_sign && value(j) * value(0) > 0;
    const std::size_t curve = std::size_t(m) * frequencies + k;
    sign_[curve] = !same_sign ? 0.0 : (value(0) > 0 ? 1.0 : -1.0);
    linear_[curve] = same_sign ? 0.0 : 1.0;
    for (int j = 0; j < count; ++j)
      curves_[cell(start + j, m) * frequencies + k] =
          same_sign ? std::log(std::fabs(value(j))) : value(j);
  }
  continue_below(m, start, count > 1);
}

void WaveTable::continue_below(int m, int start, bool two_rows) {
  const std::size_t frequencies = std::size_t(frequencies_);
  for (int r = start - 1; r >= 0; --r) {
    const std::size_t here = cell(r, m), next = cell(r + 1, m), after = cell(r + 2, m);
    const bool power = m == 0 && two_rows;
    scales_[here] = power ? 2 * scales_[next] - scales_[after] : scales_[next];
    for (std::size_t k = 0; k < frequencies; ++k) {
      const double value = curves_[next * frequencies + k];
      const bool log_curve = linear_[std::size_t(m) * frequencies + k] == 0;
      curves_[here * frequencies + k] =
          power && log_curve ? 2 * value - curves_[after * frequencies + k] : value;
    }
  }
}

int WaveTable::moved(int m, int r) const {
  return std::max(0, r + wave_nodes / 2 - last_row_[std::size_t(m)]);
}

double WaveTable::log_scale(const WavePlace& place, int r, int m, double q) const {
  const int down = moved(m, r);
  const auto& weights = place.weights[std::size_t(down)];
  const int start = r - (wave_nodes / 2 - 1) - down;
  double sum = 2 * multipole_exponent(m, q * radius_);
  for (int i = 0; i < wave_nodes; ++i) sum += weights[std::size_t(i)] * scales_[cell(start + i, m)];
  return sum;
}

WaveTerm WaveTable::term(const WavePlace& place, int r, int m, double factor) const {
  const int down = moved(m, r);
  const std::size_t curve = std::size_t(m) * std::size_t(frequencies_);
  const std::size_t start = cell(r - (wave_nodes / 2 - 1) - down, m);
  return {curves_.data() + start * std::size_t(frequencies_),
          place.weights[std::size_t(down)].data(), sign_.data() + curve, linear_.data() + curve,
          factor};
}

void WaveTable::plane_wave(const WavePlace& place, int shift, double q, double k, double across,
                           double depth, std::span<double> out) const {
  const int r = place.below + shift - first_;
  const double eta = std::asinh(std::fabs(across) / q);
  const double cut = std::log(1e3 / tolerance_);
  std::vector<WaveTerm> terms;
  terms.reserve(std::size_t(orders_));
  double largest = -1e300;
  for (int m = 0; m < orders_ && holds(place, r, m); ++m) {
    const double exponent = log_scale(place, r, m, q) + 2 * m * eta - 2 * k * depth;
    // T_0 alone vanishes with q: it says nothing about the others.
    if (m > 0 && exponent < largest - cut) break;
    if (m > 0) largest = std::max(largest, exponent);
    terms.push_back(
        term(place, r, m, std::exp(exponent) * (m == 0 ? 1.0 : 1.0 + std::exp(-4 * m * eta))));
  }
  crossed_kernel().sum(terms.data(), int(terms.size()), long(orders_) * frequencies_, frequencies_,
                       out.data());
}

int WaveTable::multipoles(const WavePlace& place, double q, std::vector<double>& reduced,
                          std::vector<double>& scale) const {
  const int r = place.below - first_;
  int count = 0;
  while (count < orders_ && holds(place, r, count)) ++count;
  reduced.assign(std::size_t(count) * std::size_t(frequencies_), 0.0);
  scale.resize(std::size_t(count));
  for (int m = 0; m < count; ++m) {
    scale[std::size_t(m)] = log_scale(place, r, m, q);
    const WaveTerm one = term(place, r, m, 1.0);
    crossed_kernel().sum(&one, 1, long(orders_) * frequencies_, frequencies_,
                         reduced.data() + std::size_t(m) * std::size_t(frequencies_));
  }
  return count;
}

}  // namespace gapwright
