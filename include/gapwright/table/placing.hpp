// Points of a table, placed so that a cubic reading of it is good enough (METHODS §10).
#pragma once

#include <gapwright/math/slope_spline.hpp>

#include <functional>
#include <vector>

namespace gapwright {

/// Energy and its derivatives by the distance [nm].
using EnergyFunction = std::function<Jet(double distance_nm)>;

/// One distance of a table. The force is -dE/dD.
struct TablePoint {
  double distance_nm = 0.0;
  double energy = 0.0;
  double force = 0.0;
};

/// What errors are relative to: max(|E|, energy), max(|F|, force).
struct TableScale {
  double energy = 0.0;
  double force = 0.0;
};

/// A thousandth of the deepest energy and of the strongest attraction between two distances; where
/// nothing attracts, of the largest energy and force.
TableScale table_scale(const EnergyFunction& function, double low_nm, double high_nm);

/// Largest errors of three ways to read a table, relative to the scale: a cubic between two points
/// through their energies and forces, its derivative, and not-a-knot cubic splines through the
/// column of energies and through that of forces.
struct ReadingError {
  double energy = 0.0;
  double force = 0.0;
};

struct PlacedPoints {
  std::vector<TablePoint> points;
  ReadingError error;
};

/// Distances between the ends are whole multiples of this, short to print [nm].
inline constexpr double distance_grain_nm = 1e-6;

/// As few points as the tolerance allows, both ends among them. Throws std::domain_error unless
/// low < high and 1e-8 <= tolerance <= 0.1.
PlacedPoints place_points(const EnergyFunction& function, double low_nm, double high_nm,
                          const TableScale& scale, double tolerance);

/// The errors of given points against the function they were taken from.
ReadingError reading_error(const EnergyFunction& function, const std::vector<TablePoint>& points,
                           const TableScale& scale);

/// The cubic through energies and forces of both ends of the interval that holds a distance; beyond
/// the ends a straight line.
Jet read_cubic(const std::vector<TablePoint>& points, double distance_nm);

}  // namespace gapwright
