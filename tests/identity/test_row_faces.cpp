// Ribbons across others and over sheets: limits that other formulas know.
#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/join/over_sheet.hpp>
#include <gapwright/join/rows_over_sheet.hpp>
#include <gapwright/join/rows_tube.hpp>

#include <cmath>
#include <map>
#include <memory>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

constexpr double gap = 0.34;
constexpr double radius = 0.678;
const Nodes nodes = make_nodes(1e-4);
const Conditions conditions;

Window whole_window() {
  Window all = united(crossed_window(0.0, 0.0, gap, nodes),
                      crossed_window(0.0, radius, radius + gap, nodes));
  return united(all, united(rows_window(gap, nodes), rows_tube_window(radius, gap, nodes)));
}

const RowScatterer& ribbon(int lines) {
  static std::map<int, RowScatterer> kept;
  if (!kept.contains(lines)) {
    const Catalogs& all = Catalogs::built_in();
    const Window window = whole_window();
    const RibbonHamiltonian hamiltonian(make_ribbon(RibbonEdge::armchair, lines), all.hopping(""),
                                        all.ribbon_edges(""));
    kept[lines] =
        row_scatterer(ribbon_response(hamiltonian, conditions, nodes, window.q, window.xi),
                      all.background(""), window);
  }
  return kept[lines];
}

std::shared_ptr<const FlatResponse> flat() {
  static const auto response = std::make_shared<const FlatResponse>(
      Catalogs::built_in().hopping(""), conditions, nodes, whole_window().xi, 1e-4, 80.0);
  return response;
}

CarbonReflector sheet() {
  return CarbonReflector(flat(), Catalogs::built_in().background(""), nodes);
}

/// A tube whose π electrons are those of flat graphene.
const Scatterer& tube() {
  static const Scatterer scatterer =
      shell_scatterer(Channel::outward, flat_shell_response(*flat(), radius, nodes, whole_window()),
                      Catalogs::built_in().background(""), whole_window());
  return scatterer;
}

double energy(const FrequencyDensity& density, const Window& window) {
  return frequency_sum(density, nodes, window.xi, conditions).value;
}

/// ∫dy of a parallel energy at a lateral offset.
template <typename Energy>
double over_offsets(Energy parallel) {
  constexpr double step = 0.1;
  double sum = 0.0;
  for (int i = 0;; ++i) {
    const double value = parallel(i * step);
    sum += (i == 0 ? 1.0 : 2.0) * step * value;
    if (i > 10 && std::fabs(value) < 2e-6 * std::fabs(sum)) return sum;
  }
}

const double one_degree = M_PI / 180;

}  // namespace

TEST_CASE("ribbons crossed at a small angle are parallel ones integrated over the offset") {
  // METHODS §5: sin γ times the crossed energy tends to ∫dy of the parallel one.
  const Window crossed = crossed_window(0.0, 0.0, gap, nodes);
  const CrossedDensity density = crossed_density(ribbon(7), ribbon(7), gap, 1.0, crossed, false);
  const Window parallel = rows_window(gap, nodes);
  const double limit = over_offsets([&](double y) {
    return energy(
        rows_density(ribbon(7), ribbon(7), stacked_pose(gap, y), parallel, false).first_round_trip,
        parallel);
  });
  CHECK(std::sin(one_degree) * energy(density.first_round_trip, crossed) ==
        Approx(limit).epsilon(5e-5));
}

TEST_CASE("a ribbon and a tube crossed at a small angle likewise") {
  const Window crossed = crossed_window(0.0, radius, radius + gap, nodes);
  const CrossedDensity density =
      crossed_density(ribbon(7), tube(), radius + gap, 1.0, crossed, false);
  const Window parallel = rows_tube_window(radius, gap, nodes);
  const double limit = over_offsets([&](double y) {
    return energy(
        rows_tube_density(ribbon(7), tube(), tube_over_pose(radius, gap, y), parallel, false)
            .first_round_trip,
        parallel);
  });
  CHECK(std::sin(one_degree) * energy(density.first_round_trip, crossed) ==
        Approx(limit).epsilon(5e-5));
}

