// The shipped catalogues, their rules (one broken text a rule) and their hash.
#include <gapwright/catalog/catalogs.hpp>

#include <cmath>
#include <filesystem>
#include <fstream>

#include <catch2/catch.hpp>
#include <fmt/format.h>

using namespace gapwright;
using Catch::Matchers::Contains;

namespace {

// A folder of its own that goes with the test.
class Folder {
 public:
  Folder() : path_(std::filesystem::temp_directory_path() / fmt::format("gapwright-{}", next())) {
    std::filesystem::remove_all(path_);
    std::filesystem::create_directories(path_);
  }
  ~Folder() { std::filesystem::remove_all(path_); }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;

  Catalogs with(const std::string& file, const std::string& text) const {
    std::ofstream(path_ / file) << text;
    return Catalogs::from_folder(path_);
  }

 private:
  static std::string next() {
    static int count = 0;
    return fmt::format("{}-{}", static_cast<const void*>(&count), ++count);
  }
  std::filesystem::path path_;
};

const std::string hopping_text = R"toml(
[[set]]
name = "one"
title = "One"
curvature = true
hopping.value = [-2.7]
hopping.unit = "eV"
hopping.range = [-3.5, -2.0]
hopping.source = "somebody (1998)"
overlap.value = [0.1]
overlap.unit = "1"
overlap.range = [-0.5, 0.5]
overlap.source = "somebody else (1999)"
)toml";

const std::string background_text = R"toml(
[[background]]
name = "one"
title = "One"
normal_electrons.value = 4
normal_electrons.unit = "1/atom"
normal_electrons.range = [0, 4]
normal_electrons.source = "somebody (1998)"
normal_strength.value = 0.208
normal_strength.unit = "nm"
normal_strength.range = [0, 0.4]
normal_strength.source = "somebody (1998)"
)toml";

const std::string ribbon_text = R"toml(
[[ribbon]]
name = "one"
title = "One"
edge_bond.value = 1.1
edge_bond.unit = "1"
edge_bond.range = [1.0, 1.3]
edge_bond.source = "somebody (2006)"
repulsion.value = 2.0
repulsion.unit = "eV"
repulsion.range = [-5, 5]
repulsion.source = "somebody (2006)"
)toml";

const std::string contact_text = R"toml(
[[target]]
name = "one"
title = "One"
kind = "pair"
spacing.value = 0.344
spacing.unit = "nm"
spacing.range = [0.30, 0.40]
spacing.source = "somebody (1953)"
energy.value = 1.2
energy.unit = "eV/nm2"
energy.range = [0.1, 4]
energy.source = "somebody (1953)"
)toml";

const std::string checks_text = R"toml(
[[check]]
name = "one"
quantity = "diameter_nm"
object = "(5,5)"
value = 0.678
uncertainty = 1.0e-5
unit = "nm"
weight = "gated"
source = "somebody (1998)"
)toml";

std::string changed(std::string text, const std::string& before, const std::string& after) {
  const auto place = text.find(before);
  REQUIRE(place != std::string::npos);
  return text.replace(place, before.size(), after);
}

struct Broken {
  std::string rule, file, before, after, message;
};

const std::string& text_of(const std::string& file) {
  if (file == "hopping.toml") return hopping_text;
  if (file == "background.toml") return background_text;
  if (file == "ribbons.toml") return ribbon_text;
  return file == "contact.toml" ? contact_text : checks_text;
}

