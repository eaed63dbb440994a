// Labels of ribbons.
#pragma once

#include <gapwright/lattice/ribbon.hpp>

#include <string_view>

namespace gapwright {

/// "13-AGNR", "6-ZGNR", also in small letters. Throws InputError with the nearest ribbon.
Ribbon read_ribbon(std::string_view text);

}  // namespace gapwright
