// How the program ends.
#pragma once

namespace gapwright::cli {

enum ExitCode {
  good = 0,
  fault = 1,      ///< ours, or a gated check outside
  bad_input = 2,  ///< what was asked for, a file, a disk
  some_failed = 3,
  stopped = 4,  ///< before the end: run again to go on
};

}  // namespace gapwright::cli
