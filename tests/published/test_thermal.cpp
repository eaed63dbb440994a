// Free energies at finite temperature and far away.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/planar.hpp>
#include <gapwright/pair/binder.hpp>
#include <gapwright/response/flat_response.hpp>
#include <gapwright/sheet/flat_sheet.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <cmath>
#include <map>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double zeta_3 = 1.2020569031595942;

const Binder& binder_at(double kelvin, double mu) {
  static std::map<std::pair<double, double>, std::unique_ptr<Binder>> all;
  auto& slot = all[{kelvin, mu}];
  if (!slot) {
    Settings settings;
    settings.conditions.temperature_K = kelvin;
    settings.conditions.chemical_potential_eV = mu;
    slot = std::make_unique<Binder>(Catalogs::built_in(), settings);
  }
  return *slot;
}

Binding side_by_side(const char* label, double gap, double kelvin, double mu = 0.0) {
  const Object tube = parse_label(label).object;
  return binder_at(kelvin, mu).bind({Arrangement::parallel, tube, tube, gap});
}

double static_part(const Binding& row) {
  return *row.thermal_share * *row.dispersion_eV_per_nm;
}

/// Two sheets of the model.
PlanarEnergy sheets(double spacing, const Conditions& conditions, double* static_share = nullptr) {
  const Nodes nodes = make_nodes(1e-4, conditions);
  const IndexRange xi = frequencies_at(spacing, nodes);
  const IndexRange waves = planar_waves(spacing, spacing, nodes);
  const FlatResponse flat(Catalogs::built_in().hopping(), conditions, nodes, xi,
                          nodes.q.node(waves.first), nodes.q.node(waves.end() - 1));
  const SheetScatterer sheet = carbon_sheet(flat, Catalogs::built_in().background(), nodes, waves);
  const PlanarEnergy energy = planar_energy(sheet, sheet, spacing, conditions);
  if (static_share)
    *static_share = energy.energy_eV_per_nm2.static_part / energy.energy_eV_per_nm2.value;
  return energy;
}

}  // namespace

TEST_CASE("parallel tubes at 300 K and far apart", "[reference]") {
  // Reference values of the model (METHODS §5).
  const Binding near = side_by_side("10,10", 0.34, 300);
  CHECK(*near.dispersion_eV_per_nm == Approx(-0.567954).epsilon(2e-5));
  CHECK(static_part(near) == Approx(-0.0047839).epsilon(2e-4));
  const Binding far = side_by_side("10,10", 5.0, 300);
  CHECK(*far.dispersion_eV_per_nm == Approx(-3.0184e-4).epsilon(1e-4));
  CHECK(static_part(far) == Approx(-9.986e-5).epsilon(1e-4));
  CHECK(*side_by_side("10,10", 5.0, 0).dispersion_eV_per_nm == Approx(-2.70656e-4).epsilon(1e-4));
  CHECK(*side_by_side("10,10", 50.0, 0).dispersion_eV_per_nm == Approx(-9.2754e-7).epsilon(1e-4));
  CHECK(*side_by_side("10,0", 5.0, 0).dispersion_eV_per_nm == Approx(-5.5570e-5).epsilon(1e-4));
  CHECK(*side_by_side("10,0", 50.0, 0).dispersion_eV_per_nm == Approx(-1.50640e-9).epsilon(1e-4));
  CHECK(static_part(side_by_side("10,0", 5.0, 300)) == Approx(-1.46e-6).epsilon(3e-3));
  CHECK(static_part(side_by_side("10,0", 5.0, 300, 0.6)) == Approx(-8.524e-5).epsilon(2e-4));
  CHECK_FALSE(side_by_side("10,10", 5.0, 0).thermal_share);
  for (const Binding* row : {&near, &far}) CHECK(*row->relative_error < 1e-4);
}

