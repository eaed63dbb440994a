// bind --bundle.
#pragma once

#include "words.hpp"

#include <gapwright/pair/binder.hpp>

namespace gapwright::cli {

/// Binds a hexagonal bundle of the one tube that was named; returns the exit code.
int bind_bundle(const Words& words, const Catalogs& catalogs, const Settings& settings);

}  // namespace gapwright::cli
