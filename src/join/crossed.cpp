#include "charge_waves.hpp"
#include "crossed_further.hpp"
#include "multipoles.hpp"
#include "row_face.hpp"
#include "wave_table.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/math/quadrature.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <optional>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

/// Lowest wave number at T > 0, in inverse distances, where charge waves are this share of the
/// energy: room for (8.11) of METHODS, whose fit turns e^{-2qD} next to its nodes into an error.
double lowest_static(double share, double tolerance) {
  return 2.5e-7 / (1 + 100 * share) * std::min(1.0, tolerance / 1e-4);
}

/// Step of t in steps of ln q: the integrand varies a little faster along t.
constexpr double across_step = 0.8;

/// cosh t beyond which less than a fiftieth of the tolerance is left: the rest falls as 1/cosh t
/// where the two wave numbers are still alike and as its square beyond.
double largest_cosh(double tolerance, double sine) {
  return std::sqrt(50 / (sine * tolerance));
}

}  // namespace

double lowest_charge_wave(double gap_nm, double distance_nm, double tolerance) {
  return std::min(2e-3, 0.05 * tolerance / charge_wave_share(gap_nm)) / std::max(1.0, distance_nm);
}

Window crossed_window(double radius_1_nm, double radius_2_nm, double distance_nm,
                      const Nodes& nodes) {
  const double gap = distance_nm - radius_1_nm - radius_2_nm;
  if (!(radius_1_nm >= 0) || !(radius_2_nm >= 0) || !(gap > 0) || !std::isfinite(gap))
    throw std::domain_error(fmt::format(
        "crossed_window: radii {} and {} nm, axes {} nm apart, required: bodies that do not touch",
        radius_1_nm, radius_2_nm, distance_nm));
  const double limit = largest_exponent(nodes.tolerance);
  const double share = charge_wave_share(gap);
  Window window;
  // Below the lowest frequency the density is continued as a constant while it falls slowly: an
  // error of about 3e-4·share where bodies this far apart begin. Likewise below the lowest wave
  // number, 0.6·share·q·D.
  const double lower = std::max(1.0, 3e-4 * share / (0.1 * nodes.tolerance));
  window.xi = frequencies_at(std::max(1.0, gap) * lower, nodes);
  window.fine = far_apart(std::max(1.0, gap) * lower);
  const LogLattice lattice = nodes_on(window, nodes).q;
  const double lowest = lowest_charge_wave(gap, distance_nm, nodes.tolerance);
  window.q.first = lattice.index_below(
      nodes.warm()
          ? std::min(lowest, lowest_static(share, nodes.tolerance) / std::max(1.0, distance_nm))
          : lowest);
  window.q.count = lattice.index_above(limit / (2 * gap)) + 1 - window.q.first + 1;
  const double wider = std::max(radius_1_nm, radius_2_nm);
  const double far = distance_nm - std::min(radius_1_nm, radius_2_nm);
  const int least = least_multipole(gap);
  int largest = 0;
  for (int j = 0; j < window.q.count; ++j) {
    // One node more than needed, so that nothing is extrapolated.
    const double q = lattice.node(window.q.first + std::max(0, j - 1));
    const int m = largest_multipole(q, wider, far, limit, largest);
    largest = j == 0 ? m : std::min(m, largest);
    window.orders.push_back(std::max(largest, least) + 1);
  }
  return window;
}

namespace {

/// Wave numbers of equal or of opposite sign along the two axes.
struct Branch {
  double sine, cosine;  // of half the angle between the axes, or of half its supplement
  double sign;          // of q₁q₂
  double weight;        // 2 where the other branch is the same
};

std::vector<Branch> branches_of(double angle_deg) {
  const double half = 0.5 * angle_deg * constants::pi / 180;
  const double s = std::sin(half), c = std::cos(half);
  if (angle_deg == max_crossing_deg) return {{s, c, 1.0, 2.0}};
  return {{s, c, 1.0, 1.0}, {c, s, -1.0, 1.0}};
}

/// Where the sums of a crossed row run.
struct Extent {
  explicit Extent(const CrossedAxes& row)
      : tolerance(row.nodes.tolerance),
        bodies(row.nodes.q),
        q(row.gap() > 1.0 ? bodies : make_nodes(tolerance).q),
        stride(int(std::lround(q.step / bodies.step))),
        lowest(bodies.node(row.window.q.first)),
        highest(largest_exponent(tolerance) / (2 * row.gap())) {}

