#include <gapwright/sweep/store.hpp>

#include <string_view>

namespace gapwright {

std::string_view program_version() {
  return GAPWRIGHT_VERSION;
}

}  // namespace gapwright
