// Succeeds when the installed library links and its built-in catalogues can be read.
#include <gapwright/catalog/catalogs.hpp>

int main() {
  const auto& catalogs = gapwright::Catalogs::built_in();
  return catalogs.hopping().name.empty() || catalogs.hash().size() != 16 ? 1 : 0;
}
