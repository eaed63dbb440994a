#include "ribbon_mean_field.hpp"

#include "ribbon_occupation.hpp"

#include <algorithm>
#include <cmath>
#include <deque>

#include <Eigen/Dense>

namespace gapwright {

namespace {

constexpr double iteration_goal_eV = 1e-10;
constexpr double quadrature_goal_eV = 1e-8;
constexpr int most_iterations = 80;
constexpr int most_refinements = 4;

/// Next input of x → x + residual(x) from the inputs and residuals seen.
/// Source: D. G. Anderson, J. ACM 12, 547 (1965).
class AndersonMixing {
 public:
  Eigen::VectorXd next(const Eigen::VectorXd& input, const Eigen::VectorXd& residual) {
    inputs_.push_back(input);
    residuals_.push_back(residual);
    if (inputs_.size() > depth + 1) {
      inputs_.pop_front();
      residuals_.pop_front();
    }
    const auto known = static_cast<Eigen::Index>(inputs_.size()) - 1;
    Eigen::VectorXd mixed_input = input, mixed_residual = residual;
    if (known > 0) {
      Eigen::MatrixXd moves(input.size(), known), turns(input.size(), known);
      for (Eigen::Index i = 0; i < known; ++i) {
        moves.col(i) = inputs_[i + 1] - inputs_[i];
        turns.col(i) = residuals_[i + 1] - residuals_[i];
      }
      const Eigen::VectorXd share = turns.colPivHouseholderQr().solve(residual);
      mixed_input -= moves * share;
      mixed_residual -= turns * share;
    }
    return mixed_input + weight * mixed_residual;
  }

 private:
  static constexpr std::size_t depth = 6;
  static constexpr double weight = 0.7;
  std::deque<Eigen::VectorXd> inputs_, residuals_;
};

double published_gap_scale_eV(int chains) {
  return 9.33 / ((1.5 * chains - 1) * 1.42 + 15);
}

/// The up spin is denser on the sublattice of the lower edge, most of all at the edges.
std::vector<double> first_guess(int chains, double repulsion_eV) {
  const int rows = 2 * chains;
  std::vector<double> potential(static_cast<std::size_t>(rows));
  for (int j = 0; j < rows; ++j) {
    const double excess = 0.02 + 0.15 * (std::exp(-j / 3.0) + std::exp(-(rows - 1 - j) / 3.0));
    potential[j] = (j % 2 == 0 ? -1 : 1) * repulsion_eV * excess;
  }
  return potential;
}

/// A wide ribbon starts from the edges of one a quarter as wide.
std::vector<double> widened(const std::vector<double>& narrow, int chains) {
  std::vector<double> potential(2 * static_cast<std::size_t>(chains), 0.0);
  for (std::size_t j = 0; j < narrow.size() / 2; ++j) {
    potential[j] = narrow[j];
    potential[potential.size() - 1 - j] = narrow[narrow.size() - 1 - j];
  }
  return potential;
}

/// U(n_down - 1/2) with n_down the mirror image of n_up and n_up + n_down = 1.
Eigen::VectorXd field_of(int chains, double hopping_eV, double repulsion_eV,
                         const Eigen::VectorXd& potential, const OccupationGrid& grid) {
  const std::vector<double> up = row_occupations(
      chains, hopping_eV, {potential.data(), potential.data() + potential.size()}, grid);
  Eigen::VectorXd field(potential.size());
  for (Eigen::Index j = 0; j < field.size(); ++j)
    field[j] = 0.5 * repulsion_eV * (up[up.size() - 1 - j] - up[j]);
  return field;
}

}  // namespace

MeanField ribbon_mean_field(int chains, double hopping_eV, double repulsion_eV) {
  constexpr int widest_guessed = 100;
  const std::vector<double> start =
      chains <= widest_guessed
          ? first_guess(chains, repulsion_eV)
          : widened(ribbon_mean_field(chains / 4, hopping_eV, repulsion_eV).potential_eV, chains);
  Eigen::VectorXd potential = Eigen::Map<const Eigen::VectorXd>(start.data(), start.size());
  OccupationGrid grid{0.25 * published_gap_scale_eV(chains), 10, 0.45};

  MeanField field;
  for (int level = 0; level <= most_refinements && !field.converged; ++level) {
    AndersonMixing mixing;
    double change = 0;
    do {
      const Eigen::VectorXd residual =
          field_of(chains, hopping_eV, repulsion_eV, potential, grid) - potential;
      change = residual.cwiseAbs().maxCoeff();
      if (change > iteration_goal_eV) potential = mixing.next(potential, residual);
    } while (change > iteration_goal_eV && ++field.iterations < most_iterations);
    grid = {0.3 * grid.energy_eV, grid.order + 3, 0.8 * grid.step};
    const double refined = (field_of(chains, hopping_eV, repulsion_eV, potential, grid) - potential)
                               .cwiseAbs()
                               .maxCoeff();
    field.error_eV = std::max(change, refined);
    field.converged = field.error_eV <= quadrature_goal_eV;
    if (field.iterations >= most_iterations) break;
  }
  field.potential_eV.assign(potential.data(), potential.data() + potential.size());
  return field;
}

}  // namespace gapwright
