// Bundles and beads against published and reference values.
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/bundle.hpp>
#include <gapwright/pair/potential.hpp>
#include <gapwright/table/beads.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Binder& binder() {
  static const Binder shared(Catalogs::built_in(), {});
  return shared;
}

Object tube(const char* label) {
  return parse_label(label).object;
}

PotentialWell blind_well(const char* label) {
  const auto curve = binder().curve({Arrangement::parallel, tube(label), tube(label), {}});
  const Potential potential = contact_potential(*curve, graphitic_pair_potential(), 0.2, 2.0);
  const auto well = first_well([&](double x) { return potential.at(x); },
                               curve->touching_nm() + 0.2, curve->touching_nm() + 2.0);
  REQUIRE(well);
  return {well->distance_nm - curve->touching_nm(), well->energy};
}

}  // namespace

// Girifalco, Hodak & Lee, Phys. Rev. B 62, 13104 (2000): the graphitic pair potential over smooth
// tubes.
TEST_CASE("pairs and bundles of the published pair potential") {
  CHECK(blind_well("5,5").distance_nm == Approx(0.31325).epsilon(1e-3));
  CHECK(blind_well("5,5").energy.value == Approx(-0.6683).epsilon(1e-3));
  CHECK(blind_well("10,10").distance_nm == Approx(0.31537).epsilon(1e-3));
  CHECK(blind_well("10,10").energy.value == Approx(-0.9504).epsilon(1e-3));
  const Bundle bundle = hexagonal_bundle(binder(), tube("10,10"));
  REQUIRE(bundle.status == Status::ok);
  CHECK(bundle.pair_potential.lattice_constant_nm == Approx(1.6713).epsilon(1e-3));
  CHECK(bundle.pair_potential.energy_eV_per_nm == Approx(-2.8768).epsilon(1e-3));
}

// Thess et al., Science 273, 483 (1996): 16.95 ± 0.34 Å for bundles near (10,10), from memory.
TEST_CASE("a bundle is the sum of its pairs") {
  const Bundle bundle = hexagonal_bundle(binder(), tube("10,10"));
  CHECK(bundle.model.lattice_constant_nm == Approx(1.695).margin(0.034));
  CHECK(bundle.neighbours > 100);
  CHECK(bundle.model.energy_eV_per_nm < bundle.model.first_neighbours_eV_per_nm);
  // Direct pairs on the first shells at √1, √3, √4, √7 (12 of them) and √9 lattice constants.
  const auto curve = binder().curve({Arrangement::parallel, tube("10,10"), tube("10,10"), {}});
  const PairFunction contact = binder().contact_term(binder().settings().contact_target);
  const auto pair = [&](double square) {
    const double gap = std::sqrt(square) * bundle.model.lattice_constant_nm - curve->touching_nm();
    return curve->dispersion(gap, false).energy.value + curve->contact(contact, gap).energy;
  };
  const double first = 3 * pair(1);
  const double near = first + 3 * pair(3) + 3 * pair(4) + 6 * pair(7) + 3 * pair(9);
  CHECK(bundle.model.first_neighbours_eV_per_nm == Approx(first).epsilon(1e-4));
  CHECK(bundle.model.energy_eV_per_nm < near);
  CHECK(bundle.model.energy_eV_per_nm == Approx(near).epsilon(5e-3));
  CHECK_THROWS_AS(hexagonal_bundle(binder(), tube("graphene")), InputError);
}

// Reference values of the model (METHODS §10).
TEST_CASE("beads of (10,10) pairs") {
  const auto curve = binder().curve({Arrangement::parallel, tube("10,10"), tube("10,10"), {}});
  const PairFunction contact = binder().contact_term(binder().settings().contact_target);
  const PairPotential potential = pair_potential(*curve, contact, 0.2, 100.0, 1e-4);
  const EnergyFunction energy = [&](double x) { return potential.total.at(x); };
  const double touching = curve->touching_nm();
  const BeadPair beads(energy, 1.0, 1.0, touching + 0.2, std::nullopt);
  CHECK(beads.at(touching + 0.25).value == Approx(6.1465).epsilon(5e-4));
  CHECK(beads.at(touching + 0.32).value == Approx(-0.41900).epsilon(3e-4));
  CHECK(beads.at(touching + 0.40).value == Approx(-0.36039).epsilon(3e-4));
  CHECK(beads.at(touching + 1.0).value == Approx(-0.012082).epsilon(3e-4));
  const auto well = first_well(energy, touching + 0.2, touching + 5.0);
  REQUIRE(well);
  const double D = well->distance_nm;
  CHECK(D - touching == Approx(0.3199).margin(1e-4));
  CHECK(well->energy.value == Approx(-0.7156).epsilon(2e-4));
  CHECK(beads.corrugation(D, 0.5) == Approx(0.044).margin(5e-4));
  CHECK(beads.corrugation(D, 1.0) == Approx(0.29).margin(5e-3));
  CHECK(beads.corrugation(D, usual_bead_spacing_nm(D)) == Approx(1e-3).epsilon(0.2));
  CHECK(beads.corrugation(D, 0.315 * std::sqrt(D)) == Approx(1e-2).epsilon(0.1));
  // Beads overestimate crossing at 90°, first round trip times full over first.
  const auto over = [&](double gap, double direct) {
    const auto dispersion = [&](double x) { return potential.dispersion.at(x); };
    return crossing_limit(dispersion, touching + gap).value / direct - 1;
  };
  CHECK(over(0.32, -0.87443 * 1.0200) == Approx(0.014).margin(1e-3));
  CHECK(over(1.0, -0.076403 * 1.0111) == Approx(0.06).margin(5e-3));
}
