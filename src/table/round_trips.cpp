#include "round_trips.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/crossed.hpp>
#include <gapwright/table/beads.hpp>

#include <algorithm>
#include <array>
#include <cmath>

namespace gapwright {
namespace {

constexpr std::array angle_nodes_deg = {15.0, 30.0, 60.0, 90.0};
double sine_of(double angle_deg) {
  return std::sin(angle_deg * constants::pi / 180);
}

/// Six gaps for a factor of 50.
std::vector<double> coarse_gaps(double low, double high) {
  const double span = std::log(high / low);
  const int count = std::max(4, int(std::lround(span / 0.8)) + 1);
  std::vector<double> gaps;
  for (int i = 0; i < count; ++i) gaps.push_back(low * std::exp(span * i / (count - 1)));
  gaps.back() = high;
  return gaps;
}

std::unique_ptr<PairCurve> crossed_curve(const Binder& binder, const TableRequest& request,
                                         double angle_deg) {
  return binder.curve(
      {Arrangement::crossed, request.first, request.second, std::nullopt, angle_deg});
}

/// Angles from here up stand on the grid of two wave numbers at a gap.
double lowest_node_deg(const TableRequest& request, double gap) {
  const double one = tubes_of(request.first).walls.back().radius_nm;
  const double other = tubes_of(request.second).walls.back().radius_nm;
  return lowest_grid_angle_deg(one, other, one + other + gap);
}

/// The polynomial in sin γ through all nodes but one.
SmoothEnergy between(const std::map<double, SmoothEnergy>& nodes, double angle_deg,
                     std::optional<double> left_out_deg) {
  SmoothEnergy sum;
  const double s = sine_of(angle_deg);
  for (const auto& [node, ratio] : nodes) {
    if (node == left_out_deg) continue;
    double weight = 1.0;
    for (const auto& [other, unused] : nodes)
      if (other != node && other != left_out_deg)
        weight *= (s - sine_of(other)) / (sine_of(node) - sine_of(other));
    sum.energy += weight * ratio.energy;
    sum.slope += weight * ratio.slope;
  }
  return sum;
}

/// True when all wanted angles are nodes at every gap: then they need no others.
bool are_nodes(const std::vector<double>& wanted, double lowest) {
  return std::all_of(wanted.begin(), wanted.end(), [&](double angle) {
    return angle >= lowest && std::find(angle_nodes_deg.begin(), angle_nodes_deg.end(), angle) !=
                                  angle_nodes_deg.end();
  });
}

}  // namespace

FurtherRoundTrips::FurtherRoundTrips(const Binder& binder, const TableRequest& request,
                                     double low_gap_nm, double high_gap_nm)
    : gaps_(coarse_gaps(low_gap_nm, high_gap_nm)), nodes_(gaps_.size()) {
  add_angles(binder, request);
  if (!are_nodes(request.angles_deg, lowest_node_deg(request, gaps_.front())))
    add_limit(binder, request);
  read_angles(request.angles_deg);
  check_gaps(binder, request);
}

SmoothEnergy FurtherRoundTrips::computed(const PairCurve& curve, double gap_nm) {
  const CurvePoint point = curve.dispersion(gap_nm, true);
  point_errors_.push_back(point.energy.error / std::fabs(point.energy.value));
  positive_ = positive_ && point.positive;
  const double value = point.energy.value / point.first_round_trip;
  return {value, (point.slope.value - value * point.first_slope) / point.first_round_trip};
}

void FurtherRoundTrips::add_angles(const Binder& binder, const TableRequest& request) {
  const std::vector<double>& wanted = request.angles_deg;
  const bool all = !are_nodes(wanted, lowest_node_deg(request, gaps_.front()));
  for (const double angle : angle_nodes_deg) {
    if (!all && std::find(wanted.begin(), wanted.end(), angle) == wanted.end()) continue;
    const auto curve = crossed_curve(binder, request, angle);
    curve->announce(gaps_.front());
    for (std::size_t i = 0; i < gaps_.size(); ++i)
      if (angle >= lowest_node_deg(request, gaps_[i]))
        nodes_[i][angle] = computed(*curve, gaps_[i]);
  }
}

void FurtherRoundTrips::add_limit(const Binder& binder, const TableRequest& request) {
  const auto curve =
      binder.curve({Arrangement::parallel, request.first, request.second, std::nullopt});
  const double low = gaps_.front(), high = std::max(gaps_.back(), endless_gap_nm);
  const auto parallel = [&](RoundTrips trips) {
    return pair_potential(*curve, {}, low, high, binder.settings().tolerance, trips).dispersion;
  };
  const Potential all = parallel(RoundTrips::all), first = parallel(RoundTrips::first);
  for (std::size_t i = 0; i < gaps_.size(); ++i) {
    const auto limit = [&](const Potential& potential) {
      return crossing_limit([&](double distance) { return potential.at(distance); },
                            curve->touching_nm() + gaps_[i]);
    };
    const Jet full = limit(all), once = limit(first);
    const double value = full.value / once.value;
    nodes_[i][0.0] = {value, (full.slope - value * once.slope) / once.value};
  }
}

// The lowest node between limit and 90° left out and read back is off by several times what the
// angles between all nodes are.
void FurtherRoundTrips::read_angles(const std::vector<double>& wanted) {
  double off = 0.0;
  for (const double angle : wanted) {
    std::vector<SmoothEnergy> ratios;
    for (const Nodes& nodes : nodes_) {
      ratios.push_back(between(nodes, angle, std::nullopt));
      if (nodes.contains(angle) || nodes.size() < 3) continue;
      const SmoothEnergy coarser = between(nodes, angle, std::next(nodes.begin())->first);
      off = std::max(off, std::fabs(ratios.back().energy - coarser.energy));
    }
    at_angle_.emplace(angle, PotentialTerm(gaps_, ratios));
  }
  between_error_ += 0.3 * off;
}

// At the widest node, the cheapest one: the ratios of all angles bend alike.
void FurtherRoundTrips::check_gaps(const Binder& binder, const TableRequest& request) {
  const double angle = nodes_.front().rbegin()->first;
  std::vector<SmoothEnergy> ratios;
  for (const Nodes& nodes : nodes_) ratios.push_back(nodes.at(angle));
  const PotentialTerm term(gaps_, ratios);
  const auto curve = crossed_curve(binder, request, angle);
  double off = 0.0;
  for (std::size_t i = 1; i < gaps_.size(); ++i) {
    const double gap = std::sqrt(gaps_[i - 1] * gaps_[i]);
    off = std::max(off, std::fabs(term.at(gap).value - computed(*curve, gap).energy));
  }
  between_error_ += off;
}

// An estimate compares the grid of a point with one twice as coarse, whose own error swings with
// where its nodes fall against the gap, from nothing to many times that of the full grid. The
// latter swings as well, and would show in between_error(), which finds the ratios on a smooth
// curve. So the lower quartile counts.
double FurtherRoundTrips::point_error() const {
  std::vector<double> errors = point_errors_;
  const auto quartile = errors.begin() + std::ptrdiff_t(errors.size() / 4);
  std::nth_element(errors.begin(), quartile, errors.end());
  return *quartile;
}

SmoothEnergy FurtherRoundTrips::ratio(double angle_deg, double gap_nm) const {
  const Jet ratio = at_angle_.at(angle_deg).at(gap_nm);
  return {ratio.value, ratio.slope};
}

PotentialTerm limit_term(const Potential& parallel, double low_gap_nm, double high_gap_nm) {
  const EnergyFunction energy = [&](double distance) { return parallel.at(distance); };
  const auto limit = [&](double gap) {
    const Jet jet = crossing_limit(energy, parallel.touching_nm() + gap);
    return SmoothEnergy{jet.value, jet.slope};
  };
  return sample_term(limit, low_gap_nm, high_gap_nm, {1e-9, 1e-8, 33, 4}).term;
}

}  // namespace gapwright
