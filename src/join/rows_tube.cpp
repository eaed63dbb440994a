#include "multipoles.hpp"
#include "row_sum.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/rows_tube.hpp>
#include <gapwright/math/bessel.hpp>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <stdexcept>
#include <utility>

#include <fmt/format.h>

namespace gapwright {

RowPose tube_over_pose(double radius_nm, double gap_nm, double offset_nm) {
  return {.y_nm = offset_nm, .z_nm = radius_nm + gap_nm};
}

RowPose tube_beside_pose(const Ribbon& ribbon, double radius_nm, double gap_nm, double offset_nm) {
  return {.y_nm = 0.5 * ribbon.nuclei_width_nm() + gap_nm + radius_nm,
          .z_nm = offset_nm,
          .away_y = 1.0,
          .away_z = 0.0};
}

double least_axis_distance_nm(const std::vector<RibbonRow>& rows, const RowPose& pose) {
  double least = HUGE_VAL;
  for (const RibbonRow& row : rows)
    least = std::min(least, std::hypot(row.y_nm - pose.y_nm, pose.z_nm));
  return least;
}

Window rows_tube_window(double radius_nm, double gap_nm, const Nodes& nodes) {
  if (!(radius_nm > 0))
    throw std::domain_error(
        fmt::format("rows_tube_window: radius = {} nm, required: > 0", radius_nm));
  Window window = rows_window(gap_nm, nodes);
  const LogLattice lattice = nodes_on(window, nodes).q;
  const double limit = largest_exponent(nodes.tolerance) + (gap_nm > 1.0 ? 6.0 : 0.0);
  const int end = window.q.end();
  window.q.first = lattice.index_below(lowest_row_wave(radius_nm + gap_nm, gap_nm, nodes));
  window.q.count = end - window.q.first;
  window.orders.clear();
  const int least = least_multipole(gap_nm);
  int largest = 0;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = lattice.node(window.q.first + j);
    const int m = largest_multipole(q, radius_nm, radius_nm + gap_nm, limit, largest);
    largest = j == 0 ? m : std::min(m, largest);
    window.orders.push_back(std::max(largest, least) + 1);
  }
  return window;
}

namespace {

/// A row seen from the axis; angles are from the direction down to the ribbon's plane, towards y.
struct SeenRow {
  double angle;
  BesselLogs waves;
};

/// cos or sin of what a row's charge and dipole send to the multipoles, and its derivative.
struct Entries {
  std::vector<double> charges[2], dipoles[2];  ///< [cos, sin], each [row][m]
};

/// Re and Im of e^{i·phase} times a size.
struct Wave {
  double cosine = 0.0, sine = 0.0;
  void add(double size, double phase) {
    cosine += size * std::cos(phase);
    sine += size * std::sin(phase);
  }
};

class RowsTube {
 public:
  RowsTube(const RowScatterer& ribbon, const Scatterer& tube, const RowPose& pose,
           const Window& window, bool with_slope)
      : ribbon_(ribbon),
        tube_(tube),
        pose_(pose),
        window_(window),
        with_slope_(with_slope),
        away_(std::atan2(-pose.away_y, pose.away_z)),
        dipole_(ribbon.rows().size(), ribbon.dipole().data() + shift(ribbon.window())) {}

  bool add(int j, std::vector<std::vector<double>>& sums) const {
    const std::size_t orders = std::size_t(window_.orders[std::size_t(j)]);
    Entries value, slope;
    couple(j, orders, value, slope);
    const std::vector<double> roots = tube_roots(j, orders);
    if (!pose_.mirrored())
      return add_block(j, orders, value, slope, roots, true, Mirror::even, sums);
    const bool even = add_block(j, orders, value, slope, roots, false, Mirror::even, sums);
    return (orders < 2 || add_block(j, orders, value, slope, roots, false, Mirror::odd, sums)) &&
           even;
  }

