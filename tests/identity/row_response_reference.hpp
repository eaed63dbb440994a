// The response of an armchair ribbon by the plain sum over transitions, for tests of what follows.
#pragma once

#include <gapwright/catalog/constants.hpp>
#include <gapwright/lattice/ribbon.hpp>
#include <gapwright/math/nodes.hpp>
#include <gapwright/wire/row_scatterer.hpp>

#include <cmath>
#include <complex>
#include <map>
#include <vector>

#include <Eigen/Dense>

/// χ_jj'(q, iξ) = 2∫dk/2π Σ 2(E_v - E_c)/((E_c - E_v)² + ξ²) ρ_jρ_j'*, T = 0, undoped, by a uniform
/// sum over k with Bloch phases of the atoms' own positions; hopping 2.7 eV, edge dimers
/// times 1.12.
class RowResponseReference {
 public:
  RowResponseReference(int lines, int waves, gapwright::Nodes nodes, double edge_bond = 1.12)
      : lines_(lines), waves_(waves), nodes_(nodes), edge_bond_(edge_bond) {}

  void operator()(int q_index, gapwright::IndexRange xi, std::span<double> chi) const {
    at(nodes_.q.node(q_index), xi, chi);
  }

  void at(double q, gapwright::IndexRange xi, std::span<double> chi) const {
    const std::size_t frequencies = std::size_t(xi.count), n = std::size_t(lines_);
    std::fill(chi.begin(), chi.end(), 0.0);
    const double zone = 2 * M_PI / (3 * gapwright::constants::bond_nm);
    for (int step = 0; step < waves_; ++step) {
      const double k = zone * (step + 0.5) / waves_ - 0.5 * zone;
      const States from = states(k), to = states(k + q);
      for (int v = 0; v < lines_; ++v)
        for (int c = lines_; c < 2 * lines_; ++c) {
          // v(k) to c(k+q), and v(k+q) to c(k).
          add(from, v, to, c, zone / waves_, xi, chi, frequencies, n);
          add(to, v, from, c, zone / waves_, xi, chi, frequencies, n);
        }
    }
  }

 private:
  using States = Eigen::SelfAdjointEigenSolver<Eigen::MatrixXcd>;

  States states(double k) const {
    using namespace gapwright::constants;
    const std::complex<double> i(0, 1);
    Eigen::MatrixXcd h = Eigen::MatrixXcd::Zero(2 * lines_, 2 * lines_);
    const double t = 2.7;
    for (int j = 0; j < lines_; ++j) {
      const double edge = j == 0 || j == lines_ - 1 ? edge_bond_ : 1.0;
      // Left and right atom of a dimer; rows alternate by half a period.
      h(2 * j, 2 * j + 1) += -t * edge * std::exp(i * k * bond_nm);
      if (j + 1 == lines_) break;
      // The right atom bonds to the next row's left one half a bond further right, and the left
      // one to the next row's right one as much to the left.
      h(2 * j + 1, 2 * j + 2) += -t * std::exp(i * k * 0.5 * bond_nm);
      h(2 * j, 2 * j + 3) += -t * std::exp(-i * k * 0.5 * bond_nm);
    }
    const Eigen::MatrixXcd whole = h + h.adjoint();
    return States(whole);
  }

  void add(const States& a, int v, const States& b, int c, double dk, gapwright::IndexRange xi,
           std::span<double> chi, std::size_t frequencies, std::size_t n) const {
    std::vector<std::complex<double>> rho(n);
    for (std::size_t j = 0; j < n; ++j)
      for (std::size_t atom = 2 * j; atom < 2 * j + 2; ++atom)
        rho[j] += std::conj(a.eigenvectors()(Eigen::Index(atom), v)) *
                  b.eigenvectors()(Eigen::Index(atom), c);
    const double gap = b.eigenvalues()(c) - a.eigenvalues()(v);
    for (std::size_t x = 0; x < frequencies; ++x) {
      const double w = nodes_.xi.node(xi.first + int(x));
      const double factor = -2 * dk / (2 * M_PI) * gap / (gap * gap + w * w);
      for (std::size_t j = 0; j < n; ++j)
        for (std::size_t l = 0; l < n; ++l)
          chi[(j * n + l) * frequencies + x] += factor * (rho[j] * std::conj(rho[l])).real();
    }
  }

  int lines_, waves_;
  gapwright::Nodes nodes_;
  double edge_bond_;
};
