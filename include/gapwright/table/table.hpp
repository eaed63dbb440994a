// Energy and force tables of two tubes for simulations (METHODS §10).
#pragma once

#include <gapwright/pair/binder.hpp>
#include <gapwright/table/placing.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace gapwright {

enum class TableKind {
  parallel,  ///< per length: eV/nm, eV/nm²
  crossed,   ///< of one crossing: eV, eV/nm
  beads,     ///< of two beads: eV, eV/nm
};
std::string_view table_kind_word(TableKind kind);

/// What a table shall hold. Distances are those of the axes.
struct TableRequest {
  TableKind kind = TableKind::parallel;
  Object first{}, second{};
  std::vector<double> angles_deg{};      ///< crossed: 1° … 90°
  std::optional<double> inner_cut_nm{};  ///< default: the gap 0.2 nm
  std::optional<double> outer_cut_nm{};  ///< default: none, and the table ends at the gap 10 nm;
                                         ///< beads: that distance
  std::optional<double> spacing_nm{};  ///< beads: of both chains; default 0.25 √(D/nm) at the well
};

/// A line of a table; energies and forces in the units of its kind.
struct TableRow {
  double distance_nm = 0.0;
  std::optional<double> angle_deg{};                  ///< crossed; 0: the limit γ → 0
  std::optional<double> energy{}, force{};            ///< none in the limit, where they diverge
  std::optional<double> energy_sine{}, force_sine{};  ///< crossed: times sin γ
  std::optional<double>
      pair_potential{};  ///< chirality-blind energy beside it, uncut; not of beads
};

/// How two chains of beads slide along each other at the well.
struct SlidingRow {
  double spacing_nm = 0.0;
  double corrugation = 0.0;  ///< peak to peak over mean
};

/// Dispersion of two tubes across each other at 90° and what their beads make of it.
struct CrossingRow {
  double gap_nm = 0.0;
  double beads_eV = 0.0;
  double direct_eV = 0.0;
  double direct_error_eV = 0.0;
};

/// One angle of a crossed table; 0: the limit γ → 0.
struct AngleSummary {
  double angle_deg = 0.0;
  std::optional<double> well_distance_nm{}, well_energy_sine_eV{};
  std::optional<double> sine_shift_eV{};  ///< what the outer cut adds to E·sin γ below its switch
};

struct Table {
  TableKind kind = TableKind::parallel;
  std::string object_1, object_2;
  double diameter_1_nm = 0.0, diameter_2_nm = 0.0;
  double touching_nm = 0.0;  ///< distance of the axes at no gap
  Settings settings;
  double first_nm = 0.0, last_nm = 0.0;
  std::optional<double> outer_cut_nm;
  std::optional<double> shift;  ///< what the cut adds to U below its switch; parallel and beads
  std::optional<double> well_distance_nm, well_energy;  ///< of two parallel tubes; not crossed
  double tolerance = 0.0;
  ReadingError reading_error;     ///< largest of all functions of distance in the table
  double dispersion_error = 0.0;  ///< largest relative error of the dispersion energy …
  double slope_error = 0.0;       ///< … and of its force
  std::vector<AngleSummary> angles;
  std::optional<double> spacing_nm;
  std::optional<double> closest_energy, closest_force;  ///< beads: the straight line below
  std::optional<double>
      bead_sum_error;  ///< of the beads summed back, over max(|U|, 1e-3 of its well)
  std::vector<SlidingRow> sliding;
  std::vector<CrossingRow> crossing;
  std::vector<TableRow> rows;
  Status status = Status::ok;
  std::string message;
};

/// Throws InputError, naming the member of the request, for tubes that would overlap, cuts out of
/// order, angles outside 1° … 90°, spacings longer than the narrower tube's diameter, objects that
/// are no tubes.
void check_request(const TableRequest& request);

/// Computes a table to the binder's tolerance: cubic readings of it are off by at most that, of
/// max(|E|, 1e-3 of the well). Checks the request first. status not_converged: an error above the
/// tolerance; outside_range: bodies too close for the model.
Table make_table(const Binder& binder, const TableRequest& request);

/// The spacing that beads of two tubes get by default [nm]; 0.25 √D at the well. Throws InputError
/// where the tubes have no well.
double default_spacing_nm(const Binder& binder, const Object& first, const Object& second);

/// Units of a kind's energies and forces.
std::string_view energy_unit(TableKind kind);
std::string_view force_unit(TableKind kind);

}  // namespace gapwright
