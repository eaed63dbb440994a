#include "round_trips.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/table/beads.hpp>

#include <algorithm>
#include <array>
#include <cmath>

namespace gapwright {
namespace {

constexpr std::array angle_nodes_deg = {15.0, 30.0, 60.0, 90.0};
constexpr double no_angle = -1.0;

double sine_of(double angle_deg) {
  return std::sin(angle_deg * constants::pi / 180);
}

/// Five gaps for a factor of 50: a factor of 2.7 from one to the next.
std::vector<double> coarse_gaps(double low, double high) {
  const double span = std::log(high / low);
  const int count = std::max(4, int(std::lround(span)) + 1);
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

SmoothEnergy ratio_at(const CurvePoint& point) {
  const double value = point.energy.value / point.first_round_trip;
  return {value, (point.slope.value - value * point.first_slope) / point.first_round_trip};
}

}  // namespace

FurtherRoundTrips::FurtherRoundTrips(const Binder& binder, const TableRequest& request,
                                     double low_gap_nm, double high_gap_nm)
    : gaps_(coarse_gaps(low_gap_nm, high_gap_nm)) {
  const std::vector<double>& wanted = request.angles_deg;
  const auto is_node = [](double angle) {
    return std::find(angle_nodes_deg.begin(), angle_nodes_deg.end(), angle) !=
           angle_nodes_deg.end();
  };
  const bool nodes_only = std::all_of(wanted.begin(), wanted.end(), is_node);
  for (const double angle : angle_nodes_deg)
    if (!nodes_only || std::count(wanted.begin(), wanted.end(), angle) > 0)
      add_angle(binder, request, angle);
  check_gaps(binder, request, at_angle_.rbegin()->first);
  if (nodes_only) return;
  add_limit(binder, request);
  check_angles(wanted);
}

void FurtherRoundTrips::add_angle(const Binder& binder, const TableRequest& request,
                                  double angle_deg) {
  const auto curve = crossed_curve(binder, request, angle_deg);
  curve->announce(gaps_.front());
  std::vector<SmoothEnergy> ratios;
  for (const double gap : gaps_) {
    const CurvePoint point = curve->dispersion(gap, true);
    error_ = std::max(error_, point.energy.error / std::fabs(point.energy.value));
    positive_ = positive_ && point.positive;
    ratios.push_back(ratio_at(point));
  }
  at_angle_.emplace(angle_deg, PotentialTerm(gaps_, ratios));
}

// At the widest angle, the cheapest one: the ratios of all angles bend alike.
void FurtherRoundTrips::check_gaps(const Binder& binder, const TableRequest& request,
                                   double angle_deg) {
  const auto curve = crossed_curve(binder, request, angle_deg);
  double off = 0.0;
  for (std::size_t i = 1; i < gaps_.size(); ++i) {
    const double gap = std::sqrt(gaps_[i - 1] * gaps_[i]);
    const double wanted = ratio_at(curve->dispersion(gap, true)).energy;
    off = std::max(off, std::fabs(at_angle_.at(angle_deg).at(gap).value - wanted));
  }
  error_ += off;
}

void FurtherRoundTrips::add_limit(const Binder& binder, const TableRequest& request) {
  const auto curve =
      binder.curve({Arrangement::parallel, request.first, request.second, std::nullopt});
  const double low = gaps_.front(), high = std::max(gaps_.back(), endless_gap_nm);
  const auto parallel = [&](RoundTrips trips) {
    return pair_potential(*curve, {}, low, high, binder.settings().tolerance, trips).dispersion;
  };
  const Potential all = parallel(RoundTrips::all), first = parallel(RoundTrips::first);
  std::vector<SmoothEnergy> ratios;
  for (const double gap : gaps_) {
    const auto limit = [&](const Potential& potential) {
      return crossing_limit([&](double distance) { return potential.at(distance); },
                            curve->touching_nm() + gap);
    };
    const Jet full = limit(all), once = limit(first);
    const double value = full.value / once.value;
    ratios.push_back({value, (full.slope - value * once.slope) / once.value});
  }
  at_angle_.emplace(0.0, PotentialTerm(gaps_, ratios));
}

// Leaving out one inner node and coming back to it is worse than what is left between all of them.
void FurtherRoundTrips::check_angles(const std::vector<double>& wanted) {
  double off = 0.0;
  for (const double angle : wanted)
    for (const double gap : gaps_)
      off = std::max(off, std::fabs(between(angle, gap, no_angle).energy -
                                    between(angle, gap, angle_nodes_deg[0]).energy));
  error_ += 0.3 * off;
}

// The polynomial in sin γ through all nodes but one.
SmoothEnergy FurtherRoundTrips::between(double angle_deg, double gap_nm,
                                        double left_out_deg) const {
  SmoothEnergy sum;
  const double s = sine_of(angle_deg);
  for (const auto& [node, term] : at_angle_) {
    if (node == left_out_deg) continue;
    double weight = 1.0;
    for (const auto& [other, unused] : at_angle_)
      if (other != node && other != left_out_deg)
        weight *= (s - sine_of(other)) / (sine_of(node) - sine_of(other));
    const Jet ratio = term.at(gap_nm);
    sum.energy += weight * ratio.value;
    sum.slope += weight * ratio.slope;
  }
  return sum;
}

SmoothEnergy FurtherRoundTrips::ratio(double angle_deg, double gap_nm) const {
  const auto node = at_angle_.find(angle_deg);
  if (node == at_angle_.end()) return between(angle_deg, gap_nm, no_angle);
  const Jet ratio = node->second.at(gap_nm);
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
