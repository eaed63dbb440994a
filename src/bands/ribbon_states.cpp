#include "ribbon_states.hpp"

#include <gapwright/bands/ribbon_bands.hpp>

#include <algorithm>
#include <optional>
#include <stdexcept>

#include <Eigen/Dense>
#include <Eigen/Sparse>
#include <Spectra/MatOp/SparseSymShiftSolve.h>
#include <Spectra/SymEigsShiftSolver.h>
#include <fmt/format.h>

namespace gapwright {

namespace {

/// Sectors up to this size are solved densely; above, the few sparse states are faster (measured by
/// tests/bench/bench_ribbon).
constexpr int widest_dense = 72;

Eigen::MatrixXd dense(const BandMatrix& h) {
  Eigen::MatrixXd full = Eigen::MatrixXd::Zero(h.size, h.size);
  for (int r = 0; r <= h.reach; ++r)
    for (int i = 0; i + r < h.size; ++i) full(i + r, i) = full(i, i + r) = h.at(i, r);
  return full;
}

Eigen::SparseMatrix<double> sparse(const BandMatrix& h) {
  std::vector<Eigen::Triplet<double>> entries;
  for (int r = 0; r <= h.reach; ++r)
    for (int i = 0; i + r < h.size; ++i) {
      entries.emplace_back(i + r, i, h.at(i, r));
      if (r > 0) entries.emplace_back(i, i + r, h.at(i, r));
    }
  Eigen::SparseMatrix<double> matrix(h.size, h.size);
  matrix.setFromTriplets(entries.begin(), entries.end());
  return matrix;
}

/// The `count` lowest positive energies by shift-and-invert about `shift`, or nothing when the
/// shifted matrix is singular or the iteration does not settle.
std::optional<std::vector<double>> sparse_energies(const BandMatrix& h, int count, double shift) {
  const int wanted = std::min(2 * count, h.size - 1);
  const int basis = std::min(h.size, std::max(2 * wanted + 8, 20));
  const Eigen::SparseMatrix<double> matrix = sparse(h);  // the operation only refers to it
  Spectra::SparseSymShiftSolve<double> operation(matrix);
  Spectra::SymEigsShiftSolver<Spectra::SparseSymShiftSolve<double>> solver(operation, wanted, basis,
                                                                           shift);
  solver.init();
  solver.compute(Spectra::SortRule::LargestMagn, 1000, 1e-12, Spectra::SortRule::SmallestAlge);
  if (solver.info() != Spectra::CompInfo::Successful) return std::nullopt;
  const Eigen::VectorXd values = solver.eigenvalues();
  // The spectrum is symmetric: its upper half is the conduction side, also where bands touch.
  std::vector<double> energies;
  for (Eigen::Index i = values.size() / 2; i < values.size() && int(energies.size()) < count; ++i)
    energies.push_back(std::max(values[i], 0.0));
  return energies;
}

std::vector<double> dense_energies(const BandMatrix& h, int count) {
  const std::vector<double> all = all_energies(h);
  std::vector<double> energies(all.begin() + h.size / 2, all.begin() + h.size / 2 + count);
  for (double& energy : energies) energy = std::max(energy, 0.0);
  return energies;
}

}  // namespace

std::vector<double> all_energies(const BandMatrix& h) {
  Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver;
  if (h.reach == 1)
    solver.computeFromTridiagonal(
        Eigen::Map<const Eigen::VectorXd>(h.values.data(), h.size),
        Eigen::Map<const Eigen::VectorXd>(h.values.data() + h.size, h.size - 1),
        Eigen::EigenvaluesOnly);
  else
    solver.compute(dense(h), Eigen::EigenvaluesOnly);
  const Eigen::VectorXd& values = solver.eigenvalues();
  return {values.data(), values.data() + values.size()};
}

std::vector<double> conduction_energies_eV(const RibbonHamiltonian& hamiltonian, int sector,
                                           double k_per_nm, int count, EigenMethod method) {
  const BandMatrix h = hamiltonian.matrix(sector, k_per_nm);
  if (count < 1 || count > h.size / 2)
    throw std::domain_error(
        fmt::format("conduction_energies_eV: count = {}, required: 1 … {}", count, h.size / 2));
  if (method == EigenMethod::automatic)
    method = h.size <= widest_dense ? EigenMethod::dense : EigenMethod::sparse;
  if (method == EigenMethod::sparse)
    for (const double shift : {0.0, 1e-7 * hamiltonian.hopping_eV()}) try {
        if (auto energies = sparse_energies(h, count, shift)) return *energies;
      } catch (const std::invalid_argument&) {
        // Singular at this shift: the next one is tried.
      }
  return dense_energies(h, count);
}

}  // namespace gapwright
