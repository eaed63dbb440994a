// Wires that answer along their axis alone (METHODS §4, plain wires).
#pragma once

#include <gapwright/response/conditions.hpp>
#include <gapwright/response/electron_gas.hpp>
#include <gapwright/shell/scatterer.hpp>
#include <gapwright/wire/row_scatterer.hpp>

#include <string>

namespace gapwright {

/// Plain wires are outward scatterers of which only m = 0 is not zero, so that they go wherever a
/// tube goes: beside it, across it, over a sheet. The other multipoles of the window are there and
/// empty.

/// T^e_0 = -2k_e χ₁D I₀²/(1 - 2k_e χ₁D I₀K₀) at qR of an electron gas in its host, k_e → k_e/ε.
Scatterer gas_wire_scatterer(const ElectronGasWire& wire, double temperature_K, const Nodes& nodes,
                             const Window& window);

/// A tube of one or more walls reduced to its m = 0.
Scatterer axial_scatterer(const Scatterer& body);

/// A ribbon reduced to T^e_0 = -2k_e Σ_jj' X_jj', its charges on the axis; the radius given is that
/// within which other bodies are not let.
Scatterer axial_scatterer(const RowScatterer& ribbon, double radius_nm);

/// A window that asks for m = 0 alone: for two plain wires.
Window axial_window(Window window);

/// What a reader must know of an energy by m = 0 alone, axes a distance apart: it is the axial
/// share and a lower bound of |E|, for gapped bodies at any distance; bodies that are not thin
/// against the distance lose most. Empty for two plain gases of electrons farther than ten radii.
std::string axial_note(double distance_nm, double wider_radius_nm, bool gapped);

}  // namespace gapwright
