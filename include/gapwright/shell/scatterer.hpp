// A cylindrical shell as a scatterer of potential waves (METHODS §4).
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/catalog/media.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/response/shell_response.hpp>

#include <span>
#include <vector>

namespace gapwright {

/// Which wave comes in and which is counted.
enum class Channel {
  outward,  ///< T^e: regular wave in, outgoing wave out
  inward,   ///< T^i: outgoing wave from inside in, regular wave back
  through,  ///< T^x: share taken from a wave that passes
};

/// One channel of a body about an axis, diagonal in (m, q): T = reduced·e^{log_scale}. For a bare
/// shell `reduced` is of order one (its ideal-metal value is 1) and the scale, which does not
/// depend on ξ, carries the Bessel functions: ln(I/K), -ln(I/K), 0 for outward, inward, through.
class Scatterer {
 public:
  Scatterer() = default;
  Scatterer(Channel channel, double radius_nm, Nodes nodes, Window window);

  Channel channel() const { return channel_; }
  double radius_nm() const { return radius_nm_; }
  const Nodes& nodes() const { return nodes_; }
  const Window& window() const { return window_; }

  /// One cell; j = wave-number index minus window().q.first, m < orders[j]; ξ runs fastest.
  std::span<double> reduced(int j, int m) { return slice(reduced_, j, m); }
  std::span<const double> reduced(int j, int m) const { return slice(reduced_, j, m); }
  /// d ln T/dR [nm^-1] at fixed (αQ²) and α_⊥, scale included.
  std::span<double> radius_slope(int j, int m) { return slice(radius_slope_, j, m); }
  std::span<const double> radius_slope(int j, int m) const { return slice(radius_slope_, j, m); }
  double& log_scale(int j, int m) { return log_scale_[cells_[j] + m]; }
  double log_scale(int j, int m) const { return log_scale_[cells_[j] + m]; }

  std::size_t bytes() const;

 private:
  std::span<double> slice(std::vector<double>& v, int j, int m) {
    return {v.data() + (cells_[j] + m) * window_.xi.count, std::size_t(window_.xi.count)};
  }
  std::span<const double> slice(const std::vector<double>& v, int j, int m) const {
    return {v.data() + (cells_[j] + m) * window_.xi.count, std::size_t(window_.xi.count)};
  }

  Channel channel_ = Channel::outward;
  double radius_nm_ = 0.0;
  Nodes nodes_;
  Window window_;
  std::vector<std::size_t> cells_;
  std::vector<double> reduced_;
  std::vector<double> radius_slope_;
  std::vector<double> log_scale_;
};

/// The scatterer of one shell in vacuum from its π response and the background, on a window that
/// the response covers. Throws std::invalid_argument when it does not.
Scatterer shell_scatterer(Channel channel, const ShellResponse& response,
                          const Background& background, const Window& window);

/// A shell with vacuum inside and a medium outside (METHODS §4, liquids). T^e may have either sign,
/// `reduced` carries it; 1 - T^x is the geometric mean of what passes inwards and outwards, so that
/// enclosed() holds as it is. The radius slope is not formed (zero). With vacuum outside the values
/// are those of shell_scatterer. Throws std::invalid_argument as it does.
Scatterer liquid_shell_scatterer(Channel channel, const ShellResponse& response,
                                 const Background& background, const Medium& outside,
                                 const Window& window);

/// What walls inside look like from outside the next wall: S_k = T^e_k + (1 - T^x_k)² S_{k-1} /
/// (1 - S_{k-1} T^i_k), as an outward scatterer with the scale of the outer wall. The radius slope
/// is not formed (zero). METHODS §5.
Scatterer enclosed(const Scatterer& inside, const Scatterer& outward, const Scatterer& inward,
                   const Scatterer& through, const Window& window);

}  // namespace gapwright
