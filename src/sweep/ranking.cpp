#include <gapwright/sweep/ranking.hpp>

#include <algorithm>
#include <numeric>
#include <tuple>

#include <tbb/parallel_for.h>

namespace gapwright {
namespace {

// A row reduced to what sorting needs.
struct SortKey {
  FieldValue value;
  const Binding* row = nullptr;
};

bool precedes(const SortKey& a, const SortKey& b, bool descending) {
  const bool a_empty = std::holds_alternative<std::monostate>(a.value);
  const bool b_empty = std::holds_alternative<std::monostate>(b.value);
  if (a_empty != b_empty) return b_empty;
  if (a.value != b.value) return descending ? b.value < a.value : a.value < b.value;
  return std::tie(a.row->object_1, a.row->object_2) < std::tie(b.row->object_1, b.row->object_2);
}

std::vector<std::size_t> sorted_places(const std::vector<SortKey>& keys, bool descending) {
  std::vector<std::size_t> order(keys.size());
  std::iota(order.begin(), order.end(), std::size_t{0});
  std::sort(order.begin(), order.end(),
            [&](std::size_t a, std::size_t b) { return precedes(keys[a], keys[b], descending); });
  return order;
}

}  // namespace

Order order_of(const std::string& field) {
  Order order{.field = std::string(binding_field(field).name)};
  for (const char* strong : {"pull_out_force_nN", "well_depth_eV_per_nm", "well_depth_eV",
                             "stiffness_eV_per_nm3", "stiffness_eV_per_nm2"})
    order.descending = order.descending || order.field == strong;
  return order;
}

Order order_of(const Plan& plan) {
  if (!plan.sort.empty()) return order_of(plan.sort);
  if (plan.arrangement == Arrangement::coaxial) return order_of("energy_mJ_per_m2");
  return order_of(plan.fixed_gap_nm ? "energy_eV_per_nm" : "well_depth_eV_per_nm");
}

std::vector<RankedRow> ranked(const std::vector<Binding>& rows, const Binder& binder,
                              const Order& order) {
  const BindingField& field = binding_field(order.field);
  std::vector<SortKey> keys(rows.size());
  for (std::size_t i = 0; i < rows.size(); ++i) keys[i] = {field.get(rows[i]), &rows[i]};

  std::vector<RankedRow> ranking(rows.size());
  const std::vector<std::size_t> places = sorted_places(keys, order.descending);
  std::vector<int> highest(rows.size()), lowest(rows.size());
  for (std::size_t place = 0; place < places.size(); ++place)
    highest[places[place]] = lowest[places[place]] = static_cast<int>(place);

  for (const ContactTarget& target : binder.catalogs().contact_targets()) {
    if (target.name == binder.settings().contact_target) continue;
    std::vector<SortKey> other(rows.size());
    binder.contact_term(target.name);  // else every task waits for the first
    tbb::parallel_for(std::size_t{0}, rows.size(), [&](std::size_t i) {
      other[i] = {field.get(under_target(rows[i], binder, target.name)), &rows[i]};
    });
    const std::vector<std::size_t> moved = sorted_places(other, order.descending);
    for (std::size_t place = 0; place < moved.size(); ++place) {
      highest[moved[place]] = std::max(highest[moved[place]], static_cast<int>(place));
      lowest[moved[place]] = std::min(lowest[moved[place]], static_cast<int>(place));
    }
  }
  for (std::size_t place = 0; place < places.size(); ++place) {
    const std::size_t i = places[place];
    ranking[place] = {rows[i], static_cast<int>(place) + 1, highest[i] - lowest[i]};
  }
  return ranking;
}

}  // namespace gapwright