const std::vector<Broken> broken_texts = {
    {"negative repulsion", "ribbons.toml", "= 2.0", "= -2.0", "'repulsion' is negative"},
    {"missing repulsion", "ribbons.toml", "repulsion.unit", "# repulsion.unit",
     "key 'unit' is missing"},
    {"unknown key", "hopping.toml", "title", "titel", "unknown key 'titel'"},
    {"extra key", "hopping.toml", "title", "colour = 1\ntitle", "unknown key 'colour'"},
    {"extra key of a value", "hopping.toml", "hopping.unit", "hopping.note = \"\"\nhopping.unit",
     "unknown key 'note'"},
    {"other table", "hopping.toml", "[[set]]", "[other]\n[[set]]", "unknown key 'other'"},
    {"no list", "hopping.toml", "[[set]]", "[set]", "'set' is not a list of tables"},
    {"missing source", "hopping.toml", "hopping.source = \"somebody (1998)\"\n", "",
     "key 'source' is missing"},
    {"missing range", "hopping.toml", "hopping.range = [-3.5, -2.0]\n", "",
     "key 'range' is missing"},
    {"missing unit", "hopping.toml", "hopping.unit = \"eV\"\n", "", "key 'unit' is missing"},
    {"another unit", "hopping.toml", "\"eV\"", "\"meV\"", "'meV' is not known as 'unit'"},
    {"out of range", "hopping.toml", "[-2.7]", "[-3.6]", "'value' is out of range"},
    {"not finite", "hopping.toml", "[-2.7]", "[nan]", "'value' is out of range"},
    {"too many values", "hopping.toml", "[-2.7]", "[-2.7, -2.7, -2.7, -2.7]", "has 4 values"},
    {"number of overlaps", "hopping.toml", "[-2.7]", "[-2.7, -2.1]", "as many overlaps"},
    {"same signs", "hopping.toml", "[0.1]", "[-0.1]", "have the same sign"},
    {"overlap not positive", "hopping.toml", "[0.1]", "[0.34]", "would not be positive"},
    {"zero hopping", "hopping.toml", "[-2.7]\nhopping.unit = \"eV\"\nhopping.range = [-3.5, -2.0]",
     "[0]\nhopping.unit = \"eV\"\nhopping.range = [-3.5, 0]", "the first hopping is zero"},
    {"name", "hopping.toml", "\"one\"", "\"One Set\"", "is not a name"},
    {"name twice", "hopping.toml", "[[set]]", hopping_text + "[[set]]", "is used twice"},
    {"no flag", "hopping.toml", "true", "1", "'curvature' is not a flag"},
    {"blank source", "contact.toml", "\"somebody (1953)\"", "\" \"", "'source' is blank"},
    {"kind", "contact.toml", "\"pair\"", "\"pairs\"", "'pairs' is not known as 'kind'"},
    {"energy not positive", "contact.toml",
     "1.2\nenergy.unit = \"eV/nm2\"\nenergy.range = [0.1, 4]",
     "0\nenergy.unit = \"eV/nm2\"\nenergy.range = [0, 4]", "'energy' is not positive"},
    {"range upside down", "contact.toml", "[0.30, 0.40]", "[0.40, 0.30]", "ends below its start"},
    {"no electrons", "background.toml", background_text.substr(background_text.find("normal_e")),
     "", "holds no electrons"},
    {"half an oscillator", "background.toml", "normal_strength.value = 0.208", "", "is missing"},
    {"no strength", "background.toml", "0.208", "0", "'normal_strength' is not positive"},
    {"unknown quantity", "checks.toml", "diameter_nm", "diameter", "is not known as 'quantity'"},
    {"unit of a quantity", "checks.toml", "\"nm\"", "\"eV\"", "is not known as 'unit'"},
    {"weight", "checks.toml", "\"gated\"", "\"heavy\"", "is not known as 'weight'"},
    {"gate without width", "checks.toml", "1.0e-5", "0", "needs an uncertainty"},
    {"negative uncertainty", "checks.toml", "1.0e-5", "-1", "'uncertainty' is out of range"},
    {"unknown hopping set", "checks.toml", "weight", "hopping = \"nearest\"\nweight",
     "'nearest' is not known as 'hopping'"},
    {"check twice", "checks.toml", "[[check]]", checks_text + "[[check]]", "is used twice"},
    {"syntax", "checks.toml", "[[check]]", "[[check]", "expected valid TOML"},
};

}  // namespace

TEST_CASE("every rule of the catalogues refuses its broken text") {
  for (const Broken& broken : broken_texts) {
    DYNAMIC_SECTION(broken.rule) {
      const Folder folder;
      CHECK_NOTHROW(folder.with(broken.file, text_of(broken.file)));
      const auto text = changed(text_of(broken.file), broken.before, broken.after);
      CHECK_THROWS_WITH(folder.with(broken.file, text),
                        Contains(broken.message) && Contains(broken.file + ":"));
    }
  }
}

TEST_CASE("a missing folder and a misspelled file are refused") {
  CHECK_THROWS_WITH(Catalogs::from_folder("no-such-folder"), Contains("is not a folder"));
  const Folder folder;
  CHECK_THROWS_WITH(folder.with("hoping.toml", hopping_text), Contains("nearest: hopping.toml"));
}

TEST_CASE("a folder replaces only the files it holds") {
  const Folder folder;
  const Catalogs catalogs = folder.with("contact.toml", contact_text);
  CHECK(catalogs.contact_target().name == "one");
  CHECK(catalogs.hopping().name == Catalogs::built_in().hopping().name);
}

TEST_CASE("built-in checks that ask for a set the folder does not hold are left out") {
  const Folder folder;
  const auto rows = folder.with("hopping.toml", hopping_text).checks();
  CHECK_FALSE(rows.empty());
  CHECK(rows.size() < Catalogs::built_in().checks().size());
  for (const auto& row : rows) CHECK(row.hopping.empty());
}

TEST_CASE("entries are found by name, the first by default") {
  const Catalogs& catalogs = Catalogs::built_in();
  CHECK(&catalogs.hopping() == &catalogs.hopping_sets().front());
  for (const auto& set : catalogs.hopping_sets()) CHECK(&catalogs.hopping(set.name) == &set);
  CHECK_THROWS_WITH(catalogs.hopping("zone-foldin"), Contains("nearest: zone-folding"));
  CHECK_THROWS_WITH(catalogs.background("two-fluids"), Contains("nearest: two-fluid"));
  CHECK_THROWS_WITH(catalogs.contact_target("bilayer"), Contains("nearest: bilayer-qmc"));
}

