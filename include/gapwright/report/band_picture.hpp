// Bands and density of states of one tube on the grids a picture needs.
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/lattice/tube.hpp>

#include <string>
#include <vector>

namespace gapwright {

/// Energies are from neutrality, cut at ±window_eV.
struct BandPicture {
  std::string label;
  double window_eV = 0.0;
  double zone_edge_per_nm = 0.0;  ///< π/T
  std::vector<double> k;          ///< 0 … 1, in units of the zone edge
  /// All sub-bands that enter the window, over half the zone: the other half is their mirror image.
  /// [band][k]
  std::vector<std::vector<double>> bands_eV;
  std::vector<double> energy_eV;  ///< centres of bins of equal width
  std::vector<double> states_per_eV_atom;
};

/// Bands by zone folding (METHODS §2). The density of states counts both spins and is the average
/// over each bin of sub-bands that are linear between dense k: over all energies it sums to 2 an
/// atom. Throws std::domain_error unless window_eV > 0 and bins >= 1.
BandPicture band_picture(const Tube& tube, const HoppingSet& hopping, double window_eV = 3.0,
                         int bins = 600);

}  // namespace gapwright
