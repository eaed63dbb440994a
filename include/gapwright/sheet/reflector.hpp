// Flat bodies as mirrors of evanescent waves at any wave vector (METHODS §4).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/catalog/media.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/flat_response.hpp>

#include <memory>
#include <span>
#include <vector>

namespace gapwright {

/// r(k, iξ) of a flat body, dimensionless, at the frequencies of the shared lattice.
class Reflector {
 public:
  Reflector() = default;
  Reflector(const Reflector&) = default;
  Reflector& operator=(const Reflector&) = default;
  virtual ~Reflector() = default;

  virtual const IndexRange& xi() const = 0;
  /// r at every ξ of xi() for a wave of size `wave` whose component along a given axis is `axial`
  /// [nm^-1]; out.size() == xi().count.
  virtual void reflection(double axial, double wave, std::span<double> out) const = 0;
};

/// A carbon sheet, r = (αk/2)/(1 + αk/2) + α_⊥k/2, as good as its flat response.
class CarbonReflector final : public Reflector {
 public:
  CarbonReflector(std::shared_ptr<const FlatResponse> flat, const Background& background,
                  const Nodes& nodes);
  const IndexRange& xi() const override { return flat_->xi(); }
  void reflection(double axial, double wave, std::span<double> out) const override;

 private:
  std::shared_ptr<const FlatResponse> flat_;
  std::vector<double> in_plane_;
  std::vector<double> normal_;
};

/// A half-space of a medium facing another one (vacuum or a liquid): r = (ε_s - ε)/(ε_s + ε), the
/// same for all waves, of either sign.
class HalfSpaceReflector final : public Reflector {
 public:
  HalfSpaceReflector(const Medium& body, const Medium& outside, const Nodes& nodes, IndexRange xi);
  const IndexRange& xi() const override { return xi_; }
  void reflection(double axial, double wave, std::span<double> out) const override;

 private:
  IndexRange xi_;
  std::vector<double> reflection_;
};

}  // namespace gapwright
