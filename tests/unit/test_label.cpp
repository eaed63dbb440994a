#include <gapwright/catalog/input_error.hpp>
#include <gapwright/lattice/candidates.hpp>
#include <gapwright/lattice/label.hpp>

#include <cmath>
#include <random>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

std::string read(std::string_view label) {
  return label_of(parse_label(label).object);
}

InputError::Parts refusal(std::string_view label) {
  try {
    parse_label(label);
  } catch (const InputError& error) {
    return error.parts();
  }
  FAIL("accepted: " << label);
  return {};
}

bool holds(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("labels of tubes, walls and the sheet", "[label]") {
  CHECK(read("(10,10)") == "(10,10)");
  CHECK(read("10,10") == "(10,10)");
  CHECK(read("5,5@10,10") == "(5,5)@(10,10)");
  CHECK(read("(5,5)@(10,10)@(15,15)") == "(5,5)@(10,10)@(15,15)");
  CHECK(read("graphene") == "graphene");
  CHECK(read(" graphene\t") == "graphene");
  CHECK(read(" ( 5 , 5 ) @ 10 ,10 ") == "(5,5)@(10,10)");
  CHECK(read("+9,0") == "(9,0)");

  const Object walls = parse_label("5,5@10,10").object;
  REQUIRE(std::get<TubeObject>(walls).walls.size() == 2);
  CHECK(std::get<TubeObject>(walls).walls[0].chirality == Chirality{5, 5});
  CHECK(walls == parse_label("(5,5) @ (10,10)").object);
  CHECK_FALSE(walls == parse_label("(10,10)").object);
  CHECK_FALSE(walls == parse_label("(5,5)@(11,10)").object);
  CHECK(std::holds_alternative<SheetObject>(parse_label("graphene").object));
}

TEST_CASE("a label written from an object reads back as the object", "[label]") {
  for (const Tube& tube : candidate_tubes({Interval{0.3, 3.0}, {}, TubeFilter::Kind::any})) {
    const ParsedLabel parsed = parse_label(label_of(TubeObject{{tube}}));
    CHECK(parsed.object == Object(TubeObject{{tube}}));
    CHECK(parsed.notes.empty());
  }
}

TEST_CASE("a mirror image is taken as its canonical twin and said so", "[label]") {
  const ParsedLabel parsed = parse_label("(5,8)@20,0");
  CHECK(label_of(parsed.object) == "(8,5)@(20,0)");
  REQUIRE(parsed.notes.size() == 1);
  CHECK(holds(parsed.notes[0], "(5,8)"));
  CHECK(holds(parsed.notes[0], "(8,5)"));
}

TEST_CASE("indices that name no tube", "[label]") {
  CHECK(holds(refusal("(0,0)").what, "circumference is zero"));
  // C_h = 3·a1 - a2 turned by a sixth is 2·a1 + a2.
  CHECK(holds(refusal("(3,-1)").what, "negative"));
  CHECK(holds(refusal("(3,-1)").nearest, "(2,1)"));
  CHECK(holds(refusal("-3,-4").nearest, "(4,3)"));
  CHECK(holds(refusal("10").what, "two indices"));
  CHECK(holds(refusal("1,2,3").what, "two indices"));
  CHECK(holds(refusal("5,").what, "whole numbers"));
  CHECK(holds(refusal("10.0,10").what, "whole numbers"));
}

TEST_CASE("another separator or bracket is recognised", "[label]") {
  for (const char* label : {"10;10", "10x10", "10 10", "10/10", "(10;10)", "[10;10]"}) {
    CHECK(holds(refusal(label).what, "comma"));
    CHECK(refusal(label).nearest == "(10,10)");
  }
  for (const char* label : {"(10,10", "10,10)", "[10,10]", "((10,10))"})
    CHECK(refusal(label).nearest == "(10,10)");
}

TEST_CASE("diameters outside the range name the nearest tube inside", "[label]") {
  CHECK(holds(refusal("3,0").what, "0.2349 nm"));
  CHECK(refusal("3,0").nearest == "(4,0)");
  CHECK(refusal("2,2").nearest == "(3,3)");
  CHECK(refusal("300,300").nearest == "(147,147)");
  CHECK(refusal("256,0").nearest == "(255,0)");
  CHECK(read("255,0") == "(255,0)");
  CHECK(read("4,0") == "(4,0)");
  for (const std::string digits : {"2147483648", "99999999999999999999999"}) {
    CHECK(holds(refusal(digits + "," + digits).what, "over 1000 nm"));
    CHECK(refusal(digits + "," + digits).nearest == "(147,147)");
    CHECK(refusal(digits + ",0").nearest == "(255,0)");
  }
}

TEST_CASE("walls must rise and leave room", "[label]") {
  CHECK(holds(refusal("5,5@7,7").what, "0.136 nm"));
  CHECK(refusal("5,5@7,7").nearest == "(5,5)@(8,8)");
  CHECK(holds(refusal("10,10@5,5").what, "wider"));
  CHECK(refusal("10,10@5,5").nearest == "(5,5)@(10,10)");
  CHECK(refusal("5,5@10,10@11,11").nearest == "(10,10)@(13,13)");
  CHECK(refusal("147,147@147,147").nearest.empty());
  CHECK(read("5,5@8,8") == "(5,5)@(8,8)");
  CHECK(holds(refusal("5,5@").where, "wall 2"));
  CHECK(holds(refusal("@5,5").where, "wall 1"));
  CHECK(holds(refusal("graphene@5,5").what, "flat"));
}

TEST_CASE("everything else is refused with what is expected", "[label]") {
  using namespace std::string_literals;
  for (const std::string& label :
       {""s, " \t"s, "nanotube"s, "(10,10)(5,5)"s, "()"s, "("s, "@"s, "1e1,1"s, "(１０,１０)"s,
        "\xff\xfe"s, "10,10\0"s, "wire:Copper"s, std::string(100000, '9')}) {
    const InputError::Parts parts = refusal(label);
    CHECK(holds(parts.expected, "(10,10)"));
    CHECK(holds(parts.expected, "graphene"));
    CHECK(parts.what.size() + parts.where.size() < 400);
  }
  CHECK(refusal("graphen").nearest == "graphene");
  CHECK(refusal("Graphene").nearest == "graphene");
  CHECK(holds(refusal("5,5@6-zgnr").what, "ribbon"));
  CHECK(holds(refusal("wire:Copper").what, "wire"));
}

TEST_CASE("labels of ribbons", "[label]") {
  CHECK(read("13-AGNR") == "13-AGNR");
  CHECK(read(" 6-zgnr ") == "6-ZGNR");
  CHECK(read("3-AGNR") == "3-AGNR");
  CHECK(read("3000-ZGNR") == "3000-ZGNR");
  CHECK(std::get<RibbonObject>(parse_label("7-AGNR").object).ribbon ==
        make_ribbon(RibbonEdge::armchair, 7));
  for (const char* label : {"13AGNR", "AGNR-13", "13 AGNR", "13-GNR", "+13-AGNR", "-13-AGNR"})
    CHECK(refusal(label).nearest == "13-AGNR");
  CHECK(refusal("2-AGNR").nearest == "3-AGNR");
  CHECK(refusal("0-ZGNR").nearest == "2-ZGNR");
  CHECK(refusal("99999999999999999999-ZGNR").nearest == "3000-ZGNR");
  for (const char* label : {"AGNR", "13-5-AGNR", "-AGNR", "1.5-AGNR", "13-AGNRs"})
    CHECK(holds(refusal(label).expected, "6-ZGNR"));
  CHECK(holds(refusal("13-AGNR@10,10").what, "no wall"));
}

TEST_CASE("rows of ribbons fill the width", "[label]") {
  for (const Ribbon& ribbon :
       {make_ribbon(RibbonEdge::armchair, 7), make_ribbon(RibbonEdge::zigzag, 4)}) {
    const auto rows = ribbon_rows(ribbon);
    REQUIRE(int(rows.size()) == ribbon.rows());
    for (std::size_t j = 0; j < rows.size(); ++j) {
      const auto& mirror = rows[rows.size() - 1 - j];
      CHECK(rows[j].y_nm == Approx(-mirror.y_nm).margin(1e-12));
      CHECK(rows[j].strip_high_nm - rows[j].strip_low_nm == Approx(ribbon.strip_nm()));
      if (j + 1 < rows.size())
        CHECK(rows[j].strip_high_nm ==
              Approx(0.5 * (rows[j].y_nm + rows[j + 1].y_nm)).margin(1e-12));
      // A_at times the atoms of a row per nm (METHODS §1).
      CHECK(ribbon.strip_nm() == Approx(std::sqrt(3.0) / 4 * 0.142 * 0.142 * 3 *
                                        ribbon.atoms_per_row() / ribbon.period_nm()));
    }
    CHECK(row_conductances_per_nm(rows).size() == rows.size() - 1);
  }
  // Density of the sheet, 38.177 atoms/nm² (Saito, Dresselhaus & Dresselhaus 1998).
  const Ribbon seven = make_ribbon(RibbonEdge::armchair, 7);
  CHECK(seven.atoms_per_nm() / seven.width_nm() == Approx(38.177).epsilon(1e-5));
  CHECK_THROWS_AS(make_ribbon(RibbonEdge::armchair, 2), std::domain_error);
  CHECK_THROWS_AS(make_ribbon(RibbonEdge::zigzag, 3001), std::domain_error);
}

TEST_CASE("messages carry no control characters of the label", "[label]") {
  const InputError::Parts parts = refusal("\x1b[31mred\x07\xc2\x9b\xc3");
  for (const std::string& text : {parts.what, parts.where})
    for (const char c : text) CHECK(static_cast<unsigned char>(c) >= 0x20);
  CHECK_FALSE(holds(parts.what, "\xc2\x9b"));
}

TEST_CASE("random labels are read or refused, never anything else", "[label]") {
  std::mt19937 random(1);
  const std::string letters = "0123456789(),@ -+;gx\xc3\x01";
  std::uniform_int_distribution<std::size_t> pick(0, letters.size() - 1), length(0, 14);
  int accepted = 0;
  for (int i = 0; i < 20000; ++i) {
    std::string label(length(random), ' ');
    for (char& c : label) c = letters[pick(random)];
    try {
      const ParsedLabel parsed = parse_label(label);
      ++accepted;
      CHECK(parse_label(label_of(parsed.object)).object == parsed.object);
    } catch (const InputError& error) {
      CHECK_FALSE(error.parts().what.empty());
      CHECK_FALSE(error.parts().expected.empty());
    }
  }
  CHECK(accepted > 0);
}