TEST_CASE("every shipped entry names its source") {
  const Catalogs& catalogs = Catalogs::built_in();
  for (const auto& entry : catalogs.hopping_sets()) CHECK_FALSE(entry.source.empty());
  for (const auto& entry : catalogs.backgrounds()) CHECK_FALSE(entry.source.empty());
  for (const auto& entry : catalogs.contact_targets()) CHECK_FALSE(entry.source.empty());
  for (const auto& row : catalogs.checks()) CHECK_FALSE(row.source.empty());
}

TEST_CASE("the default background obeys the f-sum rule") {
  // Σ strength·energy² = 4π k_e n ħ²/m_e with k_e = 1.43996 eV nm, ħ²/m_e = 0.0762 eV nm²
  // (CODATA 2018), n = 3 and 4 electrons at 38.177 atoms a nm²; energy of the normal dipoles
  // 31.8 eV by the same rule from 0.208 nm.
  const Background& two_fluid = Catalogs::built_in().background();
  const double product = 4 * M_PI * 1.439964548 * 0.0761996423 * 38.177;
  CHECK(two_fluid.in_plane_nm(0) * 13.06 * 13.06 == Approx(3 * product).epsilon(1e-5));
  CHECK(two_fluid.normal_energy_eV == Approx(std::sqrt(4 * product / 0.208)).epsilon(1e-5));
  CHECK(two_fluid.normal_energy_eV == Approx(31.8).margin(0.05));
  // Far above its energy an oscillator answers as free electrons do, like 1/ξ².
  const double xi_eV = 1e5;
  CHECK(two_fluid.in_plane_nm(xi_eV) * xi_eV * xi_eV == Approx(3 * product).epsilon(1e-5));
  CHECK(two_fluid.normal_nm(xi_eV) * xi_eV * xi_eV == Approx(4 * product).epsilon(1e-5));
  CHECK(Catalogs::built_in().background("in-plane-only").normal_nm(0) == 0.0);
}

TEST_CASE("contact targets are turned to energy per area") {
  const Catalogs& catalogs = Catalogs::built_in();
  // Mostaani et al. (2015): (11.5 + 2·17.7)/3 = 15.6 meV/atom, two atoms face each other.
  CHECK(catalogs.contact_target("bilayer-qmc").energy_eV_per_nm2 ==
        Approx(2 * 0.0156 * 38.177).epsilon(1e-5));
  CHECK(catalogs.contact_target("graphite-rpa").energy_eV_per_nm2 ==
        Approx(0.048 * 38.177 * 15.6 / 17.7).epsilon(1e-5));
  // Wang et al. (2015): 0.37 J/m² = 0.37/0.1602176634 eV/nm².
  CHECK(catalogs.contact_target("cleavage-measured").energy_eV_per_nm2 ==
        Approx(0.37 / 0.1602176634).epsilon(1e-12));
  CHECK(catalogs.contact_target("cleavage-measured").kind == TargetKind::cleavage);
}

TEST_CASE("a set with one hopping and no overlap is recognised") {
  const Catalogs& catalogs = Catalogs::built_in();
  CHECK(catalogs.hopping("nearest-neighbour").nearest_neighbour_only());
  CHECK(catalogs.hopping("zone-folding").nearest_neighbour_only());
  CHECK_FALSE(catalogs.hopping("nearest-neighbour-overlap").nearest_neighbour_only());
  CHECK_FALSE(catalogs.hopping("third-neighbour-overlap").nearest_neighbour_only());
}

TEST_CASE("the catalogue hash follows values and names, not words around them") {
  const Folder folder;
  const auto hash = [&](const std::string& before, const std::string& after) {
    return folder.with("hopping.toml", changed(hopping_text, before, after)).hash();
  };
  const std::string same = hash("[-2.7]", "[-2.7]");
  CHECK(hash("\"One\"", "\"Another title\"") == same);
  CHECK(hash("somebody (1998)", "somebody (2001)") == same);
  CHECK(hash("[-2.7]", "[-2.70]") == same);
  CHECK(hash("[-2.7]", fmt::format("[{:.17g}]", std::nextafter(-2.7, 0.0))) != same);
  CHECK(hash("[0.1]", fmt::format("[{:.17g}]", std::nextafter(0.1, 1.0))) != same);
  CHECK(hash("\"one\"", "\"two\"") != same);
  CHECK(hash("true", "false") != same);
  CHECK(same.size() == 16);
}

TEST_CASE("the content hash tells kinds and boundaries apart") {
  // FNV-1a of nothing is its offset basis (Fowler, Noll & Vo).
  CHECK(ContentHash().hex() == "cbf29ce484222325");
  CHECK(ContentHash().add("ab").add("c").hex() != ContentHash().add("a").add("bc").hex());
  CHECK(ContentHash().add(1.0).hex() != ContentHash().add(std::int64_t{1}).hex());
  CHECK(ContentHash().add(0.0).hex() != ContentHash().add(-0.0).hex());
  CHECK(ContentHash().add(std::int64_t{1}).add(std::int64_t{2}).hex() !=
        ContentHash().add(std::int64_t{2}).add(std::int64_t{1}).hex());
}
