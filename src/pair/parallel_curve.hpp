// Tubes side by side.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/join/parallel.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/pair/curve.hpp>

#include <memory>
#include <mutex>

namespace gapwright {

class ParallelCurve final : public PairCurve {
 public:
  ParallelCurve(const TubeObject& first, const TubeObject& second, const Carbon& carbon,
                TubeCache& cache)
      : first_(first), second_(second), carbon_(carbon), cache_(cache) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double gap_nm) const override;
  bool has_contact() const override { return carbon_.in_vacuum(); }
  /// All pairs of walls of the two tubes.
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  struct Bodies {
    std::shared_ptr<const Scatterer> first, second;
  };
  /// Own electrons at one gap, with the coupling that other electrons share.
  struct Evaluated {
    double gap_nm = 0.0;
    std::shared_ptr<const ParallelCoupling> coupling;
    ParallelDensity own;
  };

  Window window(double gap_nm) const;
  Bodies bodies(Electrons electrons, const Window& here) const;
  Evaluated evaluate(double gap_nm, bool with_slope, RoundTrips trips) const;

  TubeObject first_;
  TubeObject second_;
  const Carbon& carbon_;
  TubeCache& cache_;
  mutable std::mutex last_mutex_;
  mutable Evaluated last_;  ///< the electronic share follows the dispersion at the same gap
};

}  // namespace gapwright
