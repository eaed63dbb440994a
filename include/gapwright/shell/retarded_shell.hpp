// A cylindrical shell in the full Maxwell problem, TM and TE waves coupled (METHODS §9).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/math/bessel.hpp>
#include <gapwright/response/retardation.hpp>
#include <gapwright/response/shell_response.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// A symmetric 2×2 over the waves of one (m, q, ξ): TM is E_z, TE is H_z.
struct WaveBlock {
  double tm = 0.0;
  double mixed = 0.0;
  double te = 0.0;
};

/// One channel of a shell at (m, q, ξ): T = reduced·e^{log_scale}. The scale is ln(I/K) outward and
/// -ln(I/K) inward at κR; the ideal metal has reduced = diag(1, (I'/I)(K/|K'|)) outward and its
/// inverse inward.
struct RetardedBlock {
  WaveBlock reduced;
  double determinant = 0.0;  ///< of reduced, free of cancellation
  WaveBlock radius_slope;    ///< dT/dR·e^{-log_scale} [nm^-1] at fixed αQ² and α_⊥
  double log_scale = 0.0;
};

/// What a sheet of current and normal dipoles is and which wave meets it, METHODS (9.3) … (9.6).
struct RetardedCell {
  int order = 0;              ///< m >= 0
  double wave_per_nm = 0.0;   ///< q > 0
  double delay_per_nm = 0.0;  ///< s = ξ/ħc >= 0
  double radius_nm = 0.0;
  double strength_nm = 0.0;  ///< α >= 0; an ideal metal has α → ∞, up to 1e100
  double normal_nm = 0.0;    ///< α_⊥ >= 0
};

/// Block of one cell; `waves` are the Bessel functions at κR, κ² = q² + s², up to order m or more.
/// Exact at s = 0, where only TM is left and equals METHODS (4.2), (4.3). Channel::through is
/// refused with std::invalid_argument.
RetardedBlock retarded_block(Channel channel, const RetardedCell& cell, const BesselLogs& waves);

/// A shell in vacuum from its π response and the background. Keeps a reference to the response.
class RetardedShell {
 public:
  RetardedShell(const ShellResponse& response, const Background& background,
                const RetardedOptions& options = {});

  double radius_nm() const { return response_.radius_nm(); }
  const Nodes& nodes() const { return response_.nodes(); }
  const Window& window() const { return response_.window(); }

  /// Orders 0 … blocks.size()-1 at one wave number and frequency, both as indices within window().
  void blocks(Channel channel, int j, int k, std::span<RetardedBlock> blocks) const;

 private:
  const ShellResponse& response_;
  std::vector<double> delay_;     // ξ/ħc
  std::vector<double> in_plane_;  // α_σ
  std::vector<double> normal_;    // α_⊥
};

}  // namespace gapwright
