// Loading and validating the catalogues.
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/catalog/media.hpp>
#include <gapwright/catalog/wires.hpp>

#include <cstdint>
#include <filesystem>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright {

/// All catalogue entries; the first of each list is the default.
class Catalogs {
 public:
  /// The catalogues compiled into the program. Throws InputError only if the build is broken.
  static const Catalogs& built_in();
  /// The same files read from a folder (hopping.toml, background.toml, ribbons.toml, contact.toml,
  /// media.toml, wires.toml, checks.toml).
  /// A missing file keeps the built-in one; built-in checks that ask for a hopping set the folder
  /// does not hold are left out. Throws InputError with file, line, text and caret.
  static Catalogs from_folder(const std::filesystem::path& folder);

  /// Entry by name; an empty name is the default. Throws InputError with the nearest name.
  const HoppingSet& hopping(const std::string& name = {}) const;
  const Background& background(const std::string& name = {}) const;
  const RibbonEdges& ribbon_edges(const std::string& name = {}) const;
  const ContactTarget& contact_target(const std::string& name = {}) const;
  /// "vacuum" is always there and the default.
  const Medium& medium(const std::string& name = {}) const;
  /// What bodies can stand in: vacuum or a liquid.
  const Medium& liquid(const std::string& name = {}) const;
  std::vector<std::string> liquid_names() const;
  const ElectronGasWire& wire(const std::string& name) const;

  const std::vector<HoppingSet>& hopping_sets() const { return hopping_sets_; }
  const std::vector<Background>& backgrounds() const { return backgrounds_; }
  const std::vector<RibbonEdges>& ribbon_edge_sets() const { return ribbon_edges_; }
  const std::vector<ContactTarget>& contact_targets() const { return contact_targets_; }
  const std::vector<Medium>& media() const { return media_; }
  const std::vector<ElectronGasWire>& wires() const { return wires_; }
  const std::vector<CheckRow>& checks() const { return checks_; }

  /// 64-bit hash over all values (as IEEE bits) and names that enter results; titles, sources and
  /// checks do not. Sixteen hexadecimal digits.
  std::string hash() const;

 private:
  std::vector<HoppingSet> hopping_sets_;
  std::vector<Background> backgrounds_;
  std::vector<RibbonEdges> ribbon_edges_;
  std::vector<ContactTarget> contact_targets_;
  std::vector<Medium> media_;
  std::vector<ElectronGasWire> wires_;
  std::vector<CheckRow> checks_;
};

/// Incremental FNV-1a hash used for catalogue hashes and store keys: text and IEEE bits.
class ContentHash {
 public:
  ContentHash& add(std::string_view text);
  ContentHash& add(double value);
  ContentHash& add(std::int64_t value);
  std::string hex() const;

 private:
  std::uint64_t state_ = 14695981039346656037ULL;
};

}  // namespace gapwright
