#include "fermi_lines.hpp"

#include <gapwright/catalog/constants.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

/// Fermi factors are constant farther than this from the chemical potential, relative to the states
/// nearest to it: e^-15.
constexpr double warm_reach = 15.0;
/// |dE/dz| in units of t·a_cc: 1.5 at the Dirac point, √3 at most; longer hoppings steepen the
/// bands.
constexpr double steepest_slope = 1.75, longer_range = 1.6;
/// Poles weigh more than branch points: panels keep farther from them.
constexpr double pole_share = 0.7;

bool rises(const BranchPoint& a, const BranchPoint& b) {
  return a.z < b.z;
}

}  // namespace

FermiLines::FermiLines(const SheetHamiltonian& hamiltonian, const Occupation& occupation)
    : hamiltonian_(hamiltonian), occupation_(occupation) {
  double largest = 0.0;
  for (const Bond& bond : hamiltonian.nearest())
    largest = std::max(largest, std::fabs(bond.hopping_eV));
  const double scale =
      largest * constants::bond_nm * (hamiltonian.nearest_neighbour_only() ? 1.0 : longer_range);
  steepest_ = steepest_slope * scale;
  pole_distance_ = pole_share * constants::pi * occupation.kT() / steepest_;
}

double FermiLines::energy(double c, double z, int band) const {
  const BandState state = hamiltonian_.at({c, z});
  return state.midpoint_eV + band * std::abs(state.coupling_eV) - occupation_.chemical_potential();
}

double FermiLines::distance(double c, double z) const {
  const BandState state = hamiltonian_.at({c, z});
  const double middle = state.midpoint_eV - occupation_.chemical_potential();
  return std::fabs(std::fabs(middle) - std::abs(state.coupling_eV));
}

double FermiLines::nearest(double c, double from, double to, double best) const {
  const double middle = 0.5 * (from + to), half = 0.5 * (to - from);
  const double here = distance(c, middle);
  best = std::min(best, here);
  const double precision = std::max(0.3 * occupation_.kT(), 0.002 * best);
  if (here - steepest_ * half > best - precision) return best;
  return nearest(c, middle, to, nearest(c, from, middle, best));
}

void FermiLines::append_warm(double c, double from, double to, double limit,
                             std::vector<BranchPoint>& out) const {
  const double middle = 0.5 * (from + to), half = 0.5 * (to - from);
  const double here = distance(c, middle), change = steepest_ * half;
  if (here - change > limit) return;
  if (here + change > limit && half > pole_distance_) {
    append_warm(c, from, middle, limit, out);
    append_warm(c, middle, to, limit, out);
  } else if (!out.empty() && out.back().end() >= from) {
    out.back().length = to - out.back().z;
  } else {
    out.push_back({from, pole_distance_, to - from});
  }
}

void FermiLines::append_crossings(double c, double from, double to, int band,
                                  std::vector<BranchPoint>& out) const {
  constexpr double isolated = 5e-4, smallest = 1e-7, slope_step = 1e-6;
  const double middle = 0.5 * (from + to), half = 0.5 * (to - from);
  if (std::fabs(energy(c, middle, band)) > steepest_ * half || half < smallest) return;
  if (half > isolated || (energy(c, from, band) < 0) == (energy(c, to, band) < 0)) {
    append_crossings(c, from, middle, band, out);
    append_crossings(c, middle, to, band, out);
    return;
  }
  const bool up = energy(c, to, band) >= 0;
  double low = from, high = to;
  for (int i = 0; i < 50; ++i) {
    const double at = 0.5 * (low + high);
    ((energy(c, at, band) >= 0) == up ? high : low) = at;
  }
  const double slope =
      (energy(c, low + slope_step, band) - energy(c, low - slope_step, band)) / (2 * slope_step);
  out.push_back({low, 0.0, 0.0, slope});
}

std::vector<BranchPoint> FermiLines::along(double c, double from, double to, double nearest) const {
  std::vector<BranchPoint> points;
  if (occupation_.kT() > 0) {
    append_warm(c, from, to, nearest + warm_reach * occupation_.kT(), points);
    return points;
  }
  for (const int band : {-1, 1}) append_crossings(c, from, to, band, points);
  std::sort(points.begin(), points.end(), rises);
  return points;
}

std::vector<BranchPoint> with_fermi_points(const std::vector<BranchPoint>& zeros,
                                           const std::vector<BranchPoint>& fermi) {
  std::vector<BranchPoint> points = fermi;
  for (const BranchPoint& zero : zeros) {
    const bool inside = std::any_of(fermi.begin(), fermi.end(), [&](const BranchPoint& part) {
      return part.length > 0 && part.z <= zero.z && zero.z <= part.end();
    });
    if (!inside) points.push_back(zero);
  }
  std::sort(points.begin(), points.end(), rises);
  return points;
}

void add_resonances(const std::vector<BranchPoint>& initial, const std::vector<BranchPoint>& final,
                    double least_xi, std::vector<BranchPoint>& points) {
  constexpr double reach = 7.0, closest = 1e-8;
  for (const BranchPoint& a : initial) {
    if (a.slope == 0) continue;
    for (const BranchPoint& b : final) {
      if (b.slope == 0 || std::fabs(a.z - b.z) > reach || a.slope == b.slope) continue;
      // Of two straight bands; a.slope·(z - a.z) = b.slope·(z - b.z).
      const double z = a.z + b.slope * (a.z - b.z) / (a.slope - b.slope);
      if (std::fabs(z - a.z) < reach)
        points.push_back({z, std::max(closest, least_xi / std::fabs(a.slope - b.slope))});
    }
  }
  std::sort(points.begin(), points.end(), rises);
}

}  // namespace gapwright
