// Crossed bodies on a grid of their two wave numbers, for the full determinant (METHODS §5).
#pragma once

#include "wave_table.hpp"

#include <vector>

// Frequencies are parallel already.
#define EIGEN_DONT_PARALLELIZE
#include <Eigen/Dense>

namespace gapwright {

/// Nodes q = e^{j·step} of both axes, q₂ of both signs against q₁ > 0 (the opposite pair is alike).
class CrossedGrid {
 public:
  CrossedGrid(double step, double lowest, double highest, double angle_rad);

  int count() const { return range_.count; }
  double step() const { return lattice_.step; }
  double node(int i) const { return lattice_.node(range_.first + i); }
  double weight(int i) const { return weights_[std::size_t(i)]; }
  /// Component of k across an axis: of q along it and q′ of the given sign along the other.
  double across(int along, int other, double sign) const;
  double wave(int along, int other, double sign) const;
  double sine() const { return sine_; }

 private:
  LogLattice lattice_;
  IndexRange range_;
  std::vector<double> weights_;
  double sine_, cosine_;
};

/// One body on the grid: at each of its own wave numbers it maps waves of the other wave number on
/// one another, R(q; q′, q″) = Σ_c sign_c·rows(q′, c)·rows(q″, c). Rows: q′ > 0, then q′ < 0.
class GridMirror {
 public:
  struct Factor {
    Eigen::MatrixXd rows;
    Eigen::VectorXd sign;
  };

  /// `depth` is the distance of the reference plane from the axis.
  GridMirror(const WaveTable& table, double lattice_step, const CrossedGrid& grid, double depth);

  /// At node i and frequency x: columns until nothing above `neglected` is left on the diagonal.
  Factor factor(int i, int x, double neglected) const;

 private:
  struct Node {
    Eigen::MatrixXd waves;        // [q′][m = 0, even and odd of 1, 2, …], √scale included
    std::vector<double> reduced;  // [m][ξ]
  };
  std::vector<Node> nodes_;
  int frequencies_;
};

}  // namespace gapwright