  double tolerance;
  LogLattice bodies;  // the nodes of the bodies
  LogLattice q;       // those of the sums: every stride-th
  int stride;
  double lowest, highest;  // of k

  double widest(const Branch& b) const { return largest_cosh(tolerance, b.sine); }
  /// v at t.
  static double split(const Branch& b, double t) { return std::asinh(b.sine * std::sinh(t)); }
  IndexRange waves(const Branch& b) const {
    const int low = q.index_below(lowest * b.cosine);
    return {low, q.index_above(highest * b.cosine) - low + 1};
  }
  /// The lowest lattice index a body is asked for.
  int lowest_index(const std::vector<Branch>& branches) const {
    int index = bodies.index_below(lowest);
    for (const Branch& b : branches) {
      const double v = split(b, std::acosh(widest(b)));
      index = std::min(index, stride * waves(b).first - int(std::ceil(v / bodies.step)) - 1);
    }
    return index;
  }
};

/// In e-folds: farther apart two wave numbers of one plane wave count little.
constexpr double widest_split = 5.0;

/// ∫_{-∞}^0 s dx of s = 1/(a x² + b x + c) through s(0), s(width), s(2·width); none where s falls
/// otherwise.
std::optional<double> logarithmic_tail(std::array<double, 3> s, double width) {
  if (s[0] == 0 || !(s[1] / s[0] > 1) || !(s[2] / s[1] > 1)) return std::nullopt;
  const double c = 1 / s[0], bend = 1 / s[2] - 2 / s[1] + c;
  const double a = bend / (2 * width * width), b = (1 / s[1] - c) / width - a * width;
  if (!(a / c > 0) || !(b / c < 0)) return std::nullopt;
  // x = -X y/(1 - y)
  const double X = -c / b;
  const GaussRule& gauss = gauss_legendre(32);
  double sum = 0.0;
  for (std::size_t i = 0; i < gauss.nodes.size(); ++i) {
    const double y = 0.5 * (1 + gauss.nodes[i]), rest = 1 - y;
    sum += 0.5 * gauss.weights[i] * X / (a * X * X * y * y - b * X * y * rest + c * rest * rest);
  }
  return sum;
}

/// Sums of one branch.
class BranchSum {
 public:
  BranchSum(const CrossedAxes& crossing, const Branch& branch, const FaceTable& a,
            const FaceTable& b, CrossedDensity& density, bool with_slope)
      : crossing_(crossing),
        extent_(crossing),
        branch_(branch),
        a_(a),
        b_(b),
        density_(density),
        with_slope_(with_slope),
        waves_(extent_.waves(branch)),
        weights_(trapezoid_weights(extent_.q, waves_, {})),
        from_a_(std::size_t(a.frequencies())),
        from_b_(from_a_.size()),
        product_(from_a_.size()),
        static_full_(crossing.nodes.warm() ? std::size_t(waves_.count) : 0),
        static_halved_(static_full_.size()) {}

  void run() {
    const double step = across_step * extent_.q.step;
    const double widest = extent_.widest(branch_);
    for (int i = 0; std::cosh(i * step) <= widest; ++i) {
      const double t = i * step, v = Extent::split(branch_, t);
      const WavePlace up(v, extent_.bodies.step), down(-v, extent_.bodies.step);
      // dq₁dq₂ = 2q² dv d ln q, and the same at -q₁, -q₂.
      const double measure = 4 * branch_.weight * branch_.sine * std::cosh(t) / std::cosh(v) * step;
      for (int j = 0; j < waves_.count; ++j) {
        const double q = extent_.q.node(waves_.first + j);
        if (q * std::cosh(t) > extent_.highest * branch_.cosine) break;
        add(j, q, v, q * std::cosh(t) / branch_.cosine, up, down, i);
        weigh(j, measure * q, q * std::cosh(t) / branch_.cosine, i % 2 == 0);
      }
    }
    if (static_full_.empty()) return;
    // Its lowest nodes lack the long waves of the other body.
    const int joint = int(std::ceil(widest_split / extent_.q.step));
    FrequencyDensity& energy = density_.first_round_trip;
    energy.full[0] += static_correction(static_full_, joint, 1, weights_.full);
    energy.halved[0] +=
        static_correction(static_halved_, joint + (waves_.first + joint) % 2, 2, weights_.halved);
  }

