// The commands: words in, an exit code out.
#pragma once

#include "words.hpp"

namespace gapwright::cli {

int describe(const Words& words);
int bind(const Words& words);
int rank(const Words& words);
int table(const Words& words);
int report(const Words& words);
int check(const Words& words);

}  // namespace gapwright::cli
