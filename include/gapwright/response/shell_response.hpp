// The density response of the π electrons of one cylindrical carbon shell (METHODS §3).
#pragma once

#include <gapwright/bands/hamiltonian.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/conditions.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// (αQ²)_π = -4πk_e·½(χ_m + χ_{-m})(q, iξ) [nm^-1] of one shell on a window, ξ fastest.
class ShellResponse {
 public:
  ShellResponse() = default;
  ShellResponse(double radius_nm, Nodes nodes, Window window);

  double radius_nm() const { return radius_nm_; }
  const Nodes& nodes() const { return nodes_; }
  const Window& window() const { return window_; }

  /// The ξ values of one cell; j = wave-number index minus window().q.first, m < orders[j].
  std::span<double> cell(int j, int m);
  std::span<const double> cell(int j, int m) const;

 private:
  double radius_nm_ = 0.0;
  Nodes nodes_;
  Window window_;
  std::vector<std::size_t> offsets_;
  std::vector<double> values_;
};

/// Response of a tube on the window, from its own bands. T = 0, undoped: every cell is an integral
/// over the helical cutting lines with Gauss panels that keep all branch points outside the
/// Bernstein ellipse ρ = 2.4. Relative accuracy 1e-6 (3e-5 at single nodes) from 1e-5 up (single
/// precision), else 5e-8. Works in parallel over cells with OpenMP unless called from a task.
/// A value at a node does not depend on the window it is computed with.
ShellResponse tube_response(const Tube& tube, const HoppingSet& hopping,
                            const Conditions& conditions, const Nodes& nodes, const Window& window);

}  // namespace gapwright
