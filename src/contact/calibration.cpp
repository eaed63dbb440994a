#include <gapwright/contact/calibration.hpp>
#include <gapwright/math/quadrature.hpp>

#include <array>
#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

// Σ_n w_n E₂(n·d) and its companion of the derivative, Σ_n n E₂'(n·d).
struct StackSums {
  double energy = 0.0;
  double slope = 0.0;

  StackSums& operator+=(const StackSums& other) {
    energy += other.energy;
    slope += other.slope;
    return *this;
  }
};

StackSums operator*(double factor, const StackSums& sums) {
  return {factor * sums.energy, factor * sums.slope};
}

// Sheets up to this one are summed one by one, the rest by Euler and Maclaurin's formula. The
// integral runs in v = 1/n, where the summands divided by their power law are smooth down to v = 0.
constexpr int last_direct = 16;
constexpr int tail_nodes = 12;

class StackSummand {
 public:
  StackSummand(const SheetDispersion& dispersion, double spacing_nm, bool cleavage)
      : dispersion_(dispersion), spacing_nm_(spacing_nm), cleavage_(cleavage) {}

  StackSums operator()(double n) const {
    const SmoothEnergy pair = dispersion_(n * spacing_nm_);
    return {cleavage_ ? n * pair.energy : pair.energy, n * pair.slope};
  }

 private:
  const SheetDispersion& dispersion_;
  double spacing_nm_;
  bool cleavage_;
};

// ∫_N^∞ f(n) dn = ∫_0^{1/N} f(1/v) v^{-2} dv.
StackSums tail_integral(const StackSummand& summand) {
  const GaussRule& rule = gauss_legendre(tail_nodes);
  constexpr double half = 0.5 / last_direct;
  StackSums sum;
  for (int i = 0; i < tail_nodes; ++i) {
    const double v = half * (1 + rule.nodes[i]);
    sum += half * rule.weights[i] / (v * v) * summand(1 / v);
  }
  return sum;
}

// Σ_{n>=1} f(n) = Σ_{n<N} f(n) + ½f(N) + ∫_N^∞ f dn - f'(N)/12 + f'''(N)/720 - …, A&S 23.1.30;
// derivatives by central differences, f' of fourth, f''' of second order.
StackSums stack_sums(const StackSummand& summand) {
  constexpr std::array<double, 5> first = {1.0 / 12, -8.0 / 12, 0, 8.0 / 12, -1.0 / 12};
  constexpr std::array<double, 5> third = {-0.5, 1, 0, -1, 0.5};
  StackSums sum = tail_integral(summand);
  for (int n = 1; n <= last_direct + 2; ++n) {
    double weight = n < last_direct ? 1.0 : n == last_direct ? 0.5 : 0.0;
    const int k = n - last_direct + 2;
    if (k >= 0) weight += third[k] / 720 - first[k] / 12;
    sum += weight * summand(n);
  }
  return sum;
}

// Riemann's ζ(5), ζ(6), ζ(9), ζ(10): Σ n^{-p}, A&S table 23.3.
constexpr double zeta_5 = 1.036927755143369926;
constexpr double zeta_6 = 1.017343061984449140;
constexpr double zeta_9 = 1.002008392826082214;
constexpr double zeta_10 = 1.000994575127818085;

// What the sums over sheets make of the contact terms d^{-10} and d^{-6}.
struct ContactWeights {
  double repulsion, repulsion_slope;
  double attraction, attraction_slope;
};

ContactWeights contact_weights(TargetKind kind) {
  switch (kind) {
    case TargetKind::stack:
      return {zeta_10, zeta_10, zeta_6, zeta_6};
    case TargetKind::cleavage:
      return {zeta_9, zeta_10, zeta_5, zeta_6};
    case TargetKind::pair:
      break;
  }
  return {1, 1, 1, 1};
}

StackSums dispersion_sums(const ContactTarget& target, const SheetDispersion& dispersion) {
  if (target.kind == TargetKind::pair) {
    const SmoothEnergy pair = dispersion(target.spacing_nm);
    return {pair.energy, pair.slope};
  }
  return stack_sums(
      StackSummand(dispersion, target.spacing_nm, target.kind == TargetKind::cleavage));
}

}  // namespace

PairFunction calibrate(const ContactTarget& target, const SheetDispersion& dispersion) {
  if (!(target.spacing_nm > 0) || !(target.energy_eV_per_nm2 > 0))
    throw std::domain_error(
        fmt::format("calibrate: spacing_nm = {}, energy_eV_per_nm2 = {}, required: both > 0",
                    target.spacing_nm, target.energy_eV_per_nm2));
  const StackSums sums = dispersion_sums(target, dispersion);
  const ContactWeights weights = contact_weights(target.kind);
  const SmoothEnergy repulsion = sheets_energy({.repulsion_eV_nm12 = 1}, target.spacing_nm);
  const SmoothEnergy attraction = sheets_energy({.attraction_eV_nmp = 1}, target.spacing_nm);

  // B·a + C·b = energy, B·c + C·d = slope.
  const double energy = -target.energy_eV_per_nm2 - sums.energy;
  const double slope = -sums.slope;
  const double a = weights.repulsion * repulsion.energy;
  const double b = weights.attraction * attraction.energy;
  const double c = weights.repulsion_slope * repulsion.slope;
  const double d = weights.attraction_slope * attraction.slope;
  const double determinant = a * d - b * c;
  PairFunction pair;
  pair.repulsion_eV_nm12 = (energy * d - b * slope) / determinant;
  pair.attraction_eV_nmp = (a * slope - energy * c) / determinant;
  if (!(pair.repulsion_eV_nm12 > 0))
    throw std::domain_error(
        fmt::format("calibrate: target \"{}\" asks for B = {} eV·nm^12, required: > 0", target.name,
                    pair.repulsion_eV_nm12));
  return pair;
}

}  // namespace gapwright
