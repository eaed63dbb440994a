// The direction-averaged response of flat graphene (METHODS §3).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/math/spline.hpp>
#include <gapwright/response/conditions.hpp>
#include <gapwright/response/shell_response.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// Mean over the direction of Q of the sheet's χ(Q, iξ), tabulated on a fine logarithmic grid in Q
/// at the frequencies of the shared lattice.
class FlatResponse {
 public:
  /// Q from wave_min_nm to wave_max_nm [nm^-1]. Relative accuracy 2e-6 (1e-9 below tolerance 1e-5).
  FlatResponse(const HoppingSet& hopping, const Conditions& conditions, const Nodes& nodes,
               IndexRange xi, double wave_min_per_nm, double wave_max_per_nm);

  const IndexRange& xi() const { return xi_; }
  bool covers(double wave_min_per_nm, double wave_max_per_nm) const;
  /// α_π(Q, iξ) = -4πk_e χ̄/Q² [nm] at every ξ of xi(); out.size() == xi().count. Below the
  /// tabulated range the first value of αQ·… is continued as α(Q) constant.
  void strength_nm(double wave_per_nm, std::span<double> out) const;

 private:
  IndexRange xi_;
  double wave_min_ = 0.0;
  double wave_max_ = 0.0;
  UniformSplines log_strength_;  // ln α over ln Q
};

/// The response a shell of this radius would have if its π electrons were those of flat graphene at
/// Q² = q² + m²/R²: what the electronic share is measured against (METHODS §7).
ShellResponse flat_shell_response(const FlatResponse& flat, double radius_nm, const Nodes& nodes,
                                  const Window& window);

}  // namespace gapwright
