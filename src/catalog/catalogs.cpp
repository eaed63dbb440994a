#include "embedded.hpp"
#include "readers.hpp"

#include <gapwright/catalog/catalogs.hpp>

#include <algorithm>

namespace gapwright {
namespace {

const std::vector<std::string>& file_names() {
  static const std::vector<std::string> names = {"hopping.toml", "background.toml", "ribbons.toml",
                                                 "contact.toml", "media.toml",      "wires.toml",
                                                 "checks.toml"};
  return names;
}

template <class Entry>
std::vector<std::string> names_of(const std::vector<Entry>& entries) {
  std::vector<std::string> names;
  for (const Entry& entry : entries) names.push_back(entry.name);
  return names;
}

template <class Entry>
const Entry& entry_of(const std::vector<Entry>& entries, const std::string& name,
                      const std::string& kind) {
  if (name.empty()) return entries.front();
  for (const Entry& entry : entries)
    if (entry.name == name) return entry;
  const auto names = names_of(entries);
  throw InputError({"unknown " + kind + " '" + name + "'",
                    {},
                    {},
                    "one of " + joined(names),
                    nearest_word(name, names)});
}

TomlReader built_in_file(const std::string& name) {
  for (const EmbeddedFile& file : embedded_catalogs())
    if (file.name == name) return TomlReader::from_text(file.text, "built-in " + name);
  throw InputError({"catalogue is missing", "built-in " + name, {}, "a complete build", {}});
}

// A misspelled file would be passed over in silence.
void check_folder(const std::filesystem::path& folder) {
  if (!std::filesystem::is_directory(folder))
    throw InputError({"is not a folder", folder.string(), {}, "a folder of catalogues", {}});
  bool any = false;
  for (const auto& item : std::filesystem::directory_iterator(folder)) {
    const std::string name = item.path().filename().string();
    if (item.path().extension() != ".toml") continue;
    if (std::find(file_names().begin(), file_names().end(), name) != file_names().end()) {
      any = true;
      continue;
    }
    throw InputError({"unknown catalogue",
                      item.path().string(),
                      {},
                      "one of " + joined(file_names()),
                      nearest_word(name, file_names())});
  }
  if (!any)
    throw InputError({"holds no catalogue",
                      folder.string(),
                      {},
                      "a folder with some of " + joined(file_names()),
                      {}});
}

}  // namespace

const Catalogs& Catalogs::built_in() {
  static const Catalogs catalogs = [] {
    Catalogs all;
    all.hopping_sets_ = read_hopping_sets(built_in_file("hopping.toml"));
    all.backgrounds_ = read_backgrounds(built_in_file("background.toml"));
    all.ribbon_edges_ = read_ribbon_edges(built_in_file("ribbons.toml"));
    all.contact_targets_ = read_contact_targets(built_in_file("contact.toml"));
    all.media_ = read_media(built_in_file("media.toml"));
    all.wires_ = read_wires(built_in_file("wires.toml"));
    all.checks_ = read_checks(built_in_file("checks.toml"), names_of(all.hopping_sets_));
    return all;
  }();
  return catalogs;
}

Catalogs Catalogs::from_folder(const std::filesystem::path& folder) {
  check_folder(folder);
  Catalogs all = built_in();
  const auto replace = [&](const std::string& name, auto&& take) {
    const auto file = folder / name;
    if (std::filesystem::exists(file)) take(TomlReader::from_file(file));
  };
  replace("hopping.toml", [&](const TomlReader& file) {
    all.hopping_sets_ = read_hopping_sets(file);
    const auto names = names_of(all.hopping_sets_);
    std::erase_if(all.checks_, [&](const CheckRow& row) {
      return !row.hopping.empty() &&
             std::find(names.begin(), names.end(), row.hopping) == names.end();
    });
  });
  replace("background.toml",
          [&](const TomlReader& file) { all.backgrounds_ = read_backgrounds(file); });
  replace("ribbons.toml",
          [&](const TomlReader& file) { all.ribbon_edges_ = read_ribbon_edges(file); });
  replace("contact.toml",
          [&](const TomlReader& file) { all.contact_targets_ = read_contact_targets(file); });
  replace("media.toml", [&](const TomlReader& file) { all.media_ = read_media(file); });
  replace("wires.toml", [&](const TomlReader& file) { all.wires_ = read_wires(file); });
  replace("checks.toml", [&](const TomlReader& file) {
    all.checks_ = read_checks(file, names_of(all.hopping_sets_));
  });
  return all;
}

const HoppingSet& Catalogs::hopping(const std::string& name) const {
  return entry_of(hopping_sets_, name, "hopping set");
}

const Background& Catalogs::background(const std::string& name) const {
  return entry_of(backgrounds_, name, "background");
}

const RibbonEdges& Catalogs::ribbon_edges(const std::string& name) const {
  return entry_of(ribbon_edges_, name, "set of ribbon edges");
}

const ContactTarget& Catalogs::contact_target(const std::string& name) const {
  return entry_of(contact_targets_, name, "contact target");
}

const Medium& Catalogs::medium(const std::string& name) const {
  static const Medium vacuum;
  if (name.empty() || name == vacuum.name) return vacuum;
  for (const Medium& medium : media_)
    if (medium.name == name) return medium;
  auto names = names_of(media_);
  names.insert(names.begin(), vacuum.name);
  throw InputError({"unknown medium '" + name + "'",
                    {},
                    {},
                    "one of " + joined(names),
                    nearest_word(name, names)});
}

std::vector<std::string> Catalogs::liquid_names() const {
  std::vector<std::string> names{medium().name};
  for (const Medium& medium : media_)
    if (medium.liquid) names.push_back(medium.name);
  return names;
}

const Medium& Catalogs::liquid(const std::string& name) const {
  const auto known = std::find_if(media_.begin(), media_.end(),
                                  [&](const Medium& medium) { return medium.name == name; });
  const bool solid = known != media_.end() && !known->liquid;
  const auto names = liquid_names();
  if (solid || (known == media_.end() && !name.empty() && name != names.front()))
    throw InputError({solid ? name + " is no liquid" : "unknown liquid '" + name + "'",
                      {},
                      {},
                      "one of " + joined(names),
                      solid ? std::string() : nearest_word(name, names)});
  return medium(name);
}

const ElectronGasWire& Catalogs::wire(const std::string& name) const {
  for (const ElectronGasWire& wire : wires_)
    if (wire.name == name) return wire;
  const auto names = names_of(wires_);
  throw InputError({"unknown wire '" + name + "'",
                    {},
                    {},
                    "one of " + joined(names),
                    nearest_word(name, names)});
}

std::string Catalogs::hash() const {
  ContentHash hash;
  for (const HoppingSet& set : hopping_sets_) {
    hash.add(set.name).add(static_cast<std::int64_t>(set.hopping_eV.size()));
    for (const double value : set.hopping_eV) hash.add(value);
    for (const double value : set.overlap) hash.add(value);
    hash.add(set.onsite_eV).add(static_cast<std::int64_t>(set.curvature));
  }
  for (const Background& background : backgrounds_)
    hash.add(background.name)
        .add(background.in_plane_strength_nm)
        .add(background.in_plane_energy_eV)
        .add(background.normal_strength_nm)
        .add(background.normal_energy_eV);
  for (const RibbonEdges& edges : ribbon_edges_)
    hash.add(edges.name).add(edges.edge_bond).add(edges.repulsion_eV);
  for (const ContactTarget& target : contact_targets_)
    hash.add(target.name)
        .add(static_cast<std::int64_t>(target.kind))
        .add(target.spacing_nm)
        .add(target.energy_eV_per_nm2);
  for (const ElectronGasWire& wire : wires_)
    hash.add(wire.name)
        .add(wire.mass)
        .add(wire.density_per_nm)
        .add(wire.degeneracy)
        .add(wire.radius_nm)
        .add(wire.host_permittivity);
  for (const Medium& medium : media_) {
    hash.add(medium.name)
        .add(static_cast<std::int64_t>(medium.liquid))
        .add(static_cast<std::int64_t>(medium.relaxations.size()))
        .add(static_cast<std::int64_t>(medium.oscillators.size()));
    for (const Relaxation& r : medium.relaxations) hash.add(r.energy_eV).add(r.strength);
    for (const Oscillator& o : medium.oscillators)
      hash.add(o.energy_eV).add(o.strength_eV2).add(o.damping_eV);
  }
  return hash.hex();
}

}  // namespace gapwright
