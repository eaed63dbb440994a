#include "ribbon_states.hpp"

#include <gapwright/bands/ribbon_bands.hpp>
#include <gapwright/catalog/constants.hpp>

#include <algorithm>
#include <cmath>
#include <limits>

namespace gapwright {

namespace {

using constants::pi;

constexpr int bands_followed = 2;

double dirac_wave(const Ribbon& ribbon) {
  return ribbon.edge == RibbonEdge::armchair ? 0.0 : 2 * pi / (3 * ribbon.period_nm());
}

/// Further from the Dirac point than this the bulk sub-bands of a ribbon only rise.
double bulk_reach(const Ribbon& ribbon) {
  return 12 / ribbon.width_nm();
}

/// From k = 0 to π/period, dense about the point where graphene's Dirac cones fold to. Left out is
/// what has neither a minimum of the bulk nor, for zigzag, the bands of the edges.
std::vector<double> sample_waves(const Ribbon& ribbon) {
  constexpr double ratio = 1.5;
  const double zone = pi / ribbon.period_nm(), dirac = dirac_wave(ribbon);
  const double low = std::max(0.0, dirac - bulk_reach(ribbon));
  const double high = ribbon.edge == RibbonEdge::zigzag ? zone : std::min(zone, bulk_reach(ribbon));
  const double widest = zone / 24;
  std::vector<double> waves{low, dirac, high};
  for (const double side : {-1.0, 1.0}) {
    double reach = 0.1 / ribbon.width_nm();
    for (double k = dirac + side * reach; k > low && k < high; k = dirac + side * reach) {
      waves.push_back(k);
      reach += std::min((ratio - 1) * reach, widest);
    }
  }
  std::sort(waves.begin(), waves.end());
  waves.erase(std::unique(waves.begin(), waves.end()), waves.end());
  return waves;
}

/// The energies that follow one sector; mirrored at both ends of the half zone.
class SectorBands {
 public:
  SectorBands(const RibbonHamiltonian& hamiltonian, int sector)
      : hamiltonian_(hamiltonian),
        sector_(sector),
        count_(std::min(bands_followed, hamiltonian.sector_size(sector) / 2)) {}

  int count() const { return count_; }
  /// The lowest bands, infinite where they are not followed.
  std::vector<double> at(double k) const {
    const Ribbon& ribbon = hamiltonian_.ribbon();
    const bool bulk = std::abs(k - dirac_wave(ribbon)) <= bulk_reach(ribbon);
    auto energies = conduction_energies_eV(hamiltonian_, sector_, k, bulk ? count_ : 1);
    energies.resize(static_cast<std::size_t>(count_), std::numeric_limits<double>::infinity());
    return energies;
  }
  double at(double k, int band) const {
    return conduction_energies_eV(hamiltonian_, sector_, k, band + 1)[band];
  }

 private:
  const RibbonHamiltonian& hamiltonian_;
  int sector_;
  int count_;
};

struct Minimum {
  double wave = 0.0;
  double energy_eV = std::numeric_limits<double>::infinity();
};

/// Golden sections of a bracket, to an error of 1e-9 of E at a minimum whose bend is the bracket's.
Minimum refine(const SectorBands& bands, int band, double low, double high) {
  constexpr double golden = 0.6180339887498949;
  constexpr int sections = 26;
  const auto energy = [&](double k) { return bands.at(k, band); };
  double left = high - golden * (high - low), right = low + golden * (high - low);
  double at_left = energy(left), at_right = energy(right);
  for (int i = 0; i < sections; ++i) {
    if (at_left < at_right) {
      high = right;
      right = left;
      at_right = at_left;
      left = high - golden * (high - low);
      at_left = energy(left);
    } else {
      low = left;
      left = right;
      at_left = at_right;
      right = low + golden * (high - low);
      at_right = energy(right);
    }
  }
  return at_left < at_right ? Minimum{left, at_left} : Minimum{right, at_right};
}

void add_minima(const SectorBands& bands, const std::vector<double>& waves,
                std::vector<Minimum>& minima) {
  std::vector<std::vector<double>> energies;
  for (const double k : waves) energies.push_back(bands.at(k));
  const std::size_t last = waves.size() - 1;
  for (int band = 0; band < bands.count(); ++band)
    for (std::size_t i = 0; i <= last; ++i) {
      const double here = energies[i][band];
      const double before = energies[i == 0 ? 1 : i - 1][band];
      const double after = energies[i == last ? last - 1 : i + 1][band];
      if (here > before || here > after || std::isinf(here)) continue;
      Minimum best{waves[i], here};
      if (i > 0 && i < last) {
        const Minimum inside = refine(bands, band, waves[i - 1], waves[i + 1]);
        if (inside.energy_eV < best.energy_eV) best = inside;
      }
      minima.push_back(best);
    }
}

}  // namespace

RibbonGaps ribbon_gaps(const RibbonHamiltonian& hamiltonian) {
  const std::vector<double> waves = sample_waves(hamiltonian.ribbon());
  std::vector<Minimum> minima;
  for (int sector = 0; sector < hamiltonian.sectors(); ++sector)
    add_minima(SectorBands(hamiltonian, sector), waves, minima);
  std::sort(minima.begin(), minima.end(),
            [](const Minimum& a, const Minimum& b) { return a.energy_eV < b.energy_eV; });

  RibbonGaps gaps;
  // Below this only rounding is left of a gap that symmetry closes.
  const double closed = 1e-9 * hamiltonian.hopping_eV();
  if (minima.front().energy_eV >= closed) gaps.band_gap_eV = 2 * minima.front().energy_eV;
  gaps.gap_wave_per_nm = minima.front().wave;
  std::vector<double> distinct;
  for (const Minimum& minimum : minima)
    if (minimum.energy_eV >= closed &&
        (distinct.empty() || minimum.energy_eV > (1 + 1e-7) * distinct.back()))
      distinct.push_back(minimum.energy_eV);
  const double nan = std::numeric_limits<double>::quiet_NaN();
  gaps.e11_eV = !distinct.empty() ? 2 * distinct[0] : nan;
  gaps.e22_eV = distinct.size() > 1 ? 2 * distinct[1] : nan;
  return gaps;
}

std::vector<double> ribbon_band_energies(const RibbonHamiltonian& hamiltonian, double k_per_nm) {
  std::vector<double> energies;
  for (int sector = 0; sector < hamiltonian.sectors(); ++sector)
    for (const double e : all_energies(hamiltonian.matrix(sector, k_per_nm))) energies.push_back(e);
  std::sort(energies.begin(), energies.end());
  return energies;
}

}  // namespace gapwright
