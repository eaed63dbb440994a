#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/placement.hpp>

#include <array>

namespace gapwright {
namespace {

constexpr std::array arrangements = {Arrangement::coaxial, Arrangement::parallel};

}  // namespace

std::string arrangement_word(Arrangement arrangement) {
  return arrangement == Arrangement::coaxial ? "coaxial" : "parallel";
}

Arrangement parse_arrangement(std::string_view word) {
  std::vector<std::string> words;
  for (const Arrangement arrangement : arrangements) {
    words.push_back(arrangement_word(arrangement));
    if (word == words.back()) return arrangement;
  }
  const std::string typed(word);
  throw InputError({.what = "arrangement '" + typed + "' is not computed by this version",
                    .where = "arrangement",
                    .excerpt = {},
                    .expected = "one of " + joined(words),
                    .nearest = nearest_word(word, words)});
}

const TubeObject& tubes_of(const Object& object) {
  if (const TubeObject* tubes = std::get_if<TubeObject>(&object)) return *tubes;
  throw InputError({.what = label_of(object) + " is no tube",
                    .where = {},
                    .excerpt = {},
                    .expected = "a tube such as (10,10), or walls in walls such as (5,5)@(10,10)",
                    .nearest = {}});
}

}  // namespace gapwright
