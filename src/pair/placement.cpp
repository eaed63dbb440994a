#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/placement.hpp>

namespace gapwright {

std::string arrangement_word(Arrangement) {
  return "coaxial";
}

Arrangement parse_arrangement(std::string_view word) {
  if (word == "coaxial") return Arrangement::coaxial;
  const std::string typed(word);
  throw InputError({.what = "arrangement '" + typed + "' is not computed by this version",
                    .where = "arrangement",
                    .excerpt = {},
                    .expected = "coaxial",
                    .nearest = nearest_word(word, {"coaxial"})});
}

}  // namespace gapwright
