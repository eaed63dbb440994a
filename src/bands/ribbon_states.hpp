// Eigenvalues of the band matrices of ribbons.
#pragma once

#include <gapwright/bands/ribbon_hamiltonian.hpp>

#include <vector>

namespace gapwright {

/// All, rising [eV].
std::vector<double> all_energies(const BandMatrix& matrix);

}  // namespace gapwright
