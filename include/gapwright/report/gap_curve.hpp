// Energy and force of a placed pair against its gap, as a report draws them.
#pragma once

#include <gapwright/pair/binder.hpp>

#include <optional>
#include <string>
#include <vector>

namespace gapwright {

/// One kind of interaction at every gap of a curve.
struct CurveLine {
  std::vector<double> energy;
  std::vector<double> force;  ///< negative where the bodies attract
};

/// Units are named: they depend on the arrangement.
struct GapCurve {
  std::string energy_unit;  ///< "eV/nm", or "eV" of crossed bodies
  std::string force_name;   ///< "pressure" of walls in walls, else "force"
  std::string force_unit;   ///< "GPa", "eV/nm²", or "eV/nm" of crossed bodies
  std::vector<double> gap_nm;
  CurveLine dispersion;
  std::optional<CurveLine> contact;         ///< none where no contact term exists
  std::optional<CurveLine> pair_potential;  ///< the chirality-blind one (METHODS §6), the same way
};

/// Dispersion, contact term and pair potential over gaps from repulsion to weak attraction. Walls
/// in walls: at fixed mid radius, as if they could breathe (METHODS §7). Nothing for what has no
/// such curve: more than two walls, walls with retardation.
std::optional<GapCurve> gap_curve(const Binder& binder, const Placement& placement);

}  // namespace gapwright
