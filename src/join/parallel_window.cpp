#include "charge_waves.hpp"
#include "multipoles.hpp"

#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/parallel.hpp>

#include <algorithm>
#include <stdexcept>

namespace gapwright {

Window parallel_window(double radius_1_nm, double radius_2_nm, double distance_nm,
                       const Nodes& nodes) {
  const double gap = distance_nm - radius_1_nm - radius_2_nm;
  if (!(radius_1_nm > 0) || !(radius_2_nm > 0) || !(gap > 0))
    throw std::domain_error("parallel_window: the bodies must not touch");
  // Far gapped tubes answer as q², which lifts the integrand to q⁴e^{-2qD}: it ends later.
  const double limit = largest_exponent(nodes.tolerance) + (gap > 1.0 ? 6.0 : 0.0);
  Window window;
  window.xi = frequencies_at(gap, nodes);
  window.fine = far_apart(gap);
  const LogLattice q_lattice = nodes_on(window, nodes).q;
  // Of far metallic tubes the axial charge waves are the whole energy: four times as long ones
  // count.
  const double lowest = lowest_wave(distance_nm, nodes.tolerance);
  double first = gap > 1.0 ? 0.25 * lowest : lowest;
  if (nodes.warm())
    first =
        std::min(first, lowest_static_wave(distance_nm, nodes.tolerance) / charge_wave_share(gap));
  window.q.first = q_lattice.index_below(first);
  window.q.count = q_lattice.index_above(limit / (2 * gap)) - window.q.first + 1;
  // A multipole m of one body meets the other's nearest image line.
  const double wider = std::max(radius_1_nm, radius_2_nm);
  const double far = distance_nm - std::min(radius_1_nm, radius_2_nm);
  const int least = least_multipole(gap);
  int largest = 0;
  for (int j = 0; j < window.q.count; ++j) {
    const double q = q_lattice.node(window.q.first + j);
    const int m = largest_multipole(q, wider, far, limit, largest);
    largest = j == 0 ? m : std::min(m, largest);
    window.orders.push_back(std::max(largest, least) + 1);
  }
  return window;
}

}  // namespace gapwright
