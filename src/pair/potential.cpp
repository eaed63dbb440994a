#include <gapwright/math/parallel.hpp>
#include <gapwright/pair/potential.hpp>

#include <algorithm>
#include <cmath>
#include <exception>
#include <map>
#include <mutex>

namespace gapwright {
namespace {

constexpr double contact_precision = 1e-9;

/// The points of several gaps; each on one thread, in the order of the gaps.
std::vector<SmoothEnergy> points_at(const GapFunction& function, const std::vector<double>& gaps) {
  std::vector<SmoothEnergy> points(gaps.size());
  std::vector<std::exception_ptr> problems(gaps.size());
#pragma omp parallel for num_threads(inner_threads()) schedule(dynamic, 1)
  for (std::size_t i = 0; i < gaps.size(); ++i) {
    const SerialRegion serial;
    try {
      points[i] = function(gaps[i]);
    } catch (...) {
      problems[i] = std::current_exception();
    }
  }
  for (const std::exception_ptr& problem : problems)
    if (problem) std::rethrow_exception(problem);
  return points;
}

PotentialTerm term_of(const std::map<double, SmoothEnergy>& known) {
  std::vector<double> gaps;
  std::vector<SmoothEnergy> points;
  for (const auto& [gap, point] : known) {
    gaps.push_back(gap);
    points.push_back(point);
  }
  return {gaps, points};
}

double off(double found, double wanted) {
  return std::fabs(found - wanted) / std::max(std::fabs(wanted), 1e-300);
}

}  // namespace

PotentialTerm::PotentialTerm(const std::vector<double>& gaps,
                             const std::vector<SmoothEnergy>& points) {
  const double sign = !points.empty() && points.front().energy < 0 ? -1.0 : 1.0;
  logarithmic_ = std::all_of(points.begin(), points.end(),
                             [&](const SmoothEnergy& p) { return sign * p.energy > 0; });
  factor_ = logarithmic_ ? sign : 1.0;
  std::vector<double> x, y, s;
  for (std::size_t i = 0; i < gaps.size(); ++i) {
    const double g = gaps[i], e = points[i].energy, d = points[i].slope, g4 = g * g * g * g;
    x.push_back(std::log(g));
    y.push_back(logarithmic_ ? std::log(sign * e) : e * g4);
    s.push_back(logarithmic_ ? g * d / e : g4 * (g * d + 4 * e));
  }
  spline_ = SlopeSpline(std::move(x), y, s);
}

Jet PotentialTerm::at(double gap_nm) const {
  const Jet y = spline_.at(std::log(gap_nm));
  if (logarithmic_) {
    const double e = factor_ * std::exp(y.value);
    return {e, e * y.slope / gap_nm,
            e * (y.curvature + y.slope * (y.slope - 1)) / (gap_nm * gap_nm)};
  }
  const double scale = factor_ * std::pow(gap_nm, -4.0);
  return {scale * y.value, scale / gap_nm * (y.slope - 4 * y.value),
          scale / (gap_nm * gap_nm) * (y.curvature - 9 * y.slope + 20 * y.value)};
}

PotentialTerm PotentialTerm::scaled(double factor) const {
  PotentialTerm term = *this;
  term.factor_ *= factor;
  return term;
}

SampledTerm sample_term(const GapFunction& function, double low_gap_nm, double high_gap_nm,
                        const SampleGoal& goal) {
  const double low = std::log(low_gap_nm), span = std::log(high_gap_nm / low_gap_nm);
  std::vector<double> gaps;
  for (int i = 0; i < goal.knots; ++i) gaps.push_back(std::exp(low + span * i / (goal.knots - 1)));
  gaps.front() = low_gap_nm;
  gaps.back() = high_gap_nm;
  std::vector<SmoothEnergy> points = points_at(function, gaps);
  std::map<double, SmoothEnergy> known;
  for (std::size_t i = 0; i < gaps.size(); ++i) known[gaps[i]] = points[i];

  SampledTerm result;
  std::vector<double> checks;
  for (std::size_t i = 1; i < gaps.size(); ++i) checks.push_back(std::sqrt(gaps[i - 1] * gaps[i]));
  for (int round = 0; round < goal.rounds && !checks.empty(); ++round) {
    const PotentialTerm term = term_of(known);
    points = points_at(function, checks);
    std::vector<double> next;
    result.energy_error = result.slope_error = 0.0;
    for (std::size_t i = 0; i < checks.size(); ++i) {
      const Jet found = term.at(checks[i]);
      const double energy = off(found.value, points[i].energy);
      const double slope = off(found.slope, points[i].slope);
      result.energy_error = std::max(result.energy_error, energy);
      result.slope_error = std::max(result.slope_error, slope);
      const auto place = known.emplace(checks[i], points[i]).first;
      if (energy <= goal.energy && slope <= goal.slope) continue;
      next.push_back(std::sqrt(std::prev(place)->first * checks[i]));
      next.push_back(std::sqrt(std::next(place)->first * checks[i]));
    }
    checks = std::move(next);
  }
  result.term = term_of(known);
  return result;
}

Potential Potential::scaled(double factor) const {
  Potential potential = *this;
  for (PotentialTerm& term : potential.terms_) term = term.scaled(factor);
  return potential;
}

Potential sum_of(const Potential& one, const Potential& other) {
  std::vector<PotentialTerm> terms = one.terms();
  terms.insert(terms.end(), other.terms().begin(), other.terms().end());
  return {one.touching_nm(), std::move(terms)};
}

Jet Potential::at(double distance_nm) const {
  Jet sum;
  for (const PotentialTerm& term : terms_) {
    const Jet part = term.at(distance_nm - touching_nm_);
    sum.value += part.value;
    sum.slope += part.slope;
    sum.curvature += part.curvature;
  }
  return sum;
}

namespace {

/// Repulsion and attraction, each of one sign.
std::vector<PotentialTerm> contact_terms(const PairCurve& curve, const PairFunction& pair,
                                         double low_gap_nm, double high_gap_nm) {
  std::vector<PotentialTerm> terms;
  PairFunction repulsion = pair, attraction = pair;
  repulsion.attraction_eV_nmp = 0.0;
  attraction.repulsion_eV_nm12 = 0.0;
  for (const PairFunction& part : {repulsion, attraction}) {
    if (part.repulsion_eV_nm12 == 0 && part.attraction_eV_nmp == 0) continue;
    const auto energy = [&](double gap) { return curve.contact(part, gap); };
    terms.push_back(sample_term(energy, low_gap_nm, high_gap_nm,
                                {contact_precision, 30 * contact_precision, 17, 6})
                        .term);
  }
  return terms;
}

}  // namespace

Potential contact_potential(const PairCurve& curve, const PairFunction& pair, double low_gap_nm,
                            double high_gap_nm) {
  return {curve.touching_nm(), contact_terms(curve, pair, low_gap_nm, high_gap_nm)};
}

PairPotential pair_potential(const PairCurve& curve, const PairFunction& contact, double low_gap_nm,
                             double high_gap_nm, double tolerance, RoundTrips trips) {
  PairPotential result;
  std::mutex mutex;
  double point_error = 0.0, slope_error = 0.0;
  curve.announce(low_gap_nm);
  const auto direct = [&](double gap) {
    const CurvePoint point = curve.dispersion(gap, true, trips);
    const std::lock_guard lock(mutex);
    point_error = std::max(point_error, point.energy.error / std::fabs(point.energy.value));
    slope_error = std::max(slope_error, point.slope.error / std::fabs(point.slope.value));
    result.positive = result.positive && point.positive;
    return SmoothEnergy{point.energy.value, point.slope.value};
  };
  // About a factor of 1.6 in the gap from knot to knot.
  const int knots = std::max(5, int(std::ceil(std::log(high_gap_nm / low_gap_nm) / 0.5)) + 1);
  const SampledTerm dispersion =
      sample_term(direct, low_gap_nm, high_gap_nm, {0.1 * tolerance, tolerance, knots, 3});
  const double touching = curve.touching_nm();
  std::vector<PotentialTerm> terms;
  if (curve.has_contact()) terms = contact_terms(curve, contact, low_gap_nm, high_gap_nm);
  result.dispersion = Potential(touching, {dispersion.term});
  result.contact = Potential(touching, std::move(terms));
  result.total = sum_of(result.dispersion, result.contact);
  result.dispersion_error = point_error + dispersion.energy_error;
  result.slope_error = slope_error + dispersion.slope_error;
  return result;
}

std::optional<PotentialWell> first_well(const std::function<Jet(double distance_nm)>& energy,
                                        double low_nm, double high_nm) {
  // Far finer than any well of this kind is wide.
  constexpr int steps = 400;
  const double ratio = std::pow(high_nm / low_nm, 1.0 / steps);
  double low = low_nm;
  if (energy(low).slope > 0) return std::nullopt;
  double high = low;
  for (int i = 0; i < steps && energy(high).slope < 0; ++i) {
    low = high;
    high = low * ratio;
  }
  if (energy(high).slope < 0) return std::nullopt;
  for (int i = 0; i < 60 && high - low > 1e-13 * high; ++i) {
    const double middle = 0.5 * (low + high);
    (energy(middle).slope < 0 ? low : high) = middle;
  }
  const double place = 0.5 * (low + high);
  return PotentialWell{place, energy(place)};
}

}  // namespace gapwright
