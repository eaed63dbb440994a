#include <gapwright/bands/hamiltonian.hpp>
#include <gapwright/catalog/constants.hpp>

#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {

namespace {

using constants::pi;
using Complex = std::complex<double>;

double dot(PlaneVector a, PlaneVector b) {
  return a.c * b.c + a.z * b.z;
}

double norm(PlaneVector a) {
  return std::hypot(a.c, a.z);
}

Complex phase(double angle) {
  return {std::cos(angle), std::sin(angle)};
}

void require_usable(const HoppingSet& hopping) {
  const std::size_t shells = hopping.hopping_eV.size();
  if (shells < 1 || shells > 3)
    throw std::invalid_argument(
        fmt::format("SheetHamiltonian: hopping_eV of '{}' has {} values, required 1 to 3",
                    hopping.name, shells));
  if (hopping.overlap.size() != shells && !hopping.overlap.empty())
    throw std::invalid_argument(
        fmt::format("SheetHamiltonian: overlap of '{}' has {} values, required {} or none",
                    hopping.name, hopping.overlap.size(), shells));
  if (hopping.hopping_eV[0] == 0)
    throw std::invalid_argument(
        fmt::format("SheetHamiltonian: first hopping of '{}' is 0, required a number other than 0",
                    hopping.name));
}

/// Makes bonds of one neighbour shell with the curvature factor 1 - (δ·ĉ/R)²/8.
class BondMaker {
 public:
  BondMaker(const HoppingSet& hopping, double radius_nm)
      : hopping_(hopping), radius_nm_(hopping.curvature ? radius_nm : 0.0) {}

  Bond operator()(PlaneVector delta, std::size_t shell) const {
    double factor = 1;
    if (radius_nm_ > 0) {
      const double turn = delta.c / radius_nm_;
      factor -= turn * turn / 8;
    }
    const double overlap = hopping_.overlap.empty() ? 0.0 : hopping_.overlap[shell];
    return {delta, factor * hopping_.hopping_eV[shell], factor * overlap};
  }

 private:
  const HoppingSet& hopping_;
  double radius_nm_;
};

/// One Newton step towards F = 0 from the Jacobian of (Re F, Im F).
PlaneVector newton_step(Complex F, Complex F_c, Complex F_z) {
  const double determinant = F_c.real() * F_z.imag() - F_z.real() * F_c.imag();
  return {-(F.real() * F_z.imag() - F_z.real() * F.imag()) / determinant,
          -(F_c.real() * F.imag() - F.real() * F_c.imag()) / determinant};
}

}  // namespace

RotatedLattice rotated_lattice(double chiral_angle_rad) {
  constexpr double a = constants::lattice_nm;
  const double theta = chiral_angle_rad;
  RotatedLattice lattice;
  // C_h lies at +θ from a1, so with ĉ along C_h a1 lies at -θ and a2 at π/3 - θ.
  const PlaneVector a1{a * std::cos(theta), -a * std::sin(theta)};
  const PlaneVector a2{a * std::cos(pi / 3 - theta), a * std::sin(pi / 3 - theta)};
  lattice.primitive = {a1, a2};
  const PlaneVector to_b = (a1 + a2) * (1.0 / 3);
  lattice.neighbours = {to_b, to_b - a2, to_b - a1};
  const double turn = 2 * pi / (a1.c * a2.z - a1.z * a2.c);
  lattice.reciprocal = {PlaneVector{a2.z * turn, -a2.c * turn},
                        PlaneVector{-a1.z * turn, a1.c * turn}};
  lattice.dirac = (lattice.reciprocal[0] - lattice.reciprocal[1]) * (1.0 / 3);
  return lattice;
}

SheetHamiltonian::SheetHamiltonian(const HoppingSet& hopping, const RotatedLattice& lattice,
                                   double radius_nm)
    : lattice_(lattice), onsite_eV_(hopping.onsite_eV) {
  require_usable(hopping);
  simple_ = hopping.nearest_neighbour_only();
  const BondMaker bond(hopping, radius_nm);
  const auto& delta = lattice_.neighbours;
  for (std::size_t j = 0; j < 3; ++j) nearest_[j] = bond(delta[j], 0);
  if (!simple_) {
    between_.assign(nearest_.begin(), nearest_.end());
    if (hopping.hopping_eV.size() > 1)
      for (std::size_t j = 0; j < 3; ++j) within_.push_back(bond(delta[j] - delta[(j + 1) % 3], 1));
    if (hopping.hopping_eV.size() > 2)
      for (std::size_t j = 0; j < 3; ++j) between_.push_back(bond(delta[j] * -2, 2));
    require_positive_overlap(hopping);
  }
  find_dirac_point(hopping);
  if (!simple_) neutrality_eV_ = at(dirac_).midpoint_eV;
}

