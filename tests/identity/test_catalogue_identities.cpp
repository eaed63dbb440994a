// What must hold for every pair of a catalogue: fields that agree with each other, equal things
// that are equal, and bits that depend on nothing but the row.
#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/candidates.hpp>
#include <gapwright/pair/binder.hpp>
#include <gapwright/response/shell_response.hpp>

#include <algorithm>
#include <cmath>
#include <complex>
#include <map>
#include <numbers>
#include <string>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double pi = std::numbers::pi;

Placement walls(std::vector<Tube> tubes) {
  Placement placement;
  placement.first = TubeObject{std::move(tubes)};
  return placement;
}

Placement labelled(const std::string& label) {
  Placement placement;
  placement.first = parse_label(label).object;
  return placement;
}

std::vector<Tube> tubes_of(double low_nm, double high_nm) {
  TubeFilter filter;
  filter.diameter_nm = Interval{low_nm, high_nm};
  return candidate_tubes(filter);
}

/// Pairs with gaps of 0.30 to 0.40 nm around inner tubes of the given diameters.
std::vector<Placement> pairs_around(double low_nm, double high_nm) {
  std::vector<Placement> pairs;
  const std::vector<Tube> outer = tubes_of(low_nm + 0.6, high_nm + 0.8);
  for (const Tube& inside : tubes_of(low_nm, high_nm))
    for (const Tube& around : outer) {
      const double gap = around.radius_nm - inside.radius_nm;
      if (gap >= 0.30 && gap <= 0.40) pairs.push_back(walls({inside, around}));
    }
  return pairs;
}

struct Row {
  Placement placement;
  Binding binding;
};

const std::vector<Row>& catalogue() {
  static const std::vector<Row> rows = [] {
    const Binder binder(Catalogs::built_in(), {});
    std::vector<Row> all;
    for (const Placement& pair : pairs_around(0.5, 0.8)) all.push_back({pair, binder.bind(pair)});
    return all;
  }();
  return rows;
}

void check_fields() {
  REQUIRE(catalogue().size() > 300);
  // CODATA 2018 and the honeycomb with a_cc = 0.142 nm, in SI.
  const double charge = 1.602176634e-19, atom_area = 0.75 * std::sqrt(3.0) * 0.142e-9 * 0.142e-9;
  for (const Row& row : catalogue()) {
    const Binding& b = row.binding;
    const Tube &inner = tubes_of(row.placement.first).walls[0],
               &outer = tubes_of(row.placement.first).walls[1];
    INFO(b.object_1 << "@" << b.object_2);
    CHECK(b.status == Status::ok);
    CHECK(b.diameter_1_nm == inner.diameter_nm());
    CHECK(b.diameter_2_nm == outer.diameter_nm());
    CHECK(*b.gap_nm == Approx((*b.diameter_2_nm - *b.diameter_1_nm) / 2).epsilon(1e-14));
    CHECK(b.kind_1 == (inner.metallic() ? "metallic" : "semiconducting"));
    CHECK(b.kind_2 == (outer.metallic() ? "metallic" : "semiconducting"));

    CHECK(*b.dispersion_eV_per_nm + *b.contact_eV_per_nm ==
          Approx(*b.energy_eV_per_nm).epsilon(1e-14));
    const double joule_per_m = *b.energy_eV_per_nm * charge / 1e-9;
    const double mid_circumference = pi * (*b.diameter_1_nm + *b.diameter_2_nm) / 2 * 1e-9;
    const double joule_per_m2 = joule_per_m / mid_circumference;
    CHECK(*b.energy_mJ_per_m2 == Approx(joule_per_m2 * 1e3).epsilon(1e-13));
    CHECK(*b.energy_meV_per_atom == Approx(joule_per_m2 * atom_area / charge * 1e3).epsilon(1e-13));
    // Two walls have one interface: its cut energy is the energy, a force of joule per metre.
    CHECK(*b.cut_energy_eV_per_nm == Approx(*b.energy_eV_per_nm).epsilon(1e-13));
    CHECK(*b.pull_out_force_nN == Approx(-joule_per_m * 1e9).epsilon(1e-13));
    REQUIRE(b.interfaces.size() == 1);
    CHECK(b.interfaces[0].pull_out_force_nN == *b.pull_out_force_nN);

    CHECK(*b.dispersion_eV_per_nm < 0);
    CHECK(*b.pressure_dispersion_GPa < 0);
    CHECK(*b.pair_potential_eV_per_nm < 0);
    CHECK(std::fabs(*b.electronic_share_eV_per_nm) < 0.05 * std::fabs(*b.dispersion_eV_per_nm));
    CHECK(*b.relative_error > 0);
    CHECK(*b.relative_error <= 1e-4);
    CHECK(*b.energy_error >= *b.relative_error * std::fabs(*b.dispersion_eV_per_nm));
    CHECK(*b.pressure_error > 0);
    CHECK(*b.electronic_share_error > 0);
  }
}

