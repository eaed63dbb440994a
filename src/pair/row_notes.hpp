// What a reader of a row has to know about its limits.
#pragma once

#include <gapwright/pair/binding.hpp>

#include <string>
#include <vector>

namespace gapwright {

/// Notes on a row of two bodies beside each other, over or across, whose energies are filled.
std::vector<std::string> notes_of(const Binding& row);

}  // namespace gapwright