 private:
  double across(double q1, double q2) const {
    const double angle = crossing_.angle_deg * constants::pi / 180;
    return (branch_.sign * q2 - q1 * std::cos(angle)) / std::sin(angle);
  }

  /// Fills product_ with r̃₁r̃₂e^{-2kD}k²/π² at (v, and -v for i > 0).
  void add(int j, double q, double v, double k, const WavePlace& up, const WavePlace& down, int i) {
    const double more = q * std::exp(v), less = q * std::exp(-v);
    const double depth_a = crossing_.depth_1(), depth_b = crossing_.depth_2();
    const int shift = extent_.stride * (waves_.first + j);
    a_.plane_wave(up, shift, more, k, across(more, less), depth_a, from_a_);
    b_.plane_wave(down, shift, less, k, across(less, more), depth_b, from_b_);
    for (std::size_t x = 0; x < product_.size(); ++x) product_[x] = from_a_[x] * from_b_[x];
    if (i == 0) return;
    if (&a_ != &b_) {
      a_.plane_wave(down, shift, less, k, across(less, more), depth_a, from_a_);
      b_.plane_wave(up, shift, more, k, across(more, less), depth_b, from_b_);
    }
    for (std::size_t x = 0; x < product_.size(); ++x) product_[x] += from_a_[x] * from_b_[x];
  }

  /// At ξ = 0 metallic bodies screen as 1/ln q: below a joint the sum gives way to the integral of
  /// the density per ln q that three nodes above it tell (METHODS (8.11)). What that changes.
  double static_correction(const std::vector<double>& density, int joint, int stride,
                           const std::vector<double>& weights) const {
    const double step = stride * extent_.q.step;
    const int spacing = stride * std::max(1, int(std::lround(0.5 / step)));
    if (joint < 0 || joint + 2 * spacing >= waves_.count) return 0.0;
    const auto per_log = [&](int j) {
      return extent_.q.node(waves_.first + j) * density[std::size_t(j)];
    };
    const double width = spacing * extent_.q.step;
    const std::optional<double> below = logarithmic_tail(
        {per_log(joint), per_log(joint + spacing), per_log(joint + 2 * spacing)}, width);
    if (!below) return 0.0;
    double summed = 0.0;
    for (int j = 0; j <= joint; ++j) summed += weights[std::size_t(j)] * density[std::size_t(j)];
    const double slope = (per_log(joint + stride) - per_log(joint - stride)) / (2 * step);
    return *below + 0.5 * step * per_log(joint) + step * step / 12 * slope - summed;
  }

  void weigh(int j, double measure, double k, bool even) {
    // (1/sin²γ)·dq₁dq₂/(2π)²·π²/k²
    const double sine = std::sin(crossing_.angle_deg * constants::pi / 180);
    const double factor = -measure / (4 * k * k * sine * sine);
    const double full = factor * weights_.full[std::size_t(j)];
    const double halved = even ? 2 * factor * weights_.halved[std::size_t(j)] : 0.0;
    if (!static_full_.empty()) {
      static_full_[std::size_t(j)] += factor * product_[0];
      if (even) static_halved_[std::size_t(j)] += 2 * factor * product_[0];
    }
    FrequencyDensity& energy = density_.first_round_trip;
    FrequencyDensity& slope = density_.first_slope;
    for (std::size_t x = 0; x < product_.size(); ++x) {
      energy.full[x] += full * product_[x];
      energy.halved[x] += halved * product_[x];
    }
    if (!with_slope_) return;
    for (std::size_t x = 0; x < product_.size(); ++x) {
      slope.full[x] -= 2 * k * full * product_[x];
      slope.halved[x] -= 2 * k * halved * product_[x];
    }
  }