 private:
  static constexpr double normal = constants::pi;  // the normal points from the plane to the tube
  int shift(const Window& whole) const { return window_.xi.first - whole.xi.first; }

  /// √T^e without its scale, [m][ξ].
  std::vector<double> tube_roots(int j, std::size_t orders) const {
    const std::size_t frequencies = std::size_t(window_.xi.count);
    std::vector<double> roots(orders * frequencies);
    const int row = j + window_.q.first - tube_.window().q.first;
    for (std::size_t m = 0; m < orders; ++m) {
      const auto values = tube_.reduced(row, int(m)).subspan(shift(tube_.window()), frequencies);
      for (std::size_t k = 0; k < frequencies; ++k)
        roots[m * frequencies + k] = std::sqrt(values[k]);
    }
    return roots;
  }

  void couple(int j, std::size_t orders, Entries& value, Entries& slope) const {
    const std::size_t rows = ribbon_.rows().size();
    for (Entries* set : {&value, &slope})
      for (int part = 0; part < 2 && (set == &value || with_slope_); ++part) {
        set->charges[part].resize(rows * orders);
        set->dipoles[part].resize(rows * orders);
      }
    const double q = tube_.nodes().q.node(window_.q.first + j);
    const int tube_row = j + window_.q.first - tube_.window().q.first;
    for (std::size_t r = 0; r < rows; ++r) {
      const double y = ribbon_.rows()[r].y_nm - pose_.y_nm, z = pose_.z_nm;
      const SeenRow seen{std::atan2(y, z), bessel_logs(q * std::hypot(y, z), int(orders) + 2)};
      for (std::size_t m = 0; m < orders; ++m) {
        const double both = m == 0 ? 1.0 : 2.0;
        const double scale = 0.5 * (tube_.log_scale(tube_row, int(m)) +
                                    std::log(2 * constants::coulomb_eV_nm * both));
        fill(seen, int(m), scale, q, r * orders + m, value, slope);
      }
    }
  }

  /// (n·∇)K_m e^{imφ} = -(q/2)[e^{-iβ}K_{m+1}e^{i(m+1)φ} + e^{iβ}K_{m-1}e^{i(m-1)φ}], n at angle β.
  void fill(const SeenRow& row, int m, double scale, double q, std::size_t at, Entries& value,
            Entries& slope) const {
    const auto k = [&](int order) {
      return std::exp(scale + row.waves.log_k[std::size_t(std::abs(order))]);
    };
    const double angle = row.angle, same = k(m), up = k(m + 1), down = k(m - 1);
    const auto once = [&](double a) {
      Wave wave;
      wave.add(-0.5 * q * up, (m + 1) * angle - a);
      wave.add(-0.5 * q * down, (m - 1) * angle + a);
      return wave;
    };
    Wave charge;
    charge.add(same, m * angle);
    put(charge, at, value.charges);
    put(once(normal), at, value.dipoles);
    if (!with_slope_) return;
    const double quarter = 0.25 * q * q, a = normal, b = away_;
    Wave twice;
    twice.add(quarter * k(m + 2), (m + 2) * angle - a - b);
    twice.add(quarter * same, m * angle - a + b);
    twice.add(quarter * same, m * angle + a - b);
    twice.add(quarter * k(m - 2), (m - 2) * angle + a + b);
    put(once(away_), at, slope.charges);
    put(twice, at, slope.dipoles);
  }

  static void put(const Wave& wave, std::size_t at, std::vector<double>* parts) {
    parts[0][at] = wave.cosine;
    parts[1][at] = wave.sine;
  }

