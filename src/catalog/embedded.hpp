// Catalogue files compiled into the library.
#pragma once

#include <string_view>
#include <vector>

namespace gapwright {

struct EmbeddedFile {
  std::string_view name;
  std::string_view text;
};

/// Generated at build time from catalogs/.
const std::vector<EmbeddedFile>& embedded_catalogs();

}  // namespace gapwright
