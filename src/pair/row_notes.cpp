#include "row_notes.hpp"

#include <gapwright/catalog/media.hpp>

#include <fmt/format.h>

namespace gapwright {
namespace {

/// Liquids are layered below a few molecules.
constexpr double continuum_nm = 0.6;
/// Light takes as long as charges of these bodies need to follow.
constexpr double retarded_nm = 10.0;

}  // namespace

std::vector<std::string> notes_of(const Binding& row) {
  std::vector<std::string> notes;
  if (row.medium != Medium{}.name) {
    if (row.gap_nm < continuum_nm) notes.push_back("the liquid is taken as a continuum");
    if (row.temperature_K > 0) notes.push_back("salt is not included in the static term");
  }
  if (row.gap_nm > retarded_nm)
    notes.push_back(
        "non-retarded: beyond 10 nm retardation weakens the energy, all but its static (n = 0) "
        "term");
  if (row.dispersion_eV && row.first_round_trip_eV &&
      *row.dispersion_eV != *row.first_round_trip_eV)
    notes.push_back(fmt::format(
        "crossed: the dispersion is the full form, {:.2f} % beyond its first round trip",
        100 * (*row.dispersion_eV / *row.first_round_trip_eV - 1)));
  return notes;
}

}  // namespace gapwright
