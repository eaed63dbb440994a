#include <gapwright/math/nodes.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

// The trapezoid error of the dispersion energy falls as e^{-decay/step}: `scale`·e^{-decay/step}
// equals the tolerance at the step chosen.
constexpr double trapezoid_decay = 6.1;
constexpr double trapezoid_scale = 20.0;
constexpr double widest_step = 0.55;

// err(step) = squared_factor · err(2·step)² for relative errors.
constexpr double squared_factor = 2.0;
constexpr double rounding_floor = 1e-15;

// Between the nodes of T > 0 the density is a cubic spline, whose error falls faster than step^4:
// 1.5e-6 at 0.25.
double spline_step(double tolerance) {
  return 0.25 * std::min(1.0, std::pow(tolerance / 1e-5, 0.2));
}

IndexRange united(const IndexRange& a, const IndexRange& b) {
  if (a.count == 0) return b;
  if (b.count == 0) return a;
  const int first = std::min(a.first, b.first);
  return {first, std::max(a.end(), b.end()) - first};
}

// Raises every multipole count of `window` to that of `part` where both have the wave number.
void raise_orders(Window& window, const Window& part) {
  for (int j = 0; j < part.q.count; ++j) {
    int& orders = window.orders[part.q.first + j - window.q.first];
    orders = std::max(orders, part.orders[j]);
  }
}

// Lattice sum weights on the nodes first, first + stride, … <= last, continuations included.
void add_weights(const LogLattice& lattice, const IndexRange& range, int first, int stride,
                 const Continuation& continuation, std::vector<double>& weights) {
  if (first >= range.end()) return;
  const int last = first + (range.end() - 1 - first) / stride * stride;
  const double step = lattice.step * stride;
  for (int index = first; index <= last; index += stride)
    weights[index - range.first] = step * lattice.node(index);
  const double first_share = step * lattice.node(first);
  const double last_share = step * lattice.node(last);
  if (continuation.constant_below) weights[first - range.first] += first_share / std::expm1(step);
  if (continuation.power_above > 0)
    weights[last - range.first] += last_share / std::expm1((continuation.power_above - 1) * step);
}

}  // namespace

double LogLattice::node(int index) const {
  if (from_zero && index < 0) return 0.0;
  return origin * std::exp(index * step);
}

int LogLattice::index_below(double x) const {
  if (!(x > 0) || !std::isfinite(x))
    throw std::domain_error(
        fmt::format("LogLattice::index_below: x = {}, required: 0 < x < infinity", x));
  if (from_zero && x < origin) return -1;
  int index = static_cast<int>(std::floor(std::log(x / origin) / step));
  while (node(index) > x) --index;
  while (node(index + 1) <= x) ++index;
  return index;
}

int LogLattice::index_above(double x) const {
  const int below = index_below(x);
  return node(below) == x ? below : below + 1;
}

Nodes make_nodes(double tolerance, double first_matsubara_eV) {
  if (!(tolerance >= 1e-8 && tolerance <= 1e-2))
    throw std::domain_error(
        fmt::format("make_nodes: tolerance = {}, required: 1e-8 … 1e-2", tolerance));
  const double step =
      std::min(widest_step, trapezoid_decay / std::log(trapezoid_scale / tolerance));
  if (!(first_matsubara_eV >= 0) || !std::isfinite(first_matsubara_eV))
    throw std::domain_error(
        fmt::format("make_nodes: first_matsubara_eV = {}, required: >= 0", first_matsubara_eV));
  Nodes nodes{.q = {step}, .xi = {step}, .tolerance = tolerance};
  if (first_matsubara_eV > 0) nodes.xi = {spline_step(tolerance), first_matsubara_eV, true};
  return nodes;
}

bool Window::covers(const Window& other) const {
  if (fine != other.fine && other.q.count > 0) return false;
  if (!q.contains(other.q) || !xi.contains(other.xi)) return false;
  for (int j = 0; j < other.q.count; ++j)
    if (orders[other.q.first + j - q.first] < other.orders[j]) return false;
  return true;
}

std::size_t Window::cells() const {
  std::size_t sum = 0;
  for (const int count : orders) sum += static_cast<std::size_t>(count);
  return sum;
}

Window united(const Window& a, const Window& b) {
  if (a.fine != b.fine && a.q.count > 0 && b.q.count > 0)
    throw std::invalid_argument("united: the windows stand on different lattices");
  Window window{.q = united(a.q, b.q),
                .orders = {},
                .xi = united(a.xi, b.xi),
                .fine = a.q.count > 0 ? a.fine : b.fine};
  window.orders.assign(window.q.count, 0);
  raise_orders(window, a);
  raise_orders(window, b);
  for (int j = window.q.count - 2; j >= 0; --j)
    window.orders[j] = std::max(window.orders[j], window.orders[j + 1]);
  return window;
}

AxisWeights trapezoid_weights(const LogLattice& lattice, const IndexRange& range,
                              const Continuation& continuation) {
  if (range.count < 0)
    throw std::domain_error(
        fmt::format("trapezoid_weights: range.count = {}, required: >= 0", range.count));
  if (continuation.power_above != 0 && !(continuation.power_above > 1))
    throw std::domain_error(fmt::format("trapezoid_weights: power_above = {}, required: 0 or > 1",
                                        continuation.power_above));
  AxisWeights weights{std::vector<double>(range.count), std::vector<double>(range.count)};
  const int first_even = range.first + (range.first % 2 != 0);
  add_weights(lattice, range, range.first, 1, continuation, weights.full);
  add_weights(lattice, range, first_even, 2, continuation, weights.halved);
  return weights;
}

double trapezoid_error(double full, double halved) {
  const double difference = std::abs(full - halved);
  const double size = std::abs(full);
  const double squared = size > 0 ? squared_factor * difference * (difference / size) : difference;
  return std::min(difference, squared) + rounding_floor * size;
}

}  // namespace gapwright
