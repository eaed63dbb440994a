// Tubes across each other.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/join/crossed.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/pair/curve.hpp>

namespace gapwright {

/// Energies of two infinite tubes in all, eV (METHODS §5, crossed).
class CrossedCurve final : public PairCurve {
 public:
  CrossedCurve(const TubeObject& first, const TubeObject& second, double angle_deg,
               const Carbon& carbon, TubeCache& cache)
      : first_(first), second_(second), angle_deg_(angle_deg), carbon_(carbon), cache_(cache) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double gap_nm) const override;
  bool has_contact() const override { return carbon_.in_vacuum(); }
  /// All pairs of walls of the two tubes.
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  struct Bodies;
  Window window(double gap_nm) const;
  Bodies bodies(const Window& window, Electrons electrons) const;
  FrequencySum sum(const FrequencyDensity& density, const Window& window) const;

  TubeObject first_;
  TubeObject second_;
  double angle_deg_;
  const Carbon& carbon_;
  TubeCache& cache_;
};

}  // namespace gapwright
