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
  /// Q from wave_min to wave_max. Relative accuracy 1e-6 below Q = 8 nm^-1, 1e-4 at 13 and 2e-3 at
  /// 16 nm^-1, where umklapp sets in and e^{-2Qd} leaves nothing of it; 1e-7 below 10 nm^-1 at a
  /// tolerance under 1e-5.
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
