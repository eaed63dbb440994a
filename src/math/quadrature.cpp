#include <gapwright/math/quadrature.hpp>

#include <cmath>
#include <map>
#include <mutex>
#include <numbers>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

// P_n and P'_n at x, |x| < 1, by the three-term recurrence. Extended precision so that the rule is
// right to the last bits of double.
struct Legendre {
  long double value;
  long double slope;
};

Legendre legendre(int n, long double x) {
  long double before = 1, value = x;
  for (int k = 2; k <= n; ++k) {
    const long double next = ((2 * k - 1) * x * value - (k - 1) * before) / k;
    before = value;
    value = next;
  }
  return {value, n * (before - x * value) / ((1 - x) * (1 + x))};
}

GaussRule make_rule(int count) {
  GaussRule rule{std::vector<double>(count), std::vector<double>(count)};
  for (int i = 0; i < (count + 1) / 2; ++i) {
    // Tricomi's start is good enough that Newton converges quadratically from the first step.
    long double x = std::cos(std::numbers::pi_v<long double> * (i + 0.75L) / (count + 0.5L));
    Legendre at = legendre(count, x);
    for (int iteration = 0; iteration < 8; ++iteration) {
      const long double change = at.value / at.slope;
      x -= change;
      at = legendre(count, x);
      if (std::abs(change) < 1e-17L) break;
    }
    if (2 * i + 1 == count) at = legendre(count, x = 0);
    const long double weight = 2 / ((1 - x) * (1 + x) * at.slope * at.slope);
    rule.nodes[i] = static_cast<double>(-x);
    rule.nodes[count - 1 - i] = static_cast<double>(x);
    rule.weights[i] = rule.weights[count - 1 - i] = static_cast<double>(weight);
  }
  return rule;
}

}  // namespace

const GaussRule& gauss_legendre(int count) {
  if (count < 1)
    throw std::domain_error(fmt::format("gauss_legendre: count = {}, required: >= 1", count));
  static std::mutex mutex;
  static std::map<int, GaussRule> rules;  // references into a map stay valid
  const std::scoped_lock lock(mutex);
  const auto found = rules.find(count);
  return found != rules.end() ? found->second
                              : rules.emplace(count, make_rule(count)).first->second;
}

}  // namespace gapwright