TEST_CASE("far metallic tubes approach coupled plasmons of two wires") {
  // E/L → -(√A/16π) D⁻² [ln(D/R) + 1 + πv/8k_e]^{-3/2}, A = 8k_e v/π, v = 3t·a_cc/2; the law of
  // Chang et al. (1971) and Dobson, White & Rubio, Phys. Rev. Lett. 96, 073201 (2006). Ratios:
  // reference values of the model (METHODS §5).
  const double v = 1.5 * 2.7 * constants::bond_nm, k_e = constants::coulomb_eV_nm;
  const double R = make_tube({10, 10}).radius_nm;
  const std::map<double, double> ratios = {{1e2, 0.942}, {1e3, 0.970}, {1e4, 0.981}};
  for (const auto& [distance, ratio] : ratios) {
    const double logarithm = std::log(distance / R) + 1 + constants::pi * v / (8 * k_e);
    const double law = -std::sqrt(8 * k_e * v / constants::pi) / (16 * constants::pi) /
                       (distance * distance) * std::pow(logarithm, -1.5);
    const Binding row = side_by_side("10,10", std::min(1e4, distance) - 2 * R, 0);
    INFO("D = " << distance);
    CHECK(law / *row.dispersion_eV_per_nm == Approx(ratio).margin(1e-3));
    CHECK(*row.relative_error < 1e-4);
  }
}

TEST_CASE("far semiconducting tubes fall as the fifth power") {
  // Reference value of the model (METHODS §5).
  const double R = make_tube({10, 0}).radius_nm, distance = 3000.0;
  const Binding row = side_by_side("10,0", distance - 2 * R, 0);
  CHECK(*row.dispersion_eV_per_nm * std::pow(distance, 5) == Approx(-0.51822).epsilon(1e-3));
}

TEST_CASE("metallic tubes screen static waves") {
  // T^e_0 K_0/I_0 of (10,10) at 300 K: reference value of the model (METHODS §4).
  const Tube tube = make_tube({10, 10});
  Conditions conditions;
  conditions.temperature_K = 300;
  Nodes nodes = make_nodes(1e-4, conditions);
  nodes.q.step = -std::log(1.26e-4);
  const Window window{{-1, 1}, {1}, {-1, 1}};
  const ShellResponse response =
      tube_response(tube, Catalogs::built_in().hopping(), conditions, nodes, window);
  const Scatterer scatterer =
      shell_scatterer(Channel::outward, response, Catalogs::built_in().background(), window);
  CHECK(scatterer.reduced(0, 0)[0] == Approx(0.984).margin(5e-4));
}

TEST_CASE("far warm sheets attract as kT/d^2") {
  // F/A → -ζ(3)kT/(16πd²) (Gómez-Santos, Phys. Rev. B 80, 245424 (2009)); shares and ratios:
  // reference values of the model (METHODS §5).
  Conditions warm;
  warm.temperature_K = 300;
  const double kT = thermal_energy_eV(warm);
  const std::map<double, double> shares = {
      {5, 0.097}, {10, 0.228}, {20, 0.461}, {30, 0.620}, {100, 0.926}};
  for (const auto& [spacing, expected] : shares) {
    double share = 0.0;
    sheets(spacing, warm, &share);
    INFO("d = " << spacing);
    CHECK(share == Approx(expected).margin(6e-4));
  }
  for (const auto& [spacing, ratio] :
       std::map<double, double>{{50, 1.195}, {100, 1.049}, {200, 1.0076}})
    CHECK(sheets(spacing, warm).energy_eV_per_nm2.value /
              (-zeta_3 * kT / (16 * constants::pi * spacing * spacing)) ==
          Approx(ratio).epsilon(2e-3));
  for (const auto& [spacing, ratio] :
       std::map<double, double>{{5, 1.0253}, {10, 1.1011}, {50, 2.3708}})
    CHECK(sheets(spacing, warm).energy_eV_per_nm2.value /
              sheets(spacing, {}).energy_eV_per_nm2.value ==
          Approx(ratio).epsilon(2e-3));
  CHECK(sheets(5000, warm).energy_eV_per_nm2.value /
            (-zeta_3 * kT / (16 * constants::pi * 5000.0 * 5000.0)) ==
        Approx(1.0).epsilon(1e-3));
}

TEST_CASE("the contact term is calibrated at T = 0 whatever the temperature") {
  const std::string target = binder_at(0, 0).settings().contact_target;
  CHECK(binder_at(300, 0).contact_term(target).repulsion_eV_nm12 ==
        binder_at(0, 0).contact_term(target).repulsion_eV_nm12);
}
