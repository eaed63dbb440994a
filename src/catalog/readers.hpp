// From TOML tables to catalogue entries.
#pragma once

#include <gapwright/catalog/entries.hpp>
#include <gapwright/catalog/media.hpp>
#include <gapwright/catalog/toml_reader.hpp>
#include <gapwright/catalog/wires.hpp>

#include <string>
#include <vector>

namespace gapwright {

/// Each reads one whole file and throws InputError at the first rule broken: a key unknown, missing
/// or of the wrong type, a value outside the range that stands beside it, another unit than
/// expected, a name used twice.
std::vector<HoppingSet> read_hopping_sets(const TomlReader& file);
std::vector<Background> read_backgrounds(const TomlReader& file);
std::vector<RibbonEdges> read_ribbon_edges(const TomlReader& file);
std::vector<ContactTarget> read_contact_targets(const TomlReader& file);
std::vector<Medium> read_media(const TomlReader& file);
std::vector<ElectronGasWire> read_wires(const TomlReader& file);
/// `hopping_names` are those a row may ask for.
std::vector<CheckRow> read_checks(const TomlReader& file,
                                  const std::vector<std::string>& hopping_names);

/// A name of small letters, digits and hyphens that is not among `taken`.
std::string read_name(const TomlReader& entry, const std::vector<std::string>& taken);

/// One or more numbers with their source.
struct Quantity {
  std::vector<double> values;
  std::string unit;
  std::string source;
};

/// The table `key` = { value, unit, range, source }: 1 to `most` numbers in one of `units`, all
/// inside `range`.
Quantity read_quantity(const TomlReader& entry, const std::string& key,
                       const std::vector<std::string>& units, std::size_t most = 1);

}  // namespace gapwright
