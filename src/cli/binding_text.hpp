// One pair as a block to read.
#pragma once

#include <gapwright/pair/binding.hpp>

#include <string>

namespace gapwright::cli {

std::string binding_text(const Binding& row);

/// The pair as a user would type it, "(5,5)@(10,10)" or "(10,10) (17,0)".
std::string pair_text(const Binding& row);

}  // namespace gapwright::cli
