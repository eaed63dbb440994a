#include "check_quantities.hpp"

#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/contact/short_range.hpp>
#include <gapwright/join/planar.hpp>
#include <gapwright/pair/equilibrium.hpp>
#include <gapwright/response/flat_response.hpp>
#include <gapwright/sheet/flat_sheet.hpp>

#include <cmath>
#include <functional>
#include <stdexcept>

namespace gapwright::cli {
namespace {

using Quantity = double (*)(const CheckRow&, const Binder&);

InputError unfit(const CheckRow& row, const std::string& expected) {
  return InputError(
      {"object '" + row.object + "' does not fit " + row.quantity, row.name, {}, expected, {}});
}

TubeObject walls(const CheckRow& row, std::size_t count) {
  const ParsedLabel parsed = parse_label(row.object);
  const TubeObject* object = std::get_if<TubeObject>(&parsed.object);
  if (!object || object->walls.size() != count)
    throw unfit(row, count == 1 ? "one tube" : "two walls, inner@outer");
  return *object;
}

Tube tube(const CheckRow& row) {
  return walls(row, 1).walls.front();
}

const HoppingSet& hopping(const Binder& binder) {
  return binder.catalogs().hopping(binder.settings().hopping);
}

TubeGaps gaps(const CheckRow& row, const Binder& binder) {
  return tube_gaps(tube(row), hopping(binder));
}

Binding binding(const CheckRow& row, const Binder& binder) {
  return binder.bind({Arrangement::coaxial, walls(row, 2)});
}

// α_π(iξ)·ξ/(πk_e), one for the universal conductivity e²/4ħ (METHODS §3).
double sheet_conductivity_ratio(const CheckRow&, const Binder& binder) {
  const Nodes nodes = make_nodes(binder.settings().tolerance);
  const IndexRange xi{nodes.xi.index_above(0.02), 1};
  const double wave_per_nm = 1e-4;  // ħvQ far below ξ
  // A limit of T = 0 without doping.
  const FlatResponse flat(hopping(binder), {}, nodes, xi, wave_per_nm, 10 * wave_per_nm);
  std::vector<double> strength_nm(1);
  flat.strength_nm(wave_per_nm, strength_nm);
  return strength_nm[0] * nodes.xi.node(xi.first) / (constants::pi * constants::coulomb_eV_nm);
}

// -E·d³ of two sheets with π electrons alone, far apart, T = 0 (METHODS §5).
double flat_c3(const CheckRow&, const Binder& binder) {
  const double spacing_nm = 500;
  const Nodes nodes = make_nodes(binder.settings().tolerance);
  IndexRange xi = contact_frequencies(nodes);
  const int lowest = nodes.xi.index_below(1e-3 / spacing_nm);
  xi = {lowest, xi.end() - lowest};
  const IndexRange waves = planar_waves(spacing_nm, spacing_nm, nodes);
  const FlatResponse flat(hopping(binder), {}, nodes, xi, nodes.q.node(waves.first),
                          nodes.q.node(waves.end() - 1));
  const SheetScatterer sheet = carbon_sheet(flat, Background{}, nodes, waves);
  const PlanarEnergy energy = planar_energy(sheet, sheet, spacing_nm, {});
  return -energy.energy_eV_per_nm2.value * std::pow(spacing_nm, 3);
}

double pair_slope(const Binder& binder, double spacing_nm) {
  const PairFunction contact = binder.contact_term(binder.settings().contact_target);
  return binder.sheets(spacing_nm).slope_eV_per_nm3.value +
         sheets_energy(contact, spacing_nm).slope;
}

// Σ_n n E₂'(nd); summands fall as n^-3, the tail by Euler and Maclaurin's first two terms.
double stack_slope(const Binder& binder, double spacing_nm) {
  constexpr int layers = 40;
  double sum = 0.0, last = 0.0;
  for (int n = 1; n <= layers; ++n) {
    last = n * pair_slope(binder, n * spacing_nm);
    sum += last;
  }
  return sum + last * (layers / 2.0 - 0.5);
}

// C33 = d·dp/dd at the spacing where the slope vanishes.
double c33_GPa(const std::function<double(double)>& slope) {
  double low = 0.30, high = 0.40;
  if (!(slope(low) < 0) || !(slope(high) > 0))
    throw std::domain_error("c33: required a minimum within 0.30 … 0.40 nm");
  while (high - low > 1e-9) {
    const double middle = 0.5 * (low + high);
    (slope(middle) < 0 ? low : high) = middle;
  }
  const double step = 1e-4;
  const double curvature = (slope(low + step) - slope(low - step)) / (2 * step);
  return low * curvature * constants::GPa_per_eV_per_nm3;
}

double pair_potential_sheet_spacing_nm(const CheckRow&, const Binder&) {
  const PairFunction pair = graphitic_pair_potential();
  double low = 0.30, high = 0.40;
  while (high - low > 1e-9) {
    const double middle = 0.5 * (low + high);
    (sheets_energy(pair, middle).slope < 0 ? low : high) = middle;
  }
  return low;
}

const std::map<std::string, Quantity>& quantities() {
  static const std::map<std::string, Quantity> all = {
      {"diameter_nm", [](const CheckRow& r, const Binder&) { return tube(r).diameter_nm(); }},
      {"chiral_angle_deg",
       [](const CheckRow& r, const Binder&) { return tube(r).chiral_angle_deg(); }},
      {"period_nm", [](const CheckRow& r, const Binder&) { return tube(r).period_nm; }},
      {"atoms_per_cell",
       [](const CheckRow& r, const Binder&) { return double(tube(r).atoms_per_cell()); }},
      {"band_gap_eV", [](const CheckRow& r, const Binder& b) { return gaps(r, b).band_gap_eV; }},
      {"e11_over_hopping",
       [](const CheckRow& r, const Binder& b) {
         return gaps(r, b).e11_eV / std::abs(hopping(b).hopping_eV.front());
       }},
      {"e22_over_hopping",
       [](const CheckRow& r, const Binder& b) {
         return gaps(r, b).e22_eV / std::abs(hopping(b).hopping_eV.front());
       }},
      {"curvature_gap_eV",
       [](const CheckRow& r, const Binder& b) {
         return curvature_gap_eV(tube(r), std::abs(hopping(b).hopping_eV.front()));
       }},
      {"sheet_conductivity_ratio", sheet_conductivity_ratio},
      {"flat_c3_eV_nm", flat_c3},
      {"two_sheet_c33_GPa",
       [](const CheckRow&, const Binder& b) {
         return c33_GPa([&](double d) { return pair_slope(b, d); });
       }},
      {"stack_c33_GPa",
       [](const CheckRow&, const Binder& b) {
         return c33_GPa([&](double d) { return stack_slope(b, d); });
       }},
      {"pull_out_force_nN",
       [](const CheckRow& r, const Binder& b) { return binding(r, b).pull_out_force_nN.value(); }},
      {"energy_mJ_per_m2",
       [](const CheckRow& r, const Binder& b) { return binding(r, b).energy_mJ_per_m2.value(); }},
      {"equilibrium_gap_nm",
       [](const CheckRow& r, const Binder& b) {
         return coaxial_equilibrium_gap_nm(b, {Arrangement::coaxial, walls(r, 2)});
       }},
      {"pair_potential_sheet_spacing_nm", pair_potential_sheet_spacing_nm},
      {"pair_potential_sheet_energy_eV_per_nm2",
       [](const CheckRow& r, const Binder& b) {
         return sheets_energy(graphitic_pair_potential(), pair_potential_sheet_spacing_nm(r, b))
             .energy;
       }},
      {"pair_potential_coaxial_eV_per_nm",
       [](const CheckRow& r, const Binder&) {
         const TubeObject pair = walls(r, 2);
         return coaxial_energy(graphitic_pair_potential(), pair.walls[0].radius_nm,
                               pair.walls[1].radius_nm)
             .energy;
       }},
  };
  return all;
}

}  // namespace

CheckBench::CheckBench(const Catalogs& catalogs, Settings settings)
    : catalogs_(catalogs), settings_(std::move(settings)) {}

const Binder& CheckBench::binder(const std::string& hopping) {
  Settings settings = settings_;
  if (!hopping.empty()) settings.hopping = hopping;
  auto& slot = binders_[settings.hopping];
  if (!slot) slot = std::make_unique<Binder>(catalogs_, settings);
  return *slot;
}

double our_value(const CheckRow& row, CheckBench& bench) {
  const auto found = quantities().find(row.quantity);
  if (found == quantities().end()) {
    std::vector<std::string> names;
    for (const auto& [name, quantity] : quantities()) names.push_back(name);
    throw InputError({"unknown quantity '" + row.quantity + "'",
                      "check " + row.name,
                      {},
                      "one of " + joined(names),
                      nearest_word(row.quantity, names)});
  }
  return found->second(row, bench.binder(row.hopping));
}

}  // namespace gapwright::cli
