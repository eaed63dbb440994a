// The one door to a pair: bodies, placement and conditions in, a Binding out.
#pragma once

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/contact/short_range.hpp>
#include <gapwright/join/planar.hpp>
#include <gapwright/pair/binding.hpp>
#include <gapwright/pair/curve.hpp>
#include <gapwright/pair/placement.hpp>
#include <gapwright/response/conditions.hpp>

#include <memory>
#include <string>
#include <vector>

namespace gapwright {

/// What a row depends on besides its bodies and placement.
struct Settings {
  Conditions conditions;
  std::string hopping;  ///< catalogue names; empty: the default entry
  std::string background;
  std::string contact_target;
  double tolerance = 1e-4;  ///< of the dispersion energy, relative
};

/// Tolerances of the dispersion energy that can be met.
inline constexpr double least_tolerance = 1e-7;
inline constexpr double largest_tolerance = 1e-2;

/// The grids carry bodies beside each other up to this gap.
inline constexpr double farthest_gap_nm = 1e4;

/// Version of the numbers: part of every store key, raised whenever results change.
std::string_view numerics_version();

/// Computes rows. Responses and scatterers of tubes are kept within a memory bound and shared by
/// all rows; safe to call from several threads; a row's bits do not depend on what was computed
/// before or beside it.
class Binder {
 public:
  /// Throws InputError for settings that are out of range or name no entry.
  Binder(const Catalogs& catalogs, const Settings& settings);
  ~Binder();
  Binder(const Binder&) = delete;
  Binder& operator=(const Binder&) = delete;

  const Settings& settings() const;  ///< catalogue names filled in
  const Catalogs& catalogs() const;

  /// Announces rows to come, so that each tube's response is computed once, on a window that serves
  /// all of them.
  void announce(const std::vector<Placement>& rows) const;
  /// Computes the response of an announced tube now.
  void warm(const Tube& tube) const;

  /// One row under the settings' contact target.
  Binding bind(const Placement& placement) const;

  /// The bodies of a placement with their gap left free; not for walls in walls, whose gaps are
  /// those of their radii. Throws InputError for bodies that do not fit the arrangement.
  std::unique_ptr<PairCurve> curve(const Placement& placement) const;

  /// Energy of the contact term of a row under another target: rank_spread needs no dispersion.
  double contact_eV_per_nm(const Placement& placement, const std::string& contact_target) const;

  /// The short-range term of a target, calibrated at T = 0 without doping whatever the conditions
  /// (computed once).
  PairFunction contact_term(const std::string& contact_target) const;
  /// Two flat sheets of the model at the conditions.
  PlanarEnergy sheets(double spacing_nm) const;

  /// Hash of everything a row of this binder depends on besides its bodies: conditions, catalogue
  /// values, tolerance, numerics version. Sixteen hexadecimal digits.
  std::string settings_key() const;

 private:
  struct Impl;
  std::unique_ptr<Impl> impl_;
};

}  // namespace gapwright
