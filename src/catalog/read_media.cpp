#include "readers.hpp"

#include <cmath>

namespace gapwright {
namespace {

// ħ·1e14 rad/s and h·1e15 Hz, exact since the SI of 2019.
constexpr double eV_per_1e14_rad_per_s = 0.06582119569509066;
constexpr double eV_per_1e15_Hz = 4.135667696923859;

constexpr std::size_t most_terms = 100;

/// Reads one medium and gathers the sources.
class MediumReader {
 public:
  MediumReader(const TomlReader& entry, const std::vector<std::string>& taken) : entry_(entry) {
    medium_.name = read_name(entry, taken);
    if (medium_.name == Medium{}.name)
      throw entry.error("name", "'" + medium_.name + "' is always there", "another name");
    medium_.title = entry.text("title");
    medium_.liquid = entry.word("kind", {"liquid", "solid"}) == "liquid";
  }

  Medium read() {
    if (entry_.has("relaxation_strength") || entry_.has("relaxation_energy")) relaxations();
    if (entry_.has("oscillator_strength") || entry_.has("oscillator_energy")) oscillators();
    if (entry_.has("refractive_index") || entry_.has("absorption")) index_of_refraction();
    entry_.finish();
    if (medium_.oscillators.empty())
      throw entry_.error("name", "'" + medium_.name + "' has no oscillators",
                         "oscillator_energy and oscillator_strength, or refractive_index and "
                         "absorption");
    return std::move(medium_);
  }

 private:
  Quantity take(const std::string& key, const std::vector<std::string>& units,
                std::size_t most = 1) {
    Quantity quantity = read_quantity(entry_, key, units, most);
    if (medium_.source.find(quantity.source) == std::string::npos)
      medium_.source += (medium_.source.empty() ? "" : "; ") + quantity.source;
    return quantity;
  }

  std::vector<double> positive(const std::string& key, const Quantity& quantity,
                               std::size_t count) const {
    if (quantity.values.size() != count)
      throw entry_.error(key,
                         "'" + key + "' has " + std::to_string(quantity.values.size()) + " values",
                         std::to_string(count) + ", one for each energy");
    for (const double value : quantity.values)
      if (!(value > 0)) throw entry_.error(key, "'" + key + "' is not positive", "numbers above 0");
    return quantity.values;
  }

  std::vector<double> energies_eV(const std::string& key, std::size_t most) {
    const Quantity quantity = take(key, {"eV", "1e14 rad/s", "1e15 Hz"}, most);
    std::vector<double> values = positive(key, quantity, quantity.values.size());
    for (double& value : values) {
      if (quantity.unit == "1e14 rad/s") value *= eV_per_1e14_rad_per_s;
      if (quantity.unit == "1e15 Hz") value *= eV_per_1e15_Hz;
    }
    return values;
  }

  void relaxations() {
    const auto energies = energies_eV("relaxation_energy", most_terms);
    const auto strengths = positive(
        "relaxation_strength", take("relaxation_strength", {"1"}, most_terms), energies.size());
    for (std::size_t i = 0; i < energies.size(); ++i)
      medium_.relaxations.push_back({energies[i], strengths[i]});
  }

  void oscillators() {
    const auto energies = energies_eV("oscillator_energy", most_terms);
    const Quantity strength = take("oscillator_strength", {"eV2", "1"}, most_terms);
    const auto strengths = positive("oscillator_strength", strength, energies.size());
    std::vector<double> damping(energies.size(), 0.0);
    if (entry_.has("oscillator_damping"))
      damping = positive("oscillator_damping", take("oscillator_damping", {"eV"}, most_terms),
                         energies.size());
    for (std::size_t i = 0; i < energies.size(); ++i) {
      const double unit = strength.unit == "eV2" ? 1.0 : energies[i] * energies[i];
      medium_.oscillators.push_back({energies[i], strengths[i] * unit, damping[i]});
    }
  }

  // ε = 1 + (n² - 1)/(1 + ξ²/ω²) + (ε(0) - n²)/(1 + ξ/ω_rot): Ninham & Parsegian, Biophys. J. 10,
  // 646 (1970), with one absorption.
  void index_of_refraction() {
    const double index = positive("refractive_index", take("refractive_index", {"1"}), 1)[0];
    const double energy = energies_eV("absorption", 1)[0];
    if (!(index > 1))
      throw entry_.error("refractive_index", "an index of 1 or less has no oscillator",
                         "a number above 1");
    medium_.oscillators.push_back({energy, (index * index - 1) * energy * energy, 0.0});
    if (!entry_.has("static_permittivity") && !entry_.has("rotation")) return;
    const double rest = take("static_permittivity", {"1"}).values[0] - index * index;
    if (!(rest > 0))
      throw entry_.error("static_permittivity",
                         "the static permittivity is not above the index squared",
                         "a larger one, or none");
    medium_.relaxations.push_back({energies_eV("rotation", 1)[0], rest});
  }

  const TomlReader& entry_;
  Medium medium_;
};

}  // namespace

std::vector<Medium> read_media(const TomlReader& file) {
  std::vector<Medium> media;
  std::vector<std::string> names;
  for (const TomlReader& entry : file.tables("medium")) {
    media.push_back(MediumReader(entry, names).read());
    names.push_back(media.back().name);
  }
  file.finish();
  return media;
}

}  // namespace gapwright
