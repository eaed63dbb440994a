#include "aligned_scratch.hpp"
#include "further_trips.hpp"
#include "multipole_coupling.hpp"
#include "parallel_kernel.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/math/kernel.hpp>

#include <algorithm>
#include <cmath>
#include <memory>
#include <stdexcept>

namespace gapwright {

const ParallelKernel& parallel_kernel() {
#if defined(__x86_64__)
  if (kernel_variant() == KernelVariant::avx512) return avx512::parallel_kernel;
  if (kernel_variant() == KernelVariant::avx2) return avx2::parallel_kernel;
#endif
  return portable::parallel_kernel;
}

namespace {

/// Further round trips may lose this share of the first one, relative to the tolerance.
constexpr double further_share = 0.03;
/// A frequency whose weight in the sum is small may lose more, up to this factor.
constexpr double most_relief = 10.0;
/// Frequencies whose multipoles are counted together: as many as the widest kernel takes at once.
constexpr int together = 8;
/// ∫dq/2π over both signs of q.
constexpr double both_signs = 1 / constants::pi;

/// Sums over the wave numbers.
struct WaveSums {
  explicit WaveSums(int frequencies)
      : full(std::size_t(frequencies)), halved(std::size_t(frequencies)) {}

  void add(const std::vector<double>& row, double weight, double halved_weight) {
    for (std::size_t k = 0; k < full.size(); ++k) {
      full[k] += weight * row[k];
      halved[k] += halved_weight * row[k];
    }
  }
  std::vector<double> full, halved;
};

FrequencyDensity density_of(const WaveSums& a, const WaveSums* b, int derivatives) {
  FrequencyDensity density{a.full, a.halved, derivatives};
  for (std::size_t k = 0; b && k < a.full.size(); ++k) {
    density.full[k] += b->full[k];
    density.halved[k] += b->halved[k];
  }
  return density;
}

std::vector<double> scales(const Scatterer& body, int j, int orders) {
  std::vector<double> scale;
  for (int m = 0; m < orders; ++m) scale.push_back(body.log_scale(j, m));
  return scale;
}

/// The multipoles of two bodies on the wave numbers of a window.
struct Coupled {
  Coupled(const Scatterer& first, const Scatterer& second, double distance_nm, const Window& wanted,
          bool slope)
      : window(wanted),
        nodes(first.nodes()),
        with_slope(slope),
        weights(trapezoid_weights(nodes.q, window.q, {})),
        importance(frequency_weights(nodes, window.xi)) {
    require(first, second);
    for (int j = 0; j < window.q.count; ++j) {
      const int orders = window.orders[std::size_t(j)];
      scale_1.push_back(scales(first, j + shift(first), orders));
      scale_2.push_back(scales(second, j + shift(second), orders));
      waves.emplace_back(scale_1.back(), scale_2.back(), nodes.q.node(window.q.first + j),
                         distance_nm, slope);
    }
  }

  int shift(const Scatterer& body) const { return window.q.first - body.window().q.first; }

  void require(const Scatterer& first, const Scatterer& second) const {
    for (const Scatterer* part : {&first, &second})
      if (!part->window().covers(window) || part->channel() != Channel::outward)
        throw std::invalid_argument(
            "ParallelCoupling: outward scatterers on the window are required");
    for (std::size_t j = 0; j < waves.size(); ++j)
      if (scales(first, int(j) + shift(first), waves[j].orders) != scale_1[j] ||
          scales(second, int(j) + shift(second), waves[j].orders) != scale_2[j])
        throw std::invalid_argument("ParallelCoupling: scatterers of the same bodies are required");
  }

  Window window;
  Nodes nodes;
  bool with_slope;
  AxisWeights weights;
  std::vector<double> importance;                     // of the frequencies
  std::vector<std::vector<double>> scale_1, scale_2;  // of each wave number
  std::vector<MultipoleCoupling> waves;
};

/// One evaluation for two scatterers.
class Evaluation {
 public:
  Evaluation(const Coupled& coupling, const Scatterer& first, const Scatterer& second)
      : coupling_(coupling),
        first_(first),
        second_(second),
        frequencies_(coupling.window.xi.count),
        scratch_(multipole_scratch(coupling.window.max_order(), coupling.window.max_order())),
        trace(frequencies_),
        trace_slope(frequencies_),
        further(frequencies_),
        further_slope(frequencies_) {}

  /// Shares of the multipoles are what further trips need.
  void first_trips(bool with_shares) {
    std::size_t size = 0;
    for (const MultipoleCoupling& wave : coupling_.waves)
      for (const int odd : {0, 1}) {
        shares_at_.push_back(size);
        size += 2 * std::size_t(wave.orders - odd) * std::size_t(frequencies_);
      }
    if (with_shares) shares_.resize(size);
    for (int j = 0; j < coupling_.window.q.count; ++j) {
      start_row();
      for (const int odd : {0, 1})
        if (const MultipoleBlock block = this->block(j, odd); block.rows > 0)
          parallel_kernel().first_trip(block);
      add(j, trace, row_);
      add(j, trace_slope, slope_row_);
    }
  }

  /// False when a determinant was not positive.
  bool further_trips() {
    bool positive = true;
    const std::vector<double> loss = allowed_loss();
    std::vector<double> allowed(loss.size());
    for (int j = 0; j < coupling_.window.q.count; ++j) {
      start_row();
      const double weight = coupling_.weights.full[std::size_t(j)];
      for (std::size_t k = 0; k < loss.size(); ++k) allowed[k] = loss[k] / weight;
      for (const int odd : {0, 1})
        if (const MultipoleBlock block = this->block(j, odd); block.rows > 0)
          positive = further_trips(block, allowed) && positive;
      add(j, further, row_);
      add(j, further_slope, slope_row_);
    }
    return positive;
  }

