#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/placement.hpp>

#include <array>
#include <stdexcept>

namespace gapwright {
namespace {

constexpr std::array arrangements = {
    Arrangement::coaxial, Arrangement::parallel, Arrangement::crossed, Arrangement::over,
    Arrangement::stacked, Arrangement::coplanar, Arrangement::edge_on};

}  // namespace

std::string arrangement_word(Arrangement arrangement) {
  switch (arrangement) {
    case Arrangement::coaxial:
      return "coaxial";
    case Arrangement::parallel:
      return "parallel";
    case Arrangement::crossed:
      return "crossed";
    case Arrangement::over:
      return "over";
    case Arrangement::stacked:
      return "stacked";
    case Arrangement::coplanar:
      return "coplanar";
    case Arrangement::edge_on:
      return "edge_on";
  }
  throw std::invalid_argument("arrangement_word: arrangement outside the enumeration");
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
