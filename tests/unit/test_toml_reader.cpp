// Typed reading of TOML: what is taken, what is refused, and where the caret points.
#include <gapwright/catalog/toml_reader.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;
using Catch::Matchers::Contains;

namespace {

TomlReader reader(const std::string& text) {
  return TomlReader::from_text(text, "plan.toml");
}

template <class Action>
InputError::Parts refused(Action action) {
  try {
    action();
  } catch (const InputError& error) {
    return error.parts();
  }
  FAIL("nothing was refused");
  return {};
}

const NumberRange range_nm{0.3, 20.0, "nm"};

}  // namespace

TEST_CASE("values of every kind are read") {
  const auto plan = reader(
      "a = 1.5\nb = 2\nc = \"text\"\nd = true\ne = [1, 2.5]\nf = \"0.6:1.2\"\ng = [0.6, 1.2]\n"
      "h = \" 0.6 : 1.2 \"\n[t]\nx = 3\n[[u]]\nx = 1\n[[u]]\nx = 2\n");
  CHECK(plan.number("a", range_nm) == 1.5);
  CHECK(plan.number("b", range_nm) == 2.0);
  CHECK(plan.integer("b", 1, 3) == 2);
  CHECK(plan.text("c") == "text");
  CHECK(plan.word("c", {"text", "other"}) == "text");
  CHECK(plan.flag("d"));
  CHECK(plan.numbers("e", 1, 3, range_nm) == std::vector<double>{1.0, 2.5});
  CHECK(plan.numbers("a", 1, 3, range_nm) == std::vector<double>{1.5});
  for (const char* key : {"f", "g", "h"})
    CHECK(plan.interval(key, range_nm) == std::array<double, 2>{0.6, 1.2});
  CHECK(plan.table("t").integer("x", 0, 9) == 3);
  REQUIRE(plan.tables("u").size() == 2);
  CHECK(plan.tables("u")[1].integer("x", 0, 9) == 2);
  CHECK_NOTHROW(plan.finish());
}

TEST_CASE("an absent key is nothing when optional") {
  const auto plan = reader("a = 1\n");
  CHECK_FALSE(plan.has("z"));
  CHECK_FALSE(plan.optional_number("z", range_nm));
  CHECK_FALSE(plan.optional_integer("z", 0, 1));
  CHECK_FALSE(plan.optional_flag("z"));
  CHECK_FALSE(plan.optional_text("z"));
  CHECK_FALSE(plan.optional_word("z", {"w"}));
  CHECK_FALSE(plan.optional_interval("z", range_nm));
  CHECK_FALSE(plan.optional_table("z"));
}

TEST_CASE("an unknown key is refused with place, caret and nearest key") {
  const auto plan = reader("title = \"x\"\n  diametr_nm = 1.0\n");
  CHECK(plan.text("title") == "x");
  CHECK_FALSE(plan.optional_number("diameter_nm", range_nm));
  const auto parts = refused([&] { plan.finish(); });
  CHECK(parts.what == "unknown key 'diametr_nm'");
  CHECK(parts.where == "plan.toml:2");
  CHECK(parts.excerpt == "    diametr_nm = 1.0\n    ^");
  CHECK(parts.expected == "one of title, diameter_nm");
  CHECK(parts.nearest == "diameter_nm");
}

TEST_CASE("a required key that is misspelled is named as such") {
  const auto plan = reader("diametr_nm = 1.0\n");
  const auto parts = refused([&] { (void)plan.number("diameter_nm", range_nm); });
  CHECK(parts.what == "unknown key 'diametr_nm'");
  CHECK(parts.nearest == "diameter_nm");
}

TEST_CASE("a required key that is absent is named with what it should hold") {
  const auto parts = refused([] { (void)reader("a = 1\n").number("gap_nm", range_nm); });
  CHECK(parts.what == "key 'gap_nm' is missing");
  CHECK(parts.expected == "gap_nm = a number of 0.3 to 20 nm");
}

