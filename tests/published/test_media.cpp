// Permittivities of the catalogued media at imaginary frequency, and the Hamaker constants they
// give by the planar formula of Lifshitz without retardation.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Medium& medium(const char* name) {
  return Catalogs::built_in().medium(name);
}

/// Li₃(x) by its series, 0 <= x < 1.
double trilogarithm(double x) {
  double sum = 0.0, power = 1.0;
  for (int n = 1; n < 100000; ++n) {
    power *= x;
    const double term = power / (double(n) * n * n);
    sum += term;
    if (term < 1e-15 * sum) break;
  }
  return sum;
}

/// A = (3/2)kT Σ'_n Li₃(r²), r = (ε-1)/(ε+1) at ξ_n = 2πn kT (Parsegian, Van der Waals Forces,
/// 2006). [1e-20 J]
double vacuum_hamaker(const Medium& body, double temperature_K) {
  const double kT = constants::boltzmann_eV_per_K * temperature_K;
  double sum = 0.0;
  for (int n = 0; n < 20000; ++n) {
    const double epsilon = body.permittivity(2 * constants::pi * n * kT);
    const double r = (epsilon - 1) / (epsilon + 1);
    const double term = trilogarithm(r * r);
    sum += (n == 0 ? 0.5 : 1.0) * term;
    if (term < 1e-12 * sum) break;
  }
  return 1.5 * kT * sum * constants::elementary_charge_C * 1e20;
}

}  // namespace

// Oscillators of Parsegian & Weiss, J. Colloid Interface Sci. 81, 285 (1981); the values follow
// from them: static, without the relaxation and the infrared (square of the index), at the first
// thermal frequency of 298 K and at 1 and 10 eV.
TEST_CASE("water") {
  const Medium& water = medium("water");
  CHECK(water.liquid);
  CHECK(water.permittivity(0.0) == Approx(79.00).margin(0.005));
  Medium visible = water;
  visible.relaxations.clear();
  std::erase_if(visible.oscillators, [](const Oscillator& o) { return o.energy_eV < 1.0; });
  CHECK(visible.permittivity(0.0) == Approx(1.7674).margin(1e-4));
  CHECK(water.permittivity(0.1614) == Approx(2.0167).margin(1e-4));
  CHECK(water.permittivity(1.0) == Approx(1.7743).margin(1e-4));
  CHECK(water.permittivity(10.0) == Approx(1.4630).margin(1e-4));
  // Israelachvili (1992), from memory: 3.7e-20 J from one absorption; this fuller set gives more.
  CHECK(vacuum_hamaker(water, 300.0) == Approx(3.88).margin(0.02));
}

// Hough & White (1980) as given by Bergström, Adv. Colloid Interface Sci. 70, 125 (1997): 6.5e-20
// J.
TEST_CASE("silica") {
  const Medium& silica = medium("silica");
  CHECK_FALSE(silica.liquid);
  CHECK(silica.permittivity(0.0) == Approx(3.82).margin(1e-10));
  CHECK(silica.permittivity(1.0) == Approx(2.1095).margin(5e-5));
  CHECK(vacuum_hamaker(silica, 300.0) == Approx(6.5).margin(0.05));
  CHECK(vacuum_hamaker(silica, 300.0) == Approx(6.49).epsilon(2e-3));  // another sum, from the set
  // Sellmeier fit of Malitson, J. Opt. Soc. Am. 55, 1205 (1965): the index of the visible.
  const double strengths[] = {0.6961663, 0.4079426, 0.8974794};
  const double waves_um[] = {0.0684043, 0.1162414, 9.896161};
  const double energy = 2.0;
  double sellmeier = 1.0;
  for (int i = 0; i < 3; ++i) {
    const double resonance = 2 * constants::pi * constants::hbar_c_eV_nm / (1e3 * waves_um[i]);
    sellmeier += strengths[i] / (1 + energy * energy / (resonance * resonance));
  }
  CHECK(silica.permittivity(energy) == Approx(sellmeier).epsilon(0.01));
}

// Static permittivity and index of refraction at 25 °C, Hamaker constants of Israelachvili,
// Intermolecular and Surface Forces (1992): from memory, so that only a gross slip is caught.
TEST_CASE("organic liquids") {
  struct Row {
    const char* name;
    double static_permittivity, index, hamaker;
  };
  for (const Row& r : {Row{"ethanol", 24.5, 1.359, 4.2},
                       {"cyclohexane", 2.02, 1.424, 5.2},
                       {"benzene", 2.27, 1.498, 5.0}}) {
    INFO(r.name);
    const Medium& liquid = medium(r.name);
    CHECK(liquid.liquid);
    CHECK(liquid.permittivity(0.0) == Approx(r.static_permittivity).epsilon(0.005));
    Medium visible = liquid;
    visible.relaxations.clear();
    CHECK(visible.permittivity(0.0) == Approx(r.index * r.index).epsilon(1e-12));
    CHECK(vacuum_hamaker(liquid, 298.0) == Approx(r.hamaker).epsilon(0.05));
  }
  // Milling, Mulvaney & Larson, J. Colloid Interface Sci. 180, 460 (1996): as published, with its
  // infrared strength far above what the Hamaker constant bears.
  const Medium& infrared = medium("ethanol-infrared");
  CHECK(infrared.permittivity(0.0) == Approx(1 + 23.84 + 0.852).epsilon(1e-12));
  CHECK(vacuum_hamaker(infrared, 298.0) > 1.5 * 4.2);
}

TEST_CASE("permittivities fall with frequency to one") {
  for (const Medium& m : Catalogs::built_in().media()) {
    INFO(m.name);
    CHECK_FALSE(m.source.empty());
    double last = m.permittivity(0.0);
    for (double xi = 1e-7; xi < 1e5; xi *= 2) {
      const double here = m.permittivity(xi);
      CHECK(here <= last);
      last = here;
    }
    CHECK(last == Approx(1.0).margin(1e-6));
  }
  CHECK(medium("").permittivity(0.3) == 1.0);
  CHECK(medium("vacuum").permittivity(0.0) == 1.0);
}
