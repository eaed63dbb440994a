// The rules of catalogs/media.toml: one broken text a rule.
#include <gapwright/catalog/catalogs.hpp>

#include <filesystem>
#include <fstream>

#include <catch2/catch.hpp>
#include <fmt/format.h>

using namespace gapwright;
using Catch::Matchers::Contains;

namespace {

const std::string media_text = R"toml(
[[medium]]
name = "one"
title = "One"
kind = "liquid"
relaxation_strength.value = 74.8
relaxation_strength.unit = "1"
relaxation_strength.range = [0, 90]
relaxation_strength.source = "somebody (1981)"
relaxation_energy.value = 6.55e-5
relaxation_energy.unit = "eV"
relaxation_energy.range = [0, 1]
relaxation_energy.source = "somebody (1981)"
oscillator_energy.value = [2, 10]
oscillator_energy.unit = "1e14 rad/s"
oscillator_energy.range = [0, 50]
oscillator_energy.source = "somebody (1981)"
oscillator_strength.value = [0.5, 0.7]
oscillator_strength.unit = "1"
oscillator_strength.range = [0, 200]
oscillator_strength.source = "somebody else (1982)"

[[medium]]
name = "two"
title = "Two"
kind = "solid"
static_permittivity.value = 3.0
static_permittivity.unit = "1"
static_permittivity.range = [1, 9]
static_permittivity.source = "somebody (1983)"
refractive_index.value = 1.5
refractive_index.unit = "1"
refractive_index.range = [1, 2]
refractive_index.source = "somebody (1983)"
absorption.value = 3.0
absorption.unit = "1e15 Hz"
absorption.range = [1, 10]
absorption.source = "somebody (1983)"
rotation.value = 1e-4
rotation.unit = "1e15 Hz"
rotation.range = [1e-6, 1e-2]
rotation.source = "somebody (1983)"
)toml";

std::string changed(const std::string& before, const std::string& after) {
  std::string text = media_text;
  const auto place = text.find(before);
  REQUIRE(place != std::string::npos);
  return text.replace(place, before.size(), after);
}

/// Reads the text as media.toml of a folder of its own.
Catalogs with(const std::string& text) {
  static int count = 0;
  const auto folder =
      std::filesystem::temp_directory_path() /
      fmt::format("gapwright-media-{}-{}", static_cast<const void*>(&count), ++count);
  std::filesystem::create_directories(folder);
  std::ofstream(folder / "media.toml") << text;
  struct Remove {
    std::filesystem::path folder;
    ~Remove() { std::filesystem::remove_all(folder); }
  } remove{folder};
  return Catalogs::from_folder(folder);
}

}  // namespace

TEST_CASE("media are read in their units") {
  const Catalogs catalogs = with(media_text);
  REQUIRE(catalogs.media().size() == 2);
  const Medium &one = catalogs.medium("one"), &two = catalogs.medium("two");
  CHECK(one.liquid);
  CHECK_FALSE(two.liquid);
  // ħ·1e14 rad/s = 0.0658212 eV, h·1e15 Hz = 4.13567 eV (SI, exact).
  CHECK(one.oscillators[0].energy_eV == Approx(2 * 0.0658211957).epsilon(1e-9));
  CHECK(two.oscillators[0].energy_eV == Approx(3 * 4.135667697).epsilon(1e-9));
  CHECK(one.permittivity(0) == Approx(1 + 74.8 + 0.5 + 0.7).epsilon(1e-14));
  CHECK(one.permittivity(one.relaxations[0].energy_eV) == Approx(1 + 37.4 + 1.2).epsilon(1e-6));
  CHECK(two.permittivity(0) == Approx(3.0).epsilon(1e-14));
  CHECK(two.permittivity(two.oscillators[0].energy_eV) == Approx(1 + 1.25 / 2).epsilon(1e-4));
  CHECK(one.source == "somebody (1981); somebody else (1982)");
}

TEST_CASE("every rule of the media refuses its broken text") {
  struct Broken {
    std::string rule, before, after, message;
  };
  const std::vector<Broken> rules{
      {"unknown key", "title", "titel", "unknown key 'titel'"},
      {"kind", "\"liquid\"", "\"gas\"", "'gas' is not known as 'kind'"},
      {"vacuum", "\"one\"", "\"vacuum\"", "is always there"},
      {"name twice", "\"two\"", "\"one\"", "is used twice"},
      {"unit", "\"1e14 rad/s\"", "\"1/cm\"", "'1/cm' is not known as 'unit'"},
      {"number of strengths", "[0.5, 0.7]", "[0.5]", "has 1 values"},
      {"strength not positive", "[0.5, 0.7]", "[0.5, 0]", "is not positive"},
      {"energy not positive", "[2, 10]", "[0, 10]", "is not positive"},
      {"out of range", "[2, 10]", "[2, 60]", "out of range"},
      {"half a relaxation", "relaxation_energy.value = 6.55e-5\n", "", "is missing"},
      {"index of one", "refractive_index.value = 1.5", "refractive_index.value = 1",
       "has no oscillator"},
      {"index above the static value", "refractive_index.value = 1.5",
       "refractive_index.value = 1.8", "not above the index squared"},
  };
  for (const Broken& broken : rules) {
    DYNAMIC_SECTION(broken.rule) {
      CHECK_THROWS_WITH(with(changed(broken.before, broken.after)),
                        Contains(broken.message) && Contains("media.toml:"));
    }
  }
  const std::string one_only = media_text.substr(0, media_text.find("oscillator_energy"));
  CHECK_THROWS_WITH(with(one_only), Contains("has no oscillators"));
}

TEST_CASE("media are found by name and enter the hash") {
  const Catalogs& catalogs = Catalogs::built_in();
  CHECK(catalogs.medium().name == "vacuum");
  for (const Medium& medium : catalogs.media()) CHECK(&catalogs.medium(medium.name) == &medium);
  CHECK_THROWS_WITH(catalogs.medium("watre"), Contains("nearest: water"));
  const std::string same = with(media_text).hash();
  CHECK(with(changed("somebody (1981)", "somebody (1999)")).hash() == same);
  CHECK(with(changed("74.8", "74.9")).hash() != same);
  CHECK(with(changed("[0.5, 0.7]", "[0.5, 0.71]")).hash() != same);
  CHECK(with(changed("\"two\"", "\"three\"")).hash() != same);
  CHECK(with(changed("\"solid\"", "\"liquid\"")).hash() != same);
}
