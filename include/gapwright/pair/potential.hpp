// The energy of two placed bodies as a smooth function of their distance: from a few direct points.
#pragma once

#include <gapwright/contact/short_range.hpp>
#include <gapwright/math/slope_spline.hpp>
#include <gapwright/pair/curve.hpp>

#include <functional>
#include <optional>
#include <vector>

namespace gapwright {

/// A function of the gap [nm]: energy and its derivative.
using GapFunction = std::function<SmoothEnergy(double gap_nm)>;

/// One addend of a potential: a quintic spline in ln g of ln|E|, or of E·g⁴ where E changes sign,
/// through energies and exact slopes (METHODS §10). Beyond its last knot it goes on as a power of
/// the gap.
class PotentialTerm {
 public:
  PotentialTerm() = default;
  /// Knots [gaps, nm] rise; see SlopeSpline.
  PotentialTerm(const std::vector<double>& gaps, const std::vector<SmoothEnergy>& points);

  Jet at(double gap_nm) const;  ///< derivatives by the gap
  PotentialTerm scaled(double factor) const;

 private:
  bool logarithmic_ = true;
  double factor_ = 1.0;  // the sign, and what scaled() adds
  SlopeSpline spline_;
};

/// A term and how far checks between its knots were off, before they became knots themselves.
struct SampledTerm {
  PotentialTerm term;
  double energy_error = 0.0;  ///< largest |ΔE/E|
  double slope_error = 0.0;   ///< largest |ΔE'/E'|
};

/// What sample_term aims at.
struct SampleGoal {
  double energy = 1e-6;  ///< relative, at the checks
  double slope = 1e-5;   ///< relative, at the checks
  int knots = 9;         ///< to begin with, equal steps in ln g
  int rounds = 3;        ///< of halving the intervals whose checks fail
};

/// Samples a function on a range of gaps until checks midway between knots agree. The points of a
/// round run on inner_threads(); same bits for any number of them.
SampledTerm sample_term(const GapFunction& function, double low_gap_nm, double high_gap_nm,
                        const SampleGoal& goal);

/// A sum of terms against the distance of the axes.
class Potential {
 public:
  Potential() = default;
  Potential(double touching_nm, std::vector<PotentialTerm> terms)
      : touching_nm_(touching_nm), terms_(std::move(terms)) {}

  double touching_nm() const { return touching_nm_; }
  const std::vector<PotentialTerm>& terms() const { return terms_; }
  /// All energies times a factor.
  Potential scaled(double factor) const;
  /// Energy and its derivatives at a distance beyond touching [nm].
  Jet at(double distance_nm) const;

 private:
  double touching_nm_ = 0.0;
  std::vector<PotentialTerm> terms_;
};

/// The sum of two potentials of the same touching distance.
Potential sum_of(const Potential& one, const Potential& other);

/// The dispersion of a curve and its contact energy, apart and together.
struct PairPotential {
  Potential dispersion;
  Potential contact;  ///< no term where no contact term exists
  Potential total;
  double dispersion_error = 0.0;  ///< largest relative error: of the points and between them
  double slope_error = 0.0;       ///< the same of the dispersion's slope
  bool positive = true;           ///< false: bodies too close for the model somewhere
};

/// Potential of a curve between two gaps, to a relative tolerance of the dispersion.
PairPotential pair_potential(const PairCurve& curve, const PairFunction& contact, double low_gap_nm,
                             double high_gap_nm, double tolerance,
                             RoundTrips trips = RoundTrips::all);

/// The contact part alone, or any other pair function's energy, to 1e-8.
Potential contact_potential(const PairCurve& curve, const PairFunction& pair, double low_gap_nm,
                            double high_gap_nm);

/// The first minimum outwards from a distance: where, and the energy and curvature there.
struct PotentialWell {
  double distance_nm = 0.0;
  Jet energy;
};
std::optional<PotentialWell> first_well(const std::function<Jet(double distance_nm)>& energy,
                                        double low_nm, double high_nm);

}  // namespace gapwright
