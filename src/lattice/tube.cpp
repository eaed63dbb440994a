#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/tube.hpp>

#include <cmath>
#include <cstdint>
#include <numeric>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {

namespace {

using constants::pi;

// 2(n² + nm + m²) stays below 2³¹ up to here; such a tube is 780 nm wide.
constexpr int largest_index = 10000;

TubeKind shape_of(Chirality c) {
  if (c.n == c.m) return TubeKind::armchair;
  return c.m == 0 ? TubeKind::zigzag : TubeKind::chiral;
}

}  // namespace

double Tube::chiral_angle_deg() const {
  return chiral_angle_rad * 180 / pi;
}

double Tube::atoms_per_nm() const {
  return atoms_per_cell() / period_nm;
}

double Tube::mass_per_nm_zg() const {
  constexpr double zg_per_kg = 1e24;
  return atoms_per_nm() * constants::atom_mass_kg * zg_per_kg;
}

std::string Tube::label() const {
  return fmt::format("({},{})", chirality.n, chirality.m);
}

Tube make_tube(Chirality chirality) {
  const auto [n, m] = chirality;
  if (n < 1 || m < 0 || m > n || n > largest_index)
    throw std::domain_error(
        fmt::format("make_tube: chirality ({},{}), required n >= m >= 0 and 1 <= n <= {}", n, m,
                    largest_index));
  const int length_squared = n * n + n * m + m * m;  // |C_h|²/a²
  const int d_R = std::gcd(2 * n + m, 2 * m + n);
  const double circumference_nm = constants::lattice_nm * std::sqrt(length_squared);

  Tube tube;
  tube.chirality = chirality;
  tube.radius_nm = circumference_nm / (2 * pi);
  tube.chiral_angle_rad = std::atan2(std::numbers::sqrt3 * m, 2 * n + m);
  tube.period_nm = std::numbers::sqrt3 * circumference_nm / d_R;
  tube.hexagons = 2 * length_squared / d_R;
  tube.symmetry = std::gcd(n, m);
  tube.shape = shape_of(chirality);
  return tube;
}

}  // namespace gapwright
