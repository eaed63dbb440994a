// Plans, rows, the store and the ranking of a sweep.

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/sweep/ranking.hpp>
#include <gapwright/sweep/runner.hpp>

#include <bit>
#include <cmath>
#include <filesystem>
#include <limits>
#include <set>

#include <catch2/catch.hpp>
#include <unistd.h>

using namespace gapwright;

namespace {

struct TemporaryFolder {
  TemporaryFolder() {
    std::string name = (std::filesystem::temp_directory_path() / "gapwright-XXXXXX").string();
    path = ::mkdtemp(name.data());
  }
  ~TemporaryFolder() { std::filesystem::remove_all(path); }
  std::filesystem::path path;
};

Plan small_plan() {
  Plan plan;
  plan.inner_diameter_nm = Interval{0.65, 0.75};
  plan.gap_nm = Interval{0.335, 0.345};
  return plan;
}

bool same_bits(const Binding& a, const Binding& b) {
  for (const BindingField& field : binding_fields()) {
    const FieldValue x = field.get(a), y = field.get(b);
    const double *u = std::get_if<double>(&x), *v = std::get_if<double>(&y);
    if (u && v ? std::bit_cast<std::uint64_t>(*u) != std::bit_cast<std::uint64_t>(*v) : x != y)
      return false;
  }
  return true;
}

}  // namespace

TEST_CASE("fields of a row are set and read by name") {
  std::set<std::string_view> names;
  Binding row;
  for (const BindingField& field : binding_fields()) {
    CHECK(names.insert(field.name).second);
    if (field.name == "status")
      field.set(row, FieldValue(std::string("not_converged")));
    else
      field.set(row, field.is_text ? FieldValue(std::string(field.name)) : FieldValue(0.25));
  }
  CHECK(row.object_2 == "object_2");
  CHECK(row.energy_meV_per_atom == 0.25);
  CHECK(row.status == Status::not_converged);
  binding_field("thermal_share").set(row, FieldValue());
  CHECK_FALSE(row.thermal_share.has_value());
  CHECK_THROWS_AS(binding_field("temperature_K").set(row, FieldValue()), std::invalid_argument);
  CHECK_THROWS_AS(binding_field("status").set(row, FieldValue(std::string("fine"))),
                  std::invalid_argument);
  try {
    binding_field("energy_eV_pernm");
    FAIL("no field has this name");
  } catch (const InputError& error) {
    CHECK(error.parts().nearest == "energy_eV_per_nm");
  }
}

TEST_CASE("rows of a plan are all pairs within its bounds, in order, once") {
  const Plan plan = small_plan();
  const PlanRows rows(plan);
  TubeFilter filter;
  filter.diameter_nm = Interval{0.3, 2.0};
  const std::vector<Tube> all = candidate_tubes(filter);
  std::set<std::string> wanted;
  for (const Tube& inner : all)
    for (const Tube& outer : all)
      if (plan.inner_diameter_nm->contains(inner.diameter_nm()) &&
          plan.gap_nm->contains(outer.radius_nm - inner.radius_nm))
        wanted.insert(inner.label() + "@" + outer.label());
  std::set<std::string> found;
  for (std::size_t k = 0; k < rows.size(); ++k) {
    CHECK(found.insert(label_of(rows[k].first)).second);
    if (k > 0) CHECK(rows.outer(k - 1).radius_nm <= rows.outer(k).radius_nm);
  }
  CHECK(found == wanted);
}

TEST_CASE("rows side by side are all unordered pairs, like ones too, the thinner tube first") {
  Plan plan;
  plan.arrangement = Arrangement::parallel;
  plan.tubes.diameter_nm = Interval{0.6, 1.3};  // more than one tile of tubes
  const std::vector<Tube> tubes = candidate_tubes(plan.tubes);
  REQUIRE(tubes.size() > 64);
  const PlanRows rows(plan);
  std::set<std::string> found;
  for (std::size_t k = 0; k < rows.size(); ++k) {
    const Placement row = rows[k];
    CHECK(row.arrangement == Arrangement::parallel);
    CHECK_FALSE(row.gap_nm);
    CHECK(rows.inner(k).radius_nm <= rows.outer(k).radius_nm);
    const std::string first = label_of(row.first), second = label_of(*row.second);
    CHECK(found.insert(first + " " + second).second);
    CHECK((first == second || !found.contains(second + " " + first)));
  }
  CHECK(found.size() == tubes.size() * (tubes.size() + 1) / 2);

  plan.with = make_tube({8, 8});
  plan.fixed_gap_nm = 0.5;
  const PlanRows held(plan);
  CHECK(held.size() == tubes.size());
  for (std::size_t k = 0; k < held.size(); ++k) {
    const Placement row = held[k];
    CHECK(row.gap_nm == 0.5);
    // The same row as among all pairs, whichever side the tube is on.
    CHECK(found.contains(label_of(row.first) + " " + label_of(*row.second)));
    CHECK((label_of(row.first) == "(8,8)" || label_of(*row.second) == "(8,8)"));
  }
  plan.inner = make_tube({5, 5});
  CHECK_THROWS_AS(PlanRows(plan), InputError);
}

