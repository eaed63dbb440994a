// Ribbons beside ribbons and tubes: stacked, coplanar, edge-on.
#pragma once

#include "ribbon_cache.hpp"

#include <gapwright/contact/rows.hpp>
#include <gapwright/join/rows_tube.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/pair/curve.hpp>
#include <gapwright/pair/placement.hpp>

namespace gapwright {

/// Two ribbons; of two edge-on the second one stands upright.
class RowsCurve final : public PairCurve {
 public:
  RowsCurve(const Ribbon& first, const Ribbon& second, Arrangement arrangement, double offset_nm,
            const Carbon& carbon, RibbonCache& cache)
      : first_(first),
        second_(second),
        arrangement_(arrangement),
        offset_nm_(offset_nm),
        carbon_(carbon),
        cache_(cache) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double) const override { return {}; }
  bool has_electronic_share() const override { return false; }
  bool has_contact() const override { return true; }
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  RowPose pose(double gap_nm) const;

  Ribbon first_, second_;
  Arrangement arrangement_;
  double offset_nm_;
  const Carbon& carbon_;
  RibbonCache& cache_;
};

/// A ribbon and a tube of one or more walls: over its face, or in its plane.
class RowsTubeCurve final : public PairCurve {
 public:
  RowsTubeCurve(const Ribbon& ribbon, const TubeObject& tube, Arrangement arrangement,
                double offset_nm, const Carbon& carbon, RibbonCache& ribbons, TubeCache& tubes)
      : ribbon_(ribbon),
        tube_(tube),
        arrangement_(arrangement),
        offset_nm_(offset_nm),
        carbon_(carbon),
        ribbons_(ribbons),
        tubes_(tubes) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double) const override { return {}; }
  bool has_electronic_share() const override { return false; }
  bool has_contact() const override { return true; }
  /// All walls of the tube.
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  RowPose pose(double gap_nm) const;
  Window window(double gap_nm) const;

  Ribbon ribbon_;
  TubeObject tube_;
  Arrangement arrangement_;
  double offset_nm_;
  const Carbon& carbon_;
  RibbonCache& ribbons_;
  TubeCache& tubes_;
};

/// The rows of a ribbon as lines of atoms, where the pose puts them.
std::vector<AtomLine> lines_of(const Ribbon& ribbon, const RowPose& pose);

}  // namespace gapwright
