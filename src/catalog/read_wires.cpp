#include "readers.hpp"

#include <gapwright/catalog/constants.hpp>

namespace gapwright {

double ElectronGasWire::fermi_wave_per_nm() const {
  return constants::pi * density_per_nm / degeneracy;
}

double ElectronGasWire::fermi_energy_eV() const {
  const double k = fermi_wave_per_nm();
  return constants::hbar2_per_mass_eV_nm2 * k * k / (2 * mass);
}

namespace {

/// One positive number; its source joins those of the entry.
double positive(const TomlReader& entry, const std::string& key,
                const std::vector<std::string>& units, ElectronGasWire& wire, std::string* unit) {
  const Quantity quantity = read_quantity(entry, key, units);
  if (wire.source.find(quantity.source) == std::string::npos)
    wire.source += (wire.source.empty() ? "" : "; ") + quantity.source;
  if (!(quantity.values[0] > 0))
    throw entry.error(key, "'" + key + "' is not positive", "a number above 0");
  if (unit) *unit = quantity.unit;
  return quantity.values[0];
}

ElectronGasWire read_wire(const TomlReader& entry, const std::vector<std::string>& taken) {
  ElectronGasWire wire;
  wire.name = read_name(entry, taken);
  wire.title = entry.text("title");
  std::string unit;
  wire.mass = positive(entry, "mass", {"electron mass"}, wire, nullptr);
  wire.density_per_nm = positive(entry, "density", {"1/nm", "1e6/cm"}, wire, &unit);
  if (unit == "1e6/cm") wire.density_per_nm *= 0.1;
  wire.degeneracy = positive(entry, "degeneracy", {"1"}, wire, nullptr);
  wire.radius_nm = positive(entry, "radius", {"nm"}, wire, nullptr);
  wire.host_permittivity = positive(entry, "host_permittivity", {"1"}, wire, nullptr);
  if (wire.host_permittivity < 1)
    throw entry.error("host_permittivity", "'host_permittivity' is below that of vacuum",
                      "a number not below 1");
  entry.finish();
  return wire;
}

}  // namespace

std::vector<ElectronGasWire> read_wires(const TomlReader& file) {
  std::vector<ElectronGasWire> wires;
  std::vector<std::string> names;
  for (const TomlReader& entry : file.tables("wire")) {
    wires.push_back(read_wire(entry, names));
    names.push_back(wires.back().name);
  }
  file.finish();
  return wires;
}

}  // namespace gapwright
