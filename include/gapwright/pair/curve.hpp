// The energy of two bodies against their gap: what rows, wells and tables are made of.
#pragma once

#include <gapwright/contact/short_range.hpp>
#include <gapwright/math/nodes.hpp>

#include <string>

namespace gapwright {

/// How far round trips between two bodies are followed.
enum class RoundTrips { all, first };

/// Dispersion at one gap. Energies per length, eV/nm and eV/nm²; of crossed bodies in all, eV and
/// eV/nm.
struct CurvePoint {
  Estimate energy;
  Estimate slope;                 ///< by the gap; zero unless asked for
  double first_round_trip = 0.0;  ///< the share of the first round trip in `energy`
  double first_slope = 0.0;       ///< its derivative; zero unless asked for
  double static_part = 0.0;       ///< the n = 0 part of `energy`; zero at T = 0
  bool positive = true;           ///< false: a determinant was not positive, the bodies too close
};

/// Two placed bodies whose gap is free; all else of the placement and the settings is fixed. Safe
/// to call from several threads; needs the Binder it came from.
class PairCurve {
 public:
  PairCurve() = default;
  PairCurve(const PairCurve&) = delete;
  PairCurve& operator=(const PairCurve&) = delete;
  virtual ~PairCurve() = default;

  /// Distance of the axes, or of axis and plane, at no gap [nm].
  virtual double touching_nm() const = 0;

  /// Announces that gaps from this one up [nm] will be asked for.
  virtual void announce(double closest_gap_nm) const = 0;

  /// Dispersion at a gap [nm]. RoundTrips::first leaves the further ones out: faster where the
  /// bodies cross, the same work elsewhere.
  virtual CurvePoint dispersion(double gap_nm, bool with_slope,
                                RoundTrips trips = RoundTrips::all) const = 0;

  /// False where a ribbon or a wire takes part: it has no like of flat graphene.
  virtual bool has_electronic_share() const { return true; }

  /// Own electrons less those of flat graphene (METHODS §7), summed on the nodes: what the two
  /// share cancels in the error, too. Units as of the energy.
  virtual Estimate electronic_share(double gap_nm) const = 0;

  /// False where no contact term exists: in a liquid, over a half-space.
  virtual bool has_contact() const = 0;

  /// What a reader must know of energies at this gap; empty: nothing.
  virtual std::string note(double /*gap_nm*/) const { return {}; }

  /// Contact energy and its derivative by the gap under a pair function; units as of the energy.
  /// Zero where no contact term exists.
  virtual SmoothEnergy contact(const PairFunction& pair, double gap_nm) const = 0;
};

}  // namespace gapwright
