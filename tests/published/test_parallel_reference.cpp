// Reference values of parallel tubes: made once with an independent implementation of the same
// equations, relative error below 3e-5 unless said; and the pair potential's published wells.
#include <gapwright/contact/beside.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

Binding row(const std::string& first, const std::string& second, std::optional<double> gap) {
  static const Binder binder(Catalogs::built_in(), {});
  return binder.bind(
      {Arrangement::parallel, parse_label(first).object, parse_label(second).object, gap});
}

/// Gap and energy of the least energy per length of two equal tubes under the pair potential.
std::pair<double, double> pair_potential_well(double radius) {
  double low = 0.28, high = 0.36;
  const PairFunction pair = graphitic_pair_potential();
  for (int i = 0; i < 60; ++i) {
    const double gap = 0.5 * (low + high);
    (parallel_energy(pair, radius, radius, 2 * radius + gap).slope < 0 ? low : high) = gap;
  }
  return {low, parallel_energy(pair, radius, radius, 2 * radius + low).energy};
}

}  // namespace

TEST_CASE("parallel pairs at a gap") {
  struct Row {
    const char* tube;
    double gap, dispersion, first, contact, pair_potential;
  };
  for (const Row& r : {Row{"10,10", 0.32, -0.673197, -0.656471, -0.0425, -0.94718},
                       {"10,10", 0.34, -0.567816, -0.55436, -0.1117, -0.88411},
                       {"10,10", 1.0, -0.0281119, -0.0277525, -0.00097, -0.02498},
                       {"10,0", 0.34, -0.402461, -0.39517, -0.0840, -0.66257}}) {
    const Binding b = row(r.tube, r.tube, r.gap);
    INFO(r.tube << " at " << r.gap);
    CHECK(*b.dispersion_eV_per_nm == Approx(r.dispersion).epsilon(3e-5));
    CHECK(*b.first_round_trip_eV_per_nm == Approx(r.first).epsilon(3e-5));
    CHECK(*b.contact_eV_per_nm == Approx(r.contact).margin(1e-4));
    CHECK(*b.pair_potential_eV_per_nm == Approx(r.pair_potential).margin(1e-5));
    CHECK(std::fabs(*b.dispersion_eV_per_nm - r.dispersion) <
          (*b.relative_error + 3e-5) * std::fabs(r.dispersion));
    CHECK(b.status == Status::ok);
  }
}

TEST_CASE("wells of parallel pairs") {
  const Binding wide = row("10,10", "10,10", {}), thin = row("5,5", "5,5", {});
  CHECK(*wide.equilibrium_gap_nm == Approx(0.3199).margin(1e-4));
  CHECK(*wide.well_depth_eV_per_nm == Approx(0.7156).margin(2e-4));
  CHECK(*thin.equilibrium_gap_nm == Approx(0.3189).margin(1e-4));
  CHECK(*thin.well_depth_eV_per_nm == Approx(0.4803).margin(2e-4));
  CHECK(*wide.stiffness_eV_per_nm3 > 0);
}

TEST_CASE("far parallel pairs") {
  struct Row {
    const char* tube;
    double gap, dispersion;
  };
  for (const Row& r : {Row{"10,10", 5, -2.70656e-4},
                       {"10,0", 5, -5.5570e-5},
                       {"10,10", 50, -9.2754e-7},
                       {"10,0", 50, -1.50640e-9}})
    CHECK(*row(r.tube, r.tube, r.gap).dispersion_eV_per_nm == Approx(r.dispersion).epsilon(2e-3));
}

TEST_CASE("the pair potential's wells") {
  // Girifalco, Hodak & Lee, Phys. Rev. B 62, 13104 (2000): parameters from memory, wells from the
  // integral over smooth tubes.
  const auto [thin_gap, thin_energy] = pair_potential_well(make_tube({5, 5}).radius_nm);
  const auto [wide_gap, wide_energy] = pair_potential_well(make_tube({10, 10}).radius_nm);
  CHECK(thin_gap == Approx(0.31325).epsilon(1e-3));
  CHECK(thin_energy == Approx(-0.6683).epsilon(1e-3));
  CHECK(wide_gap == Approx(0.31537).epsilon(1e-3));
  CHECK(wide_energy == Approx(-0.9504).epsilon(1e-3));
}
