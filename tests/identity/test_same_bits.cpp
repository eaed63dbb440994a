// Bits that depend on nothing but the row: not on threads, memory, order or neighbours.
#include <gapwright/join/coaxial.hpp>
#include <gapwright/lattice/candidates.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/pair/binder.hpp>
#include <gapwright/response/flat_response.hpp>
#include <gapwright/response/shell_response.hpp>

#include <algorithm>
#include <random>
#include <string>
#include <thread>
#include <vector>

#include <catch2/catch.hpp>

using namespace gapwright;

namespace {

Placement labelled(const std::string& label) {
  Placement placement;
  placement.first = parse_label(label).object;
  return placement;
}

/// Double walls around inner tubes of 0.62 to 0.70 nm, gaps of 0.30 to 0.40 nm; three walls; narrow
/// and wide gaps around tubes that others use.
std::vector<Placement> assorted_rows() {
  std::vector<Placement> rows;
  TubeFilter filter;
  filter.diameter_nm = Interval{0.62, 0.70};
  const std::vector<Tube> inner = candidate_tubes(filter);
  filter.diameter_nm = Interval{1.22, 1.50};
  for (const Tube& around : candidate_tubes(filter))
    for (const Tube& inside : inner) {
      const double gap = around.radius_nm - inside.radius_nm;
      if (gap >= 0.30 && gap <= 0.40)
        rows.push_back({Arrangement::coaxial, TubeObject{{inside, around}}});
    }
  for (const char* label : {"5,5@10,10@15,15", "8,1@10,10@15,15", "5,5@16,4", "5,5@8,8"})
    rows.push_back(labelled(label));
  return rows;
}

/// The first field that differs in any bit, or nothing.
std::string first_difference(const Binding& a, const Binding& b) {
  for (const BindingField& field : binding_fields())
    if (field.get(a) != field.get(b)) return std::string(field.name);
  if (a.interfaces.size() != b.interfaces.size()) return "interfaces";
  for (std::size_t k = 0; k < a.interfaces.size(); ++k)
    if (a.interfaces[k].cut_energy_eV_per_nm != b.interfaces[k].cut_energy_eV_per_nm)
      return "interfaces";
  return {};
}

bool same_bits(const ShellResponse& a, const ShellResponse& b) {
  for (int j = 0; j < a.window().q.count; ++j)
    for (int m = 0; m < a.window().orders[std::size_t(j)]; ++m) {
      const auto x = a.cell(j, m), y = b.cell(j, m);
      if (!std::equal(x.begin(), x.end(), y.begin(), y.end())) return false;
    }
  return true;
}

}  // namespace

TEST_CASE("responses are the same bits for any number of threads") {
  const HoppingSet& hopping = Catalogs::built_in().hopping();
  for (const double tolerance : {1e-4, 1e-6}) {
    const Nodes nodes = make_nodes(tolerance);
    for (const Chirality chirality : {Chirality{6, 5}, {10, 10}, {9, 0}}) {
      const Tube tube = make_tube(chirality);
      const Window window = coaxial_window(tube.radius_nm, tube.radius_nm + 0.34, nodes);
      set_inner_threads(1);
      const ShellResponse one = tube_response(tube, hopping, {}, nodes, window);
      for (const int threads : {2, 3}) {
        set_inner_threads(threads);
        CHECK(same_bits(tube_response(tube, hopping, {}, nodes, window), one));
      }
    }
  }
  const Nodes nodes = make_nodes(1e-4);
  const IndexRange xi = contact_frequencies(nodes);
  std::vector<double> one(std::size_t(xi.count)), two(std::size_t(xi.count));
  set_inner_threads(1);
  const FlatResponse flat_one(hopping, {}, nodes, xi, 0.1, 5.0);
  set_inner_threads(2);
  const FlatResponse flat_two(hopping, {}, nodes, xi, 0.1, 5.0);
  set_inner_threads(0);
  for (const double wave : {0.11, 0.5, 0.9, 3.0, 4.9}) {
    flat_one.strength_nm(wave, one);
    flat_two.strength_nm(wave, two);
    CHECK(one == two);
  }
}

TEST_CASE("a row's bits do not depend on what a Binder did before or beside it") {
  static const std::vector<Placement> rows = assorted_rows();
  REQUIRE(rows.size() > 60);
  static const std::vector<Binding> in_order = [] {
    const Binder binder(Catalogs::built_in(), {});
    std::vector<Binding> all;
    for (const Placement& row : rows) all.push_back(binder.bind(row));
    return all;
  }();

  SECTION("fresh Binders") {
    for (const std::size_t k : {std::size_t(0), rows.size() / 2, rows.size() - 3}) {
      const Binder fresh(Catalogs::built_in(), {});
      CHECK(first_difference(fresh.bind(rows[k]), in_order[k]).empty());
    }
  }
  SECTION("another order, twice") {
    const Binder other(Catalogs::built_in(), {});
    std::vector<std::size_t> order(rows.size());
    for (std::size_t k = 0; k < order.size(); ++k) order[k] = order.size() - 1 - k;
    std::mt19937 random(5);
    for (int round = 0; round < 2; ++round) {
      for (const std::size_t k : order) {
        INFO(in_order[k].object_1 << "@" << in_order[k].object_2);
        CHECK(first_difference(other.bind(rows[k]), in_order[k]).empty());
      }
      std::shuffle(order.begin(), order.end(), random);
    }
  }
  SECTION("announced and warmed") {
    const Binder warmed(Catalogs::built_in(), {});
    warmed.announce(rows);
    for (const Placement& row : rows)
      for (const Tube& tube : tubes_of(row.first).walls) warmed.warm(tube);
    for (std::size_t k = 0; k < rows.size(); ++k) {
      INFO(in_order[k].object_1 << "@" << in_order[k].object_2);
      CHECK(first_difference(warmed.bind(rows[k]), in_order[k]).empty());
    }
  }
  SECTION("two threads at once") {
    const Binder shared(Catalogs::built_in(), {});
    std::vector<Binding> forwards(rows.size()), backwards(rows.size());
    std::thread beside([&] {
      const SerialRegion serial;
      for (std::size_t k = rows.size(); k-- > 0;) backwards[k] = shared.bind(rows[k]);
    });
    const SerialRegion serial;
    for (std::size_t k = 0; k < rows.size(); ++k) forwards[k] = shared.bind(rows[k]);
    beside.join();
    for (std::size_t k = 0; k < rows.size(); ++k) {
      INFO(in_order[k].object_1 << "@" << in_order[k].object_2);
      CHECK(first_difference(forwards[k], in_order[k]).empty());
      CHECK(first_difference(backwards[k], in_order[k]).empty());
    }
  }
}