TEST_CASE("keys differ by walls and by settings") {
  const Placement a{Arrangement::coaxial, TubeObject{{make_tube({5, 5}), make_tube({10, 10})}}};
  const Placement b{Arrangement::coaxial, TubeObject{{make_tube({5, 5}), make_tube({11, 9})}}};
  CHECK(row_key(a, "x") == row_key(a, "x"));
  CHECK(row_key(a, "x") != row_key(b, "x"));
  CHECK(row_key(a, "x") != row_key(a, "y"));
}

TEST_CASE("a store gives every number back bit for bit") {
  const TemporaryFolder folder;
  const Binder binder(Catalogs::built_in(), {});
  const auto file = folder.path / "rows.db";
  Binding row =
      binder.bind({Arrangement::coaxial, TubeObject{{make_tube({5, 5}), make_tube({10, 10})}}});
  row.band_gap_1_eV = std::numeric_limits<double>::denorm_min();
  row.band_gap_2_eV = 0.1 + 0.2;
  row.gap_nm = std::numeric_limits<double>::max();
  row.contact_eV_per_nm = 3.0;  // SQLite packs whole numbers
  row.thermal_share.reset();
  row.status = Status::not_converged;
  row.message = "for want of \"digits\"";
  {
    Store store = Store::open(file, binder);
    store.write({{"first", row}});
    CHECK(store.keys() == std::unordered_set<std::string>{"first"});
    Binding bad = row;
    bad.gap_nm = std::nan("");
    CHECK_THROWS_AS(store.write({{"second", row}, {"third", bad}}), std::invalid_argument);
    CHECK(store.keys().size() == 1);  // nothing of a refused batch is kept
  }
  const Store store = Store::open_read_only(file);
  const auto rows = store.read({"missing", "first"});
  REQUIRE(rows.size() == 1);
  CHECK(same_bits(rows.front(), row));
  CHECK(rows.front().message == row.message);
  CHECK(store.origin().settings.contact_target == binder.settings().contact_target);
  CHECK_NOTHROW(store.require_same_origin(binder));
  Settings coarse;
  coarse.tolerance = 1e-3;
  const Binder other(Catalogs::built_in(), coarse);
  CHECK_THROWS_AS(store.require_same_origin(other), InputError);
}

TEST_CASE("a run is the same on any number of threads, in parts and from a store") {
  const TemporaryFolder folder;
  const Plan plan = small_plan();
  const PlanRows rows(plan);
  const Binder binder(Catalogs::built_in(), plan.settings);
  const SweepResult one = run_plan(rows, "", binder, {.threads = 1});
  const SweepResult three = run_plan(rows, "", binder, {.threads = 3});
  REQUIRE(one.rows.size() == rows.size());
  REQUIRE(three.rows.size() == rows.size());
  Store store = Store::open(folder.path / "rows.db", binder);
  for (const int part : {2, 1})
    run_plan(rows, "", binder, {.store = &store, .part = part, .parts = 2});
  const SweepResult stored = run_plan(rows, "", binder, {.store = &store});
  CHECK(stored.computed == 0);
  CHECK(stored.from_store == rows.size());
  for (std::size_t k = 0; k < rows.size(); ++k) {
    CHECK(same_bits(one.rows[k], three.rows[k]));
    CHECK(same_bits(one.rows[k], stored.rows[k]));
    CHECK(one.rows[k].object_2 == rows.outer(k).label());
  }
  CHECK_THROWS_AS(run_plan(rows, "", binder, {.part = 3, .parts = 2}), std::invalid_argument);
}

