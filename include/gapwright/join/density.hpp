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
};

/// Energy at T = 0: (1/2π)∫₀^∞ F dξ, with constant continuation below the first node and ξ^-4 above
/// the last. The error is that of both axes. [unit of F times eV]
Estimate frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi,
                       const Conditions& conditions);

/// The frequency range every contact row uses at this tolerance.
IndexRange contact_frequencies(const Nodes& nodes);

}  // namespace gapwright
