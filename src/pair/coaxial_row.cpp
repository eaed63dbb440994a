#include "coaxial_row.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/retarded_coaxial.hpp>
#include <gapwright/lattice/label.hpp>

#include <cmath>

namespace gapwright {
namespace {

/// Precision of responses read from the flat table, relative to the dispersion energy.
constexpr double share_precision = 2e-6;

std::vector<Window> interface_windows(const std::vector<Tube>& walls, const Nodes& nodes) {
  std::vector<Window> windows;
  for (std::size_t k = 1; k < walls.size(); ++k)
    windows.push_back(coaxial_window(walls[k - 1].radius_nm, walls[k].radius_nm, nodes));
  return windows;
}

Window all_windows(const std::vector<Window>& windows) {
  Window all = windows.front();
  for (const Window& window : windows) all = united(all, window);
  return all;
}

/// The chain of interfaces of walls first … last: energies of each, innermost first.
class WallChain {
 public:
  WallChain(const std::vector<Tube>& walls, const Carbon& carbon, TubeCache& cache)
      : walls_(walls),
        carbon_(carbon),
        cache_(cache),
        windows_(interface_windows(walls, carbon.nodes)),
        all_(all_windows(windows_)) {}

  std::vector<Estimate> interfaces(std::size_t first, std::size_t last, Electrons electrons) const {
    std::vector<Estimate> energies;
    for (const FrequencyDensity& density : densities(first, last, electrons))
      energies.push_back(sum(density));
    return energies;
  }

  /// Own electrons less those of flat graphene, summed on the nodes: what the two share cancels in
  /// the error, too.
  Estimate electronic_share(const std::vector<FrequencyDensity>& own,
                            const std::vector<FrequencyDensity>& flat) const {
    FrequencyDensity difference{std::vector<double>(own.front().full.size()),
                                std::vector<double>(own.front().full.size()), 0};
    for (std::size_t i = 0; i < own.size(); ++i)
      for (std::size_t k = 0; k < difference.full.size(); ++k) {
        difference.full[k] += own[i].full[k] - flat[i].full[k];
        difference.halved[k] += own[i].halved[k] - flat[i].halved[k];
      }
    return sum(difference);
  }

  std::vector<FrequencyDensity> densities(std::size_t first, std::size_t last,
                                          Electrons electrons) const {
    std::vector<FrequencyDensity> all;
    std::shared_ptr<const Scatterer> inside = part(first, Channel::outward, electrons);
    for (std::size_t k = first + 1; k <= last; ++k) {
      const auto around = part(k, Channel::inward, electrons);
      const Window& window = windows_[k - 1];
      all.push_back(coaxial_density(*inside, *around, window, false).energy);
      if (k < last)
        inside = std::make_shared<const Scatterer>(
            enclosed(*inside, *part(k, Channel::outward, electrons), *around,
                     *part(k, Channel::through, electrons), all_));
    }
    return all;
  }

  /// Two walls, with the derivative by the gap.
  CoaxialDensity with_slope() const {
    return coaxial_density(*part(0, Channel::outward, Electrons::own),
                           *part(1, Channel::inward, Electrons::own), windows_.front(), true);
  }

  /// The same with retardation.
  CoaxialDensity retarded(Electrons electrons, bool with_slope) const {
    const Window& window = windows_.front();
    const auto inside = cache_.shell(walls_[0], electrons, window);
    const auto around = cache_.shell(walls_[1], electrons, window);
    return retarded_coaxial_density(RetardedShell(*inside, carbon_.background),
                                    RetardedShell(*around, carbon_.background), window, with_slope);
  }

  FrequencySum sum(const FrequencyDensity& density) const {
    return frequency_sum(density, carbon_.nodes, all_.xi, carbon_.conditions);
  }

 private:
  std::shared_ptr<const Scatterer> part(std::size_t wall, Channel channel,
                                        Electrons electrons) const {
    return cache_.scatterer(walls_[wall], channel, electrons,
                            walls_.size() == 2 ? windows_.front() : all_);
  }

