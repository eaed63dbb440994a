#include <gapwright/shell/retarded_shell.hpp>

#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

/// Bessel functions of one order at x = κR.
struct CellWaves {
  double x, kappa;
  double product;  ///< I K
  double rise;     ///< I'/I
  double fall;     ///< |K'|/K

  double order2;  ///< 1 + m²/x², of Bessel's equation

  double rise_slope() const { return kappa * (order2 - rise / x - rise * rise); }
  double fall_slope() const { return kappa * (-order2 - fall / x + fall * fall); }
};

/// The tangential part P = (1 + M G)⁻¹ M of METHODS (9.4), its determinant and dP/dR at fixed αQ².
struct SurfaceCurrent {
  WaveBlock p, slope;
  double determinant;
};

/// U S Uᵀ of a symmetric S.
WaveBlock congruent(double u11, double u12, double u21, double u22, const WaveBlock& s) {
  return {u11 * u11 * s.tm + 2 * u11 * u12 * s.mixed + u12 * u12 * s.te,
          u11 * u21 * s.tm + (u11 * u22 + u12 * u21) * s.mixed + u12 * u22 * s.te,
          u21 * u21 * s.tm + 2 * u21 * u22 * s.mixed + u22 * u22 * s.te};
}

SurfaceCurrent surface_current(const RetardedCell& cell, const CellWaves& w) {
  const double s = cell.delay_per_nm, q = cell.wave_per_nm, radius = cell.radius_nm;
  const double h = q * cell.order / w.x;
  const double a = cell.strength_nm * radius;
  const WaveBlock m{a * (w.kappa * w.kappa + h * h), -a * s * h, a * s * s};
  const double delta = (a * s * w.kappa) * (a * s * w.kappa);
  const double g_tm = w.product, g_te = w.product * w.rise * w.fall;
  const double n = 1 + m.tm * g_tm + m.te * g_te + delta * g_tm * g_te;
  SurfaceCurrent c{
      {(m.tm + delta * g_te) / n, m.mixed / n, (m.te + delta * g_tm) / n}, {}, delta / n};
  // dP = U dM Uᵀ - P G' P, U = (1 + M G)⁻¹; α ∝ 1/Q² and h ∝ 1/R move with R.
  const double around = cell.order / radius;
  const double growth = (1 + 2 * around * around / (q * q + around * around)) / radius;
  const WaveBlock m_slope{growth * m.tm - 2 * a * h * h / radius,
                          growth * m.mixed + a * s * h / radius, growth * m.te};
  c.slope = congruent((1 + m.te * g_te) / n, -m.mixed * g_te / n, -m.mixed * g_tm / n,
                      (1 + m.tm * g_tm) / n, m_slope);
  const double both = w.kappa * (w.rise - w.fall);
  const double g_tm_slope = g_tm * both;
  const double g_te_slope =
      g_te * both + w.product * (w.rise_slope() * w.fall + w.rise * w.fall_slope());
  const WaveBlock& p = c.p;
  c.slope.tm -= p.tm * p.tm * g_tm_slope + p.mixed * p.mixed * g_te_slope;
  c.slope.mixed -= p.mixed * (p.tm * g_tm_slope + p.te * g_te_slope);
  c.slope.te -= p.mixed * p.mixed * g_tm_slope + p.te * p.te * g_te_slope;
  return c;
}

}  // namespace