 private:
  bool further_trips(MultipoleBlock block, const std::vector<double>& allowed) const {
    bool positive = true;
    for (; block.start < frequencies_; block.start += together) {
      block.frequencies = std::min(together, frequencies_ - block.start);
      const LeadingPart leading = leading_part(block, allowed);
      if (leading.rows == 0 || leading.columns == 0) continue;
      MultipoleBlock part = block;
      part.rows = leading.rows;
      part.columns = leading.columns;
      positive = parallel_kernel().further_trips(part) && positive;
    }
    return positive;
  }

  void start_row() {
    row_.assign(std::size_t(frequencies_), 0.0);
    slope_row_.assign(std::size_t(frequencies_), 0.0);
  }
  void add(int j, WaveSums& sums, const std::vector<double>& row) const {
    sums.add(row, coupling_.weights.full[std::size_t(j)], coupling_.weights.halved[std::size_t(j)]);
  }

  MultipoleBlock block(int j, int odd) {
    const MultipoleCoupling& wave = coupling_.waves[std::size_t(j)];
    t1_.clear();
    t2_.clear();
    for (int m = odd; m < wave.orders; ++m) {
      t1_.push_back(cell(first_, j, m));
      t2_.push_back(cell(second_, j, m));
    }
    MultipoleBlock block;
    block.rows = block.columns = block.stride = wave.orders - odd;
    block.frequencies = block.share_stride = frequencies_;
    block.coupling = (odd ? wave.odd : wave.even).data();
    if (coupling_.with_slope)
      block.coupling_slope = (odd ? wave.odd_slope : wave.even_slope).data();
    block.first = t1_.data();
    block.second = t2_.data();
    block.weight = both_signs;
    block.scratch = scratch_.data();
    if (!shares_.empty()) {
      block.row_share = shares_.data() + shares_at_[std::size_t(2 * j + odd)];
      block.column_share = block.row_share + block.rows * frequencies_;
    }
    block.trace = block.further = row_.data();
    block.trace_slope = block.further_slope = slope_row_.data();
    return block;
  }

  const double* cell(const Scatterer& body, int j, int m) const {
    const int skipped = coupling_.window.xi.first - body.window().xi.first;
    return body.reduced(j + coupling_.shift(body), m).data() + skipped;
  }

  /// What -ln det of one block may lose at each frequency, times the weight of its wave number: an
  /// equal part of what the frequency may lose.
  std::vector<double> allowed_loss() const {
    const double share = further_share * coupling_.nodes.tolerance;
    const std::vector<double>& weight = coupling_.importance;
    double energy = 0.0;
    for (std::size_t k = 0; k < weight.size(); ++k) energy += weight[k] * std::fabs(trace.full[k]);
    const double blocks = 2.0 * coupling_.window.q.count * both_signs;
    std::vector<double> loss;
    for (std::size_t k = 0; k < weight.size(); ++k) {
      const double own = std::fabs(trace.full[k]);
      const double even_part = energy / (double(weight.size()) * weight[k]);
      loss.push_back(share * std::clamp(even_part, own, most_relief * own) / blocks);
    }
    return loss;
  }

  const Coupled& coupling_;
  const Scatterer& first_;
  const Scatterer& second_;
  int frequencies_;
  AlignedScratch scratch_;
  std::vector<const double*> t1_, t2_;
  std::vector<double> shares_;          // of rows, then of columns, [multipole][frequency]
  std::vector<std::size_t> shares_at_;  // where those of a wave number and parity begin
  std::vector<double> row_, slope_row_;

 public:
  WaveSums trace, trace_slope, further, further_slope;
};

}  // namespace

struct ParallelCoupling::Impl : Coupled {
  using Coupled::Coupled;
};

ParallelCoupling::ParallelCoupling(const Scatterer& first, const Scatterer& second,
                                   double distance_nm, const Window& window, bool with_slope)
    : impl_(std::make_unique<Impl>(first, second, distance_nm, window, with_slope)) {}
ParallelCoupling::~ParallelCoupling() = default;

ParallelDensity ParallelCoupling::density(const Scatterer& first, const Scatterer& second,
                                          FurtherTrips further) const {
  impl_->require(first, second);
  Evaluation evaluation(*impl_, first, second);
  const bool all = further == FurtherTrips::included;
  evaluation.first_trips(all);
  ParallelDensity density;
  if (all) density.positive = evaluation.further_trips();
  density.first_round_trip = density_of(evaluation.trace, nullptr, 0);
  density.energy = density_of(evaluation.trace, all ? &evaluation.further : nullptr, 0);
  density.distance_slope.derivatives = density.first_slope.derivatives = 1;
  if (!impl_->with_slope) return density;
  density.first_slope = density_of(evaluation.trace_slope, nullptr, 1);
  density.distance_slope =
      density_of(evaluation.trace_slope, all ? &evaluation.further_slope : nullptr, 1);
  return density;
}

ParallelDensity parallel_density(const Scatterer& first, const Scatterer& second,
                                 double distance_nm, const Window& window, bool with_slope) {
  return ParallelCoupling(first, second, distance_nm, window, with_slope).density(first, second);
}

}  // namespace gapwright