  const CrossedAxes& crossing_;
  const Extent extent_;
  const Branch& branch_;
  const FaceTable& a_;
  const FaceTable& b_;
  CrossedDensity& density_;
  bool with_slope_;
  IndexRange waves_;
  AxisWeights weights_;
  std::vector<double> from_a_, from_b_, product_;
  std::vector<double> static_full_, static_halved_;  // at ξ = 0, per dq; empty at T = 0
};

}  // namespace

double Crossing::wider_radius() const {
  return std::max(first.radius_nm(), second.radius_nm());
}

void CrossedAxes::require(const char* where) const {
  if (!(gap() > 0) || !std::isfinite(gap()))
    throw std::domain_error(
        fmt::format("{}: axes {} nm apart, required: more than the radii {} and {} nm together",
                    where, distance_nm, radius_1, radius_2));
  if (!(angle_deg >= min_crossing_deg && angle_deg <= max_crossing_deg))
    throw std::domain_error(fmt::format("{}: angle {} degrees, required: {} … {}", where, angle_deg,
                                        min_crossing_deg, max_crossing_deg));
}

void Crossing::require(const char* where) const {
  axes().require(where);
  for (const Scatterer* body : {&first, &second})
    if (body->channel() != Channel::outward || !body->window().covers(window))
      throw std::invalid_argument(
          fmt::format("{}: outward scatterers on the window are required", where));
}

namespace {

/// The sums of all branches; `lowest` of the tables is that of the extent.
CrossedDensity crossed_sum(const CrossedAxes& axes, const FaceTable& a, const FaceTable& b,
                           bool with_slope) {
  CrossedDensity density;
  density.first_slope.derivatives = 1;
  for (FrequencyDensity* part : {&density.first_round_trip, &density.first_slope}) {
    if (part == &density.first_slope && !with_slope) continue;
    part->full.assign(std::size_t(axes.window.xi.count), 0.0);
    part->halved.assign(std::size_t(axes.window.xi.count), 0.0);
  }
  for (const Branch& branch : branches_of(axes.angle_deg))
    BranchSum(axes, branch, a, b, density, with_slope).run();
  return density;
}

int lowest_index(const CrossedAxes& axes) {
  return Extent(axes).lowest_index(branches_of(axes.angle_deg));
}

}  // namespace

CrossedDensity crossed_density(const Scatterer& first, const Scatterer& second, double distance_nm,
                               double angle_deg, const Window& window, bool with_slope) {
  const Crossing crossing{first, second, window, distance_nm, angle_deg};
  crossing.require("crossed_density");
  const CrossedAxes axes = crossing.axes();
  const WaveTable a(first, window, lowest_index(axes));
  if (&first == &second) return crossed_sum(axes, a, a, with_slope);
  const WaveTable b(second, window, lowest_index(axes));
  return crossed_sum(axes, a, b, with_slope);
}

CrossedDensity crossed_density(const RowScatterer& first, const RowScatterer& second, double gap_nm,
                               double angle_deg, const Window& window, bool with_slope) {
  const CrossedAxes axes{first.nodes(), window, 0.0, 0.0, gap_nm, angle_deg};
  axes.require("crossed_density");
  const RowFace a(first, window);
  if (&first == &second) return crossed_sum(axes, a, a, with_slope);
  return crossed_sum(axes, a, RowFace(second, window), with_slope);
}

CrossedDensity crossed_density(const RowScatterer& ribbon, const Scatterer& tube,
                               double distance_nm, double angle_deg, const Window& window,
                               bool with_slope) {
  const CrossedAxes axes{tube.nodes(), window, 0.0, tube.radius_nm(), distance_nm, angle_deg};
  axes.require("crossed_density");
  return crossed_sum(axes, RowFace(ribbon, window), WaveTable(tube, window, lowest_index(axes)),
                     with_slope);
}

}  // namespace gapwright