  /// [charges, dipoles] of rows in the mirror's vectors against cosines, sines or both.
  std::vector<double> matrix(const Entries& entries, std::size_t orders, bool all,
                             Mirror half) const {
    const std::size_t rows = ribbon_.rows().size();
    const std::size_t even = std::size_t(ribbon_.half_size(Mirror::even));
    const std::size_t first = all || half == Mirror::even ? 0 : even;
    const std::size_t count = all ? rows : std::size_t(ribbon_.half_size(half));
    const std::size_t wide = all ? 2 * orders - 1 : (half == Mirror::even ? orders : orders - 1);
    std::vector<double> result(2 * count * wide);
    for (const bool dipoles : {false, true})
      for (int part = 0; part < 2; ++part) {
        if (!all && (part == 0) != (half == Mirror::even)) continue;
        std::vector<double> values = (dipoles ? entries.dipoles : entries.charges)[part];
        mirror_left(values, rows);
        const std::size_t skip = part == 0 ? 0 : 1;  // no sine of m = 0
        const std::size_t left = all && part == 1 ? orders : 0;
        for (std::size_t i = 0; i < count; ++i)
          for (std::size_t m = skip; m < orders; ++m)
            result[(i + (dipoles ? count : 0)) * wide + left + m - skip] =
                values[(first + i) * orders + m];
      }
    return result;
  }

  bool add_block(int j, std::size_t orders, const Entries& value, const Entries& slope,
                 const std::vector<double>& roots, bool all, Mirror half,
                 std::vector<std::vector<double>>& sums) const {
    std::vector<const double*> diagonal;
    const std::size_t frequencies = std::size_t(window_.xi.count);
    for (std::size_t m = 0; m < orders && (all || half == Mirror::even); ++m)
      diagonal.push_back(roots.data() + m * frequencies);
    for (std::size_t m = 1; m < orders && (all || half == Mirror::odd); ++m)
      diagonal.push_back(roots.data() + m * frequencies);
    RowFactor multipoles;
    multipoles.diagonals = int(diagonal.size());
    multipoles.diagonal = diagonal.data();
    const RowFactor rows = row_factor(ribbon_, j + window_.q.first - ribbon_.window().q.first,
                                      shift(ribbon_.window()), all, half, dipole_);
    return add_row_block(rows, multipoles, window_.xi.count, matrix(value, orders, all, half),
                         with_slope_ ? matrix(slope, orders, all, half) : std::vector<double>(),
                         sums);
  }

  const RowScatterer& ribbon_;
  const Scatterer& tube_;
  const RowPose& pose_;
  const Window& window_;
  bool with_slope_;
  double away_;  // the rows seen from the tube go the other way
  std::vector<const double*> dipole_;
};

void require(const RowScatterer& ribbon, const Scatterer& tube, const RowPose& pose,
             const Window& window) {
  if (tube.channel() != Channel::outward || !tube.window().covers(window) ||
      !ribbon.window().q.contains(window.q) || !ribbon.window().xi.contains(window.xi))
    throw std::invalid_argument(
        "rows_tube_density: a ribbon and an outward scatterer on the window are required");
  const double nearest = least_axis_distance_nm(ribbon.rows(), pose);
  if (!(nearest > tube.radius_nm()))
    throw std::domain_error(
        fmt::format("rows_tube_density: a row {} nm from the axis of a tube of radius {} nm, "
                    "required: outside",
                    nearest, tube.radius_nm()));
  for (int j = 0; j < window.q.count; ++j)
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m)
      for (const double value : tube.reduced(j + window.q.first - tube.window().q.first, m))
        if (!(value >= 0))
          throw std::domain_error(
              "rows_tube_density: a negative T^e, required: a tube in vacuum beside a ribbon");
}

}  // namespace

RowDensity rows_tube_density(const RowScatterer& ribbon, const Scatterer& tube, const RowPose& pose,
                             const Window& window, bool with_slope) {
  require(ribbon, tube, pose, window);
  const RowsTube pair(ribbon, tube, pose, window, with_slope);
  return sum_waves(tube.nodes().q, window, with_slope,
                   [&](int j, auto& sums) { return pair.add(j, sums); });
}

}  // namespace gapwright
