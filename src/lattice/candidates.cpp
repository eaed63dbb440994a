#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/lattice/candidates.hpp>

#include <algorithm>
#include <array>
#include <cmath>
#include <utility>

#include <fmt/format.h>

namespace gapwright {

namespace {

using Kind = TubeFilter::Kind;

constexpr std::array<std::pair<Kind, const char*>, 6> words{
    {{Kind::any, "any"},
     {Kind::metallic, "metallic"},
     {Kind::semiconducting, "semiconducting"},
     {Kind::armchair, "armchair"},
     {Kind::zigzag, "zigzag"},
     {Kind::chiral, "chiral"}}};

bool is_kind(int n, int m, Kind kind) {
  switch (kind) {
    case Kind::any:
      return true;
    case Kind::metallic:
      return (n - m) % 3 == 0;
    case Kind::semiconducting:
      return (n - m) % 3 != 0;
    case Kind::armchair:
      return n == m;
    case Kind::zigzag:
      return m == 0;
    case Kind::chiral:
      return n != m && m != 0;
  }
  return false;
}

int length_squared(const Tube& tube) {
  const auto [n, m] = tube.chirality;
  return n * n + n * m + m * m;
}

}  // namespace

std::string kind_word(Kind kind) {
  for (const auto& [value, word] : words)
    if (value == kind) return word;
  return {};
}

Kind parse_kind(std::string_view word) {
  std::vector<std::string> choices;
  for (const auto& [value, choice] : words) {
    if (word == choice) return value;
    choices.push_back(choice);
  }
  throw InputError({fmt::format("unknown kind of tube '{}'", word),
                    "kind",
                    {},
                    "one of " + joined(choices),
                    nearest_word(word, choices)});
}

std::vector<Tube> candidate_tubes(const TubeFilter& filter) {
  const Interval all{min_diameter_nm, max_diameter_nm};
  const Interval wanted = filter.diameter_nm.value_or(all);
  const Interval diameter{std::max(wanted.low, all.low), std::min(wanted.high, all.high)};
  std::vector<Tube> tubes;
  if (!(wanted.low <= wanted.high) || !(diameter.low <= diameter.high)) return tubes;

  // d is at least that of (n,0) and at most that of (n,n).
  const double zigzag_step_nm = constants::lattice_nm / constants::pi;
  const int most = static_cast<int>(diameter.high / zigzag_step_nm) + 1;
  const int least = static_cast<int>(diameter.low / (zigzag_step_nm * std::numbers::sqrt3));
  for (int n = std::max(least, 1); n <= most; ++n) {
    if (filter.index && !filter.index->contains(n)) continue;
    for (int m = 0; m <= n; ++m) {
      if (!is_kind(n, m, filter.kind)) continue;
      const double width = zigzag_step_nm * std::sqrt(n * n + n * m + m * m);
      if (width > diameter.high + zigzag_step_nm) break;
      if (width < diameter.low - zigzag_step_nm) continue;
      // The stored diameter decides, so that a printed limit selects the tube it came from.
      Tube tube = make_tube({n, m});
      if (diameter.contains(tube.diameter_nm())) tubes.push_back(std::move(tube));
    }
  }
  std::sort(tubes.begin(), tubes.end(), [](const Tube& a, const Tube& b) {
    return std::pair(length_squared(a), a.chirality.n) <
           std::pair(length_squared(b), b.chirality.n);
  });
  return tubes;
}

}  // namespace gapwright
