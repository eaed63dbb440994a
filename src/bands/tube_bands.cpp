#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>

#include <algorithm>
#include <cmath>
#include <limits>

namespace gapwright {

namespace {

/// The direct gap 2|F| along one cutting line, squared: smooth also where the gap closes.
class LineGap {
 public:
  LineGap(const SheetHamiltonian& hamiltonian, double c) : hamiltonian_(hamiltonian), c_(c) {}
  double operator()(double z) const { return 4 * std::norm(hamiltonian_.at({c_, z}).coupling_eV); }

 private:
  const SheetHamiltonian& hamiltonian_;
  double c_;
};

struct Minimum {
  double z = 0.0;
  double value = 0.0;
};

/// Least value in a bracket: parabolas through the three best points, else golden sections.
/// Source: Brent, Algorithms for Minimization without Derivatives (1973), chapter 5.
class BrentSearch {
 public:
  BrentSearch(double low, Minimum guess, double high)
      : low_(low), high_(high), tolerance_(1e-13 * (high - low)), best_(guess) {}

  bool done() const {
    return std::abs(best_.z - middle()) <= 2 * tolerance_ - 0.5 * (high_ - low_);
  }
  const Minimum& best() const { return best_; }

  /// Where to look next.
  double proposal() {
    const double vertex = parabola_step();
    if (std::abs(step_before_) > tolerance_ && std::abs(vertex) < 0.5 * std::abs(step_before_) &&
        best_.z + vertex > low_ && best_.z + vertex < high_) {
      step_before_ = step_;
      step_ = vertex;
    } else {
      constexpr double golden = 0.381966011250105;
      step_before_ = (best_.z < middle() ? high_ : low_) - best_.z;
      step_ = golden * step_before_;
    }
    return best_.z + (std::abs(step_) < tolerance_ ? std::copysign(tolerance_, step_) : step_);
  }

  void take(Minimum trial) {
    if (trial.value <= best_.value) {
      (trial.z < best_.z ? high_ : low_) = best_.z;
      third_ = second_;
      second_ = best_;
      best_ = trial;
      return;
    }
    (trial.z < best_.z ? low_ : high_) = trial.z;
    if (trial.value <= second_.value || second_.z == best_.z) {
      third_ = second_;
      second_ = trial;
    } else if (trial.value <= third_.value || third_.z == best_.z || third_.z == second_.z) {
      third_ = trial;
    }
  }

 private:
  double middle() const { return 0.5 * (low_ + high_); }

  /// From the best point to the vertex of the parabola; infinite when there is none.
  double parabola_step() const {
    const double r = (best_.z - second_.z) * (best_.value - third_.value);
    const double q = (best_.z - third_.z) * (best_.value - second_.value);
    if (r == q) return std::numeric_limits<double>::infinity();
    return ((best_.z - second_.z) * r - (best_.z - third_.z) * q) / (2 * (q - r));
  }

