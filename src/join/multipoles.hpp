// Decay of multipole waves with distance, for windows.
#pragma once

namespace gapwright {

/// η of the uniform expansion I_m(x) ~ e^η, K_m(x) ~ e^-η (Abramowitz & Stegun 9.7.7).
double multipole_exponent(int m, double x);

/// The largest m (at least 0) whose round trip e^{-2[η_m(q·far) - η_m(q·near)]} is not below
/// e^{-limit}; searched from `start` downwards or upwards.
int largest_multipole(double q, double near_nm, double far_nm, double limit, int start);

/// The multipoles of every window of bodies this far apart: the transverse dipoles of gapped bodies
/// fall as slowly as the axial ones, so that no exponent says when they end.
int least_multipole(double gap_nm);

}  // namespace gapwright
