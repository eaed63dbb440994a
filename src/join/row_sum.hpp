// Sums over wave numbers that rows share, whatever stands beside them.
#pragma once

#include "rows_kernel.hpp"

#include <gapwright/join/rows.hpp>

#include <functional>
#include <vector>

namespace gapwright {

/// A matrix between point rows [rows][columns] in the mirror's vectors on the left side, where
/// `left` is the number of rows.
void mirror_left(std::vector<double>& matrix, std::size_t left);
/// The same on the right side.
void mirror_right(std::vector<double>& matrix, std::size_t right);

/// The factor of a ribbon at one wave number: one half of it or both, dipoles following charges.
/// `dipole` holds as many equal pointers as there are rows.
RowFactor row_factor(const RowScatterer& body, int j, int xi_shift, bool all, Mirror half,
                     const std::vector<const double*>& dipole);

/// Adds one block, the smaller body first. The coupling [first][second] and its slope (or an empty
/// one) are those of the factors; everything else of the block is set here.
bool add_row_block(const RowFactor& first, const RowFactor& second, int frequencies,
                   std::vector<double> coupling, std::vector<double> slope,
                   std::vector<std::vector<double>>& sums);

/// The lowest wave number of a window of rows; `length_nm` as of lowest_wave.
double lowest_row_wave(double length_nm, double gap_nm, const Nodes& nodes);

/// Adds the blocks of one wave number to four sums: ln det, -trace and their derivatives.
using WaveTerm4 = std::function<bool(int j, std::vector<std::vector<double>>& sums)>;

/// Σ_j weight_j of the terms of all wave numbers, in a fixed order.
RowDensity sum_waves(const LogLattice& lattice, const Window& window, bool with_slope,
                     const WaveTerm4& term);

}  // namespace gapwright
