// Rows of tubes side by side.
#pragma once

#include "contact_terms.hpp"
#include "tube_cache.hpp"

#include <gapwright/pair/binding.hpp>
#include <gapwright/pair/placement.hpp>

namespace gapwright {

/// Announces the tubes of a parallel row with the window it needs.
void announce_parallel(const Placement& placement, const Carbon& carbon, TubeCache& cache);

/// Fills the energies of a parallel row at its gap, or at the bottom of its well.
void bind_parallel(const Placement& placement, const Carbon& carbon, TubeCache& cache,
                   const ContactTerm& contact, Binding& row);

/// Contact energy of all pairs of walls of two tubes [eV/nm], and its derivative by the gap.
SmoothEnergy parallel_contact(const TubeObject& first, const TubeObject& second,
                              const PairFunction& pair, double gap_nm);

}  // namespace gapwright
