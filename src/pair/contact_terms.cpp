#include "contact_terms.hpp"

#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

constexpr double closest_nm = 0.2;
constexpr double near_limit_nm = 2.0;
constexpr double farthest_nm = 1.0e4;

}  // namespace

const SheetScatterer& ContactTerms::sheet_for(double spacing_nm) {
  const std::lock_guard lock(sheets_mutex_);
  // Wave numbers at half the usual step: the table serves any, and a sheet costs next to nothing.
  Nodes nodes = carbon_.nodes;
  nodes.q.step *= 0.5;
  if (spacing_nm <= near_limit_nm) {
    if (!near_) {
      const FlatResponse& flat = cache_.flat(contact_frequencies(carbon_.nodes));
      near_ = std::make_unique<SheetScatterer>(carbon_sheet(
          flat, carbon_.background, nodes, planar_waves(closest_nm, near_limit_nm, nodes)));
    }
    return *near_;
  }
  if (!far_) {
    const IndexRange xi = frequencies_at(farthest_nm, carbon_.nodes);
    const IndexRange waves = planar_waves(near_limit_nm, farthest_nm, nodes);
    const FlatResponse flat(carbon_.hopping, carbon_.conditions, carbon_.nodes, xi,
                            nodes.q.node(waves.first), nodes.q.node(waves.end() - 1));
    far_ = std::make_unique<SheetScatterer>(carbon_sheet(flat, carbon_.background, nodes, waves));
  }
  return *far_;
}

PlanarEnergy ContactTerms::sheets(double spacing_nm) {
  if (!(spacing_nm >= closest_nm) || !(spacing_nm <= farthest_nm))
    throw std::domain_error("ContactTerms::sheets: spacing must be 0.2 nm to 10 µm");
  const SheetScatterer& sheet = sheet_for(spacing_nm);
  return planar_energy(sheet, sheet, spacing_nm, carbon_.conditions);
}

const ContactTerm& ContactTerms::term(const std::string& target) {
  const ContactTarget& wanted = catalogs_.contact_target(target);
  const std::lock_guard lock(terms_mutex_);
  if (const auto found = terms_.find(wanted.name); found != terms_.end()) return found->second;
  // off_energy, off_slope: relative shifts of the sheets' energy and slope.
  const auto solved = [&](bool off_energy, bool off_slope) {
    return calibrate(wanted, [&](double d) {
      const PlanarEnergy e = sheets(d);
      return SmoothEnergy{
          e.energy_eV_per_nm2.value + (off_energy ? e.energy_eV_per_nm2.error : 0.0),
          e.slope_eV_per_nm3.value + (off_slope ? e.slope_eV_per_nm3.error : 0.0)};
    });
  };
  return terms_
      .emplace(wanted.name,
               ContactTerm{solved(false, false), solved(true, false), solved(false, true)})
      .first->second;
}

}  // namespace gapwright
