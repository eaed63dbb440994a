#include <gapwright/catalog/input_error.hpp>
#include <gapwright/table/layout.hpp>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

Table small_table(TableKind kind) {
  Table table;
  table.kind = kind;
  table.object_1 = "(10,10)";
  table.object_2 = "(17,0)";
  table.touching_nm = 1.25;
  table.first_nm = 1.5;
  table.last_nm = 2.0;
  table.rows = {{.distance_nm = 1.5, .energy = 1.0, .force = 2.0},
                {.distance_nm = 2.0, .energy = -0.5, .force = -1.0}};
  return table;
}

std::string written(const std::string& text, TableKind kind = TableKind::parallel) {
  return Layout::from_text(text, "mine.template", kind).write(small_table(kind));
}

// The message of a refused text.
std::string refusal(const std::string& text, TableKind kind = TableKind::parallel) {
  try {
    Layout::from_text(text, "mine.template", kind);
  } catch (const InputError& error) {
    return error.what();
  }
  return "accepted";
}

}  // namespace

TEST_CASE("units are those of the SI and of CODATA 2018") {
  // 1 eV = 96.48533212 kJ/mol, 23.06054783 kcal/mol, 0.1602176634 aJ; 1 eV/nm = 0.1602176634 nN.
  CHECK(1 / parse_unit("kJ/mol")->size == Approx(96.48533212).epsilon(1e-9));
  CHECK(1 / parse_unit("kcal/mol")->size == Approx(23.06054783).epsilon(1e-9));
  CHECK(1 / parse_unit("aJ")->size == Approx(0.1602176634).epsilon(1e-12));
  CHECK(1 / parse_unit("nN")->size == Approx(0.1602176634).epsilon(1e-12));
  CHECK(1 / parse_unit("kcal/mol/Å2")->size == Approx(0.2306054783).epsilon(1e-9));
  CHECK(parse_unit("eV/A")->size == Approx(10));
  CHECK(parse_unit("rad")->size == Approx(57.29577951));
  CHECK(parse_unit("kJ/mol/nm²")->dimension == Dimension{1, -2});
  CHECK(parse_unit("nN/nm")->dimension == Dimension{1, -2});
  for (const char* word : {"", "ev", "kJ", "eV/", "eV/eV", "eV//nm", "mol", "nm2", "eV/nm3"})
    CHECK_FALSE(parse_unit(word));
}

TEST_CASE("a layout writes fields in units and formats, and all else as it stands") {
  CHECK(written("[row]\n{distance} {energy}\n") == "1.5 1\n2 -0.5\n");
  CHECK(written("[row]\n{number 3d}|{distance Å 8.3f}|{energy meV/nm .2e}|{force nN/nm +.4f}\n") ==
        "  1|  15.000|1.00e+03|+0.3204\n  2|  20.000|-5.00e+02|-0.1602\n");
  CHECK(written("# a comment\n\n[header]\n{{{object_1}}} {rows}\n# kept\n\n[row]\n{gap .2f}\n"
                "[footer]\nend [x]\n") == "{(10,10)} 2\n# kept\n\n0.25\n0.75\nend [x]\n");
  CHECK(written("[row]\r\n{object_2 -8}:{object_2 8} {gap}\r\n") ==
        "(17,0)  :  (17,0) 0.25\n(17,0)  :  (17,0) 0.75\n");
  CHECK(written("[row]\n{distance}\n{energy eV}\n", TableKind::beads) == "1.5\n1\n2\n-0.5\n");
}

TEST_CASE("rows without a value of a field are left out") {
  Table table = small_table(TableKind::crossed);
  table.rows[0].angle_deg = 0.0;
  table.rows[0].energy.reset();
  table.rows[0].energy_sine = 3.0;
  table.rows[1].angle_deg = 90.0;
  table.rows[1].energy_sine = -0.5;
  const auto with = [&](const char* text) {
    return Layout::from_text(text, "t", TableKind::crossed).write(table);
  };
  CHECK(with("[header]\n{rows}\n[row]\n{angle} {energy}\n") == "1\n90 -0.5\n");
  CHECK(with("[header]\n{rows}\n[row]\n{angle} {energy_sine}\n") == "2\n0 3\n90 -0.5\n");
}

TEST_CASE("a layout that cannot be used is refused with line, text and caret") {
  CHECK(refusal("[row]\n{distance} {energi}\n") ==
        "mine.template:2: unknown field 'energi'\n  {distance} {energi}\n              ^\n"
        "  expected one of number, distance, gap, angle, energy, force, energy_sine, force_sine, "
        "rows, kind, object_1, object_2, diameter_1, diameter_2, first_distance, last_distance, "
        "outer_cut, well_distance, spacing, temperature_K, medium, contact_target, tolerance, "
        "reading_error, dispersion_error\n  nearest: energy");
  using Catch::Contains;
  CHECK_THAT(refusal("[row]\nÅ {energy kcal/mol/Åå}\n"), Contains(":2: unknown unit") &&
                                                             Contains("\n            ^\n") &&
                                                             Contains("nearest: kcal/mol/Å"));
  CHECK_THAT(refusal("[row]\n{energy eV}\n"), Contains("no unit of 'energy'") && Contains("eV/nm"));
  CHECK_THAT(refusal("[row]\n{energy 5}\n"), Contains("'5' is no format of energy"));
  CHECK_THAT(refusal("[row]\n{energy .99f}\n"), Contains("no format"));
  CHECK_THAT(refusal("[row]\n{energy 999999999999999999f}\n"), Contains("no format"));
  CHECK_THAT(refusal("[row]\n{number .2f}\n"), Contains("no format of number"));
  CHECK_THAT(refusal("[row]\n{rows nm}\n"), Contains("no unit to choose"));
  CHECK_THAT(refusal("[row]\n{energy eV/nm .2f x}\n"), Contains("one word too many"));
  CHECK_THAT(refusal("[row]\n{distance\n"), Contains("'{' without '}'"));
  CHECK_THAT(refusal("[row]\ndistance}\n"), Contains("'}' without '{'"));
  CHECK_THAT(refusal("[row]\n{ }\n"), Contains("without a name"));
  CHECK_THAT(refusal("[header]\n{energy}\n[row]\n{energy}\n"), Contains("is a field of rows"));
  CHECK_THAT(refusal("[heder]\n"), Contains("unknown part") && Contains("nearest: [header]"));
  CHECK_THAT(refusal("x\n[row]\n{energy}\n"), Contains("text before the first part"));
  CHECK_THAT(refusal("[row]\n{energy}\n[row]\n"), Contains("a second part [row]"));
  CHECK_THAT(refusal("[header]\nx\n"), Contains("no part [row]"));
  CHECK_THAT(refusal("[row]\nx\n"), Contains("the row has no field"));
  CHECK_THAT(refusal(""), Contains("no part [row]"));
}
