#include "charge_waves.hpp"
#include "row_sum.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/rows.hpp>
#include <gapwright/math/bessel.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>
#include <utility>

#include <fmt/format.h>

namespace gapwright {

RowPose stacked_pose(double gap_nm, double offset_nm) {
  return {.y_nm = offset_nm, .z_nm = gap_nm};
}

RowPose coplanar_pose(const Ribbon& first, const Ribbon& second, double gap_nm, double offset_nm) {
  const double middles = 0.5 * (first.nuclei_width_nm() + second.nuclei_width_nm()) + gap_nm;
  return {.y_nm = middles, .z_nm = offset_nm, .away_y = 1.0, .away_z = 0.0};
}

RowPose edge_on_pose(const Ribbon& second, double gap_nm, double offset_nm) {
  return {
      .y_nm = offset_nm, .z_nm = gap_nm + 0.5 * second.nuclei_width_nm(), .width_angle_deg = 90.0};
}

std::vector<RowPoint> placed_rows(const std::vector<RibbonRow>& rows, const RowPose& pose) {
  const double angle = pose.width_angle_deg * constants::pi / 180;
  // cos 90° is to be nothing at all.
  const double cosine = pose.width_angle_deg == 90 ? 0.0 : std::cos(angle);
  std::vector<RowPoint> points;
  for (const RibbonRow& row : rows)
    points.push_back({pose.y_nm + row.y_nm * cosine, pose.z_nm + row.y_nm * std::sin(angle)});
  return points;
}

namespace {

/// K_0 … K_3 at x > 0, underflowing to nothing.
struct LowOrders {
  explicit LowOrders(double x) {
    const double scale = std::exp(-x);
    k0 = scale * scaled_bessel_k(0, x);
    k1 = scale * scaled_bessel_k(1, x);
    k2 = k0 + 2 / x * k1;
    k3 = k1 + 4 / x * k2;
  }
  double k0, k1, k2, k3;
};

/// Charges and dipoles of point rows of either body: [c₁c₂, c₁d₂, d₁c₂, d₁d₂], each
/// [first][second].
struct PointCoupling {
  std::vector<double> value[4], slope[4];
};

/// Directional derivatives lower or raise the order: (n·∇)K_m e^{imφ} =
/// -(q/2)[e^{-iβ}K_{m+1}e^{i(m+1)φ} + e^{iβ}K_{m-1}e^{i(m-1)φ}], n at the angle β.
PointCoupling couple_points(const std::vector<RibbonRow>& first,
                            const std::vector<RowPoint>& second, const RowPose& pose, double q,
                            bool with_slope) {
  PointCoupling c;
  for (auto* set : {c.value, c.slope})
    for (int p = 0; p < 4; ++p)
      if (set == c.value || with_slope) set[p].resize(first.size() * second.size());
  const double normal_1 = 0.5 * constants::pi;
  const double normal_2 = normal_1 + pose.width_angle_deg * constants::pi / 180;
  const double away = std::atan2(pose.away_z, pose.away_y);
  const double k = 2 * constants::coulomb_eV_nm;
  std::size_t at = 0;
  for (const RibbonRow& from : first)
    for (const RowPoint& to : second) {
      const double y = to.y_nm - from.y_nm, z = to.z_nm;
      const double angle = std::atan2(z, y);
      const LowOrders w(q * std::hypot(y, z));
      const auto once = [&](double a) { return -q * w.k1 * std::cos(angle - a); };
      const auto twice = [&](double a, double b) {
        return 0.5 * q * q * (w.k2 * std::cos(2 * angle - a - b) + w.k0 * std::cos(a - b));
      };
      c.value[0][at] = k * w.k0;
      c.value[1][at] = k * once(normal_2);
      c.value[2][at] = -k * once(normal_1);
      c.value[3][at] = -k * twice(normal_1, normal_2);
      if (with_slope) {
        const double a = normal_1, b = normal_2, u = away;
        const double thrice = -0.25 * q * q * q *
                              (w.k3 * std::cos(3 * angle - a - b - u) +
                               w.k1 * (std::cos(angle + a - b - u) + std::cos(angle - a + b - u) +
                                       std::cos(angle - a - b + u)));
        c.slope[0][at] = k * once(u);
        c.slope[1][at] = k * twice(b, u);
        c.slope[2][at] = -k * twice(a, u);
        c.slope[3][at] = -k * thrice;
      }
      ++at;
    }
  return c;
}

/// Lines `from`, `count` of each quarter side by side: [charges, dipoles] of either body.
std::vector<double> joined(const std::vector<double>* quarters, std::size_t columns,
                           std::pair<std::size_t, std::size_t> lines,
                           std::pair<std::size_t, std::size_t> across) {
  const auto [first, rows] = lines;
  const auto [left, wide] = across;
  std::vector<double> matrix(4 * rows * wide);
  for (std::size_t p = 0; p < 4; ++p)
    for (std::size_t i = 0; i < rows; ++i)
      for (std::size_t k = 0; k < wide; ++k)
        matrix[(i + (p / 2) * rows) * 2 * wide + k + (p % 2) * wide] =
            quarters[p][(first + i) * columns + left + k];
  return matrix;
}

/// One pair of ribbons: what all wave numbers share.
class RowPair {
 public:
  RowPair(const RowScatterer& first, const RowScatterer& second, const RowPose& pose,
          const Window& window, bool with_slope)
      : first_(first),
        second_(second),
        pose_(pose),
        window_(window),
        with_slope_(with_slope),
        points_(placed_rows(second.rows(), pose)),
        dipole_1_(first.rows().size(), first.dipole().data() + shift(first.window())),
        dipole_2_(second.rows().size(), second.dipole().data() + shift(second.window())) {}