TEST_CASE("a stopped run keeps what it finished") {
  struct StopAfterThree : SweepObserver {
    std::atomic<bool> stop{false};
    void progressed(std::size_t done, std::size_t) override { stop = done >= 3; }
  } observer;
  const PlanRows rows(small_plan());
  const Binder binder(Catalogs::built_in(), {});
  const SweepResult result =
      run_plan(rows, "", binder, {.threads = 1, .stop = &observer.stop, .observer = &observer});
  CHECK(result.end == RunEnd::stopped);
  CHECK(result.rows.size() >= 3);
  CHECK(result.rows.size() < rows.size());
}

TEST_CASE("a row under another contact target is that of a binder of this target") {
  const Binder binder(Catalogs::built_in(), {});
  const Placement pair{Arrangement::coaxial, TubeObject{{make_tube({7, 5}), make_tube({15, 5})}}};
  const Binding row = binder.bind(pair);
  for (const ContactTarget& target : Catalogs::built_in().contact_targets()) {
    Settings settings;
    settings.contact_target = target.name;
    const Binder other(Catalogs::built_in(), settings);
    const Binding wanted = other.bind(pair), found = under_target(row, binder, target.name);
    for (const BindingField& field : binding_fields()) {
      const FieldValue x = field.get(wanted), y = field.get(found);
      const double *u = std::get_if<double>(&x), *v = std::get_if<double>(&y);
      INFO(target.name << " " << field.name);
      if (field.name == "energy_error" || field.name == "pressure_error") continue;
      if (u && v)
        CHECK(*v == Approx(*u).epsilon(1e-12));
      else
        CHECK(x == y);
    }
  }
}

TEST_CASE("a well under another contact target is that of a binder of this target") {
  const Binder binder(Catalogs::built_in(), {});
  for (const auto& [a, b] : {std::pair{Chirality{5, 5}, Chirality{5, 5}}, {{8, 3}, {10, 10}}})
    for (const std::optional<double> gap : {std::optional<double>(), std::optional(0.4)}) {
      const Placement pair = side_by_side(make_tube(a), make_tube(b), gap);
      const Binding row = binder.bind(pair);
      for (const ContactTarget& target : Catalogs::built_in().contact_targets()) {
        Settings settings;
        settings.contact_target = target.name;
        const Binding wanted = Binder(Catalogs::built_in(), settings).bind(pair);
        const Binding found = under_target(row, binder, target.name);
        INFO(row.object_2 << " " << target.name);
        CHECK(*found.gap_nm == Approx(*wanted.gap_nm).margin(2e-6));
        CHECK(*found.energy_eV_per_nm == Approx(*wanted.energy_eV_per_nm).epsilon(1e-5));
        CHECK(*found.dispersion_eV_per_nm == Approx(*wanted.dispersion_eV_per_nm).epsilon(1e-4));
        CHECK_FALSE(found.energy_mJ_per_m2);
        if (gap) continue;
        CHECK(*found.well_depth_eV_per_nm == Approx(*wanted.well_depth_eV_per_nm).epsilon(1e-5));
        CHECK(*found.stiffness_eV_per_nm3 == Approx(*wanted.stiffness_eV_per_nm3).epsilon(1e-3));
      }
    }
}

TEST_CASE("places: ties by label, empty fields last, spread between targets") {
  const Binder binder(Catalogs::built_in(), {});
  const PlanRows plan(small_plan());
  std::vector<Binding> rows = run_plan(plan, "", binder, {}).rows;
  const auto by_outer = ranked(rows, binder, order_of("kind_2"));
  for (std::size_t k = 1; k < by_outer.size(); ++k) {
    const Binding &a = by_outer[k - 1].binding, &b = by_outer[k].binding;
    CHECK(std::tie(a.kind_2, a.object_1, a.object_2) < std::tie(b.kind_2, b.object_1, b.object_2));
    CHECK(by_outer[k].rank == int(k) + 1);
    CHECK(by_outer[k].rank_spread == 0);
  }
  rows.front().energy_mJ_per_m2.reset();
  rows.front().energy_eV_per_nm.reset();
  const auto by_energy = ranked(rows, binder, order_of(Plan{}));
  CHECK(by_energy.back().binding.object_1 == rows.front().object_1);
  CHECK(order_of("pull_out_force_nN").descending);
  CHECK_THROWS_AS(order_of("energy"), InputError);
}
