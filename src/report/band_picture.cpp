#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/report/band_picture.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

constexpr int points_drawn = 4000;
constexpr int points_counted = 120000;

using BandsAt = std::vector<std::array<double, 2>>;

// Bands at k_i = i/intervals · π/T, i = 0 … intervals.
std::vector<BandsAt> sampled(const Tube& tube, const HoppingSet& hopping, double edge,
                             int intervals) {
  std::vector<BandsAt> samples;
  for (int i = 0; i <= intervals; ++i)
    samples.push_back(tube_band_energies(tube, hopping, edge * i / intervals));
  return samples;
}

class Histogram {
 public:
  Histogram(double window, int bins)
      : window_(window), width_(2 * window / bins), counts_(static_cast<std::size_t>(bins)) {}

  // Spreads `states` evenly from one energy to the other.
  void add(double from, double to, double states) {
    const double low = std::min(from, to), high = std::max(from, to);
    if (high < -window_ || low >= window_) return;
    if (high - low < 1e-9 * width_) {
      counts_[std::size_t(bin(low))] += states / width_;
      return;
    }
    for (int i = bin(low); i <= bin(high); ++i) {
      const double left = std::max(low, -window_ + i * width_);
      const double right = std::min(high, -window_ + (i + 1) * width_);
      if (right > left) counts_[std::size_t(i)] += states * (right - left) / (high - low) / width_;
    }
  }
  double centre(std::size_t bin) const { return -window_ + (double(bin) + 0.5) * width_; }
  const std::vector<double>& counts() const { return counts_; }

 private:
  int bin(double energy) const {
    const int last = static_cast<int>(counts_.size()) - 1;
    return static_cast<int>(std::clamp(std::floor((energy + window_) / width_), 0.0, double(last)));
  }

  double window_, width_;
  std::vector<double> counts_;
};

void count_states(const Tube& tube, const HoppingSet& hopping, double edge, Histogram& histogram) {
  const int intervals = std::max(32, points_counted / tube.hexagons);
  // Both spins, an interval's share of the zone, of 2N atoms.
  const double states = 2.0 / intervals / tube.atoms_per_cell();
  BandsAt before = tube_band_energies(tube, hopping, 0.0);
  for (int i = 1; i <= intervals; ++i) {
    BandsAt here = tube_band_energies(tube, hopping, edge * i / intervals);
    for (std::size_t mu = 0; mu < here.size(); ++mu)
      for (std::size_t s = 0; s < 2; ++s) histogram.add(before[mu][s], here[mu][s], states);
    before = std::move(here);
  }
}

}  // namespace

BandPicture band_picture(const Tube& tube, const HoppingSet& hopping, double window_eV, int bins) {
  if (!(window_eV > 0) || bins < 1)
    throw std::domain_error("band_picture: window_eV = " + std::to_string(window_eV) +
                            ", bins = " + std::to_string(bins) + ", required both positive");
  BandPicture picture;
  picture.label = tube.label();
  picture.window_eV = window_eV;
  picture.zone_edge_per_nm = constants::pi / tube.period_nm;
  const int intervals = std::clamp(points_drawn / tube.hexagons, 8, 96);
  const auto samples = sampled(tube, hopping, picture.zone_edge_per_nm, intervals);
  for (int i = 0; i <= intervals; ++i) picture.k.push_back(double(i) / intervals);
  for (std::size_t mu = 0; mu < samples.front().size(); ++mu)
    for (std::size_t s = 0; s < 2; ++s) {
      std::vector<double> band;
      for (const BandsAt& sample : samples) band.push_back(sample[mu][s]);
      const bool inside = std::any_of(band.begin(), band.end(),
                                      [&](double e) { return std::fabs(e) <= window_eV; });
      if (inside) picture.bands_eV.push_back(std::move(band));
    }
  Histogram histogram(window_eV, bins);
  count_states(tube, hopping, picture.zone_edge_per_nm, histogram);
  for (std::size_t i = 0; i < histogram.counts().size(); ++i)
    picture.energy_eV.push_back(histogram.centre(i));
  picture.states_per_eV_atom = histogram.counts();
  return picture;
}

}  // namespace gapwright
