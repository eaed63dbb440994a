// Bodies about an axis as mirrors of evanescent plane waves.
#pragma once

#include <span>

namespace gapwright {

struct WavePlace;

/// What a body makes of plane waves at any wave number along its axis, tabulated on the nodes.
class FaceTable {
 public:
  FaceTable() = default;
  FaceTable(const FaceTable&) = default;
  FaceTable& operator=(const FaceTable&) = default;
  virtual ~FaceTable() = default;

  virtual int frequencies() const = 0;
  /// e^{-2k·depth} (k/π) r̃ of METHODS (5.8) at every frequency; q lies `shift` nodes above the
  /// place, k² = q² + across².
  virtual void plane_wave(const WavePlace& place, int shift, double q, double k, double across,
                          double depth, std::span<double> out) const = 0;
};

}  // namespace gapwright
