#include <gapwright/contact/short_range.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/pair/equilibrium.hpp>

#include <algorithm>
#include <stdexcept>
#include <string>

namespace gapwright {
namespace {

constexpr double least_gap_nm = 0.28;
constexpr double largest_gap_nm = 0.45;

void require_two_walls(const char* function, const Binder& binder, const Placement& placement) {
  if (tubes_of(placement.first).walls.size() != 2)
    throw std::domain_error(std::string(function) + ": walls = " + label_of(placement.first) +
                            ", required two walls");
  if (binder.settings().conditions.retarded)
    throw std::domain_error(std::string(function) +
                            ": conditions = retarded, required non-retarded");
}

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
  /// For gaps between the two.
  Displacement(const Binder& binder, const Tube& inner, const Tube& outer, double least,
               double largest)
      : conditions_(binder.settings().conditions),
        contact_(binder.contact_term(binder.settings().contact_target)),
        mid_radius_nm_(0.5 * (inner.radius_nm + outer.radius_nm)) {
    const Settings& settings = binder.settings();
    const HoppingSet& hopping = binder.catalogs().hopping(settings.hopping);
    normal_only_ = binder.catalogs().background(settings.background);
    const Nodes nodes = make_nodes(settings.tolerance, conditions_);
    window_ = united(window_at(least, nodes), window_at(largest, nodes));
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
    return dispersion(gap_nm).slope.value +
           coaxial_energy(contact_, inner_radius(gap_nm), outer_radius(gap_nm)).slope;
  }

  /// Energy [eV/nm] and its derivative by the gap [eV/nm²].
  CurvePoint dispersion(double gap_nm) const {
    const double inner = inner_radius(gap_nm), outer = outer_radius(gap_nm);
    const Scatterer inside =
        shell_scatterer(Channel::outward, displaced(inner_, inner), normal_only_, window_);
    const Scatterer around =
        shell_scatterer(Channel::inward, displaced(outer_, outer), normal_only_, window_);
    const CoaxialDensity density = coaxial_density(inside, around, window_, true);
    CurvePoint point;
    point.energy = frequency_sum(density.energy, inside.nodes(), window_.xi, conditions_);
    point.slope = frequency_sum(density.gap_slope, inside.nodes(), window_.xi, conditions_);
    return point;
  }

 private:
  double inner_radius(double gap_nm) const { return mid_radius_nm_ - gap_nm / 2; }
  double outer_radius(double gap_nm) const { return mid_radius_nm_ + gap_nm / 2; }
  Window window_at(double gap_nm, const Nodes& nodes) const {
    return coaxial_window(inner_radius(gap_nm), outer_radius(gap_nm), nodes);
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
  require_two_walls("coaxial_equilibrium_gap_nm", binder, placement);
  const std::vector<Tube>& walls = tubes_of(placement.first).walls;
  const Displacement pair(binder, walls[0], walls[1], least_gap_nm, largest_gap_nm);
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

std::vector<CurvePoint> coaxial_curve(const Binder& binder, const Placement& placement,
                                      const std::vector<double>& gaps_nm) {
  require_two_walls("coaxial_curve", binder, placement);
  const std::vector<Tube>& walls = tubes_of(placement.first).walls;
  const double mid_radius = 0.5 * (walls[0].radius_nm + walls[1].radius_nm);
  for (const double gap : gaps_nm)
    if (!(gap >= min_gap_nm && gap < 2 * mid_radius))
      throw std::domain_error("coaxial_curve: gap_nm = " + std::to_string(gap) +
                              ", required 0.2 … twice the mid radius");
  if (gaps_nm.empty()) return {};
  const auto [least, largest] = std::minmax_element(gaps_nm.begin(), gaps_nm.end());
  const Displacement pair(binder, walls[0], walls[1], *least, *largest);
  std::vector<CurvePoint> points;
  for (const double gap : gaps_nm) points.push_back(pair.dispersion(gap));
  return points;
}

}  // namespace gapwright