  double low_, high_, tolerance_;
  Minimum best_, second_ = best_, third_ = best_;
  double step_ = 0, step_before_ = 0;
};

Minimum minimise(const LineGap& gap, double low, double guess, double high) {
  constexpr int most_steps = 80;
  BrentSearch search(low, {guess, gap(guess)}, high);
  for (int i = 0; i < most_steps && !search.done(); ++i) {
    const double z = search.proposal();
    search.take({z, gap(z)});
  }
  return search.best();
}

/// Direct gaps [eV] at the minima of one line with |z - centre| below reach, each with z.
std::vector<Minimum> line_minima(const LineGap& gap, double centre, double reach, double spacing) {
  std::vector<Minimum> minima;
  const int samples = static_cast<int>(std::ceil(reach / spacing));
  double before = gap(centre - (samples + 1) * spacing);
  double here = gap(centre - samples * spacing);
  for (int i = -samples; i <= samples; ++i) {
    const double z = centre + i * spacing;
    const double after = gap(z + spacing);
    if (here <= before && here <= after) {
      const Minimum minimum = minimise(gap, z - spacing, z, z + spacing);
      minima.push_back({minimum.z, std::sqrt(minimum.value)});
    }
    before = here;
    here = after;
  }
  return minima;
}

/// Sorted, with values that agree to 1e-7 taken once.
std::vector<double> distinct(std::vector<double> energies) {
  std::sort(energies.begin(), energies.end());
  const auto same = [](double a, double b) { return b - a <= 1e-7 * b; };
  energies.erase(std::unique(energies.begin(), energies.end(), same), energies.end());
  return energies;
}

}  // namespace

// The low sub-bands lie where a line c = µ/R passes a Dirac point, and with k → -k one valley
// shows them all. Nine lines and 4/R to either side of K hold those within 4/3R of it; where R is
// so small that this is not close to K, the window covers the whole Brillouin zone.
TubeGaps tube_gaps(const Tube& tube, const HoppingSet& hopping) {
  constexpr int side_lines = 4;
  constexpr double reach = 4.0, spacing = 0.125;  // [1/R]
  const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, hopping);
  const double R = tube.radius_nm;
  const PlaneVector dirac = hamiltonian.dirac_point();
  const int nearest_line = static_cast<int>(std::lround(hamiltonian.lattice().dirac.c * R));

  double dirac_gap = 0;
  std::vector<double> energies;
  for (int offset = -side_lines; offset <= side_lines; ++offset) {
    const LineGap gap(hamiltonian, (nearest_line + offset) / R);
    const auto minima = line_minima(gap, dirac.z, reach / R, spacing / R);
    if (offset == 0 && tube.metallic() && !minima.empty()) {
      const auto away = [&](const Minimum& a, const Minimum& b) {
        return std::abs(a.z - dirac.z) < std::abs(b.z - dirac.z);
      };
      dirac_gap = std::min_element(minima.begin(), minima.end(), away)->value;
    }
    for (const Minimum& minimum : minima) energies.push_back(minimum.value);
  }
  // Below this only the rounding of F is left of a gap that symmetry closes.
  const double closed = 1e-12 * std::abs(hopping.hopping_eV[0]);
  if (dirac_gap < closed) dirac_gap = 0;
  if (tube.metallic()) {
    const double above = std::max(dirac_gap * (1 + 1e-7), closed);
    std::erase_if(energies, [&](double energy) { return energy <= above; });
  }
  energies = distinct(std::move(energies));

  TubeGaps gaps;
  const double nan = std::numeric_limits<double>::quiet_NaN();
  gaps.e11_eV = energies.size() > 0 ? energies[0] : nan;
  gaps.e22_eV = energies.size() > 1 ? energies[1] : nan;
  gaps.band_gap_eV = tube.metallic() ? dirac_gap : gaps.e11_eV;
  return gaps;
}

std::vector<std::array<double, 2>> tube_band_energies(const Tube& tube, const HoppingSet& hopping,
                                                      double k_per_nm) {
  const SheetHamiltonian hamiltonian = tube_hamiltonian(tube, hopping);
  std::vector<std::array<double, 2>> energies;
  energies.reserve(tube.hexagons);
  for (int mu = 0; mu < tube.hexagons; ++mu) {
    const BandState state = hamiltonian.at({mu / tube.radius_nm, k_per_nm});
    const double half_gap = std::abs(state.coupling_eV);
    energies.push_back({state.midpoint_eV - half_gap, state.midpoint_eV + half_gap});
  }
  return energies;
}

double curvature_gap_eV(const Tube& tube, double hopping_eV) {
  const double bond_over_radius = constants::bond_nm / tube.radius_nm;
  return 3 * std::abs(hopping_eV) * bond_over_radius * bond_over_radius *
         std::abs(std::cos(3 * tube.chiral_angle_rad)) / 16;
}

}  // namespace gapwright
