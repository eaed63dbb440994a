#include "ribbon_propagator.hpp"
#include "time_grid.hpp"

#include <gapwright/bands/ribbon_bands.hpp>
#include <gapwright/catalog/input_error.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/response/ribbon_response.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>
#include <utility>

#include <fmt/format.h>

namespace gapwright {

namespace {

constexpr double least_gap_eV = 1e-3;
constexpr int most_waves = 8192;
/// What times and waves may leave of the tolerance; that of the waves is for the static answer to
/// long waves, which settles last.
constexpr double times_share = 0.1, waves_share = 0.3;

double computable_gap_eV(const RibbonHamiltonian& hamiltonian) {
  const Ribbon& ribbon = hamiltonian.ribbon();
  if (ribbon.lines > max_energy_lines)
    throw InputError({fmt::format("the response of {} is not computed", ribbon.label()),
                      {},
                      {},
                      fmt::format("a ribbon of at most {} lines", max_energy_lines),
                      make_ribbon(ribbon.edge, max_energy_lines).label()});
  const double gap = ribbon_gaps(hamiltonian).band_gap_eV;
  if (gap < least_gap_eV)
    throw InputError(
        {fmt::format("{} has a gap of {:.2g} eV with the edges '{}'", ribbon.label(), gap,
                     hamiltonian.edges().name),
         {},
         {},
         fmt::format("a gap of at least {} eV: without one the static response of the {} diverges",
                     least_gap_eV,
                     ribbon.edge == RibbonEdge::zigzag ? "flat edge bands" : "touching bands"),
         {}});
  return gap;
}

std::vector<double> nodes_of(const LogLattice& lattice, IndexRange range) {
  std::vector<double> values;
  for (int i = 0; i < range.count; ++i) values.push_back(lattice.node(range.first + i));
  return values;
}

/// What free carriers would add to Σχ(q, 0) = -c q², their n/kT at the longest wave, relative.
/// Throws InputError where that is more than a tenth of the tolerance: the sums hold for empty
/// conduction and full valence bands.
double carrier_error(const RibbonHamiltonian& hamiltonian, const StateGrid& grid, double gap_eV,
                     const Conditions& conditions, double longest_wave_per_nm, double tolerance) {
  constexpr double share = 0.1;
  const double mu = conditions.chemical_potential_eV, kT = thermal_energy_eV(conditions);
  const Ribbon& ribbon = hamiltonian.ribbon();
  const bool doped = std::abs(mu) >= 0.5 * gap_eV;
  double error = 0;
  if (kT > 0 && !doped)
    error = few_carriers_per_nm(grid, ribbon.period_nm(), kT, mu) /
            (kT * grid.static_polarisability * longest_wave_per_nm * longest_wave_per_nm);
  if (!doped && error <= share * tolerance) return error;
  throw InputError(
      {fmt::format("{} has free carriers at {} K and a chemical potential of {} eV", ribbon.label(),
                   conditions.temperature_K, mu),
       {},
       {},
       fmt::format("a ribbon of empty bands: its gap is {:.3g} eV, and the response of "
                   "free carriers in ribbons is not computed",
                   gap_eV),
       doped ? "0 eV" : "0 K"});
}

/// A uniform potential moves nothing, Σ_j' χ_jj'(0) = 0: what rounding leaves of the sums,
/// multiplied by the weights, would outweigh -c q² at small q.
void conserve_charge(const RibbonResponse& response, Eigen::MatrixXd& at_time) {
  for (int row = 0; 2 * row < response.rows(); ++row) {
    double sum = 0;
    for (int other = 0; other < response.rows(); ++other)
      sum += at_time(static_cast<Eigen::Index>(response.pair_of(row, other)), 0);
    at_time(static_cast<Eigen::Index>(response.pair_of(row, row)), 0) -= sum;
  }
}

}  // namespace

RibbonResponse::RibbonResponse(const Ribbon& ribbon, const Nodes& nodes, IndexRange q,
                               IndexRange xi)
    : ribbon_(ribbon), nodes_(nodes), q_(q), xi_(xi) {
  for (int row = 0; 2 * row < rows(); ++row) {
    first_.push_back(pairs_);
    pairs_ += static_cast<std::size_t>(rows() - 2 * row);
  }
  values_.resize(pairs_ * static_cast<std::size_t>(q.count) * static_cast<std::size_t>(xi.count));
}

std::size_t RibbonResponse::pair_of(int row, int other_row) const {
  if (row > other_row) std::swap(row, other_row);
  if (row + other_row > rows() - 1) {
    const int mirrored = rows() - 1 - other_row;
    other_row = rows() - 1 - row;
    row = mirrored;
  }
  return first_[row] + static_cast<std::size_t>(other_row - row);
}

std::span<double> RibbonResponse::node(int i, int k) {
  return {&values_[pairs_ * (static_cast<std::size_t>(i) * xi_.count + k)], pairs_};
}

std::span<const double> RibbonResponse::node(int i, int k) const {
  return {&values_[pairs_ * (static_cast<std::size_t>(i) * xi_.count + k)], pairs_};
}

double RibbonResponse::at(int i, int k, int row, int other_row) const {
  return node(i, k)[pair_of(row, other_row)];
}

void RibbonResponse::matrix(int i, int k, std::span<double> out) const {
  const std::size_t size = static_cast<std::size_t>(rows());
  if (out.size() != size * size)
    throw std::invalid_argument(fmt::format(
        "RibbonResponse::matrix: out has {} places, required: {}", out.size(), size * size));
  const auto values = node(i, k);
  for (int row = 0; row < rows(); ++row)
    for (int other = 0; other < rows(); ++other)
      out[row * size + other] = values[pair_of(row, other)];
}

RibbonResponse ribbon_response(const RibbonHamiltonian& hamiltonian, const Conditions& conditions,
                               const Nodes& nodes, IndexRange q, IndexRange xi) {
  validate(conditions);
  if (q.count < 1 || xi.count < 1)
    throw std::invalid_argument("ribbon_response: nodes in q and xi are required");
  const double gap = computable_gap_eV(hamiltonian);
  const StateGrid grid = settled_states(hamiltonian, waves_share * nodes.tolerance, most_waves);
  const double carriers =
      carrier_error(hamiltonian, grid, gap, conditions, nodes.q.node(q.first), nodes.tolerance);
  const TimeGrid times = time_grid(gap * (1 - 1e-6), 2 * grid.largest_energy_eV * (1 + 1e-6),
                                   nodes_of(nodes.xi, xi), times_share * nodes.tolerance);

  const auto propagator = ribbon_propagator(hamiltonian, grid, nodes_of(nodes.q, q));
  RibbonResponse response(hamiltonian.ribbon(), nodes, q, xi);
  response.waves = grid.waves;
  response.times = static_cast<int>(times.times.size());
  response.relative_error = grid.relative_error + times.relative_error + carriers;

  const auto pairs = static_cast<Eigen::Index>(response.pairs());
  std::vector<Eigen::MatrixXd> at_times(times.times.size());
#pragma omp parallel for schedule(dynamic) num_threads(inner_threads())
  for (int i = 0; i < response.times; ++i) {
    at_times[i] = propagator->response(times.times[i]);
    conserve_charge(response, at_times[i]);
  }
#pragma omp parallel for schedule(static) num_threads(inner_threads())
  for (int j = 0; j < q.count; ++j) {
    Eigen::MatrixXd by_time(pairs, response.times);
    for (int i = 0; i < response.times; ++i)
      by_time.col(i) = at_times[i].col(0) + at_times[i].col(j + 1);
    Eigen::Map<Eigen::MatrixXd>(response.node(j, 0).data(), pairs, xi.count) =
        by_time * times.weights;
  }
  return response;
}

}  // namespace gapwright
