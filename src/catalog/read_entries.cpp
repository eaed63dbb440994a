#include "readers.hpp"

#include <gapwright/catalog/constants.hpp>

#include <array>
#include <cmath>

namespace gapwright {
namespace {

template <class Entry>
std::vector<std::string> names_of(const std::vector<Entry>& entries) {
  std::vector<std::string> names;
  for (const Entry& entry : entries) names.push_back(entry.name);
  return names;
}

// 4πk_e(ħ²/m_e)·electrons/A_at [eV²·nm]: strength times energy squared of an oscillator that
// carries so many electrons per atom (f-sum rule, METHODS §3).
double oscillator_product(double electrons_per_atom) {
  return 4.0 * constants::pi * constants::coulomb_eV_nm * constants::hbar2_per_mass_eV_nm2 *
         electrons_per_atom / constants::atom_area_nm2;
}

void add_source(std::string& sources, const std::string& source) {
  if (sources.find(source) != std::string::npos) return;
  sources += (sources.empty() ? "" : "; ") + source;
}

// H and S of a set stay invertible when 1 - Σ|overlap|·(number of neighbours) > 0.
void check_overlap(const TomlReader& entry, const HoppingSet& set) {
  constexpr std::array<double, 3> neighbours{3.0, 6.0, 3.0};
  double sum = 0.0;
  for (std::size_t k = 0; k < neighbours.size() && k < set.overlap.size(); ++k)
    sum += neighbours[k] * std::abs(set.overlap[k]);
  if (sum >= 1.0)
    throw entry.error("overlap", "the overlap matrix would not be positive",
                      "3|s0| + 6|s1| + 3|s2| below 1");
  if (set.overlap[0] * set.hopping_eV[0] > 0.0)
    throw entry.error("hopping", "hopping and overlap of the first neighbours have the same sign",
                      "opposite signs, as in H and S");
}

HoppingSet read_hopping_set(const TomlReader& entry, const std::vector<std::string>& taken) {
  HoppingSet set;
  set.name = read_name(entry, taken);
  set.title = entry.text("title");
  set.curvature = entry.flag("curvature");
  const Quantity hopping = read_quantity(entry, "hopping", {"eV"}, 3);
  set.hopping_eV = hopping.values;
  set.overlap.assign(set.hopping_eV.size(), 0.0);
  add_source(set.source, hopping.source);
  if (set.hopping_eV[0] == 0.0)
    throw entry.error("hopping", "the first hopping is zero", "a first-neighbour hopping");
  if (entry.has("overlap")) {
    const Quantity overlap = read_quantity(entry, "overlap", {"1"}, 3);
    if (overlap.values.size() != set.hopping_eV.size())
      throw entry.error("overlap", "as many overlaps as hoppings are needed",
                        std::to_string(set.hopping_eV.size()) + " values");
    set.overlap = overlap.values;
    add_source(set.source, overlap.source);
  }
  if (entry.has("onsite")) {
    const Quantity onsite = read_quantity(entry, "onsite", {"eV"});
    set.onsite_eV = onsite.values[0];
    add_source(set.source, onsite.source);
  }
  entry.finish();
  check_overlap(entry, set);
  return set;
}

double positive(const TomlReader& entry, const std::string& key, const Quantity& quantity) {
  if (quantity.values[0] > 0.0) return quantity.values[0];
  throw entry.error(key, "'" + key + "' is not positive", "a number above 0 " + quantity.unit);
}

Background read_background(const TomlReader& entry, const std::vector<std::string>& taken) {
  Background background;
  background.name = read_name(entry, taken);
  background.title = entry.text("title");
  const auto take = [&](const std::string& key, const std::string& unit) {
    const Quantity quantity = read_quantity(entry, key, {unit});
    add_source(background.source, quantity.source);
    return positive(entry, key, quantity);
  };
  if (entry.has("in_plane_electrons") || entry.has("in_plane_energy")) {
    const double product = oscillator_product(take("in_plane_electrons", "1/atom"));
    const double energy_eV = take("in_plane_energy", "eV");
    background.in_plane_energy_eV = energy_eV;
    background.in_plane_strength_nm = product / (energy_eV * energy_eV);
  }
  if (entry.has("normal_electrons") || entry.has("normal_strength")) {
    const double product = oscillator_product(take("normal_electrons", "1/atom"));
    background.normal_strength_nm = take("normal_strength", "nm");
    background.normal_energy_eV = std::sqrt(product / background.normal_strength_nm);
  }
  entry.finish();
  if (background.source.empty())
    throw entry.error("name", "'" + background.name + "' holds no electrons",
                      "in_plane_electrons and in_plane_energy, or normal_electrons and "
                      "normal_strength, or both");
  return background;
}

RibbonEdges read_edges(const TomlReader& entry, const std::vector<std::string>& taken) {
  RibbonEdges edges;
  edges.name = read_name(entry, taken);
  edges.title = entry.text("title");
  const Quantity bond = read_quantity(entry, "edge_bond", {"1"});
  edges.edge_bond = positive(entry, "edge_bond", bond);
  add_source(edges.source, bond.source);
  const Quantity repulsion = read_quantity(entry, "repulsion", {"eV"});
  edges.repulsion_eV = repulsion.values[0];
  if (edges.repulsion_eV < 0)
    throw entry.error("repulsion", "'repulsion' is negative", "a number not below 0 eV");
  add_source(edges.source, repulsion.source);
  entry.finish();
  return edges;
}

// Per area of the place where two sheets meet: "meV/atom" counts the atoms of one sheet, "meV/atom
// of both" those of the two sheets that face each other.
double energy_per_area(const Quantity& energy) {
  const double value = energy.values[0];
  if (energy.unit == "eV/nm2") return value;
  if (energy.unit == "J/m2") return value * 1e3 / constants::mJ_per_m2_per_eV_per_nm2;
  const double sheets = energy.unit == "meV/atom of both" ? 2.0 : 1.0;
  return sheets * 1e-3 * value / constants::atom_area_nm2;
}

TargetKind read_kind(const TomlReader& entry) {
  const std::string word = entry.word("kind", {"pair", "stack", "cleavage"});
  if (word == "pair") return TargetKind::pair;
  return word == "stack" ? TargetKind::stack : TargetKind::cleavage;
}

ContactTarget read_contact_target(const TomlReader& entry, const std::vector<std::string>& taken) {
  ContactTarget target;
  target.name = read_name(entry, taken);
  target.title = entry.text("title");
  target.kind = read_kind(entry);
  const Quantity spacing = read_quantity(entry, "spacing", {"nm"});
  const Quantity energy =
      read_quantity(entry, "energy", {"eV/nm2", "J/m2", "meV/atom", "meV/atom of both"});
  target.spacing_nm = positive(entry, "spacing", spacing);
  positive(entry, "energy", energy);
  target.energy_eV_per_nm2 = energy_per_area(energy);
  add_source(target.source, spacing.source);
  add_source(target.source, energy.source);
  if (entry.has("registry_factor")) {
    const Quantity factor = read_quantity(entry, "registry_factor", {"1"});
    target.energy_eV_per_nm2 *= positive(entry, "registry_factor", factor);
    add_source(target.source, factor.source);
  }
  if (const auto remark = entry.optional_text("remark")) add_source(target.source, *remark);
  entry.finish();
  return target;
}

template <class Entry, class Read>
std::vector<Entry> read_all(const TomlReader& file, const std::string& key, Read read) {
  std::vector<Entry> entries;
  for (const TomlReader& entry : file.tables(key))
    entries.push_back(read(entry, names_of(entries)));
  file.finish();
  return entries;
}

}  // namespace

std::vector<HoppingSet> read_hopping_sets(const TomlReader& file) {
  return read_all<HoppingSet>(file, "set", read_hopping_set);
}

std::vector<Background> read_backgrounds(const TomlReader& file) {
  return read_all<Background>(file, "background", read_background);
}

std::vector<RibbonEdges> read_ribbon_edges(const TomlReader& file) {
  return read_all<RibbonEdges>(file, "ribbon", read_edges);
}

std::vector<ContactTarget> read_contact_targets(const TomlReader& file) {
  return read_all<ContactTarget>(file, "target", read_contact_target);
}

}  // namespace gapwright
