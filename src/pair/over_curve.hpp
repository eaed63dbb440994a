// A tube over a flat body.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/join/over_sheet.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/pair/curve.hpp>

#include <memory>
#include <optional>

namespace gapwright {

class OverCurve final : public PairCurve {
 public:
  /// Over the flat sheet, or over a half-space of a medium (METHODS §5, over a sheet).
  OverCurve(const TubeObject& tube, const std::optional<Medium>& half_space, const Carbon& carbon,
            TubeCache& cache)
      : tube_(tube), half_space_(half_space), carbon_(carbon), cache_(cache) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double gap_nm) const override;
  bool has_contact() const override { return !half_space_; }
  /// All walls of the tube.
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  Window window(double gap_nm) const;
  std::unique_ptr<const Reflector> reflector(const Window& window) const;
  OverSheetDensity densities(double gap_nm, const Window& here, Electrons electrons,
                             bool with_slope) const;

  TubeObject tube_;
  std::optional<Medium> half_space_;
  const Carbon& carbon_;
  TubeCache& cache_;
};

}  // namespace gapwright
