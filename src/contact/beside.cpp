#include "atom_by_shell.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/beside.hpp>

#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

using constants::pi;

/// Trapezoid over half a circle for an even analytic integrand with its nearest pole at i·pole:
/// the error is e^{-n·pole} times the order of the pole.
template <typename Function>
SmoothEnergy half_circle(double pole, Function f) {
  const int count = 12 + int(20.0 / pole);
  SmoothEnergy sum;
  for (int i = 0; i <= count; ++i) {
    const double weight = (i == 0 || i == count ? 1.0 : 2.0) * pi / count;
    const SmoothEnergy value = f(pi * i / count);
    sum.energy += weight * value.energy;
    sum.slope += weight * value.slope;
  }
  return sum;
}

void require_apart(const char* function, double gap) {
  if (!(gap > 0) || !std::isfinite(gap))
    throw std::domain_error(fmt::format("{}: gap = {} nm, required: > 0", function, gap));
}

}  // namespace

SmoothEnergy parallel_energy(const PairFunction& pair, double radius_1_nm, double radius_2_nm,
                             double distance_nm) {
  require_power("parallel_energy", pair.power);
  require_apart("parallel_energy", distance_nm - radius_1_nm - radius_2_nm);
  const AtomByShell atom(pair, radius_1_nm);
  const double d = distance_nm, r = radius_2_nm;
  const double pole = std::acosh((d * d + r * r - radius_1_nm * radius_1_nm) / (2 * d * r));
  const SmoothEnergy sum = half_circle(pole, [&](double angle) {
    const double cosine = std::cos(angle);
    const double s = std::sqrt(d * d + r * r - 2 * d * r * cosine);
    const SmoothEnergy e = atom.at(s);
    return SmoothEnergy{e.energy, e.slope * (d - r * cosine) / s};
  });
  const double front = carbon_density_per_nm2 * r;
  return {front * sum.energy, front * sum.slope};
}

SmoothEnergy over_sheet_energy(const PairFunction& pair, double radius_nm, double gap_nm) {
  require_power("over_sheet_energy", pair.power);
  require_apart("over_sheet_energy", gap_nm);
  const double height = radius_nm + gap_nm;
  const auto sheet = [&](double z) {
    const double steep =
        pair.repulsion_eV_nm12 * 2 / (repulsive_power - 2) * std::pow(z, 2 - repulsive_power);
    const double soft = pair.attraction_eV_nmp * 2 / (pair.power - 2) * std::pow(z, 2 - pair.power);
    return SmoothEnergy{steep - soft,
                        ((pair.power - 2) * soft - (repulsive_power - 2) * steep) / z};
  };
  const SmoothEnergy sum = half_circle(std::acosh(height / radius_nm), [&](double angle) {
    return sheet(height - radius_nm * std::cos(angle));
  });
  const double front = carbon_density_per_nm2 * carbon_density_per_nm2 * pi * radius_nm;
  return {front * sum.energy, front * sum.slope};
}

SmoothEnergy crossed_energy_sine(const PairFunction& pair, double radius_1_nm, double radius_2_nm,
                                 double distance_nm) {
  require_power("crossed_energy_sine", pair.power);
  require_apart("crossed_energy_sine", distance_nm - radius_1_nm - radius_2_nm);
  // y = c·sinh t: the tail falls as a power, the nearest pole of U lies at y = ic.
  const double touching = radius_1_nm + radius_2_nm;
  const double c = std::sqrt(distance_nm * distance_nm - touching * touching);
  constexpr double step = 0.1;
  SmoothEnergy sum;
  for (int i = 0;; ++i) {
    const double y = c * std::sinh(i * step);
    const double s = std::hypot(distance_nm, y);
    const SmoothEnergy u = parallel_energy(pair, radius_1_nm, radius_2_nm, s);
    const double weight = (i == 0 ? 1.0 : 2.0) * step * c * std::cosh(i * step);
    sum.energy += weight * u.energy;
    sum.slope += weight * u.slope * distance_nm / s;
    if (i > 10 && std::fabs(weight * u.energy) < 1e-13 * std::fabs(sum.energy)) return sum;
  }
}

}  // namespace gapwright
