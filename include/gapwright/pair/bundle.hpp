// Hexagonal bundles of one kind of tube, as the sum of their parallel pairs (METHODS §10).
#pragma once

#include <gapwright/pair/binder.hpp>

#include <string>

namespace gapwright {

/// Neighbours are summed up to about this gap.
inline constexpr double bundle_reach_nm = 10.0;

/// Lattice constant [nm] and cohesive energy per tube and length [eV/nm] of one energy.
struct BundleEnergy {
  double lattice_constant_nm = 0.0;
  double energy_eV_per_nm = 0.0;
  double first_neighbours_eV_per_nm = 0.0;  ///< its share
};

struct Bundle {
  std::string object;
  double diameter_nm = 0.0;
  int neighbours = 0;           ///< of a tube, those summed
  BundleEnergy model;           ///< dispersion and contact
  BundleEnergy pair_potential;  ///< the chirality-blind one beside it
  double lattice_constant_error_nm = 0.0;
  double energy_error = 0.0;
  double beyond_eV_per_nm = 0.0;  ///< about what the pairs left out would add
  Status status = Status::ok;
  std::string message;
};

/// Rigid tubes in a hexagonal lattice, E(a) = ½Σ U(|r|) over its vectors, at its minimum. Pairs are
/// summed as if no other tube were near. Throws InputError for what is no tube, and where no
/// contact term exists.
Bundle hexagonal_bundle(const Binder& binder, const Object& object);

}  // namespace gapwright