/// As (7,0) and (5,3), which have n² + nm + m² in common: contact, pair potential and the energy of
/// flat electrons know only radii.
void check_equal_radii() {
  struct Same {
    double contact, pair_potential, flat;
  };
  std::map<std::pair<int, int>, Same> seen;
  const auto norm = [](const Tube& tube) {
    const auto [n, m] = tube.chirality;
    return n * n + n * m + m * m;
  };
  int compared = 0;
  for (const Row& row : catalogue()) {
    const Binding& b = row.binding;
    const Same own{*b.contact_eV_per_nm, *b.pair_potential_eV_per_nm,
                   *b.dispersion_eV_per_nm - *b.electronic_share_eV_per_nm};
    const auto [at, is_new] = seen.insert({{norm(tubes_of(row.placement.first).walls[0]),
                                            norm(tubes_of(row.placement.first).walls[1])},
                                           own});
    if (is_new) continue;
    ++compared;
    INFO(b.object_1 << "@" << b.object_2);
    CHECK(own.contact == Approx(at->second.contact).margin(1e-11));
    CHECK(own.pair_potential == Approx(at->second.pair_potential).epsilon(1e-12));
    CHECK(own.flat == Approx(at->second.flat).epsilon(1e-12));
  }
  CHECK(compared > 20);
}

/// The energy of flat electrons depends on the radii alone.
void check_order_by_gap() {
  std::map<Chirality, std::vector<const Row*>> by_inner;
  for (const Row& row : catalogue())
    by_inner[tubes_of(row.placement.first).walls[0].chirality].push_back(&row);
  for (auto& [inner, rows] : by_inner) {
    std::sort(rows.begin(), rows.end(),
              [](const Row* a, const Row* b) { return *a->binding.gap_nm < *b->binding.gap_nm; });
    for (std::size_t k = 1; k < rows.size(); ++k) {
      const Binding &a = rows[k - 1]->binding, &b = rows[k]->binding;
      if (*b.gap_nm - *a.gap_nm < 1e-9) continue;
      INFO(a.object_1 << ": " << a.object_2 << " to " << b.object_2);
      CHECK(*b.dispersion_eV_per_nm - *b.electronic_share_eV_per_nm >
            *a.dispersion_eV_per_nm - *a.electronic_share_eV_per_nm);
    }
  }
}

}  // namespace

TEST_CASE("pairs of a catalogue") {
  SECTION("the fields of a row agree with each other") {
    check_fields();
  }
  SECTION("tubes of equal radius differ by their electrons alone") {
    check_equal_radii();
  }
  SECTION("attraction of flat electrons weakens as the gap opens") {
    check_order_by_gap();
  }
}

