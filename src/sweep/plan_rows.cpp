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

InputError no_candidates(const Plan& plan, const char* wall, const char* own_name,
                         const std::optional<Interval>& own_diameter_nm) {
  std::string bounds = range_text("diameter_nm", plan.tubes.diameter_nm) +
                       range_text(own_name, own_diameter_nm) +
                       range_text("index", plan.tubes.index);
  if (plan.tubes.kind != TubeFilter::Kind::any) bounds += ", kind " + kind_word(plan.tubes.kind);
  return InputError(
      {.what = fmt::format("no tube can be the {} wall{}", wall, bounds.empty() ? "" : bounds),
       .where = "plan",
       .excerpt = {},
       .expected = "bounds that hold at least one tube; (6,5) has a diameter of 0.747 nm",
       .nearest = {}});
}

double gap_nm(const Tube& inner, const Tube& outer) {
  return outer.radius_nm - inner.radius_nm;
}

// The gap nearest to the window among all pairs, for the message of an empty plan.
InputError no_pair(const Plan& plan, const std::vector<Tube>& inner,
                   const std::vector<Tube>& outer) {
  double best_distance = std::numeric_limits<double>::infinity();
  std::string best;
  for (const Tube& around : outer) {
    const double wanted = around.radius_nm - 0.5 * (plan.gap_nm.low + plan.gap_nm.high);
    auto place = std::lower_bound(inner.begin(), inner.end(), wanted,
                                  [](const Tube& t, double r) { return t.radius_nm < r; });
    if (place == inner.end() || (place != inner.begin() &&
                                 wanted - std::prev(place)->radius_nm < place->radius_nm - wanted))
      --place;
    const double gap = gap_nm(*place, around);
    const double distance = std::max(plan.gap_nm.low - gap, gap - plan.gap_nm.high);
    if (distance >= best_distance) continue;
    best_distance = distance;
    best = gap > 0
               ? fmt::format("{}@{} with a gap of {:.4f} nm", place->label(), around.label(), gap)
               : std::string();
  }
  return InputError({.what = fmt::format("no pair has a gap within {:g}:{:g} nm", plan.gap_nm.low,
                                         plan.gap_nm.high),
                     .where = "gap_nm",
                     .excerpt = {},
                     .expected = "a wider window, or wider ranges of tubes",
                     .nearest = best});
}

}  // namespace

PlanRows::PlanRows(const Plan& plan)
    : arrangement_(plan.arrangement),
      inner_(wall_candidates(plan, plan.inner, plan.inner_diameter_nm)),
      outer_(wall_candidates(plan, plan.outer, plan.outer_diameter_nm)) {
  if (inner_.empty())
    throw no_candidates(plan, "inner", "inner_diameter_nm", plan.inner_diameter_nm);
  if (outer_.empty())
    throw no_candidates(plan, "outer", "outer_diameter_nm", plan.outer_diameter_nm);
  std::size_t first = 0;  // no inner tube before it fits this outer tube or a later one
  for (std::size_t o = 0; o < outer_.size(); ++o) {
    while (first < inner_.size() && gap_nm(inner_[first], outer_[o]) > plan.gap_nm.high) ++first;
    for (std::size_t i = first; i < inner_.size(); ++i) {
      const double gap = gap_nm(inner_[i], outer_[o]);
      if (gap < plan.gap_nm.low) break;
      pairs_.emplace_back(static_cast<std::uint32_t>(i), static_cast<std::uint32_t>(o));
    }
  }
  if (pairs_.empty()) throw no_pair(plan, inner_, outer_);
}

Placement PlanRows::operator[](std::size_t row) const {
  return {arrangement_, TubeObject{{inner(row), outer(row)}}};
}

std::string row_key(const Placement& placement, const std::string& settings_key) {
  ContentHash hash;
  hash.add(arrangement_word(placement.arrangement)).add(label_of(placement.first));
  hash.add(placement.second ? label_of(*placement.second) : std::string());
  hash.add(placement.gap_nm.value_or(0.0));
  return hash.add(settings_key).hex();
}

}  // namespace gapwright