  bool add(int j, std::vector<std::vector<double>>& sums) const {
    const double q = first_.nodes().q.node(window_.q.first + j);
    PointCoupling c = couple_points(first_.rows(), points_, pose_, q, with_slope_);
    const std::size_t n1 = first_.rows().size(), n2 = second_.rows().size();
    for (auto* set : {c.value, c.slope})
      for (int p = 0; p < 4 && (set == c.value || with_slope_); ++p) {
        mirror_left(set[p], n1);
        mirror_right(set[p], n2);
      }
    if (!pose_.mirrored()) return add_block(j, c, true, Mirror::even, sums);
    const bool even = add_block(j, c, false, Mirror::even, sums);
    return add_block(j, c, false, Mirror::odd, sums) && even;
  }

 private:
  int shift(const Window& whole) const { return window_.xi.first - whole.xi.first; }

  bool add_block(int j, const PointCoupling& c, bool all, Mirror half,
                 std::vector<std::vector<double>>& sums) const {
    const auto lines = [&](const RowScatterer& body) {
      const std::size_t even = std::size_t(body.half_size(Mirror::even)), n = body.rows().size();
      if (all) return std::pair(std::size_t(0), n);
      return half == Mirror::even ? std::pair(std::size_t(0), even) : std::pair(even, n - even);
    };
    const std::size_t columns = second_.rows().size();
    std::vector<double> slope;
    if (with_slope_) slope = joined(c.slope, columns, lines(first_), lines(second_));
    const int j1 = j + window_.q.first - first_.window().q.first;
    const int j2 = j + window_.q.first - second_.window().q.first;
    return add_row_block(row_factor(first_, j1, shift(first_.window()), all, half, dipole_1_),
                         row_factor(second_, j2, shift(second_.window()), all, half, dipole_2_),
                         window_.xi.count, joined(c.value, columns, lines(first_), lines(second_)),
                         std::move(slope), sums);
  }

  const RowScatterer& first_;
  const RowScatterer& second_;
  const RowPose& pose_;
  const Window& window_;
  bool with_slope_;
  std::vector<RowPoint> points_;
  std::vector<const double*> dipole_1_, dipole_2_;
};

}  // namespace

double least_row_distance_nm(const std::vector<RibbonRow>& first,
                             const std::vector<RibbonRow>& second, const RowPose& pose) {
  double least = HUGE_VAL;
  for (const RowPoint& to : placed_rows(second, pose))
    for (const RibbonRow& from : first)
      least = std::min(least, std::hypot(to.y_nm - from.y_nm, to.z_nm));
  return least;
}

double lowest_row_wave(double length_nm, double gap_nm, const Nodes& nodes) {
  // As of parallel tubes: of far gapless bodies the axial charge waves are the whole energy.
  const double lowest = lowest_wave(length_nm, nodes.tolerance);
  const double first = gap_nm > 1.0 ? 0.25 * lowest : lowest;
  if (!nodes.warm()) return first;
  return std::min(first,
                  lowest_static_wave(length_nm, nodes.tolerance) / charge_wave_share(gap_nm));
}

Window rows_window(double gap_nm, const Nodes& nodes) {
  if (!(gap_nm > 0) || !std::isfinite(gap_nm))
    throw std::domain_error(fmt::format("rows_window: gap = {} nm, required: > 0", gap_nm));
  // Gapped ribbons answer as q², dipoles as q² each: the integrand is lifted and ends later.
  const double limit = largest_exponent(nodes.tolerance) + (gap_nm > 1.0 ? 6.0 : 0.0);
  Window window;
  window.xi = frequencies_at(gap_nm, nodes);
  window.fine = far_apart(gap_nm);
  const LogLattice lattice = nodes_on(window, nodes).q;
  window.q.first = lattice.index_below(lowest_row_wave(gap_nm, gap_nm, nodes));
  window.q.count = lattice.index_above(limit / (2 * gap_nm)) - window.q.first + 1;
  window.orders.assign(std::size_t(window.q.count), 1);
  return window;
}

RowDensity rows_density(const RowScatterer& first, const RowScatterer& second, const RowPose& pose,
                        const Window& window, bool with_slope) {
  for (const RowScatterer* body : {&first, &second})
    if (!body->window().q.contains(window.q) || !body->window().xi.contains(window.xi))
      throw std::invalid_argument("rows_density: scatterers on the window are required");
  if (!(least_row_distance_nm(first.rows(), second.rows(), pose) > 0))
    throw std::domain_error("rows_density: rows of the two ribbons meet, required: apart");
  const RowPair pair(first, second, pose, window, with_slope);
  return sum_waves(first.nodes().q, window, with_slope,
                   [&](int j, auto& sums) { return pair.add(j, sums); });
}

}  // namespace gapwright
