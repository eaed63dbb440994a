// Reference values of ribbons (METHODS §5, §6): made once with an independent implementation of the
// same equations, good to 2e-3 and better; zigzag ribbons with U = 1.94 eV.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/rows.hpp>
#include <gapwright/join/parallel.hpp>
#include <gapwright/join/plain_wire.hpp>
#include <gapwright/join/rows_tube.hpp>
#include <gapwright/pair/binder.hpp>

#include <cmath>
#include <map>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

const Nodes nodes = make_nodes(1e-4);
const Conditions conditions;

Background background() {
  return Catalogs::built_in().background("");
}

/// The rows of a ribbon on a window; the response of a ribbon on one window is kept.
RowScatterer rows_of(const Ribbon& ribbon, const Window& window, const Background& others) {
  using Key = std::tuple<std::string, int, int, int>;
  static std::map<Key, RibbonResponse> kept;
  const Key key{ribbon.label(), window.q.first, window.q.count, window.xi.first};
  if (!kept.contains(key)) {
    const Catalogs& all = Catalogs::built_in();
    kept[key] = ribbon_response(RibbonHamiltonian(ribbon, all.hopping(""), all.ribbon_edges("")),
                                conditions, nodes_on(window, nodes), window.q, window.xi);
  }
  return row_scatterer(kept[key], others, window);
}

struct Energies {
  Estimate dispersion;
  double slope;
};

Energies energies(const RowDensity& density, const Window& window) {
  CHECK(density.positive);
  return {frequency_sum(density.energy, nodes, window.xi, conditions),
          frequency_sum(density.distance_slope, nodes, window.xi, conditions).value};
}

Energies pair_of(const Ribbon& ribbon, const RowPose& pose, double gap,
                 const Background& others = background()) {
  const Window window = rows_window(gap, nodes);
  const RowScatterer rows = rows_of(ribbon, window, others);
  return energies(rows_density(rows, rows, pose, window, true), window);
}

std::vector<AtomLine> lines_of(const Ribbon& ribbon, const RowPose& pose) {
  std::vector<AtomLine> lines;
  for (const RowPoint& point : placed_rows(ribbon_rows(ribbon), pose))
    lines.push_back({point.y_nm, point.z_nm, ribbon.strip_nm() / constants::atom_area_nm2});
  return lines;
}

SmoothEnergy contact_of(const Ribbon& ribbon, const RowPose& pose) {
  static const PairFunction pair = Binder(Catalogs::built_in(), {}).contact_term("");
  return lines_energy(pair, lines_of(ribbon, {}), lines_of(ribbon, pose), pose.away_y, pose.away_z);
}

const Ribbon narrow = make_ribbon(RibbonEdge::armchair, 7);
const Ribbon wide = make_ribbon(RibbonEdge::armchair, 13);
const Ribbon zigzag = make_ribbon(RibbonEdge::zigzag, 6);

void check_dispersion(const Energies& ours, double reference) {
  CHECK(ours.dispersion.value == Approx(reference).epsilon(2e-4));
  CHECK(ours.dispersion.error < 1e-4 * std::fabs(reference));
}

}  // namespace

TEST_CASE("ribbons face to face") {
  check_dispersion(pair_of(narrow, stacked_pose(0.34), 0.34), -0.77409);
  check_dispersion(pair_of(narrow, stacked_pose(1.0), 1.0), -0.012771);
  check_dispersion(pair_of(narrow, stacked_pose(5.0), 5.0), -1.1142e-5);
  check_dispersion(pair_of(wide, stacked_pose(0.34), 0.34), -1.62668);
  check_dispersion(pair_of(zigzag, stacked_pose(0.34), 0.34), -1.27146);
}

TEST_CASE("what ribbons face to face owe to which electrons") {
  Background some = background();
  some.normal_strength_nm = 0.0;
  check_dispersion(pair_of(narrow, stacked_pose(0.34), 0.34, some), -0.26670);
  some.in_plane_strength_nm = 0.0;
  check_dispersion(pair_of(narrow, stacked_pose(0.34), 0.34, some), -0.10342);
}

TEST_CASE("ribbons side by side and edge-on") {
  check_dispersion(pair_of(narrow, coplanar_pose(narrow, narrow, 0.34), 0.34), -0.064972);
  check_dispersion(pair_of(narrow, edge_on_pose(narrow, 0.34), 0.34), -0.18013);
}