TEST_CASE("the caret stands under the value, also after letters of two bytes") {
  const auto plan = reader("x = \"Ångström\"\n\"größe\" = 99\n");
  const auto parts = refused([&] { (void)plan.number("größe", range_nm); });
  CHECK(parts.where == "plan.toml:2");
  CHECK(parts.excerpt == "  \"größe\" = 99\n            ^");
}

TEST_CASE("numbers out of range, not finite or of another type are refused") {
  for (const char* value : {"0.1", "21", "nan", "inf", "-inf", "\"1\"", "true", "[1.0]", "{}"}) {
    const auto plan = reader(std::string("a = ") + value + "\n");
    const auto parts = refused([&] { (void)plan.number("a", range_nm); });
    CHECK_THAT(parts.expected, Contains("of 0.3 to 20 nm"));
    CHECK(parts.where == "plan.toml:1");
  }
}

TEST_CASE("whole numbers are whole") {
  for (const char* value : {"1.5", "1.0", "0", "11", "\"5\""})
    CHECK_THROWS_AS(reader(std::string("a = ") + value + "\n").integer("a", 1, 10), InputError);
}

TEST_CASE("intervals that are not") {
  for (const char* value : {"\"1.2:0.6\"", "\"0.6\"", "\"0.6:\"", "\":1\"", "\"0.6-1.2\"",
                            "\"0.1:1\"", "\"1:21\"", "\"1:nan\"", "\"a:b\"", "[1.2, 0.6]", "[1.0]",
                            "[1.0, 2.0, 3.0]", "[1.0, \"2\"]", "1.0", "\"0.6:1.2:1.3\""}) {
    const auto plan = reader(std::string("a = ") + value + "\n");
    CHECK_THROWS_AS(plan.interval("a", range_nm), InputError);
  }
}

TEST_CASE("an interval on the command line") {
  CHECK(parse_interval("0.6:1.2", "--diameter-nm", range_nm) == std::array<double, 2>{0.6, 1.2});
  const auto parts = refused([] { (void)parse_interval("0.6", "--diameter-nm", range_nm); });
  CHECK(parts.where == "--diameter-nm");
  CHECK(parts.expected == "LOW:HIGH, LOW not above HIGH, both of 0.3 to 20 nm");
}

TEST_CASE("words, texts, flags, arrays and tables of the wrong kind are refused") {
  const auto plan = reader("a = \"coaxal\"\nb = \"  \"\nc = 1\nd = []\ne = [1.0, 2.0]\n");
  CHECK(refused([&] { (void)plan.word("a", {"coaxial", "parallel"}); }).nearest == "coaxial");
  CHECK_THROWS_AS(plan.text("b"), InputError);
  CHECK_THROWS_AS(plan.text("c"), InputError);
  CHECK_THROWS_AS(plan.flag("c"), InputError);
  CHECK_THROWS_AS(plan.table("c"), InputError);
  CHECK_THROWS_AS(plan.tables("c"), InputError);
  CHECK_THROWS_AS(plan.tables("d"), InputError);
  CHECK_THROWS_AS(plan.numbers("d", 1, 3, range_nm), InputError);
  CHECK_THROWS_AS(plan.numbers("e", 1, 1, range_nm), InputError);
  CHECK_THROWS_AS(plan.numbers("c", 2, 3, range_nm), InputError);
}

TEST_CASE("a syntax error shows its line") {
  const auto parts = refused([] { (void)reader("a = 1\nb = = 2\n"); });
  CHECK(parts.where == "plan.toml:2");
  CHECK_THAT(parts.excerpt, Contains("b = = 2"));
  CHECK(parts.expected == "valid TOML");
}

TEST_CASE("a key given twice is refused") {
  CHECK(refused([] { (void)reader("a = 1\na = 2\n"); }).where == "plan.toml:2");
}

TEST_CASE("files that cannot be read are refused by name") {
  const auto missing = refused([] { (void)TomlReader::from_file("no-such-file.toml"); });
  CHECK(missing.where == "no-such-file.toml");
  CHECK_THROWS_AS(TomlReader::from_file("/"), InputError);
}