RetardedBlock retarded_block(Channel channel, const RetardedCell& cell, const BesselLogs& waves) {
  if (channel == Channel::through)
    throw std::invalid_argument("retarded_block: channel = through, required outward or inward");
  const bool outward = channel == Channel::outward;
  const auto i = std::size_t(cell.order);
  CellWaves w{};
  w.kappa = std::hypot(cell.wave_per_nm, cell.delay_per_nm);
  w.x = w.kappa * cell.radius_nm;
  w.product = std::exp(waves.log_i[i] + waves.log_k[i]);
  w.rise = waves.slope_i[i];
  w.fall = -waves.slope_k[i];
  w.order2 = 1 + (cell.order / w.x) * (cell.order / w.x);
  const SurfaceCurrent c = surface_current(cell, w);

  // Over the square of the channel's own function F: A = D P D + u g gᵀ, D = diag(1, d).
  const double d = outward ? w.rise : w.fall;
  const double d_slope = outward ? w.rise_slope() : w.fall_slope();
  const double growth = 2 * w.kappa * (outward ? w.rise : -w.fall);  // d ln F²/dR
  const double u = cell.normal_nm * cell.radius_nm;
  const double g_tm = cell.wave_per_nm * d, g_te = -cell.order * cell.delay_per_nm / w.x;
  const double g_tm_slope = cell.wave_per_nm * d_slope, g_te_slope = -g_te / cell.radius_nm;
  const WaveBlock current{c.p.tm, c.p.mixed * d, c.p.te * d * d};
  const WaveBlock a{current.tm + u * g_tm * g_tm, current.mixed + u * g_tm * g_te,
                    current.te + u * g_te * g_te};
  const WaveBlock a_slope{c.slope.tm + cell.normal_nm * g_tm * g_tm + 2 * u * g_tm * g_tm_slope,
                          c.slope.mixed * d + c.p.mixed * d_slope + cell.normal_nm * g_tm * g_te +
                              u * (g_tm * g_te_slope + g_te * g_tm_slope),
                          c.slope.te * d * d + 2 * c.p.te * d * d_slope +
                              cell.normal_nm * g_te * g_te + 2 * u * g_te * g_te_slope};

  RetardedBlock block;
  const double y = w.product;
  block.reduced = {y * a.tm, y * a.mixed, y * a.te};
  block.radius_slope = {y * (growth * a.tm + a_slope.tm), y * (growth * a.mixed + a_slope.mixed),
                        y * (growth * a.te + a_slope.te)};
  // det(C + u g gᵀ) = det C + u gᵀ adj(C) g
  block.determinant =
      y * y *
      (c.determinant * d * d +
       u * (g_tm * g_tm * current.te - 2 * g_tm * g_te * current.mixed + g_te * g_te * current.tm));
  block.log_scale = waves.log_i[i] - waves.log_k[i];
  if (!outward) block.log_scale = -block.log_scale;
  return block;
}

RetardedShell::RetardedShell(const ShellResponse& response, const Background& background,
                             const RetardedOptions& options)
    : response_(response) {
  if (!(options.hbar_c_eV_nm > 0))
    throw std::domain_error("RetardedShell: hbar_c_eV_nm must be positive");
  const IndexRange& range = response.window().xi;
  for (int k = 0; k < range.count; ++k) {
    const double xi = response.nodes().xi.node(range.first + k);
    delay_.push_back(xi / options.hbar_c_eV_nm);
    in_plane_.push_back(background.in_plane_nm(xi));
    normal_.push_back(background.normal_nm(xi));
  }
}

void RetardedShell::blocks(Channel channel, int j, int k, std::span<RetardedBlock> blocks) const {
  const auto at = std::size_t(k);
  RetardedCell cell;
  cell.wave_per_nm = nodes().q.node(window().q.first + j);
  cell.delay_per_nm = delay_[at];
  cell.radius_nm = radius_nm();
  cell.normal_nm = normal_[at];
  const double kappa = std::hypot(cell.wave_per_nm, cell.delay_per_nm);
  const BesselLogs waves = bessel_logs(kappa * cell.radius_nm, int(blocks.size()));
  for (std::size_t m = 0; m < blocks.size(); ++m) {
    cell.order = int(m);
    const double around = cell.order / cell.radius_nm;
    const double wave2 = cell.wave_per_nm * cell.wave_per_nm + around * around;
    cell.strength_nm = response_.cell(j, cell.order)[at] / wave2 + in_plane_[at];
    blocks[m] = retarded_block(channel, cell, waves);
  }
}

}  // namespace gapwright
