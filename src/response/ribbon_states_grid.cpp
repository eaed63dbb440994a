#include "ribbon_states_grid.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/parallel.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {

namespace {

using constants::pi;

constexpr int fewest_waves = 32;

Eigen::MatrixXd dense(const BandMatrix& h) {
  Eigen::MatrixXd full = Eigen::MatrixXd::Zero(h.size, h.size);
  for (int r = 0; r <= h.reach; ++r)
    for (int i = 0; i + r < h.size; ++i) full(i + r, i) = full(i, i + r) = h.at(i, r);
  return full;
}

Eigen::MatrixXd product(const BandMatrix& h, const Eigen::MatrixXd& x) {
  Eigen::MatrixXd y = Eigen::MatrixXd::Zero(x.rows(), x.cols());
  for (int r = 0; r <= h.reach; ++r)
    for (int i = 0; i + r < h.size; ++i) {
      y.row(i) += h.at(i, r) * x.row(i + r);
      if (r > 0) y.row(i + r) += h.at(i, r) * x.row(i);
    }
  return y;
}

ConductionStates solve(const RibbonHamiltonian& hamiltonian, int sector, double k) {
  const BandMatrix h = hamiltonian.matrix(sector, k);
  Eigen::SelfAdjointEigenSolver<Eigen::MatrixXd> solver;
  if (h.reach == 1)
    solver.computeFromTridiagonal(
        Eigen::Map<const Eigen::VectorXd>(h.values.data(), h.size),
        Eigen::Map<const Eigen::VectorXd>(h.values.data() + h.size, h.size - 1));
  else
    solver.compute(dense(h));
  const Eigen::Index half = h.size / 2;
  return {solver.eigenvalues().tail(half), solver.eigenvectors().rightCols(half)};
}

/// The valence states of energies -E: armchair the other sign on one sublattice, zigzag that and
/// the rows in reverse order.
Eigen::MatrixXd mirrored(RibbonEdge edge, const Eigen::MatrixXd& vectors) {
  Eigen::MatrixXd valence(vectors.rows(), vectors.cols());
  const Eigen::Index size = vectors.rows();
  for (Eigen::Index i = 0; i < size; i += 2)
    if (edge == RibbonEdge::armchair) {
      valence.row(i) = -vectors.row(i + 1);
      valence.row(i + 1) = vectors.row(i);
    } else {
      valence.row(i) = vectors.row(size - 1 - i);
      valence.row(i + 1) = -vectors.row(size - 2 - i);
    }
  return valence;
}

/// Σ_vc |<v|dH/dk|c>|²/(E_c - E_v)³ over the sectors of one k.
double polarisability_term(const RibbonHamiltonian& hamiltonian, double k,
                           const std::vector<ConductionStates>& sectors) {
  double sum = 0;
  for (int sector = 0; sector < hamiltonian.sectors(); ++sector) {
    const ConductionStates& c = sectors[sector];
    const Eigen::MatrixXd valence = mirrored(hamiltonian.ribbon().edge, c.vectors);
    const Eigen::MatrixXd turn =
        valence.transpose() * product(hamiltonian.slope(sector, k), c.vectors);
    for (Eigen::Index n = 0; n < turn.cols(); ++n)
      sum +=
          (turn.col(n).array().square() / (c.energies_eV.array() + c.energies_eV[n]).cube()).sum();
  }
  return sum;
}

/// Fills the odd points of a grid whose even ones are known, or all of the first grid.
void fill(const RibbonHamiltonian& hamiltonian, StateGrid& grid, std::vector<double>& terms,
          bool all) {
  const double spacing = 2 * pi / (grid.waves * hamiltonian.ribbon().period_nm());
  const int last = grid.waves / 2, step = all ? 1 : 2;
#pragma omp parallel for schedule(dynamic) num_threads(inner_threads())
  for (int i = all ? 0 : 1; i <= last; i += step) {
    for (int sector = 0; sector < hamiltonian.sectors(); ++sector)
      grid.states[i].push_back(solve(hamiltonian, sector, i * spacing));
    terms[i] = polarisability_term(hamiltonian, i * spacing, grid.states[i]);
  }
}

double polarisability(const RibbonHamiltonian& hamiltonian, const StateGrid& grid,
                      const std::vector<double>& terms) {
  double sum = terms.front() + terms.back();
  for (std::size_t i = 1; i + 1 < terms.size(); ++i) sum += 2 * terms[i];
  return 4 * sum / (grid.waves * hamiltonian.ribbon().period_nm());
}

}  // namespace

double few_carriers_per_nm(const StateGrid& grid, double period_nm, double thermal_energy_eV,
                           double chemical_potential_eV) {
  double sum = 0;
  for (std::size_t i = 0; i < grid.states.size(); ++i) {
    const double twins = i == 0 || i + 1 == grid.states.size() ? 1 : 2;
    for (const ConductionStates& s : grid.states[i])
      sum += twins * ((std::abs(chemical_potential_eV) - s.energies_eV.array()) / thermal_energy_eV)
                         .exp()
                         .sum();
  }
  return 4 * sum / (grid.waves * period_nm);
}

StateGrid settled_states(const RibbonHamiltonian& hamiltonian, double relative_error,
                         int most_waves) {
  StateGrid grid;
  std::vector<double> terms;
  for (grid.waves = fewest_waves;; grid.waves *= 2) {
    const std::size_t count = grid.waves / 2 + 1;
    std::vector<std::vector<ConductionStates>> states(count);
    std::vector<double> new_terms(count);
    for (std::size_t i = 0; i < terms.size(); ++i) {
      states[2 * i] = std::move(grid.states[i]);
      new_terms[2 * i] = terms[i];
    }
    grid.states = std::move(states);
    const bool first = terms.empty();
    terms = std::move(new_terms);
    fill(hamiltonian, grid, terms, first);

    const double before = grid.static_polarisability;
    grid.static_polarisability = polarisability(hamiltonian, grid, terms);
    if (first) continue;
    // The trapezoid's error falls as e^{-decay·waves}: it squares with each doubling.
    const double change = std::abs(before / grid.static_polarisability - 1);
    grid.relative_error = std::min(change, change * change);
    if (grid.relative_error <= relative_error || 2 * grid.waves > most_waves) break;
  }
  for (const auto& sectors : grid.states)
    for (const ConductionStates& s : sectors)
      grid.largest_energy_eV = std::max(grid.largest_energy_eV, s.energies_eV.maxCoeff());
  return grid;
}

}  // namespace gapwright
