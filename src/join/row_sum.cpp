#include "row_sum.hpp"

#include "aligned_scratch.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/kernel.hpp>
#include <gapwright/math/parallel.hpp>

#include <array>
#include <cmath>

namespace gapwright {

const RowKernel& row_kernel() {
#if defined(__x86_64__)
  if (kernel_variant() == KernelVariant::avx512) return avx512::row_kernel;
  if (kernel_variant() == KernelVariant::avx2) return avx2::row_kernel;
#endif
  return portable::row_kernel;
}

namespace {

/// Values along one line of a matrix, `step` apart, turned into even ones, then odd ones.
void mirror_line(double* values, std::size_t count, std::size_t step, std::vector<double>& room) {
  const double root = std::sqrt(0.5);
  const std::size_t pairs = count / 2, even = (count + 1) / 2;
  room.resize(count);
  for (std::size_t i = 0; i < pairs; ++i) {
    const double low = values[i * step], high = values[(count - 1 - i) * step];
    room[i] = root * (low + high);
    room[even + i] = root * (low - high);
  }
  if (even > pairs) room[pairs] = values[pairs * step];
  for (std::size_t i = 0; i < count; ++i) values[i * step] = room[i];
}

}  // namespace

void mirror_left(std::vector<double>& matrix, std::size_t left) {
  std::vector<double> room;
  const std::size_t columns = matrix.size() / left;
  for (std::size_t k = 0; k < columns; ++k) mirror_line(matrix.data() + k, left, columns, room);
}

void mirror_right(std::vector<double>& matrix, std::size_t right) {
  std::vector<double> room;
  for (std::size_t at = 0; at < matrix.size(); at += right)
    mirror_line(matrix.data() + at, right, 1, room);
}

RowFactor row_factor(const RowScatterer& body, int j, int xi_shift, bool all, Mirror half,
                     const std::vector<const double*>& dipole) {
  RowFactor factor;
  factor.stride = body.window().xi.count;
  for (const Mirror part : {Mirror::even, Mirror::odd}) {
    if (!all && part != half) continue;
    factor.size[factor.triangles] = body.half_size(part);
    factor.upper[factor.triangles++] = body.factor(j, part).data() + xi_shift;
  }
  factor.diagonals = all ? int(body.rows().size()) : body.half_size(half);
  factor.diagonal = dipole.data();
  return factor;
}

namespace {

void transpose(std::vector<double>& matrix, int rows) {
  if (matrix.empty()) return;
  const std::size_t left = std::size_t(rows), columns = matrix.size() / left;
  std::vector<double> turned(matrix.size());
  for (std::size_t i = 0; i < left; ++i)
    for (std::size_t k = 0; k < columns; ++k) turned[k * left + i] = matrix[i * columns + k];
  matrix.swap(turned);
}

}  // namespace

bool add_row_block(const RowFactor& first, const RowFactor& second, int frequencies,
                   std::vector<double> coupling, std::vector<double> slope,
                   std::vector<std::vector<double>>& sums) {
  const bool turn = first.entries() > second.entries();
  if (turn) {
    transpose(coupling, first.entries());
    transpose(slope, first.entries());
  }
  RowBlock block;
  block.first = turn ? second : first;
  block.second = turn ? first : second;
  block.frequencies = frequencies;
  block.coupling = coupling.data();
  block.coupling_slope = slope.empty() ? nullptr : slope.data();
  block.weight = 1 / constants::pi;  // both signs of q
  block.log_det = sums[0].data();
  block.trace = sums[1].data();
  block.log_det_slope = sums[2].data();
  block.trace_slope = sums[3].data();
  const AlignedScratch scratch(row_scratch(block.first.entries(), block.second.entries()));
  block.scratch = scratch.data();
  return row_kernel().add(block);
}

RowDensity sum_waves(const LogLattice& lattice, const Window& window, bool with_slope,
                     const WaveTerm4& term) {
  const std::size_t frequencies = std::size_t(window.xi.count);
  const AxisWeights weights = trapezoid_weights(lattice, window.q, {});
  std::vector<std::vector<std::vector<double>>> terms(
      std::size_t(window.q.count),
      std::vector<std::vector<double>>(4, std::vector<double>(frequencies, 0.0)));
  std::vector<char> positive(std::size_t(window.q.count), 1);
#pragma omp parallel for schedule(dynamic) num_threads(inner_threads())
  for (int j = 0; j < window.q.count; ++j)
    positive[std::size_t(j)] = term(j, terms[std::size_t(j)]);

  RowDensity density;
  const std::array all = {&density.energy, &density.first_round_trip, &density.distance_slope,
                          &density.first_slope};
  density.distance_slope.derivatives = density.first_slope.derivatives = 1;
  for (std::size_t p = 0; p < (with_slope ? 4U : 2U); ++p) {
    all[p]->full.assign(frequencies, 0.0);
    all[p]->halved.assign(frequencies, 0.0);
    for (std::size_t j = 0; j < terms.size(); ++j)
      for (std::size_t k = 0; k < frequencies; ++k) {
        all[p]->full[k] += weights.full[j] * terms[j][p][k];
        all[p]->halved[k] += weights.halved[j] * terms[j][p][k];
      }
  }
  for (const char good : positive) density.positive = density.positive && good;
  return density;
}

}  // namespace gapwright
