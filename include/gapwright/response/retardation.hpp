// How fast fields travel.
#pragma once

#include <gapwright/catalog/constants.hpp>

namespace gapwright {

/// ħc [eV·nm] of retarded energies; a larger value leads to the non-retarded ones (METHODS §9).
struct RetardedOptions {
  double hbar_c_eV_nm = constants::hbar_c_eV_nm;
};

}  // namespace gapwright
