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

/// An energy (at T > 0 a free energy) and its n = 0 part, which is zero at T = 0.
struct FrequencySum : Estimate {
  double static_part = 0.0;
};

/// Energy from the density on the frequencies of the nodes. T = 0: (1/2π)∫₀^∞ F dξ, with constant
/// continuation below the first node; T > 0: kT Σ' F(ξ_n), the range must start at the static node.
/// F falls as ξ^-4 above the last node. The error is that of both axes. [unit of F times eV]
FrequencySum frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi);
/// The same; throws std::invalid_argument when the nodes are not those of the temperature.
FrequencySum frequency_sum(const FrequencyDensity& density, const Nodes& nodes, IndexRange xi,
                           const Conditions& conditions);

/// How much each frequency of a range counts in the sum, as weights of ∫dξ [eV].
std::vector<double> frequency_weights(const Nodes& nodes, IndexRange xi);

/// The lowest wave number [nm^-1] a row takes nodes from; `length_nm` is the largest length of its
/// geometry (outer radius, distance of the axes).
double lowest_wave(double length_nm, double tolerance);

/// The lowest wave number at T > 0 of bodies that long waves bind (a share of 1): at ξ = 0 metallic
/// bodies screen as logarithms of q, so that the part below is an error of order q·length.
double lowest_static_wave(double length_nm, double tolerance);

/// The frequency range every contact row uses; at T > 0 the range of all rows.
IndexRange contact_frequencies(const Nodes& nodes);

/// Bodies this far apart (surfaces beyond 1 nm) see each other by long waves, whose integrand is
/// narrower in ln q: their windows are fine, on half the step.
bool far_apart(double distance_nm);
/// The nodes of a window: half the step in q where it is fine.
Nodes nodes_on(const Window& window, const Nodes& nodes);

/// The frequency range of a row whose bodies are this far apart: contact_frequencies up to 1 nm and
/// at T > 0, wider towards small frequencies beyond, by decades of the distance.
IndexRange frequencies_at(double distance_nm, const Nodes& nodes);

}  // namespace gapwright
