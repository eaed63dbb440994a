// One pair as a block to read.
#pragma once

#include <gapwright/pair/binding.hpp>

#include <string>

namespace gapwright::cli {

std::string binding_text(const Binding& row);

}  // namespace gapwright::cli