// At Γ every bond is in phase and at the three M points two of three are opposed: the overlap
// between the sublattices is extreme there.
void SheetHamiltonian::require_positive_overlap(const HoppingSet& hopping) const {
  const auto& [b1, b2] = lattice_.reciprocal;
  for (const PlaneVector k : {PlaneVector{}, b1 * 0.5, b2 * 0.5, (b1 + b2) * 0.5, lattice_.dirac}) {
    const Elements e = elements(k);
    if (!(e.s > std::abs(e.g)))
      throw std::domain_error(fmt::format(
          "SheetHamiltonian: overlap of '{}' has the eigenvalue {:.3g} at k = ({:.4g}, {:.4g}) "
          "nm^-1, required > 0",
          hopping.name, e.s - std::abs(e.g), k.c, k.z));
  }
}

SheetHamiltonian::Elements SheetHamiltonian::elements(PlaneVector k) const {
  // Every bond is a combination of the δ_j, and Σδ_j = 0: two phases give them all.
  std::array<Complex, 3> e;
  e[0] = phase(dot(k, nearest_[0].delta));
  e[1] = phase(dot(k, nearest_[1].delta));
  e[2] = std::conj(e[0] * e[1]);
  Elements sum{onsite_eV_, 1.0, 0.0, 0.0};
  for (std::size_t j = 0; j < within_.size(); ++j) {
    const double cosine = (e[j] * std::conj(e[(j + 1) % 3])).real();
    sum.h += 2 * within_[j].hopping_eV * cosine;
    sum.s += 2 * within_[j].overlap * cosine;
  }
  for (std::size_t j = 0; j < between_.size(); ++j) {
    const Complex factor = j < 3 ? e[j] : std::conj(e[j - 3] * e[j - 3]);
    sum.f += between_[j].hopping_eV * factor;
    sum.g += between_[j].overlap * factor;
  }
  return sum;
}

// With D = s² - |g|², S^{-1/2} = a + b(ĝ; ĝ*) has a² = (s + √D)/2D, b²ĝ² = g²/[2D(s + √D)] and
// 2abĝ = -g/D: no ĝ = g/|g| is left, so F is smooth where g vanishes.
BandState SheetHamiltonian::at(PlaneVector k) const {
  if (simple_) {
    const Complex e0 = phase(dot(k, nearest_[0].delta));
    const Complex e1 = phase(dot(k, nearest_[1].delta));
    return {0.0, nearest_[0].hopping_eV * e0 + nearest_[1].hopping_eV * e1 +
                     nearest_[2].hopping_eV * std::conj(e0 * e1)};
  }
  const auto [h, s, f, g] = elements(k);
  const double D = s * s - std::norm(g);
  const double sum = s + std::sqrt(D);
  const double midpoint = (s * h - (std::conj(g) * f).real()) / D;
  const Complex coupling = (-h * g + 0.5 * sum * f + g * g * std::conj(f) / (2 * sum)) / D;
  return {midpoint - neutrality_eV_, coupling};
}

void SheetHamiltonian::find_dirac_point(const HoppingSet& hopping) {
  constexpr double tolerance = 1e-14;
  constexpr int most_steps = 40;
  const double scale = norm(lattice_.dirac);
  dirac_ = lattice_.dirac;
  double previous = scale;
  for (int step = 0; step < most_steps; ++step) {
    const auto [F_c, F_z] = gradient(dirac_);
    const PlaneVector move = newton_step(at(dirac_).coupling_eV, F_c, F_z);
    const double length = norm(move);
    if (!(length < 0.5 * scale)) break;
    dirac_ = dirac_ + move;
    // Rounding of F keeps the last steps from shrinking further.
    if (length < tolerance * scale || (length < 1e-12 * scale && length >= 0.5 * previous)) return;
    previous = length;
  }
  throw std::domain_error(fmt::format(
      "SheetHamiltonian: hopping '{}' has no Dirac point next to K, required one", hopping.name));
}

std::array<Complex, 2> SheetHamiltonian::gradient(PlaneVector k) const {
  std::array<Complex, 2> slope{};
  if (simple_) {
    for (const Bond& bond : nearest_) {
      const Complex term = Complex(0, bond.hopping_eV) * phase(dot(k, bond.delta));
      slope[0] += bond.delta.c * term;
      slope[1] += bond.delta.z * term;
    }
    return slope;
  }
  const double h = 1e-4 / constants::bond_nm;  // truncation 1e-9: Newton stays all but quadratic
  const auto F = [&](double c, double z) { return at({k.c + c, k.z + z}).coupling_eV; };
  slope[0] = (F(h, 0) - F(-h, 0)) / (2 * h);
  slope[1] = (F(0, h) - F(0, -h)) / (2 * h);
  return slope;
}

SheetHamiltonian tube_hamiltonian(const Tube& tube, const HoppingSet& hopping) {
  return {hopping, rotated_lattice(tube.chiral_angle_rad), tube.radius_nm};
}

}  // namespace gapwright
