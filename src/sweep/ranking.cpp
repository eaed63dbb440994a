#include <gapwright/catalog/constants.hpp>
#include <gapwright/contact/short_range.hpp>
#include <gapwright/sweep/ranking.hpp>

#include <algorithm>
#include <numeric>
#include <tuple>

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

Placement placement_of(const Binding& row) {
  const Arrangement arrangement = parse_arrangement(row.arrangement);
  if (arrangement == Arrangement::coaxial)
    return {arrangement, parse_label(row.object_1 + "@" + row.object_2).object};
  return {arrangement, parse_label(row.object_1).object, parse_label(row.object_2).object,
          row.gap_nm};
}

}  // namespace

Order order_of(const std::string& field) {
  Order order{field.empty() ? "energy_mJ_per_m2" : field};
  order.field = binding_field(order.field).name;
  order.descending = order.field == "pull_out_force_nN";
  return order;
}

Binding under_target(const Binding& row, const Binder& binder, const std::string& contact_target) {
  Binding changed = row;
  changed.contact_target = contact_target;
  if (!row.energy_eV_per_nm || !row.dispersion_eV_per_nm) return changed;
  const double contact = binder.contact_eV_per_nm(placement_of(row), contact_target);
  const double energy = *row.dispersion_eV_per_nm + contact;
  const double inner_radius_nm = row.diameter_1_nm.value() / 2;
  const double outer_radius_nm = row.diameter_2_nm.value() / 2;
  const double mid_circumference_nm = constants::pi * (inner_radius_nm + outer_radius_nm);
  const double per_area = energy / mid_circumference_nm;  // eV/nm²
  changed.contact_eV_per_nm = contact;
  changed.energy_eV_per_nm = energy;
  changed.energy_mJ_per_m2 = per_area * constants::mJ_per_m2_per_eV_per_nm2;
  changed.energy_meV_per_atom = per_area * constants::atom_area_nm2 * 1e3;
  if (row.cut_energy_eV_per_nm) changed.cut_energy_eV_per_nm = energy;
  if (row.pull_out_force_nN) changed.pull_out_force_nN = -energy * constants::nN_per_eV_per_nm;
  if (row.pressure_GPa && row.pressure_dispersion_GPa) {
    const double slope =
        coaxial_energy(binder.contact_term(contact_target), inner_radius_nm, outer_radius_nm).slope;
    changed.pressure_GPa =
        *row.pressure_dispersion_GPa - slope / mid_circumference_nm * constants::GPa_per_eV_per_nm3;
  }
  return changed;
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
    for (std::size_t i = 0; i < rows.size(); ++i)
      other[i] = {field.get(under_target(rows[i], binder, target.name)), &rows[i]};
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
