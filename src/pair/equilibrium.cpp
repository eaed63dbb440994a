#include <gapwright/contact/short_range.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/pair/equilibrium.hpp>

#include <cmath>
#include <stdexcept>

namespace gapwright {
namespace {

constexpr double least_gap_nm = 0.28;
constexpr double largest_gap_nm = 0.45;

// The in-plane background joins the π response: both keep their (αQ²) when the wall is displaced.
ShellResponse with_background(ShellResponse response, const Background& background) {
  const Window& window = response.window();
  const double radius = response.radius_nm();
  for (int j = 0; j < window.q.count; ++j)
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) {
      const double q = response.nodes().q.node(window.q.first + j);
      const double wave_squared = q * q + m * m / (radius * radius);
      const std::span<double> cell = response.cell(j, m);
      for (int k = 0; k < window.xi.count; ++k)
        cell[std::size_t(k)] +=
            background.in_plane_nm(response.nodes().xi.node(window.xi.first + k)) * wave_squared;
    }
  return response;
}

ShellResponse displaced(const ShellResponse& response, double radius_nm) {
  const Window& window = response.window();
  ShellResponse moved(radius_nm, response.nodes(), window);
  for (int j = 0; j < window.q.count; ++j)
    for (int m = 0; m < window.orders[std::size_t(j)]; ++m) {
      const auto from = response.cell(j, m);
      std::copy(from.begin(), from.end(), moved.cell(j, m).begin());
    }
  return moved;
}

class Displacement {
 public:
  Displacement(const Binder& binder, const Tube& inner, const Tube& outer)
      : conditions_(binder.settings().conditions),
        contact_(binder.contact_term(binder.settings().contact_target)),
        mid_radius_nm_(0.5 * (inner.radius_nm + outer.radius_nm)) {
    const Settings& settings = binder.settings();
    const HoppingSet& hopping = binder.catalogs().hopping(settings.hopping);
    normal_only_ = binder.catalogs().background(settings.background);
    const Nodes nodes = make_nodes(settings.tolerance, conditions_);
    window_ = united(window_at(least_gap_nm, nodes), window_at(largest_gap_nm, nodes));
    const auto response = [&](const Tube& tube) {
      return with_background(tube_response(tube, hopping, conditions_, nodes, window_),
                             normal_only_);
    };
    inner_ = response(inner);
    outer_ = response(outer);
    normal_only_.in_plane_strength_nm = 0.0;
  }

  /// dE/dg [eV/nm²].
  double slope(double gap_nm) const {
    const double inner = mid_radius_nm_ - gap_nm / 2, outer = mid_radius_nm_ + gap_nm / 2;
    const Scatterer inside =
        shell_scatterer(Channel::outward, displaced(inner_, inner), normal_only_, window_);
    const Scatterer around =
        shell_scatterer(Channel::inward, displaced(outer_, outer), normal_only_, window_);
    const CoaxialDensity density = coaxial_density(inside, around, window_, true);
    return frequency_sum(density.gap_slope, inside.nodes(), window_.xi, conditions_).value +
           coaxial_energy(contact_, inner, outer).slope;
  }

 private:
  Window window_at(double gap_nm, const Nodes& nodes) const {
    return coaxial_window(mid_radius_nm_ - gap_nm / 2, mid_radius_nm_ + gap_nm / 2, nodes);
  }

  Conditions conditions_;
  PairFunction contact_;
  double mid_radius_nm_;
  Background normal_only_;
  Window window_;
  ShellResponse inner_, outer_;
};

}  // namespace

double coaxial_equilibrium_gap_nm(const Binder& binder, const Placement& placement) {
  if (tubes_of(placement.first).walls.size() != 2)
    throw std::domain_error("coaxial_equilibrium_gap_nm: walls = " + label_of(placement.first) +
                            ", required two walls");
  if (binder.settings().conditions.retarded)
    throw std::domain_error(
        "coaxial_equilibrium_gap_nm: conditions = retarded, required non-retarded");
  const Displacement pair(binder, tubes_of(placement.first).walls[0],
                          tubes_of(placement.first).walls[1]);
  double low = least_gap_nm, high = largest_gap_nm;
  if (!(pair.slope(low) < 0) || !(pair.slope(high) > 0))
    throw std::domain_error("coaxial_equilibrium_gap_nm: walls = " + label_of(placement.first) +
                            ", required a minimum within 0.28 … 0.45 nm");
  while (high - low > 1e-6) {
    const double middle = 0.5 * (low + high);
    (pair.slope(middle) < 0 ? low : high) = middle;
  }
  return 0.5 * (low + high);
}

}  // namespace gapwright
