// The band sum along lines, for any Hamiltonian.
#pragma once

#include "cutting_lines.hpp"
#include "line_kernel.hpp"

#include <gapwright/bands/hamiltonian.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// Panel rule and precision that a tolerance asks for.
struct LinePrecision {
  PanelRule panels;
  bool single = true;  ///< sums over ξ in single precision
};
LinePrecision line_precision(double tolerance, bool nearest_neighbour_only);

/// Integrates W ΔE/(ΔE² + ξ²) over lines, all ξ at once; holds the scratch space of one thread.
class LineIntegrator {
 public:
  LineIntegrator(const SheetHamiltonian& hamiltonian, const LinePrecision& precision,
                 std::span<const double> xi_eV);

  /// Adds factor·∫dz W ΔE/(ΔE² + ξ²), mean of both directions, over the nodes of the line k =
  /// origin + (0, z) with final states at k + wave_vector (T = 0, undoped). sums.size() = number of
  /// ξ.
  void add(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes, double factor,
           std::span<double> sums);

 private:
  void simple_transitions(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes);
  void general_transitions(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes);

  const SheetHamiltonian& hamiltonian_;
  bool single_;
  std::vector<double> xi2_;
  LineTransitions transitions_;
  std::vector<double> scratch_;
};

}  // namespace gapwright
