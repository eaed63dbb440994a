#include "ribbon_occupation.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/math/quadrature.hpp>

#include <algorithm>
#include <cmath>

namespace gapwright {

namespace {

using constants::lattice_nm;
using constants::pi;

struct Rule {
  std::vector<double> nodes, weights;
};

/// ∫₀^∞dω: trapezoid in ln ω, constant below, ω^-2 above.
Rule frequency_rule(const OccupationGrid& grid, double hopping_eV) {
  const double lowest = 3e-4 * grid.energy_eV, highest = 3e3 * hopping_eV;
  const int count = 1 + static_cast<int>(std::ceil(std::log(highest / lowest) / grid.step));
  Rule rule;
  for (int i = 0; i < count; ++i) {
    rule.nodes.push_back(lowest * std::exp(i * grid.step));
    rule.weights.push_back(grid.step * rule.nodes.back());
  }
  const double below = grid.step / std::expm1(grid.step);
  rule.weights.front() += below * rule.nodes.front();
  rule.weights.back() += below * rule.nodes.back();
  return rule;
}

void add_panels(double from, double to, double first, int order, Rule& rule) {
  const GaussRule& gauss = gauss_legendre(order);
  const double length = std::abs(to - from), direction = to > from ? 1 : -1;
  double start = 0, panel = std::min(first, length);
  while (start < length) {
    // The last panel takes a rest that would be shorter than it.
    const double stop = start + 1.5 * panel > length ? length : start + panel;
    for (int i = 0; i < order; ++i) {
      const double x = start + 0.5 * (stop - start) * (1 + gauss.nodes[i]);
      rule.nodes.push_back(from + direction * x);
      rule.weights.push_back(0.5 * (stop - start) * gauss.weights[i]);
    }
    start = stop;
    panel = std::min(2 * start, 2.0);
  }
}

/// Mean over k: 0 … π/a, the other half being its mirror image.
Rule wave_rule(const OccupationGrid& grid, double hopping_eV) {
  const double zone = pi / lattice_nm, dirac = 2 * pi / (3 * lattice_nm);
  const double velocity = 1.5 * hopping_eV * constants::bond_nm;
  const double first = 0.7 * grid.energy_eV / velocity;
  Rule rule;
  add_panels(dirac, 0, first, grid.order, rule);
  add_panels(dirac, zone, first, grid.order, rule);
  for (double& weight : rule.weights) weight /= zone;
  return rule;
}

/// Σ over frequencies of weight·Re G_jj(iω) of one tridiagonal H(k), by the continued fractions of
/// the rows below and above; every step runs over all frequencies.
class GreenSum {
 public:
  GreenSum(const Rule& frequencies, const std::vector<double>& potential_eV)
      : rule_(frequencies),
        potential_(potential_eV),
        count_(frequencies.nodes.size()),
        real_(potential_eV.size() * count_),
        imaginary_(real_.size()),
        above_real_(count_),
        above_imaginary_(count_) {}

  void run(double chain_eV, double link_eV, double* sums) {
    const double bonds[2] = {chain_eV * chain_eV, link_eV * link_eV};
    const std::size_t rows = potential_.size();
    // From below: L_j = iω - V_j - b²/L_{j-1}.
    for (std::size_t j = 0; j < rows; ++j) {
      double* __restrict x = &real_[j * count_];
      double* __restrict y = &imaginary_[j * count_];
      const double* before_x = j == 0 ? nullptr : x - count_;
      const double* before_y = j == 0 ? nullptr : y - count_;
      fraction(potential_[j], j == 0 ? 0.0 : bonds[(j - 1) % 2], before_x, before_y, x, y);
    }
    // From above, with G_jj = 1/(L_j - b²/R_{j+1}).
    std::vector<double> next_real(count_), next_imaginary(count_);
    for (std::size_t j = rows; j-- > 0;) {
      const bool last = j + 1 == rows;
      const double bond = last ? 0.0 : bonds[j % 2];
      sums[j] = row_sum(&real_[j * count_], &imaginary_[j * count_], bond);
      fraction(potential_[j], bond, last ? nullptr : above_real_.data(),
               last ? nullptr : above_imaginary_.data(), next_real.data(), next_imaginary.data());
      above_real_.swap(next_real);
      above_imaginary_.swap(next_imaginary);
    }
  }

 private:
  void fraction(double potential, double bond, const double* before_x, const double* before_y,
                double* __restrict x, double* __restrict y) const {
    if (before_x == nullptr) {
      for (std::size_t i = 0; i < count_; ++i) {
        x[i] = -potential;
        y[i] = rule_.nodes[i];
      }
      return;
    }
    const double* __restrict w = rule_.nodes.data();
    for (std::size_t i = 0; i < count_; ++i) {
      const double scale = bond / (before_x[i] * before_x[i] + before_y[i] * before_y[i]);
      x[i] = -potential - scale * before_x[i];
      y[i] = w[i] + scale * before_y[i];
    }
  }

  double row_sum(const double* x, const double* y, double bond) const {
    double sum = 0;
    for (std::size_t i = 0; i < count_; ++i) {
      double u = x[i], v = y[i];
      if (bond != 0) {
        const double r = above_real_[i], s = above_imaginary_[i];
        const double scale = bond / (r * r + s * s);
        u -= scale * r;
        v += scale * s;
      }
      sum += rule_.weights[i] * u / (u * u + v * v);
    }
    return sum;
  }

  const Rule& rule_;
  const std::vector<double>& potential_;
  std::size_t count_;
  std::vector<double> real_, imaginary_;
  std::vector<double> above_real_, above_imaginary_;
};

}  // namespace

std::vector<double> row_occupations(int chains, double hopping_eV,
                                    const std::vector<double>& potential_eV,
                                    const OccupationGrid& grid) {
  const Rule frequencies = frequency_rule(grid, hopping_eV);
  const Rule waves = wave_rule(grid, hopping_eV);
  const std::size_t rows = 2 * static_cast<std::size_t>(chains);
  const int count = static_cast<int>(waves.nodes.size());
  std::vector<double> sums(rows * waves.nodes.size());
  // Below this, waking threads costs more than they save.
  const double steps = double(count) * double(rows) * double(frequencies.nodes.size());
  const int threads = steps < 2e7 ? 1 : inner_threads();
#pragma omp parallel num_threads(threads)
  {
    GreenSum green(frequencies, potential_eV);
#pragma omp for schedule(static)
    for (int i = 0; i < count; ++i)
      green.run(2 * hopping_eV * std::cos(0.5 * waves.nodes[i] * lattice_nm), hopping_eV,
                &sums[i * rows]);
  }
  std::vector<double> occupations(rows, 0.5);
  for (int i = 0; i < count; ++i)
    for (std::size_t j = 0; j < rows; ++j)
      occupations[j] += waves.weights[i] * sums[i * rows + j] / pi;
  return occupations;
}

}  // namespace gapwright
