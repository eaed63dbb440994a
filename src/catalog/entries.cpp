#include <gapwright/catalog/entries.hpp>

#include <algorithm>

namespace gapwright {
namespace {

double oscillator(double strength_nm, double energy_eV, double xi_eV) {
  const double x = xi_eV / energy_eV;
  return strength_nm / (1.0 + x * x);
}

}  // namespace

bool HoppingSet::nearest_neighbour_only() const {
  const auto zero = [](double x) { return x == 0.0; };
  return !hopping_eV.empty() && std::all_of(hopping_eV.begin() + 1, hopping_eV.end(), zero) &&
         std::all_of(overlap.begin(), overlap.end(), zero);
}

double Background::in_plane_nm(double xi_eV) const {
  return oscillator(in_plane_strength_nm, in_plane_energy_eV, xi_eV);
}

double Background::normal_nm(double xi_eV) const {
  return oscillator(normal_strength_nm, normal_energy_eV, xi_eV);
}

}  // namespace gapwright