  const std::vector<Tube>& walls_;
  const Carbon& carbon_;
  TubeCache& cache_;
  std::vector<Window> windows_;
  Window all_;
};

Estimate total(const std::vector<Estimate>& parts) {
  Estimate sum;
  for (const Estimate& part : parts) {
    sum.value += part.value;
    sum.error += part.error;
  }
  return sum;
}

TubeObject walls_between(const TubeObject& object, std::size_t first, std::size_t last) {
  return {{object.walls.begin() + std::ptrdiff_t(first),
           object.walls.begin() + std::ptrdiff_t(last) + 1}};
}

/// Fields that only two walls have: they share one area and one gap.
void fill_double_wall(const TubeObject& object, const ContactTerm& contact, const Estimate& energy,
                      const Estimate& dispersion_slope, Binding& row) {
  const double inner = object.walls[0].radius_nm, outer = object.walls[1].radius_nm;
  const double circumference = constants::pi * (inner + outer);
  const double per_area = energy.value / circumference;
  row.gap_nm = outer - inner;
  row.energy_mJ_per_m2 = per_area * constants::mJ_per_m2_per_eV_per_nm2;
  row.energy_meV_per_atom = per_area * constants::atom_area_nm2 * 1e3;
  const double to_GPa = -constants::GPa_per_eV_per_nm3 / circumference;
  const Estimate contact_slope = contact.estimate(
      [&](const PairFunction& pair) { return coaxial_energy(pair, inner, outer).slope; });
  row.pressure_dispersion_GPa = to_GPa * dispersion_slope.value;
  row.pressure_GPa = to_GPa * (dispersion_slope.value + contact_slope.value);
  row.pressure_error = std::fabs(to_GPa) * (dispersion_slope.error + contact_slope.error);
}

/// Cut energies E(all) - E(1…k) - E(k+1…N) of every interface; the row's own is the weakest.
void fill_interfaces(const TubeObject& object, const WallChain& chain, const ContactTerm& contact,
                     const std::vector<Estimate>& energies, Binding& row) {
  const std::size_t last = object.walls.size() - 1;
  const double all_contact = coaxial_contact(object, contact.nominal);
  double inside = 0.0;
  for (std::size_t k = 0; k < last; ++k) {
    // E(1…k) is a part of the chain; E(k+1…N) starts a new one.
    if (k > 0) inside += energies[k - 1].value;
    const double outside =
        k + 1 < last ? total(chain.interfaces(k + 1, last, Electrons::own)).value : 0.0;
    const TubeObject in = walls_between(object, 0, k), out = walls_between(object, k + 1, last);
    const double cut = total(energies).value - inside - outside + all_contact -
                       coaxial_contact(in, contact.nominal) - coaxial_contact(out, contact.nominal);
    row.interfaces.push_back({label_of(in), label_of(out),
                              object.walls[k + 1].radius_nm - object.walls[k].radius_nm, cut,
                              -cut * constants::nN_per_eV_per_nm});
    if (!row.cut_energy_eV_per_nm || cut > *row.cut_energy_eV_per_nm)
      row.cut_energy_eV_per_nm = cut;
  }
  row.pull_out_force_nN = -*row.cut_energy_eV_per_nm * constants::nN_per_eV_per_nm;
}

}  // namespace

void announce_coaxial(const TubeObject& object, const Carbon& carbon, TubeCache& cache) {
  const Window all = all_windows(interface_windows(object.walls, carbon.nodes));
  for (const Tube& wall : object.walls) cache.announce(wall, all);
}

double coaxial_contact(const TubeObject& object, const PairFunction& pair) {
  double sum = 0.0;
  for (std::size_t i = 0; i < object.walls.size(); ++i)
    for (std::size_t j = i + 1; j < object.walls.size(); ++j)
      sum += coaxial_energy(pair, object.walls[i].radius_nm, object.walls[j].radius_nm).energy;
  return sum;
}

void bind_coaxial(const TubeObject& object, const Carbon& carbon, TubeCache& cache,
                  const ContactTerm& contact, Binding& row) {
  const WallChain chain(object.walls, carbon, cache);
  const std::size_t last = object.walls.size() - 1;
  const bool retarded = carbon.conditions.retarded;
  std::vector<FrequencyDensity> own, flat;
  Estimate slope;
  if (last == 1) {
    CoaxialDensity density = retarded ? chain.retarded(Electrons::own, true) : chain.with_slope();
    slope = chain.sum(density.gap_slope);
    own = {std::move(density.energy)};
  } else {
    own = chain.densities(0, last, Electrons::own);
  }
  if (retarded)
    flat = {chain.retarded(Electrons::flat, false).energy};
  else
    flat = chain.densities(0, last, Electrons::flat);
  std::vector<Estimate> energies;
  double static_part = 0.0;
  for (const FrequencyDensity& density : own) {
    const FrequencySum sum = chain.sum(density);
    energies.push_back(sum);
    static_part += sum.static_part;
  }
  const Estimate dispersion = total(energies);
  const Estimate contact_energy =
      contact.estimate([&](const PairFunction& pair) { return coaxial_contact(object, pair); });
  const Estimate energy{dispersion.value + contact_energy.value,
                        dispersion.error + contact_energy.error};
  const Estimate share = chain.electronic_share(own, flat);

  row.dispersion_eV_per_nm = dispersion.value;
  if (carbon.nodes.warm()) row.thermal_share = static_part / dispersion.value;
  row.contact_eV_per_nm = contact_energy.value;
  row.energy_eV_per_nm = energy.value;
  row.energy_error = energy.error;
  row.relative_error = dispersion.error / std::fabs(dispersion.value);
  row.electronic_share_eV_per_nm = share.value;
  row.electronic_share_error = share.error + share_precision * std::fabs(dispersion.value);
  if (retarded)
    row.retardation_factor =
        dispersion.value / total(chain.interfaces(0, last, Electrons::own)).value;
  row.pair_potential_eV_per_nm = coaxial_contact(object, graphitic_pair_potential());
  if (last == 1) fill_double_wall(object, contact, energy, slope, row);
  fill_interfaces(object, chain, contact, energies, row);
  if (!(*row.relative_error <= carbon.nodes.tolerance)) {
    row.status = Status::not_converged;
    row.message = "the error estimate exceeds the tolerance";
  }
}

}  // namespace gapwright
