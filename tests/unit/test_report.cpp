// The report: pictures of bands, curves against the gap, the packed rows and the page.
#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/pair/equilibrium.hpp>
#include <gapwright/report/report.hpp>

#include <cmath>
#include <numeric>

#include <catch2/catch.hpp>
#include <nlohmann/json.hpp>

using namespace gapwright;

namespace {

Placement coaxial(const char* label) {
  return {Arrangement::coaxial, parse_label(label).object};
}

double states_up_to(const BandPicture& picture) {
  const double width = 2 * picture.window_eV / double(picture.energy_eV.size());
  return width *
         std::accumulate(picture.states_per_eV_atom.begin(), picture.states_per_eV_atom.end(), 0.0);
}

ReportRow row(const std::string& first, double energy) {
  ReportRow row;
  row.binding.object_1 = first;
  row.binding.object_2 = "(10,10)";
  row.binding.arrangement = "coaxial";
  row.binding.energy_mJ_per_m2 = energy;
  row.rank = 1;
  return row;
}

Report small_report() {
  Report report;
  report.arrangement = "coaxial";
  report.order_field = "energy_mJ_per_m2";
  report.rows = {row("(5,5)", -180.123456789), row("(6,4)", -0.0)};
  return report;
}

}  // namespace

TEST_CASE("every π state is counted once", "[report]") {
  const HoppingSet hopping = Catalogs::built_in().hopping("");
  for (const Chirality chirality : {Chirality{10, 10}, {6, 5}, {9, 0}, {3, 3}}) {
    const BandPicture picture = band_picture(make_tube(chirality), hopping, 12.0, 900);
    CHECK(states_up_to(picture) == Approx(2.0).epsilon(1e-10));  // one electron state, two spins
  }
}

TEST_CASE("density of states of a metallic tube at its middle", "[report]") {
  // 8/(√3πaγ₀) a unit of length and energy. Source: Saito, Dresselhaus & Dresselhaus, Physical
  // Properties of Carbon Nanotubes (1998), section 4.1, from memory; the wide tube has no curvature
  // to speak of.
  const HoppingSet hopping = Catalogs::built_in().hopping("");
  const Tube tube = make_tube({40, 40});
  const BandPicture picture = band_picture(tube, hopping, 0.05, 10);
  const double wanted = 8 / (std::sqrt(3.0) * constants::pi * constants::lattice_nm *
                             std::fabs(hopping.hopping_eV[0]));
  for (const double states : picture.states_per_eV_atom)
    CHECK(states * tube.atoms_per_nm() == Approx(wanted).epsilon(2e-3));
}

TEST_CASE("sub-bands drawn are those of the window", "[report]") {
  const HoppingSet hopping = Catalogs::built_in().hopping("");
  const Tube tube = make_tube({6, 5});
  const BandPicture picture = band_picture(tube, hopping, 1.0, 100);
  const double gap = tube_gaps(tube, hopping).band_gap_eV;
  double highest = -10, lowest = 10;
  for (const auto& band : picture.bands_eV) {
    REQUIRE(band.size() == picture.k.size());
    for (const double energy : band) {
      if (energy < 0) highest = std::max(highest, energy);
      if (energy > 0) lowest = std::min(lowest, energy);
    }
  }
  CHECK(lowest - highest == Approx(gap).epsilon(0.05));
  CHECK_THROWS_AS(band_picture(tube, hopping, 0.0), std::domain_error);
}

TEST_CASE("the curve of two walls meets their row", "[report]") {
  const Binder binder(Catalogs::built_in(), {});
  const Placement placement = coaxial("5,5@10,10");
  const Binding row = binder.bind(placement);
  const double gap = row.gap_nm.value(), h = 1e-3;
  const auto points = coaxial_curve(binder, placement, {gap - h, gap, gap + h});
  CHECK(points[1].energy.value == Approx(row.dispersion_eV_per_nm.value()).epsilon(1e-4));
  const double mid_circumference_nm = constants::pi * (*row.diameter_1_nm + *row.diameter_2_nm) / 2;
  CHECK(-points[1].slope.value / mid_circumference_nm * constants::GPa_per_eV_per_nm3 ==
        Approx(row.pressure_dispersion_GPa.value()).epsilon(1e-3));
  CHECK((points[2].energy.value - points[0].energy.value) / (2 * h) ==
        Approx(points[1].slope.value).epsilon(1e-4));
  CHECK_THROWS_AS(coaxial_curve(binder, placement, {0.1}), std::domain_error);
  CHECK_THROWS_AS(coaxial_curve(binder, coaxial("5,5@10,10@15,15"), {gap}), std::domain_error);
}

TEST_CASE("pressure of a drawn pair vanishes where the walls would rest", "[report]") {
  const Binder binder(Catalogs::built_in(), {});
  const Placement placement = coaxial("5,5@10,10");
  const GapCurve curve = gap_curve(binder, placement).value();
  CHECK(curve.force_unit == "GPa");
  REQUIRE(curve.contact.has_value());
  const double rest = coaxial_equilibrium_gap_nm(binder, placement);
  const auto total = [&](std::size_t i) {
    return curve.dispersion.force[i] + curve.contact->force[i];
  };
  for (std::size_t i = 0; i < curve.gap_nm.size(); ++i)
    CHECK((total(i) > 0) == (curve.gap_nm[i] < rest));  // pushes apart below, draws together above
}

TEST_CASE("no curve where the walls cannot be thought to breathe", "[report]") {
  const Binder binder(Catalogs::built_in(), {});
  CHECK_FALSE(gap_curve(binder, coaxial("5,5@10,10@15,15")).has_value());
}

TEST_CASE("rows are packed by columns", "[report]") {
  const std::string json = report_json(small_report());
  const auto packed = nlohmann::json::parse(json);
  const auto& columns = packed["columns"];
  CHECK(packed["count"] == 2);
  CHECK(columns["object_1"]["words"] == nlohmann::json({"(5,5)", "(6,4)"}));
  CHECK(columns["object_1"]["index"] == nlohmann::json({0, 1}));
  CHECK(columns["object_2"]["same"] == "(10,10)");
  CHECK(columns["energy_mJ_per_m2"]["numbers"] == nlohmann::json({-180.123, 0}));
  CHECK_FALSE(columns.contains("stiffness_eV_per_nm3"));
}

TEST_CASE("what a user wrote cannot leave its place in a page", "[report]") {
  Report report = small_report();
  report.title = "</script><b>\xff\" & {{data}}";
  const std::string json = report_json(report);
  CHECK(json.find('<') == std::string::npos);
  CHECK(nlohmann::json::parse(json)["title"].get<std::string>().starts_with("</script><b>"));
  const PageParts parts{
      "<title>{{title}}</title><style>{{styles}}</style>{{licences}}"
      "<i>{{data}}</i>{{scripts}}",
      {"p{}"},
      {"a = '</SCRIPT>'; //# sourceMappingURL=a.map\nb()"},
      "of <them>"};
  CHECK(report_page(parts, report.title, "{}") ==
        "<title>&lt;/script&gt;&lt;b&gt;\xff\" &amp; {{data}}</title><style>p{}\n</style>of "
        "&lt;them&gt;<i>{}</i><script>\na = '<\\/SCRIPT>'; //\nb()\n</script>\n");
  CHECK_THROWS_AS(report_page({"<p>", {}, {}, {}}, "", ""), std::invalid_argument);
}
