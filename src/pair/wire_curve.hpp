// Plain wires beside, across and over other bodies: dispersion by m = 0 alone.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/catalog/wires.hpp>
#include <gapwright/lattice/label.hpp>
#include <gapwright/pair/curve.hpp>
#include <gapwright/pair/placement.hpp>
#include <gapwright/sheet/reflector.hpp>

#include <memory>
#include <optional>
#include <variant>

namespace gapwright {

/// A wire of the catalogue or a tube of one or more walls.
using AxialBody = std::variant<ElectronGasWire, TubeObject>;

/// At least one of the two is a wire; over a flat body there is no second one.
class WireCurve final : public PairCurve {
 public:
  /// `below` is what lies under the first body where the arrangement is `over`: a half-space, or
  /// none for the flat sheet.
  WireCurve(const AxialBody& first, const std::optional<AxialBody>& second, Arrangement arrangement,
            double angle_deg, const std::optional<Medium>& below, const Carbon& carbon,
            TubeCache& cache)
      : first_(first),
        second_(second),
        arrangement_(arrangement),
        angle_deg_(angle_deg),
        below_(below),
        carbon_(carbon),
        cache_(cache) {}

  double touching_nm() const override;
  void announce(double closest_gap_nm) const override;
  CurvePoint dispersion(double gap_nm, bool with_slope, RoundTrips trips) const override;
  Estimate electronic_share(double) const override { return {}; }
  bool has_electronic_share() const override { return false; }
  std::string note(double gap_nm) const override;
  /// What a wire's surface is made of is not known.
  bool has_contact() const override { return false; }
  SmoothEnergy contact(const PairFunction&, double) const override { return {}; }

 private:
  Window window(double gap_nm) const;
  std::shared_ptr<const Scatterer> scatterer(const AxialBody& body, const Window& window) const;
  CurvePoint crossed(double gap_nm, const Window& here, bool with_slope, bool all) const;

  AxialBody first_;
  std::optional<AxialBody> second_;
  Arrangement arrangement_;
  double angle_deg_;
  std::optional<Medium> below_;
  const Carbon& carbon_;
  TubeCache& cache_;
};

}  // namespace gapwright
