// From energy density on the nodes to an energy with its error (METHODS §5, §8).
#pragma once

#include <gapwright/math/nodes.hpp>
#include <gapwright/response/conditions.hpp>

#include <vector>

namespace gapwright {

/// F(ξ) at each frequency node: the log-determinant summed over the wave numbers with all nodes,
/// and with every other one [energy per length or area times nothing: eV-free, nm^-1 or nm^-2].
struct FrequencyDensity {
  std::vector<double> full;
  std::vector<double> halved;
  int derivatives = 0;  ///< by distance: each weighs the cut ends of the window more
};

/// Energy at T = 0: (1/2π)∫₀^∞ F dξ, with constant continuation below the first node and ξ^-4 above
/// the last. The error is that of both axes. [unit of F times eV]
Estimate frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi,
                       const Conditions& conditions);

/// The lowest wave number [nm^-1] a row takes nodes from; `length_nm` is the largest length of its
/// geometry (outer radius, distance of the axes).
double lowest_wave(double length_nm, double tolerance);

/// The frequency range every contact row uses at this tolerance.
IndexRange contact_frequencies(const Nodes& nodes);
/// The nodes of rows on a frequency range: half the step in q on ranges that reach below
/// contact_frequencies, for the integrand of far bodies is narrower in ln q.
Nodes nodes_on(IndexRange xi, const Nodes& nodes);

/// The frequency range of a row whose bodies are this far apart: contact_frequencies up to 1 nm,
/// wider towards small frequencies beyond, by decades of the distance.
IndexRange frequencies_at(double distance_nm, const Nodes& nodes);

}  // namespace gapwright
