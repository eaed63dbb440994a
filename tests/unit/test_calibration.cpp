#include <gapwright/contact/calibration.hpp>

#include <cmath>
#include <stdexcept>

#include <boost/math/special_functions/zeta.hpp>
#include <catch2/catch.hpp>

using namespace gapwright;
using boost::math::zeta;

namespace {

// -c/d^p: its sums over a stack are zeta values.
SheetDispersion power_law(double c, double p) {
  return [=](double d) { return SmoothEnergy{-c * std::pow(d, -p), p * c * std::pow(d, -p - 1)}; };
}

// Falls like graphene's: E·d³ is smooth in 1/d and tends to a constant.
SheetDispersion graphene_like() {
  return [](double d) {
    const double front = 0.045, length = 0.3;
    const double x = length / d;
    const double shape = (1 + 2 * x) / (1 + x), slope = -x / d / ((1 + x) * (1 + x));
    const double cube = d * d * d;
    return SmoothEnergy{-front * shape / cube, front / cube * (3 * shape / d - slope)};
  };
}

ContactTarget target(TargetKind kind, double spacing_nm, double energy) {
  ContactTarget result;
  result.name = "test";
  result.kind = kind;
  result.spacing_nm = spacing_nm;
  result.energy_eV_per_nm2 = energy;
  return result;
}

// Sums sheet by sheet up to `sheets`, the rest as an integral by the law n^{-power} of the tail.
double direct_sum(const std::function<double(double)>& term, double power, int sheets = 200000) {
  double sum = 0.0;
  for (int n = sheets; n >= 1; --n) sum += term(n);
  return sum + term(sheets + 0.5) * (sheets + 0.5) / (power - 1);
}

struct Residuals {
  double energy;  // of E_total + target, relative
  double slope;   // of the derivative, relative to its dispersion part
};

// Puts the solution back into the definition, with every sum done sheet by sheet.
Residuals residuals(const ContactTarget& goal, const SheetDispersion& dispersion, double power) {
  const PairFunction pair = calibrate(goal, dispersion);
  const double d = goal.spacing_nm;
  const auto weight = [&](double n) { return goal.kind == TargetKind::cleavage ? n : 1.0; };
  const auto energy = [&](double n) {
    return weight(n) * (dispersion(n * d).energy + sheets_energy(pair, n * d).energy);
  };
  const auto slope = [&](double n) {
    return n * (dispersion(n * d).slope + sheets_energy(pair, n * d).slope);
  };
  const double lowered = goal.kind == TargetKind::cleavage ? power - 1 : power;
  return {direct_sum(energy, lowered) / goal.energy_eV_per_nm2 + 1,
          direct_sum(slope, power) / dispersion(d).slope};
}

}  // namespace

TEST_CASE("a pair target is met exactly") {
  for (const double p : {3.0, 3.4, 4.0}) {
    const SheetDispersion dispersion = power_law(1.11 * std::pow(0.344, p), p);
    const PairFunction pair = calibrate(target(TargetKind::pair, 0.344, 1.191), dispersion);
    const SmoothEnergy contact = sheets_energy(pair, 0.344), free = dispersion(0.344);
    CHECK(pair.power == 8);
    CHECK(contact.energy + free.energy == Approx(-1.191).epsilon(1e-14));
    CHECK(std::abs(contact.slope + free.slope) < 1e-13 * free.slope);
  }
}

// With E = -c/d^p everything is known: x = B-term, y = C-term of two sheets at d₀ solve
// x·ζ_B - y·ζ_C = -target + c/d₀^p·ζ_D and 10x·ζ(10) - 6y·ζ(6) = p·c/d₀^p·ζ(p).
TEST_CASE("stack and cleavage targets of a power law are zeta values") {
  const double d = 0.344;
  for (const double p : {3.0, 4.0, 5.0})
    for (const TargetKind kind : {TargetKind::stack, TargetKind::cleavage}) {
      const double lowered = kind == TargetKind::cleavage ? 1 : 0;
      const double free = 1.1;
      const double energy = -1.9 + free * zeta(p - lowered);
      const double slope = p * free * zeta(p);
      const double a = zeta(10 - lowered), b = -zeta(6 - lowered);
      const double c = 10 * zeta(10.0), e = -6 * zeta(6.0);
      const double repulsion = (energy * e - b * slope) / (a * e - b * c);
      const double attraction = (a * slope - energy * c) / (a * e - b * c);

      const PairFunction pair =
          calibrate(target(kind, d, 1.9), power_law(free * std::pow(d, p), p));
      const double unit = sheets_energy({.repulsion_eV_nm12 = 1}, d).energy;
      const double unit_soft = -sheets_energy({.attraction_eV_nmp = 1}, d).energy;
      CAPTURE(p, lowered);
      CHECK(pair.repulsion_eV_nm12 * unit == Approx(repulsion).epsilon(1e-6));
      CHECK(pair.attraction_eV_nmp * unit_soft == Approx(attraction).epsilon(1e-6));
    }
}

TEST_CASE("targets are met sheet by sheet for a dispersion like graphene's") {
  for (const TargetKind kind : {TargetKind::stack, TargetKind::cleavage})
    for (const double energy : {1.9, 2.4}) {
      const Residuals left = residuals(target(kind, 0.344, energy), graphene_like(), 3);
      CAPTURE(static_cast<int>(kind), energy);
      CHECK(std::abs(left.energy) < 1e-7);
      CHECK(std::abs(left.slope) < 1e-7);
    }
}

TEST_CASE("a calibration calls the dispersion few times and not far out") {
  int calls = 0;
  double farthest = 0.0;
  const SheetDispersion counted = [&](double d) {
    ++calls;
    farthest = std::max(farthest, d);
    return graphene_like()(d);
  };
  calibrate(target(TargetKind::pair, 0.344, 1.9), counted);
  CHECK(calls == 1);
  calls = 0;
  calibrate(target(TargetKind::cleavage, 0.344, 2.3), counted);
  CHECK(calls <= 30);
  CHECK(farthest < 2000 * 0.344);
}

// -c/d^p asks for a core of (6·target - (6 - p)·c/d₀^p)/4 at d₀.
TEST_CASE("targets that ask for an attractive core are refused") {
  const SheetDispersion dispersion = power_law(1.1 * std::pow(0.344, 3), 3);
  CHECK_NOTHROW(calibrate(target(TargetKind::pair, 0.344, 0.56), dispersion));
  CHECK_THROWS_AS(calibrate(target(TargetKind::pair, 0.344, 0.54), dispersion), std::domain_error);
  CHECK_THROWS_AS(calibrate(target(TargetKind::pair, 0.0, 1.0), dispersion), std::domain_error);
  CHECK_THROWS_AS(calibrate(target(TargetKind::pair, 0.344, -1.0), dispersion), std::domain_error);
}
