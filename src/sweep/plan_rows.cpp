#include <gapwright/catalog/input_error.hpp>
#include <gapwright/sweep/plan.hpp>

#include <algorithm>
#include <cmath>
#include <limits>

#include <fmt/format.h>

namespace gapwright {
namespace {

// Candidates of one wall: the common filter, narrowed by that wall's own diameter range.
std::vector<Tube> wall_candidates(const Plan& plan, const std::optional<Tube>& fixed,
                                  const std::optional<Interval>& own_diameter_nm) {
  if (fixed) return {*fixed};
  TubeFilter filter = plan.tubes;
  if (own_diameter_nm && filter.diameter_nm) {
    filter.diameter_nm->low = std::max(filter.diameter_nm->low, own_diameter_nm->low);
    filter.diameter_nm->high = std::min(filter.diameter_nm->high, own_diameter_nm->high);
    if (filter.diameter_nm->low > filter.diameter_nm->high) return {};
  } else if (own_diameter_nm) {
    filter.diameter_nm = own_diameter_nm;
  }
  return candidate_tubes(filter);
}

std::string range_text(const char* name, const std::optional<Interval>& range) {
  return range ? fmt::format(", {} {:g}:{:g}", name, range->low, range->high) : std::string();
}

InputError no_candidates(const Plan& plan, const std::string& place, const char* own_name,
                         const std::optional<Interval>& own_diameter_nm) {
  std::string bounds = range_text("diameter_nm", plan.tubes.diameter_nm) +
                       range_text(own_name, own_diameter_nm) +
                       range_text("index", plan.tubes.index);
  if (plan.tubes.kind != TubeFilter::Kind::any) bounds += ", kind " + kind_word(plan.tubes.kind);
  return InputError(
      {.what = fmt::format("no tube can be {}{}", place, bounds.empty() ? "" : bounds),
       .where = "plan",
       .excerpt = {},
       .expected = "bounds that hold at least one tube; (6,5) has a diameter of 0.747 nm",
       .nearest = {}});
}

/// The order of candidate_tubes().
bool precedes(const Tube& a, const Tube& b) {
  const auto squared = [](const Tube& tube) {
    const auto [n, m] = tube.chirality;
    return n * n + n * m + m * m;
  };
  return std::pair(squared(a), a.chirality.n) < std::pair(squared(b), b.chirality.n);
}

double gap_nm(const Tube& inner, const Tube& outer) {
  return outer.radius_nm - inner.radius_nm;
}

// The gap nearest to the window among all pairs, for the message of an empty plan.
InputError no_pair(const Interval& gaps_nm, const std::vector<Tube>& inner,
                   const std::vector<Tube>& outer) {
  double best_distance = std::numeric_limits<double>::infinity();
  std::string best;
  for (const Tube& around : outer) {
    const double wanted = around.radius_nm - 0.5 * (gaps_nm.low + gaps_nm.high);
    auto place = std::lower_bound(inner.begin(), inner.end(), wanted,
                                  [](const Tube& t, double r) { return t.radius_nm < r; });
    if (place == inner.end() || (place != inner.begin() &&
                                 wanted - std::prev(place)->radius_nm < place->radius_nm - wanted))
      --place;
    const double gap = gap_nm(*place, around);
    const double distance = std::max(gaps_nm.low - gap, gap - gaps_nm.high);
    if (distance >= best_distance) continue;
    best_distance = distance;
    best = gap > 0
               ? fmt::format("{}@{} with a gap of {:.4f} nm", place->label(), around.label(), gap)
               : std::string();
  }
  return InputError(
      {.what = fmt::format("no pair has a gap within {:g}:{:g} nm", gaps_nm.low, gaps_nm.high),
       .where = "gap_nm",
       .excerpt = {},
       .expected = "a wider window, or wider ranges of tubes",
       .nearest = best});
}

}  // namespace

PlanRows::PlanRows(const Plan& plan) : arrangement_(plan.arrangement), gap_nm_(plan.fixed_gap_nm) {
  if (const auto misplaced = misplaced_key(plan))
    throw InputError({.what = misplaced->what,
                      .where = misplaced->key,
                      .excerpt = {},
                      .expected = misplaced->expected,
                      .nearest = {}});
  if (arrangement_ == Arrangement::coaxial)
    pair_coaxial(plan);
  else
    pair_parallel(plan);
}

void PlanRows::pair_coaxial(const Plan& plan) {
  inner_ = wall_candidates(plan, plan.inner, plan.inner_diameter_nm);
  outer_ = wall_candidates(plan, plan.outer, plan.outer_diameter_nm);
  if (inner_.empty())
    throw no_candidates(plan, "the inner wall", "inner_diameter_nm", plan.inner_diameter_nm);
  if (outer_.empty())
    throw no_candidates(plan, "the outer wall", "outer_diameter_nm", plan.outer_diameter_nm);
  const Interval gaps_nm = plan.gap_nm.value_or(usual_gaps_nm);
  std::size_t first = 0;  // no inner tube before it fits this outer tube or a later one
  for (std::size_t o = 0; o < outer_.size(); ++o) {
    while (first < inner_.size() && gap_nm(inner_[first], outer_[o]) > gaps_nm.high) ++first;
    for (std::size_t i = first; i < inner_.size(); ++i) {
      const double gap = gap_nm(inner_[i], outer_[o]);
      if (gap < gaps_nm.low) break;
      pairs_.emplace_back(static_cast<std::uint32_t>(i), static_cast<std::uint32_t>(o));
    }
  }
  if (pairs_.empty()) throw no_pair(gaps_nm, inner_, outer_);
}

void PlanRows::pair_parallel(const Plan& plan) {
  std::vector<Tube> tubes = candidate_tubes(plan.tubes);
  if (tubes.empty()) throw no_candidates(plan, "in a pair", "", std::nullopt);
  if (plan.with) {
    for (const Tube& tube : tubes) {
      const bool thinner = precedes(tube, *plan.with);
      const auto place = static_cast<std::uint32_t>(inner_.size());
      inner_.push_back(thinner ? tube : *plan.with);
      outer_.push_back(thinner ? *plan.with : tube);
      pairs_.emplace_back(place, place);
    }
    return;
  }
  constexpr std::size_t tile = 64;
  for (std::size_t second = 0; second < tubes.size(); second += tile)
    for (std::size_t first = 0; first <= second; first += tile)
      for (std::size_t j = second; j < std::min(second + tile, tubes.size()); ++j)
        for (std::size_t i = first; i < std::min(first + tile, j + 1); ++i)
          pairs_.emplace_back(static_cast<std::uint32_t>(i), static_cast<std::uint32_t>(j));
  outer_ = tubes;
  inner_ = std::move(tubes);
}

Placement PlanRows::operator[](std::size_t row) const {
  if (arrangement_ == Arrangement::parallel) return side_by_side(inner(row), outer(row), gap_nm_);
  return {arrangement_, TubeObject{{inner(row), outer(row)}}};
}

Placement side_by_side(const Tube& first, const Tube& second, std::optional<double> gap_nm) {
  const bool swapped = precedes(second, first);
  return {Arrangement::parallel, TubeObject{{swapped ? second : first}},
          TubeObject{{swapped ? first : second}}, gap_nm};
}

std::string row_key(const Placement& placement, const std::string& settings_key) {
  ContentHash hash;
  hash.add(arrangement_word(placement.arrangement)).add(label_of(placement.first));
  hash.add(placement.second ? label_of(*placement.second) : std::string());
  hash.add(placement.gap_nm.value_or(0.0));
  return hash.add(settings_key).hex();
}

}  // namespace gapwright
