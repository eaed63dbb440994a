// The band sum along lines, for any Hamiltonian.
#pragma once

#include "cutting_lines.hpp"
#include "line_kernel.hpp"
#include "occupation.hpp"

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

/// Fermi factors of a line integral.
struct Filling {
  Occupation occupation;
  bool trivial;          ///< factors of T = 0 without doping
  double nearest = 0.0;  ///< least distance of a band from the chemical potential [eV]
};

/// Integrates W ΔE/(ΔE² + ξ²) over lines, all ξ at once; holds the scratch space of one thread.
class LineIntegrator {
 public:
  LineIntegrator(const SheetHamiltonian& hamiltonian, const LinePrecision& precision,
                 const Filling& filling, std::span<const double> xi_eV);

  /// Adds factor·∫dz ½Σ W ΔE Δn/(ΔE² + ξ²) over transitions across and within the bands, the mean
  /// of both directions, over the nodes of the line k = origin + (0, z) with final states at k +
  /// wave_vector. sums.size() = number of ξ.
  void add(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes, double factor,
           std::span<double> sums);

 private:
  void simple_transitions(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes);
  void general_transitions(PlaneVector origin, PlaneVector wave_vector, const LineNodes& nodes);
  void fill_simple(const LineNodes& nodes);
  void accumulate(const LineTransitions& transitions, bool single);
  void fill_general(const BandState& a, const BandState& b, double overlap, double weight);
  /// A transition within a band: ½·weight·overlap·[n(low) - n(high)]/(high - low) = half_strength.
  void add_within(double half_strength, double difference);

  const SheetHamiltonian& hamiltonian_;
  bool single_;
  Filling filling_;
  double active_;  // nearer than this to μ transitions within a band count [eV]
  double frozen_;  // farther than this above μ no Fermi factor counts [eV]
  std::vector<double> xi2_;
  LineTransitions transitions_;
  LineTransitions within_;
  std::vector<double> levels_, warm_;
  std::vector<int> warm_nodes_;
  std::vector<double> scratch_;
};

}  // namespace gapwright
