// Ranges of candidate tubes.
#pragma once

#include <gapwright/lattice/tube.hpp>

#include <optional>
#include <vector>

namespace gapwright {

/// A closed interval.
struct Interval {
  double low = 0.0;
  double high = 0.0;
  bool contains(double x) const { return low <= x && x <= high; }
};

/// Which tubes to take.
struct TubeFilter {
  enum class Kind { any, metallic, semiconducting, armchair, zigzag, chiral };
  std::optional<Interval> diameter_nm;
  std::optional<Interval> index;  ///< range of n
  Kind kind = Kind::any;
};

/// The word for a kind ("any", "metallic", …) and back; throws InputError for another word.
std::string kind_word(TubeFilter::Kind kind);
TubeFilter::Kind parse_kind(std::string_view word);

/// All canonical tubes that pass, by diameter, then n; empty when there is none. Tubes outside
/// 0.3 … 20 nm never pass; a filter without diameter and index range takes every other (19 917).
std::vector<Tube> candidate_tubes(const TubeFilter& filter);

}  // namespace gapwright
