#include "row_face.hpp"

#include <gapwright/catalog/constants.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {

RowFace::RowFace(const RowScatterer& ribbon, const Window& window)
    : ribbon_(ribbon),
      frequencies_(window.xi.count),
      first_(window.q.first),
      count_(window.q.count),
      row_(window.q.first - ribbon.window().q.first),
      xi_(window.xi.first - ribbon.window().xi.first) {
  if (!ribbon.window().q.contains(window.q) || !ribbon.window().xi.contains(window.xi))
    throw std::invalid_argument("RowFace: a ribbon on the window is required");
  if (window.q.count < wave_nodes)
    throw std::invalid_argument("RowFace: a window of ten wave numbers is required");
}

std::vector<double> RowFace::wave_of(double across) const {
  // Rows in rising order: the mirror's vectors hold √2 cos and √2 sin, the middle row 1.
  const auto& rows = ribbon_.rows();
  const std::size_t pairs = rows.size() / 2;
  std::vector<double> wave;
  for (std::size_t j = 0; j < pairs; ++j)
    wave.push_back(std::sqrt(2.0) * std::cos(across * rows[j].y_nm));
  if (rows.size() % 2) wave.push_back(1.0);
  for (std::size_t j = 0; j < pairs; ++j)
    wave.push_back(std::sqrt(2.0) * std::sin(across * rows[j].y_nm));
  return wave;
}

void RowFace::charges(int j, const std::vector<double>& wave, std::span<double> out) const {
  const std::size_t stride = std::size_t(ribbon_.window().xi.count), count = out.size();
  std::fill(out.begin(), out.end(), 0.0);
  std::vector<double> total(count);
  const double* weights = wave.data();
  for (const Mirror half : {Mirror::even, Mirror::odd}) {
    const double* at = ribbon_.factor(row_ + j, half).data() + xi_;
    const int size = ribbon_.half_size(half);
    for (int column = 0; column < size; ++column) {
      std::fill(total.begin(), total.end(), 0.0);
      for (int row = 0; row <= column; ++row, at += stride)
        for (std::size_t x = 0; x < count; ++x) total[x] += weights[row] * at[x];
      for (std::size_t x = 0; x < count; ++x) out[x] += total[x] * total[x];
    }
    weights += size;
  }
}

void RowFace::plane_wave(const WavePlace& place, int shift, double /*q*/, double k, double across,
                         double depth, std::span<double> out) const {
  // The stencil moves down at the upper end; below the window the lowest node stands for all.
  const int below = place.below + shift - first_;
  const int down = std::max(0, below + wave_nodes / 2 - (count_ - 1));
  if (down > wave_nodes / 2) {
    std::fill(out.begin(), out.end(), 0.0);
    return;
  }
  const auto& weights = place.weights[std::size_t(down)];
  const int start = below - (wave_nodes / 2 - 1) - down;
  const std::vector<double> wave = wave_of(across);
  std::vector<double> logs(out.size(), 0.0), here(out.size());
  int last = -1;
  for (int i = 0; i < wave_nodes; ++i) {
    const int node = std::max(0, start + i);
    if (node != last) {
      charges(node, wave, here);
      for (double& value : here) value = std::log(std::max(value, 1e-300));
      last = node;
    }
    for (std::size_t x = 0; x < out.size(); ++x) logs[x] += weights[std::size_t(i)] * here[x];
  }
  const double decay = 2 * constants::coulomb_eV_nm * std::exp(-2 * k * depth);
  const double dipoles = k * k * double(ribbon_.rows().size());
  for (std::size_t x = 0; x < out.size(); ++x) {
    const double d = ribbon_.dipole()[std::size_t(xi_) + x];
    out[x] = decay * (std::exp(logs[x]) + dipoles * d * d);
  }
}

void RowFace::at_node(int j, double k, double across, std::span<double> out) const {
  charges(j, wave_of(across), out);
  const double dipoles = k * k * double(ribbon_.rows().size());
  for (std::size_t x = 0; x < out.size(); ++x) {
    const double d = ribbon_.dipole()[std::size_t(xi_) + x];
    out[x] = 2 * constants::coulomb_eV_nm * (out[x] + dipoles * d * d);
  }
}

}  // namespace gapwright