TEST_CASE("tubes over ribbons") {
  const Tube tube = make_tube({10, 10});
  const Window window = rows_tube_window(tube.radius_nm, 0.34, nodes);
  const Scatterer scatterer = shell_scatterer(
      Channel::outward,
      tube_response(tube, Catalogs::built_in().hopping(""), conditions, nodes, window),
      background(), window);
  const RowPose pose = tube_over_pose(tube.radius_nm, 0.34);
  const PairFunction pair = Binder(Catalogs::built_in(), {}).contact_term("");
  struct Row {
    Ribbon ribbon;
    double dispersion, contact;
  };
  for (const Row& row : {Row{narrow, -0.61827, -0.11243}, Row{wide, -0.79624, -0.16460}}) {
    check_dispersion(energies(rows_tube_density(rows_of(row.ribbon, window, background()),
                                                scatterer, pose, window, true),
                              window),
                     row.dispersion);
    CHECK(lines_shell_energy(pair, lines_of(row.ribbon, {}), tube.radius_nm, 0.0, pose.z_nm, 0, 1)
              .energy == Approx(row.contact).margin(2e-5));
  }
}

TEST_CASE("contact of ribbons") {
  CHECK(contact_of(narrow, stacked_pose(0.34)).energy == Approx(0.02123).margin(2e-5));
  CHECK(contact_of(narrow, coplanar_pose(narrow, narrow, 0.34)).energy ==
        Approx(0.00197).margin(1e-5));
  CHECK(contact_of(narrow, edge_on_pose(narrow, 0.34)).energy == Approx(-0.02274).margin(1e-5));
  CHECK(contact_of(wide, stacked_pose(0.34)).energy == Approx(-0.00048).margin(2e-5));
  CHECK(contact_of(zigzag, stacked_pose(0.34)).energy == Approx(0.02158).margin(2e-5));
}

TEST_CASE("the well of two ribbons") {
  double low = 0.33, high = 0.36;
  const auto total = [&](double gap) {
    // The window of the closest gap serves all of them.
    const Window window = rows_window(0.33, nodes);
    const RowScatterer rows = rows_of(narrow, window, background());
    const RowPose pose = stacked_pose(gap);
    const Energies e = energies(rows_density(rows, rows, pose, window, true), window);
    const SmoothEnergy contact = contact_of(narrow, pose);
    return SmoothEnergy{e.dispersion.value + contact.energy, e.slope + contact.slope};
  };
  for (int i = 0; i < 24; ++i) {
    const double gap = 0.5 * (low + high);
    (total(gap).slope < 0 ? low : high) = gap;
  }
  CHECK(low == Approx(0.34743).margin(2e-5));
  CHECK(total(low).energy == Approx(-0.76228).margin(5e-5));
}

TEST_CASE("gapped ribbons far apart fall as the fifth power") {
  // Reference value of the model: -4.997 between 80 and 160 nm, -4.78 between 5 and 10 nm.
  const auto exponent = [&](double gap) {
    const double here = pair_of(narrow, stacked_pose(gap), gap).dispersion.value;
    return std::log2(pair_of(narrow, stacked_pose(2 * gap), 2 * gap).dispersion.value / here);
  };
  CHECK(exponent(80.0) == Approx(-4.997).margin(2e-3));
  CHECK(exponent(5.0) == Approx(-4.78).margin(0.02));
}

TEST_CASE("the axial share of gapped pairs") {
  // Dipoles across the axis fall as those along it: m = 0 keeps a share at any distance.
  const double gap = 80.0;
  const Window window = rows_window(gap, nodes);
  const RowScatterer rows = rows_of(narrow, window, background());
  const Scatterer wire = axial_scatterer(rows, 0.5 * narrow.width_nm());
  const double axial = frequency_sum(parallel_density(wire, wire, gap, window, false).energy, nodes,
                                     window.xi, conditions)
                           .value;
  const double whole = pair_of(narrow, stacked_pose(gap), gap).dispersion.value;
  CHECK(axial < 0);
  CHECK(axial > whole);
  CHECK(axial / whole > 0.3);
  CHECK(axial / whole < 0.99);
}

TEST_CASE("wide ribbons per width tend to sheets") {
  const auto at = [&](int lines) {
    return pair_of(make_ribbon(RibbonEdge::armchair, lines), stacked_pose(0.34), 0.34)
        .dispersion.value;
  };
  const double e_25 = at(25), e_40 = at(40), strip = narrow.strip_nm();
  // -dE/dw between 25 and 40 lines against the sheet's 1.15760 eV/nm²; what remains per width falls
  // as 1/width, an energy of the two edges that does not depend on it.
  CHECK(-(e_40 - e_25) / (15 * strip) == Approx(1.1577).epsilon(2e-4));
  CHECK(-(e_40 - e_25) / (15 * strip) == Approx(1.15760).epsilon(5e-4));
  const double edges_25 = e_25 + 1.15760 * 25 * strip, edges_40 = e_40 + 1.15760 * 40 * strip;
  CHECK(edges_25 / edges_40 == Approx(1.0).margin(0.02));
}
