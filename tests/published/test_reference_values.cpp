// Reference values of the model: made once with an independent implementation of the same equations
// (direct zone-folding sums, brute-force grids), relative error below 3e-5 unless said.
#include <gapwright/pair/binder.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Binder& usual() {
  static const Binder binder(Catalogs::built_in(), {});
  return binder;
}

Binding row(const std::string& label, const Binder& binder = usual()) {
  Placement placement;
  placement.first = parse_label(label).object;
  return binder.bind(placement);
}

}  // namespace

TEST_CASE("planar dispersion energies") {
  struct Row {
    double spacing, energy;
  };
  for (const Row& r :
       {Row{0.3354, -1.21098}, {0.344, -1.11368}, {0.5, -0.325536}, {1.0, -0.0340716}}) {
    const PlanarEnergy ours = usual().sheets(r.spacing);
    CHECK(ours.energy_eV_per_nm2.value == Approx(r.energy).epsilon(3e-5));
    CHECK(std::fabs(ours.energy_eV_per_nm2.value - r.energy) <
          ours.energy_eV_per_nm2.error + 3e-5 * std::fabs(r.energy));
  }
}

TEST_CASE("the calibrated short-range term") {
  const PairFunction pair = usual().contact_term("");
  CHECK(pair.repulsion_eV_nm12 == Approx(2.6275e-8).epsilon(5e-5));
  CHECK(pair.attraction_eV_nmp == Approx(1.2099e-6).epsilon(5e-5));
}

TEST_CASE("coaxial pairs") {
  struct Row {
    const char* label;
    double gap, dispersion, contact, share, pressure_dispersion, pressure, pair_potential;
  };
  for (const Row& r :
       {Row{"5,5@10,10", 0.33900, -3.56968, -0.0850, -0.01605, -1.83852, 0.2553, -4.86516},
        {"9,0@18,0", 0.35230, -3.26580, -0.4992, -0.01409, -1.55644, -0.5509, -4.94897},
        {"9,0@10,10", 0.32570, -4.14975, 0.7153, -0.01532, -2.18540, 1.8605, -4.70469},
        {"6,4@14,5", 0.32650, -3.99935, 0.6343, 0.00696, -2.15919, 1.7269, -4.63465}}) {
    const Binding b = row(r.label);
    INFO(r.label);
    CHECK(*b.gap_nm == Approx(r.gap).margin(6e-6));
    CHECK(*b.dispersion_eV_per_nm == Approx(r.dispersion).epsilon(3e-5));
    CHECK(std::fabs(*b.dispersion_eV_per_nm - r.dispersion) <
          (*b.relative_error + 3e-5) * std::fabs(r.dispersion));
    CHECK(*b.relative_error <= 1e-4);
    // 5e-4 of the repulsive part, which is about 4 eV/nm here and nearly cancels.
    CHECK(*b.contact_eV_per_nm == Approx(r.contact).margin(5e-4 * 4));
    CHECK(*b.electronic_share_eV_per_nm == Approx(r.share).margin(2e-5));
    CHECK(*b.pressure_dispersion_GPa == Approx(r.pressure_dispersion).epsilon(3e-5));
    CHECK(*b.pressure_GPa == Approx(r.pressure).margin(1e-3 * 8));
    CHECK(*b.pair_potential_eV_per_nm == Approx(r.pair_potential).epsilon(1e-5));
  }
}

TEST_CASE("error estimates bound the difference to a far finer run") {
  Settings fine;
  fine.tolerance = 1e-6;
  const Binder reference(Catalogs::built_in(), fine);
  for (const char* label :
       {"5,5@10,10", "9,0@18,0", "6,4@14,5", "8,2@12,8", "5,0@14,0", "5,5@10,10@15,15"}) {
    const Binding exact = row(label, reference);
    for (const double tolerance : {1e-3, 1e-4, 1e-5}) {
      Settings settings;
      settings.tolerance = tolerance;
      const Binder binder(Catalogs::built_in(), settings);
      const Binding ours = row(label, binder);
      INFO(label << " at " << tolerance);
      CHECK(*ours.relative_error <= tolerance);
      CHECK(std::fabs(*ours.dispersion_eV_per_nm - *exact.dispersion_eV_per_nm) <=
            *ours.relative_error * std::fabs(*ours.dispersion_eV_per_nm));
      CHECK(std::fabs(*ours.energy_eV_per_nm - *exact.energy_eV_per_nm) <= *ours.energy_error);
      CHECK(std::fabs(*ours.electronic_share_eV_per_nm - *exact.electronic_share_eV_per_nm) <=
            *ours.electronic_share_error + *exact.electronic_share_error);
      if (ours.pressure_GPa) {
        CHECK(std::fabs(*ours.pressure_GPa - *exact.pressure_GPa) <= *ours.pressure_error);
      }
    }
  }
}
