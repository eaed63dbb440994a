// Ribbons across ribbons and tubes and over flat bodies: the first round trip.
#pragma once

#include "ribbon_cache.hpp"

#include <gapwright/catalog/media.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/pair/curve.hpp>
#include <gapwright/sheet/reflector.hpp>

#include <memory>
#include <optional>

namespace gapwright {

/// A ribbon's face and another one's, or a tube of one or more walls, crossed; energies in all, eV.
class RowsCrossedCurve final : public PairCurve {
 public:
  RowsCrossedCurve(const Ribbon& first, const std::optional<Ribbon>& ribbon, const TubeObject& tube,
                   double angle_deg, const Carbon& carbon, RibbonCache& ribbons, TubeCache& tubes)
      : first_(first),
        ribbon_(ribbon),
        tube_(tube),
        angle_deg_(angle_deg),
        carbon_(carbon),
        ribbons_(ribbons),
        tubes_(tubes) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double) const override { return {}; }
  bool has_electronic_share() const override { return false; }
  std::string note(double) const override;
  bool has_contact() const override { return true; }
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  Window window(double gap_nm) const;

  Ribbon first_;
  std::optional<Ribbon> ribbon_;  // or the tube
  TubeObject tube_;
  double angle_deg_;
  const Carbon& carbon_;
  RibbonCache& ribbons_;
  TubeCache& tubes_;
};

/// A ribbon's face over the flat sheet, or over a half-space of a medium.
class RowsOverCurve final : public PairCurve {
 public:
  RowsOverCurve(const Ribbon& ribbon, const std::optional<Medium>& half_space, const Carbon& carbon,
                RibbonCache& ribbons, TubeCache& tubes)
      : ribbon_(ribbon),
        half_space_(half_space),
        carbon_(carbon),
        ribbons_(ribbons),
        tubes_(tubes) {}

  double touching_nm() const override { return 0.0; }
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double) const override { return {}; }
  bool has_electronic_share() const override { return false; }
  std::string note(double) const override;
  bool has_contact() const override { return !half_space_; }
  SmoothEnergy contact(const PairFunction& pair, double gap_nm) const override;

 private:
  std::unique_ptr<const Reflector> reflector(const Window& window) const;

  Ribbon ribbon_;
  std::optional<Medium> half_space_;
  const Carbon& carbon_;
  RibbonCache& ribbons_;
  TubeCache& tubes_;
};

}  // namespace gapwright
