#include "ribbon_mean_field.hpp"

#include <gapwright/bands/ribbon_hamiltonian.hpp>
#include <gapwright/catalog/constants.hpp>
#include <gapwright/catalog/input_error.hpp>

#include <cmath>
#include <complex>

#include <fmt/format.h>

namespace gapwright {

namespace {

using Complex = std::complex<double>;

double first_hopping(const Ribbon& ribbon, const HoppingSet& hopping) {
  if (!hopping.nearest_neighbour_only())
    throw InputError({ribbon.label() + " cannot have the hopping set '" + hopping.name + "'",
                      "hopping",
                      {},
                      "a set of first neighbours without overlap: those are what ribbons take",
                      "nearest-neighbour"});
  return std::abs(hopping.hopping_eV.front());
}

}  // namespace

RibbonHamiltonian::RibbonHamiltonian(const Ribbon& ribbon, const HoppingSet& hopping,
                                     const RibbonEdges& edges)
    : ribbon_(ribbon), hopping_eV_(first_hopping(ribbon, hopping)), edges_(edges) {
  if (ribbon_.edge == RibbonEdge::armchair || edges_.repulsion_eV == 0) return;
  MeanField field = ribbon_mean_field(ribbon_.lines, hopping_eV_, edges_.repulsion_eV);
  if (!field.converged)
    throw InputError(
        {fmt::format("the mean field of {} does not settle: its potential still moves "
                     "by {:.1e} eV",
                     ribbon_.label(), field.error_eV),
         "ribbon edges '" + edges_.name + "'",
         {},
         fmt::format("a repulsion for which it settles; U = {} eV at t = {} eV does not",
                     edges_.repulsion_eV, hopping_eV_),
         {}});
  potential_eV_ = std::move(field.potential_eV);
  potential_error_eV_ = field.error_eV;
}

int RibbonHamiltonian::sector_size(int sector) const {
  if (ribbon_.edge == RibbonEdge::zigzag) return ribbon_.rows();
  return 2 * ((ribbon_.lines + 1 - sector) / 2);
}

BandMatrix RibbonHamiltonian::matrix(int sector, double k_per_nm) const {
  return ribbon_.edge == RibbonEdge::armchair ? armchair(sector, k_per_nm, false)
                                              : zigzag(k_per_nm, false);
}

BandMatrix RibbonHamiltonian::slope(int sector, double k_per_nm) const {
  return ribbon_.edge == RibbonEdge::armchair ? armchair(sector, k_per_nm, true)
                                              : zigzag(k_per_nm, true);
}

// F = t(e^{ika_cc} D + e^{-ika_cc/2} J): D the dimers, J the neighbouring rows (METHODS 2.5).
BandMatrix RibbonHamiltonian::armchair(int sector, double k, bool slope) const {
  const double bond = constants::bond_nm;
  const Complex unit(0, 1);
  const Complex dimer =
      hopping_eV_ * std::exp(unit * (k * bond)) * (slope ? unit * bond : Complex(1));
  const Complex across =
      hopping_eV_ * std::exp(-0.5 * unit * (k * bond)) * (slope ? -0.5 * unit * bond : Complex(1));
  const int size = sector_size(sector), rows = size / 2;
  const bool odd_lines = ribbon_.lines % 2 != 0;
  BandMatrix h(size, 3);
  for (int j = 0; j < rows; ++j) {
    Complex within = (j == 0 ? edges_.edge_bond : 1.0) * dimer;
    if (!odd_lines && j == rows - 1) within += sector == 0 ? across : -across;
    h.at(2 * j, 0) = within.real();
    h.at(2 * j + 1, 0) = -within.real();
    h.at(2 * j, 1) = within.imag();
    if (j == rows - 1) break;
    const bool to_middle = odd_lines && sector == 0 && j == rows - 2;
    const Complex next = to_middle ? std::sqrt(2.0) * across : across;
    h.at(2 * j, 2) = next.real();
    h.at(2 * j + 1, 2) = -next.real();
    h.at(2 * j, 3) = next.imag();
    h.at(2 * j + 1, 1) = next.imag();
  }
  return h;
}

BandMatrix RibbonHamiltonian::zigzag(double k, bool slope) const {
  const double half = 0.5 * constants::lattice_nm;
  const double chain = 2 * hopping_eV_ * (slope ? -half * std::sin(k * half) : std::cos(k * half));
  BandMatrix h(ribbon_.rows(), 1);
  for (int j = 0; j < h.size; ++j) {
    if (!slope && !potential_eV_.empty()) h.at(j, 0) = potential_eV_[j];
    if (j + 1 < h.size) h.at(j, 1) = j % 2 == 0 ? chain : (slope ? 0.0 : hopping_eV_);
  }
  return h;
}

}  // namespace gapwright
