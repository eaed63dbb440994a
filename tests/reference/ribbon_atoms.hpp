// An independent slow account of nanoribbons: atoms in the plane, bonds by distance, complex Bloch
// Hamiltonians of both spins, plain product sums.
#pragma once

#include <gapwright/lattice/ribbon.hpp>

#include <cmath>
#include <complex>
#include <numbers>
#include <vector>

#include <Eigen/Dense>

namespace ribbon_atoms {

using Complex = std::complex<double>;

struct Atom {
  double x, y;
  int row;
};

/// One cell of the honeycomb with bond 0.142 nm between straight edges; rows rise in y.
inline std::vector<Atom> cell_atoms(const gapwright::Ribbon& ribbon) {
  const double b = 0.142, a = std::sqrt(3.0) * b;
  std::vector<Atom> atoms;
  for (int j = 0; j < ribbon.lines; ++j)
    if (ribbon.edge == gapwright::RibbonEdge::armchair) {
      const double x = j % 2 == 0 ? 0.0 : 1.5 * b, y = 0.5 * a * j;
      atoms.push_back({x, y, j});
      atoms.push_back({x + b, y, j});
    } else {
      const double x = j % 2 == 0 ? 0.0 : 0.5 * a, y = 1.5 * b * j;
      atoms.push_back({x, y, 2 * j});
      atoms.push_back({x + 0.5 * a, y + 0.5 * b, 2 * j + 1});
    }
  return atoms;
}

/// H(k) with bonds found by their length; dimers of the two edge rows times `edge` if armchair.
inline Eigen::MatrixXcd hamiltonian(const gapwright::Ribbon& ribbon, double t, double edge,
                                    double k) {
  const auto atoms = cell_atoms(ribbon);
  const int n = int(atoms.size());
  const double period =
      ribbon.edge == gapwright::RibbonEdge::armchair ? 0.426 : std::sqrt(3.0) * 0.142;
  Eigen::MatrixXcd h = Eigen::MatrixXcd::Zero(n, n);
  for (int i = 0; i < n; ++i)
    for (int j = 0; j < n; ++j)
      for (int cell = -2; cell <= 2; ++cell) {
        const double dx = atoms[j].x + cell * period - atoms[i].x, dy = atoms[j].y - atoms[i].y;
        if (std::abs(std::hypot(dx, dy) - 0.142) > 0.01) continue;
        const int row = atoms[i].row;
        const bool dimer = ribbon.edge == gapwright::RibbonEdge::armchair && row == atoms[j].row &&
                           (row == 0 || row == ribbon.lines - 1);
        h(i, j) += (dimer ? edge : 1.0) * t * std::exp(Complex(0, k * dx));
      }
  return h;
}

struct States {
  Eigen::VectorXd energies;
  Eigen::MatrixXcd vectors;
};

inline States states(const Eigen::MatrixXcd& h) {
  const Eigen::SelfAdjointEigenSolver<Eigen::MatrixXcd> solver(h);
  return {solver.eigenvalues(), solver.eigenvectors()};
}

/// Σ over both spins, all pairs of bands and `waves` points of k, f a step at 0. `potential` is
/// that of the up spin by row, the down spin has it with the rows in reverse order; may be empty.
inline std::vector<Eigen::MatrixXd> response(const gapwright::Ribbon& ribbon, double t, double edge,
                                             const std::vector<double>& potential, double q,
                                             const std::vector<double>& frequencies, int waves) {
  const auto atoms = cell_atoms(ribbon);
  const int n = int(atoms.size()), rows = ribbon.rows();
  std::vector<Eigen::MatrixXcd> sums(frequencies.size(), Eigen::MatrixXcd::Zero(rows, rows));
  for (int spin = 0; spin < 2; ++spin)
    for (int i = 0; i < waves; ++i) {
      const double k = 2 * std::numbers::pi * (i + 0.37) / (waves * ribbon.period_nm());
      States at[2];
      for (int side = 0; side < 2; ++side) {
        Eigen::MatrixXcd h = hamiltonian(ribbon, t, edge, k + side * q);
        if (!potential.empty())
          for (int a = 0; a < n; ++a)
            h(a, a) += potential[spin == 0 ? atoms[a].row : rows - 1 - atoms[a].row];
        at[side] = states(h);
      }
      for (int m = 0; m < n; ++m)
        for (int l = 0; l < n; ++l) {
          const double filled = (at[0].energies[m] < 0) - (at[1].energies[l] < 0);
          if (filled == 0) continue;
          Eigen::VectorXcd density = Eigen::VectorXcd::Zero(rows);
          for (int a = 0; a < n; ++a)
            density[atoms[a].row] += std::conj(at[0].vectors(a, m)) * at[1].vectors(a, l);
          const double gap = at[0].energies[m] - at[1].energies[l];
          for (std::size_t f = 0; f < frequencies.size(); ++f)
            sums[f] += filled / Complex(gap, frequencies[f]) * density * density.adjoint();
        }
    }
  std::vector<Eigen::MatrixXd> result;
  for (const auto& sum : sums) result.push_back(sum.real() / (waves * ribbon.period_nm()));
  return result;
}

}  // namespace ribbon_atoms
