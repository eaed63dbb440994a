// Messages about input, and the nearest word.
#include <gapwright/catalog/input_error.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;

TEST_CASE("an input error shows its parts in one message") {
  const InputError error(
      {"unknown key 'gap'", "plan.toml:3", "  gap = 1\n  ^", "one of gap_nm", "gap_nm"});
  CHECK(std::string(error.what()) ==
        "plan.toml:3: unknown key 'gap'\n  gap = 1\n  ^\n  expected one of gap_nm\n"
        "  nearest: gap_nm");
  CHECK(error.parts().nearest == "gap_nm");
}

TEST_CASE("empty parts leave no trace in the message") {
  CHECK(std::string(InputError({"bad label", {}, {}, {}, {}}).what()) == "bad label");
}

TEST_CASE("nearest word") {
  const std::vector<std::string> keys = {"diameter_nm", "gap_nm", "temperature_K", "index"};
  CHECK(nearest_word("diametr_nm", keys) == "diameter_nm");
  CHECK(nearest_word("DIAMETER_NM", keys) == "diameter_nm");
  CHECK(nearest_word("temperature_k", keys) == "temperature_K");
  CHECK(nearest_word("temp", keys) == "temperature_K");
  CHECK(nearest_word("idnex", keys) == "index");
  CHECK(nearest_word("pressure", keys).empty());
  CHECK(nearest_word("", keys).empty());
  CHECK(nearest_word("x", {}).empty());
}

TEST_CASE("of two equally near words the first is taken") {
  CHECK(nearest_word("bat", {"cat", "hat"}) == "cat");
}

TEST_CASE("joined words") {
  CHECK(joined({}).empty());
  CHECK(joined({"a"}) == "a");
  CHECK(joined({"a", "b", "c"}) == "a, b, c");
}
