// What describe says of a nanoribbon.
#pragma once

#include "describe_text.hpp"

#include <gapwright/catalog/entries.hpp>
#include <gapwright/lattice/ribbon.hpp>

namespace gapwright::cli {

Json ribbon_json(const Ribbon& ribbon, const HoppingSet& hopping, const RibbonEdges& edges);
std::string ribbon_text(const Ribbon& ribbon, const HoppingSet& hopping, const RibbonEdges& edges);

}  // namespace gapwright::cli