TEST_CASE("forces of crossed ribbons and ribbons over sheets are derivatives of the energy") {
  constexpr double h = 2e-5;
  const Window crossed = crossed_window(0.0, 0.0, gap, nodes);
  const auto across = [&](double moved) {
    return energy(
        crossed_density(ribbon(7), ribbon(13), gap + moved, 60.0, crossed, false).first_round_trip,
        crossed);
  };
  const CrossedDensity density = crossed_density(ribbon(7), ribbon(13), gap, 60.0, crossed, true);
  CHECK(energy(density.first_slope, crossed) ==
        Approx((across(h) - across(-h)) / (2 * h)).epsilon(1e-5));
  const CrossedDensity turned = crossed_density(ribbon(13), ribbon(7), gap, 60.0, crossed, false);
  CHECK(energy(turned.first_round_trip, crossed) ==
        Approx(energy(density.first_round_trip, crossed)).epsilon(1e-10));

  const Window window = rows_window(gap, nodes);
  const CarbonReflector below = sheet();
  const auto over = [&](double moved) {
    return energy(
        rows_over_sheet_density(ribbon(7), below, gap + moved, window, false).first_round_trip,
        window);
  };
  CHECK(energy(rows_over_sheet_density(ribbon(7), below, gap, window, true).first_slope, window) ==
        Approx((over(h) - over(-h)) / (2 * h)).epsilon(1e-5));
}

TEST_CASE("wide ribbons over a sheet are sheets over a sheet per width") {
  const Window window = rows_window(gap, nodes);
  const CarbonReflector below = sheet();
  const auto over = [&](int lines) {
    return energy(
        rows_over_sheet_density(ribbon(lines), below, gap, window, false).first_round_trip, window);
  };
  // First round trip of METHODS (5.1), -∫QdQ/2π r²e^{-2Qd}.
  FrequencyDensity planar;
  planar.full.assign(std::size_t(window.xi.count), 0.0);
  planar.halved = planar.full;
  const AxisWeights weights = trapezoid_weights(nodes.q, window.q, {});
  std::vector<double> r(std::size_t(window.xi.count));
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    below.reflection(q, q, r);
    for (std::size_t k = 0; k < r.size(); ++k)
      planar.full[k] -=
          weights.full[std::size_t(j)] * q / (2 * M_PI) * r[k] * r[k] * std::exp(-2 * q * gap);
  }
  const double strip = make_ribbon(RibbonEdge::armchair, 7).strip_nm();
  CHECK((over(40) - over(25)) / (15 * strip) == Approx(energy(planar, window)).epsilon(2e-3));
}

TEST_CASE("a tube over a wide ribbon tends to a tube over the sheet") {
  const Window window = rows_tube_window(radius, gap, nodes);
  const Window flat_window = over_sheet_window(radius, gap, nodes);
  const double whole = energy(
      over_sheet_density(tube(), sheet(), radius + gap, flat_window, false).energy, flat_window);
  double before = 1.0;
  for (const int lines : {13, 25, 40}) {
    const double share =
        energy(rows_tube_density(ribbon(lines), tube(), tube_over_pose(radius, gap), window, false)
                   .energy,
               window) /
        whole;
    // Still narrower than the sheet, and closer with every step.
    CHECK(share < 1.0);
    CHECK(1 - share < 0.5 * before);
    before = 1 - share;
  }
  // The part of the sheet that is missing falls as the width to the power -2.7 or so.
  CHECK(before < 8e-3);
}

TEST_CASE("rows across and over refuse what touches") {
  const Window window = crossed_window(0.0, 0.0, gap, nodes);
  CHECK_THROWS_AS(crossed_density(ribbon(7), ribbon(7), 0.0, 90.0, window, false),
                  std::domain_error);
  CHECK_THROWS_AS(crossed_density(ribbon(7), ribbon(7), gap, 0.5, window, false),
                  std::domain_error);
  CHECK_THROWS_AS(crossed_density(ribbon(7), tube(), radius, 90.0, window, false),
                  std::domain_error);
  CHECK_THROWS_AS(rows_over_sheet_density(ribbon(7), sheet(), 0.0, rows_window(gap, nodes), false),
                  std::domain_error);
}
