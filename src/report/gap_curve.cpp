#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/pair/equilibrium.hpp>
#include <gapwright/report/gap_curve.hpp>

#include <cmath>
#include <exception>
#include <functional>

namespace gapwright {
namespace {

constexpr double closest_gap_nm = 0.27;
constexpr double farthest_coaxial_nm = 0.6;
constexpr double farthest_beside_nm = 1.2;
constexpr int steps = 48;

// Evenly in ln g: dense where the contact term is steep.
std::vector<double> gaps_up_to(double farthest_nm) {
  std::vector<double> gaps;
  for (int i = 0; i <= steps; ++i)
    gaps.push_back(closest_gap_nm * std::pow(farthest_nm / closest_gap_nm, double(i) / steps));
  return gaps;
}

CurveLine line_of(const std::vector<double>& gaps, double force_per_slope,
                  const std::function<SmoothEnergy(double)>& at) {
  CurveLine line;
  for (const double gap : gaps) {
    const SmoothEnergy point = at(gap);
    line.energy.push_back(point.energy);
    line.force.push_back(force_per_slope * point.slope);
  }
  return line;
}

CurveLine dispersion_line(const std::vector<CurvePoint>& points, double force_per_slope) {
  CurveLine line;
  for (const CurvePoint& point : points) {
    line.energy.push_back(point.energy.value);
    line.force.push_back(force_per_slope * point.slope.value);
  }
  return line;
}

std::optional<GapCurve> coaxial(const Binder& binder, const Placement& placement) {
  const std::vector<Tube>& walls = tubes_of(placement.first).walls;
  if (walls.size() != 2 || binder.settings().conditions.retarded) return std::nullopt;
  const double mid = 0.5 * (walls[0].radius_nm + walls[1].radius_nm);
  // A thin inner wall is not shrunk below half its radius.
  const double farthest = std::min(farthest_coaxial_nm, 2 * mid - walls[0].radius_nm);
  GapCurve curve;
  curve.energy_unit = "eV/nm";
  curve.force_name = "pressure";
  curve.force_unit = "GPa";
  curve.gap_nm = gaps_up_to(farthest);
  const double to_GPa = -constants::GPa_per_eV_per_nm3 / (2 * constants::pi * mid);
  curve.dispersion = dispersion_line(coaxial_curve(binder, placement, curve.gap_nm), to_GPa);
  const auto shells = [&](const PairFunction& pair) {
    return line_of(curve.gap_nm, to_GPa,
                   [&](double gap) { return coaxial_energy(pair, mid - gap / 2, mid + gap / 2); });
  };
  curve.contact = shells(binder.contact_term(binder.settings().contact_target));
  curve.pair_potential = shells(graphitic_pair_potential());
  return curve;
}

// Gaps side by side in time; each is the same work whatever the number of threads.
std::vector<CurvePoint> points_of(const PairCurve& pair, const std::vector<double>& gaps) {
  std::vector<CurvePoint> points(gaps.size());
  std::exception_ptr failure;
#pragma omp parallel for num_threads(inner_threads()) schedule(dynamic, 1)
  for (std::size_t i = 0; i < gaps.size(); ++i) {
    try {
      const SerialRegion serial;
      points[i] = pair.dispersion(gaps[i], true);
    } catch (...) {
#pragma omp critical(gapwright_report_gap)
      if (!failure) failure = std::current_exception();
    }
  }
  if (failure) std::rethrow_exception(failure);
  return points;
}

std::optional<GapCurve> beside(const Binder& binder, const Placement& placement) {
  const bool crossed = placement.arrangement == Arrangement::crossed;
  const std::unique_ptr<PairCurve> pair = binder.curve(placement);
  GapCurve curve;
  curve.energy_unit = crossed ? "eV" : "eV/nm";
  curve.force_name = "force";
  curve.force_unit = crossed ? "eV/nm" : "eV/nm²";
  curve.gap_nm = gaps_up_to(farthest_beside_nm);
  pair->announce(closest_gap_nm);
  curve.dispersion = dispersion_line(points_of(*pair, curve.gap_nm), -1.0);
  if (!pair->has_contact()) return curve;
  const auto shells = [&](const PairFunction& function) {
    return line_of(curve.gap_nm, -1.0, [&](double gap) { return pair->contact(function, gap); });
  };
  curve.contact = shells(binder.contact_term(binder.settings().contact_target));
  curve.pair_potential = shells(graphitic_pair_potential());
  return curve;
}

}  // namespace

std::optional<GapCurve> gap_curve(const Binder& binder, const Placement& placement) {
  if (placement.arrangement == Arrangement::coaxial) return coaxial(binder, placement);
  return beside(binder, placement);
}

}  // namespace gapwright
