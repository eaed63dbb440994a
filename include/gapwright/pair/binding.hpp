// What is reported for a pair (METHODS §7).
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace gapwright {

enum class Status { ok, no_minimum, not_converged, outside_range };
std::string_view status_word(Status status);

/// Energies of one interface of a multi-wall tube.
struct Interface {
  std::string inside;   ///< label of the walls inside the cut
  std::string outside;  ///< label of the walls outside
  double gap_nm = 0.0;
  double cut_energy_eV_per_nm = 0.0;
  double pull_out_force_nN = 0.0;
};

/// One row; an empty field has no meaning for this row. Names, order and units of the fields are
/// those of `binding_fields()`; at T > 0 energies are free energies.
struct Binding {
  std::string object_1, object_2;
  std::string kind_1, kind_2;
  std::optional<double> diameter_1_nm, diameter_2_nm;
  std::optional<double> chiral_angle_1_deg, chiral_angle_2_deg;
  std::optional<double> band_gap_1_eV, band_gap_2_eV;
  std::string arrangement;
  std::optional<double> gap_nm, axis_distance_nm, offset_nm, angle_deg;
  double temperature_K = 0.0;
  double chemical_potential_eV = 0.0;
  std::string medium = "vacuum";
  std::string contact_target;
  std::optional<double> dispersion_eV_per_nm, contact_eV_per_nm, energy_eV_per_nm;
  std::optional<double> dispersion_eV, contact_eV, energy_eV;  ///< of one crossing
  std::optional<double> energy_mJ_per_m2, energy_meV_per_atom;
  std::optional<double> pressure_dispersion_GPa, pressure_GPa;
  std::optional<double> electronic_share_eV_per_nm, electronic_share_eV, thermal_share;
  std::optional<double> retardation_factor;  ///< dispersion over the non-retarded one
  std::optional<double> pull_out_force_nN, cut_energy_eV_per_nm;
  std::optional<double> pair_potential_eV_per_nm, pair_potential_eV;
  std::optional<double> equilibrium_gap_nm, well_depth_eV_per_nm, well_depth_eV;
  std::optional<double> stiffness_eV_per_nm3, stiffness_eV_per_nm2;
  std::optional<double> exponent;  ///< -d ln|dispersion|/d ln(axis distance)
  std::optional<double> first_round_trip_eV_per_nm, first_round_trip_eV;
  // Errors of energies are per length where the energies are.
  std::optional<double> relative_error, energy_error, pressure_error, electronic_share_error;
  std::optional<double> equilibrium_gap_error, well_depth_error;
  Status status = Status::ok;
  std::string message;                ///< why the status is not ok
  std::vector<Interface> interfaces;  ///< more than two walls
  std::vector<std::string> notes;     ///< what limits the model here
};

/// A field of a row by name: how exports, stores and sorting reach it.
using FieldValue = std::variant<std::monostate, double, std::string>;
struct BindingField {
  std::string_view name;
  bool is_text;
  FieldValue (*get)(const Binding&);
  void (*set)(Binding&, const FieldValue&);
};

/// All fields in the order of CSV, JSON and store columns.
const std::vector<BindingField>& binding_fields();
/// The field, or InputError with the nearest name.
const BindingField& binding_field(std::string_view name);

}  // namespace gapwright