TEST_CASE("mirror twins give the same bits") {
  const Binder binder(Catalogs::built_in(), {});
  const Binding reference = binder.bind(labelled("6,4@14,5"));
  for (const char* label : {"4,6@14,5", "6,4@5,14", "4,6@5,14", "(4, 6)@(5, 14)"}) {
    INFO(label);
    const Binding twin = binder.bind(labelled(label));
    for (const BindingField& field : binding_fields())
      CHECK(field.get(twin) == field.get(reference));
  }
  // The mirrored lattice itself, which no label leads to, has the same response to rounding.
  const Nodes nodes = make_nodes(1e-6);
  const Window window{{-4, 9}, std::vector<int>(9, 6), {-6, 20}};
  for (const Chirality chirality : {Chirality{6, 4}, {7, 4}, {9, 1}}) {
    const Tube tube = make_tube(chirality);
    Tube twin = tube;
    twin.chirality = {chirality.m, chirality.n};
    twin.chiral_angle_rad = pi / 3 - tube.chiral_angle_rad;
    const HoppingSet& hopping = Catalogs::built_in().hopping();
    const ShellResponse a = tube_response(tube, hopping, {}, nodes, window);
    const ShellResponse b = tube_response(twin, hopping, {}, nodes, window);
    double worst = 0.0;
    for (int j = 0; j < window.q.count; ++j)
      for (int m = 0; m < window.orders[std::size_t(j)]; ++m)
        for (int k = 0; k < window.xi.count; ++k)
          worst = std::max(
              worst, std::fabs(b.cell(j, m)[std::size_t(k)] / a.cell(j, m)[std::size_t(k)] - 1));
    INFO(tube.label() << " worst " << worst);
    CHECK(worst < 1e-8);
  }
}

// ½⟨[[H, ρ], ρ†]⟩ counts every bond with its energy, exactly at any q and m. The plain sum for the
// energies converges exponentially where there is a gap.
TEST_CASE("responses of tubes obey the f-sum rule") {
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  for (const double tolerance : {1e-4, 1e-6}) {
    const Nodes nodes = make_nodes(tolerance);
    const int high = nodes.xi.index_above(1e5);
    for (const Tube& tube : tubes_of(0.5, 0.8)) {
      if (tube.metallic() || tube.hexagons > 200) continue;
      const SheetHamiltonian h = tube_hamiltonian(tube, hopping);
      // ⟨bond⟩ = -2·t_j Re⟨e^{ik·δ_j} f*/|f|⟩ a bond, with both spins, by zone folding.
      std::array<double, 3> bond_energy{};
      const int points = 24 + 6000 / tube.hexagons;
      for (int mu = 0; mu < tube.hexagons; ++mu)
        for (int p = 0; p < points; ++p) {
          const double k = (p + 0.5) / points * 2 * pi / tube.period_nm;
          std::complex<double> sum = 0;
          std::array<std::complex<double>, 3> terms;
          for (int j = 0; j < 3; ++j) {
            const Bond& bond = h.nearest()[std::size_t(j)];
            terms[std::size_t(j)] =
                std::polar(bond.hopping_eV, mu / tube.radius_nm * bond.delta.c + k * bond.delta.z);
            sum += terms[std::size_t(j)];
          }
          for (int j = 0; j < 3; ++j)
            bond_energy[std::size_t(j)] += 2 * (terms[std::size_t(j)] * std::conj(sum)).real() /
                                           std::abs(sum) / (double(points) * tube.hexagons);
        }
      for (const double wave : {0.05, 1.0, 6.0})
        for (const int m : {0, 1, 4}) {
          const Window window{{nodes.q.index_above(wave), 1}, {m + 1}, {high, 1}};
          const double q = nodes.q.node(window.q.first), xi = nodes.xi.node(high);
          double expected = 0.0;
          for (int j = 0; j < 3; ++j) {
            const Bond& bond = h.nearest()[std::size_t(j)];
            const double x = m / tube.radius_nm * bond.delta.c, y = q * bond.delta.z;
            // Mean of both signs of m.
            expected += bond_energy[std::size_t(j)] * (2 - std::cos(x + y) - std::cos(x - y));
          }
          expected *= 4 * pi * constants::coulomb_eV_nm / (2 * constants::atom_area_nm2);
          const double ours =
              tube_response(tube, hopping, {}, nodes, window).cell(0, m)[0] * xi * xi;
          INFO(tube.label() << " q " << q << " m " << m);
          CHECK(ours == Approx(expected).epsilon(tolerance < 1e-5 ? 1e-7 : 5e-6));
        }
    }
  }
}
