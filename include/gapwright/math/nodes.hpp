// The lattice of nodes in wave number and imaginary frequency that all bodies share.
#pragma once

#include <cstddef>
#include <span>
#include <vector>

namespace gapwright {

/// A number with its numerical error estimate, both in the same unit.
struct Estimate {
  double value = 0.0;
  double error = 0.0;
};

/// Nodes x_j = origin·e^{j·step}, j any integer; with from_zero, x_j = 0 for every j < 0. Step and
/// origin depend on tolerance and temperature only, so whatever is tabulated for one body serves
/// every other one.
struct LogLattice {
  double step = 0.5;
  double origin = 1.0;
  bool from_zero = false;

  double node(int index) const;
  /// Largest index with node(index) <= x, exact at the nodes; not below -1 with from_zero. Throws
  /// std::domain_error unless 0 < x < infinity; so does index_above.
  int index_below(double x) const;
  /// Smallest index with node(index) >= x.
  int index_above(double x) const;
};

/// Consecutive lattice indices first … first + count - 1.
struct IndexRange {
  int first = 0;
  int count = 0;

  int end() const { return first + count; }
  bool contains(const IndexRange& other) const {
    return other.count == 0 || (first <= other.first && other.end() <= end());
  }
  bool operator==(const IndexRange&) const = default;
};

/// The lattices a tolerance and a temperature ask for [q: nm^-1, xi: eV]; METHODS §8. At T > 0 the
/// frequencies are 0, of index -1, and ξ₁e^{kh}, k >= 0, from the first Matsubara frequency up.
struct Nodes {
  LogLattice q;
  LogLattice xi;
  double tolerance = 1e-4;

  /// True at T > 0.
  bool warm() const { return xi.from_zero; }
  bool operator==(const Nodes& other) const {
    return tolerance == other.tolerance && xi.origin == other.xi.origin &&
           xi.from_zero == other.xi.from_zero;
  }
};

/// Nodes for a relative tolerance of the dispersion energy, 1e-8 … 1e-2, and the first Matsubara
/// frequency 2πkT [eV], 0 at T = 0. Throws std::domain_error outside.
Nodes make_nodes(double tolerance, double first_matsubara_eV = 0.0);

/// The part of the lattice one row needs: wave numbers, frequencies, and at each wave number the
/// multipoles 0 … orders[j]-1 (never increasing with j).
struct Window {
  IndexRange q;
  std::vector<int> orders;
  IndexRange xi;
  bool fine = false;  ///< wave numbers on the lattice of half the step

  int max_order() const { return orders.empty() ? 0 : orders.front(); }
  /// True where every node of `other` is a node of this window.
  bool covers(const Window& other) const;
  /// Number of (q, m) cells.
  std::size_t cells() const;
  bool operator==(const Window&) const = default;
};

/// The smallest window that covers both, which must be of one lattice.
Window united(const Window& a, const Window& b);

/// How an integrand continues beyond the first and the last node of an axis.
struct Continuation {
  bool constant_below = true;  ///< f(x) = f(x_first) for x < x_first
  double power_above = 0.0;    ///< f(x) = f(x_last)·(x_last/x)^power for x > x_last; 0: nothing
};

/// Trapezoid weights in ln x for ∫ f(x) dx over the nodes of a range, continuation included:
/// `full` uses every node, `halved` every node of even index at twice the step. Comparing the two
/// gives the error estimate. halved is zero at odd indices. Both have range.count entries.
struct AxisWeights {
  std::vector<double> full;
  std::vector<double> halved;
};
AxisWeights trapezoid_weights(const LogLattice& lattice, const IndexRange& range,
                              const Continuation& continuation);

/// Error estimate of a trapezoid in ln x whose error falls as e^{-c/step}: from the sums over all
/// nodes and over every other one. [unit of the sums]; METHODS §8.
double trapezoid_error(double full, double halved);

}  // namespace gapwright
