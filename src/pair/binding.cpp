#include <gapwright/catalog/input_error.hpp>
#include <gapwright/pair/binding.hpp>

#include <array>
#include <stdexcept>
#include <type_traits>

namespace gapwright {
namespace {

constexpr std::array all_statuses = {Status::ok, Status::no_minimum, Status::not_converged,
                                     Status::outside_range};

Status parse_status(const std::string& word) {
  for (const Status status : all_statuses)
    if (status_word(status) == word) return status;
  throw std::invalid_argument("Binding: status = '" + word + "', required a status word");
}

double number_in(const FieldValue& value) {
  if (const double* number = std::get_if<double>(&value)) return *number;
  throw std::invalid_argument("Binding: a field without a number, required a number");
}

const std::string& text_in(const FieldValue& value) {
  if (const std::string* text = std::get_if<std::string>(&value)) return *text;
  throw std::invalid_argument("Binding: a field without text, required text");
}

FieldValue value_of(double member) {
  return member;
}
FieldValue value_of(const std::string& member) {
  return member.empty() ? FieldValue() : FieldValue(member);
}
FieldValue value_of(Status member) {
  return std::string(status_word(member));
}
FieldValue value_of(const std::optional<double>& member) {
  return member ? FieldValue(*member) : FieldValue();
}

void assign(double& member, const FieldValue& value) {
  member = number_in(value);
}
void assign(std::string& member, const FieldValue& value) {
  if (std::holds_alternative<std::monostate>(value))
    member.clear();
  else
    member = text_in(value);
}
void assign(Status& member, const FieldValue& value) {
  member = parse_status(text_in(value));
}
void assign(std::optional<double>& member, const FieldValue& value) {
  if (std::holds_alternative<std::monostate>(value))
    member.reset();
  else
    member = number_in(value);
}

template <auto member>
constexpr BindingField field(std::string_view name) {
  using Member = std::remove_reference_t<decltype(std::declval<Binding&>().*member)>;
  return {name, std::is_same_v<Member, std::string> || std::is_same_v<Member, Status>,
          [](const Binding& row) { return value_of(row.*member); },
          [](Binding& row, const FieldValue& value) { assign(row.*member, value); }};
}

std::vector<std::string> field_names() {
  std::vector<std::string> names;
  for (const BindingField& entry : binding_fields()) names.emplace_back(entry.name);
  return names;
}

}  // namespace

std::string_view status_word(Status status) {
  switch (status) {
    case Status::ok:
      return "ok";
    case Status::no_minimum:
      return "no_minimum";
    case Status::not_converged:
      return "not_converged";
    case Status::outside_range:
      return "outside_range";
  }
  throw std::invalid_argument("status_word: status outside the enumeration");
}

const std::vector<BindingField>& binding_fields() {
  static const std::vector<BindingField> fields = {
      field<&Binding::object_1>("object_1"),
      field<&Binding::object_2>("object_2"),
      field<&Binding::kind_1>("kind_1"),
      field<&Binding::kind_2>("kind_2"),
      field<&Binding::diameter_1_nm>("diameter_1_nm"),
      field<&Binding::diameter_2_nm>("diameter_2_nm"),
      field<&Binding::chiral_angle_1_deg>("chiral_angle_1_deg"),
      field<&Binding::chiral_angle_2_deg>("chiral_angle_2_deg"),
      field<&Binding::band_gap_1_eV>("band_gap_1_eV"),
      field<&Binding::band_gap_2_eV>("band_gap_2_eV"),
      field<&Binding::arrangement>("arrangement"),
      field<&Binding::gap_nm>("gap_nm"),
      field<&Binding::axis_distance_nm>("axis_distance_nm"),
      field<&Binding::offset_nm>("offset_nm"),
      field<&Binding::angle_deg>("angle_deg"),
      field<&Binding::temperature_K>("temperature_K"),
      field<&Binding::chemical_potential_eV>("chemical_potential_eV"),
      field<&Binding::medium>("medium"),
      field<&Binding::contact_target>("contact_target"),
      field<&Binding::dispersion_eV_per_nm>("dispersion_eV_per_nm"),
      field<&Binding::contact_eV_per_nm>("contact_eV_per_nm"),
      field<&Binding::energy_eV_per_nm>("energy_eV_per_nm"),
      field<&Binding::dispersion_eV>("dispersion_eV"),
      field<&Binding::contact_eV>("contact_eV"),
      field<&Binding::energy_eV>("energy_eV"),
      field<&Binding::energy_mJ_per_m2>("energy_mJ_per_m2"),
      field<&Binding::energy_meV_per_atom>("energy_meV_per_atom"),
      field<&Binding::pressure_dispersion_GPa>("pressure_dispersion_GPa"),
      field<&Binding::pressure_GPa>("pressure_GPa"),
      field<&Binding::electronic_share_eV_per_nm>("electronic_share_eV_per_nm"),
      field<&Binding::electronic_share_eV>("electronic_share_eV"),
      field<&Binding::thermal_share>("thermal_share"),
      field<&Binding::retardation_factor>("retardation_factor"),
      field<&Binding::pull_out_force_nN>("pull_out_force_nN"),
      field<&Binding::cut_energy_eV_per_nm>("cut_energy_eV_per_nm"),
      field<&Binding::pair_potential_eV_per_nm>("pair_potential_eV_per_nm"),
      field<&Binding::pair_potential_eV>("pair_potential_eV"),
      field<&Binding::equilibrium_gap_nm>("equilibrium_gap_nm"),
      field<&Binding::well_depth_eV_per_nm>("well_depth_eV_per_nm"),
      field<&Binding::well_depth_eV>("well_depth_eV"),
      field<&Binding::stiffness_eV_per_nm3>("stiffness_eV_per_nm3"),
      field<&Binding::stiffness_eV_per_nm2>("stiffness_eV_per_nm2"),
      field<&Binding::exponent>("exponent"),
      field<&Binding::first_round_trip_eV_per_nm>("first_round_trip_eV_per_nm"),
      field<&Binding::first_round_trip_eV>("first_round_trip_eV"),
      field<&Binding::relative_error>("relative_error"),
      field<&Binding::energy_error>("energy_error"),
      field<&Binding::pressure_error>("pressure_error"),
      field<&Binding::electronic_share_error>("electronic_share_error"),
      field<&Binding::equilibrium_gap_error>("equilibrium_gap_error"),
      field<&Binding::well_depth_error>("well_depth_error"),
      field<&Binding::status>("status"),
  };
  return fields;
}

const BindingField& binding_field(std::string_view name) {
  for (const BindingField& entry : binding_fields())
    if (entry.name == name) return entry;
  const std::vector<std::string> names = field_names();
  throw InputError({.what = "no field is named '" + std::string(name) + "'",
                    .where = {},
                    .excerpt = {},
                    .expected = "one of " + joined(names),
                    .nearest = nearest_word(name, names)});
}

}  // namespace gapwright
