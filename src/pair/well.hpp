// The well of two bodies whose distance is free.
#pragma once

#include <gapwright/contact/short_range.hpp>
#include <gapwright/pair/curve.hpp>

#include <functional>
#include <optional>

namespace gapwright {

struct Well {
  double gap_nm = 0.0;
  double gap_error_nm = 0.0;
  double stiffness = 0.0;  ///< d²E/dg²
  CurvePoint dispersion;   ///< at the gap
};

inline constexpr double closest_well_nm = 0.22;
inline constexpr double farthest_well_nm = 0.8;

/// The gap where dispersion plus contact is least, to 1e-7 nm; none when there is no minimum within
/// 0.22 … 0.8 nm. The first round trip alone, `first`, gives the start: ln|E| of it as a cubic in
/// ln g, which every further point of `dispersion` corrects in value and slope. Three such points
/// as a rule; the contact term is cheap and exact.
std::optional<Well> find_well(const std::function<CurvePoint(double gap_nm)>& dispersion,
                              const std::function<CurvePoint(double gap_nm)>& first,
                              const std::function<SmoothEnergy(double gap_nm)>& contact);

}  // namespace gapwright
