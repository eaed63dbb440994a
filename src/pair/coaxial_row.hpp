// Rows of coaxial walls.
#pragma once

#include "contact_terms.hpp"
#include "tube_cache.hpp"

#include <gapwright/pair/binding.hpp>
#include <gapwright/pair/placement.hpp>

namespace gapwright {

/// Tubes of a coaxial row with the windows its interfaces need.
void announce_coaxial(const TubeObject& object, const Carbon& carbon, TubeCache& cache);

/// Fills the energies of a row of two or more walls (METHODS §5 … §7), of two with retardation
/// (§9).
void bind_coaxial(const TubeObject& object, const Carbon& carbon, TubeCache& cache,
                  const ContactTerm& contact, Binding& row);

/// Contact energy of all pairs of walls [eV/nm].
double coaxial_contact(const TubeObject& object, const PairFunction& pair);

}  // namespace gapwright
