// The rules of catalogs/wires.toml: one broken text a rule.
#include <gapwright/catalog/catalogs.hpp>

#include <filesystem>
#include <fstream>

#include <catch2/catch.hpp>
#include <fmt/format.h>

using namespace gapwright;
using Catch::Matchers::Contains;

namespace {

std::string quantity(const std::string& key, double value, const std::string& unit) {
  return fmt::format(
      "{0}.value = {1}\n{0}.unit = \"{2}\"\n{0}.range = [0, 100]\n"
      "{0}.source = \"somebody (1990)\"\n",
      key, value, unit);
}

std::string wire_text(const std::string& name) {
  return "[[wire]]\nname = \"" + name + "\"\ntitle = \"A wire\"\n" +
         quantity("mass", 0.5, "electron mass") + quantity("density", 4, "1e6/cm") +
         quantity("degeneracy", 2, "1") + quantity("radius", 7.5, "nm") +
         quantity("host_permittivity", 3, "1");
}

const std::string text = wire_text("one") + wire_text("two");

std::string changed(const std::string& before, const std::string& after) {
  std::string copy = text;
  const auto place = copy.find(before);
  REQUIRE(place != std::string::npos);
  return copy.replace(place, before.size(), after);
}

/// Reads the text as wires.toml of a folder of its own.
Catalogs with(const std::string& wires) {
  static int count = 0;
  const auto folder =
      std::filesystem::temp_directory_path() /
      fmt::format("gapwright-wires-{}-{}", static_cast<const void*>(&count), ++count);
  std::filesystem::create_directories(folder);
  std::ofstream(folder / "wires.toml") << wires;
  struct Remove {
    std::filesystem::path folder;
    ~Remove() { std::filesystem::remove_all(folder); }
  } remove{folder};
  return Catalogs::from_folder(folder);
}

}  // namespace

TEST_CASE("wires are read in their units") {
  const Catalogs catalogs = with(text);
  REQUIRE(catalogs.wires().size() == 2);
  const ElectronGasWire& wire = catalogs.wire("one");
  CHECK(wire.mass == 0.5);
  CHECK(wire.density_per_nm == Approx(0.4));  // 4e6 electrons a cm
  CHECK(wire.radius_nm == 7.5);
  CHECK(wire.host_permittivity == 3.0);
  CHECK(wire.fermi_wave_per_nm() == Approx(0.2 * M_PI));
  CHECK(wire.source == "somebody (1990)");
  CHECK(with(changed("= 7.5", "= 7.6")).hash() != catalogs.hash());
  CHECK(with(changed("somebody (1990)", "somebody (1991)")).hash() == catalogs.hash());
}

TEST_CASE("every rule of the wires refuses its broken text") {
  struct Broken {
    std::string rule, before, after, message;
  };
  const std::vector<Broken> rules{
      {"unknown key", "title", "titel", "unknown key 'titel'"},
      {"name twice", "\"two\"", "\"one\"", "is used twice"},
      {"name", "\"two\"", "\"Two\"", "is not a name"},
      {"unit of mass", "\"electron mass\"", "\"kg\"", "'kg' is not known as 'unit'"},
      {"unit of density", "\"1e6/cm\"", "\"1/cm\"", "'1/cm' is not known as 'unit'"},
      {"mass not positive", "mass.value = 0.5", "mass.value = 0", "is not positive"},
      {"density not positive", "density.value = 4", "density.value = 0", "is not positive"},
      {"out of range", "radius.value = 7.5", "radius.value = 750", "out of range"},
      {"host", "host_permittivity.value = 3", "host_permittivity.value = 0.5",
       "below that of vacuum"},
      {"missing", quantity("degeneracy", 2, "1"), "", "is missing"},
      {"text for a number", "mass.value = 0.5", "mass.value = \"light\"", "value"},
  };
  for (const Broken& broken : rules) {
    DYNAMIC_SECTION(broken.rule) {
      CHECK_THROWS_WITH(with(changed(broken.before, broken.after)),
                        Contains(broken.message) && Contains("wires.toml:"));
    }
  }
}
