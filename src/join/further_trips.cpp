#include "further_trips.hpp"

#include <algorithm>
#include <cmath>

namespace gapwright {
namespace {

/// A trace below this bounds the largest eigenvalue well enough.
constexpr double small_trace = 0.1;

/// Largest of the frequencies of a block, or a negative number when one of them is negative.
double largest(const double* values, const MultipoleBlock& block) {
  double most = 0.0;
  for (int k = block.start; k < block.start + block.frequencies; ++k) {
    if (values[k] < 0) return -1.0;
    most = std::max(most, values[k]);
  }
  return most;
}

/// Roots of the largest T of each row or column; false when one is negative.
bool roots(const double* const* t, int count, const MultipoleBlock& block,
           std::vector<double>& root) {
  root.resize(std::size_t(count));
  for (std::size_t i = 0; i < root.size(); ++i) {
    const double most = largest(t[i], block);
    if (!(most >= 0)) return false;
    root[i] = std::sqrt(most);
  }
  return true;
}

/// λ <= |G|₁|G|_∞ of G = √T₁ c √T₂, whose T are the largest of the frequencies: X rises with
/// either.
double largest_eigenvalue(const MultipoleBlock& block, const std::vector<double>& first,
                          const std::vector<double>& second) {
  std::vector<double> column(second.size());
  double row_sum = 0.0;
  for (int i = 0; i < block.rows; ++i) {
    double row = 0.0;
    for (int k = 0; k < block.columns; ++k) {
      const double g = first[std::size_t(i)] * second[std::size_t(k)] *
                       std::fabs(block.coupling[i * block.stride + k]);
      row += g;
      column[std::size_t(k)] += g;
    }
    row_sum = std::max(row_sum, row);
  }
  return row_sum * *std::max_element(column.begin(), column.end());
}

/// How many leading parts must stay so that none of the frequencies loses more than allowed/factor.
int leading(const double* shares, int count, const MultipoleBlock& block, double factor,
            const std::vector<double>& allowed) {
  int most = 0;
  for (int k = block.start; k < block.start + block.frequencies; ++k) {
    double left_out = 0.0;
    int needed = count;
    while (needed > most) {
      left_out += shares[(needed - 1) * block.share_stride + k];
      if (factor * left_out > allowed[std::size_t(k)]) break;
      --needed;
    }
    most = std::max(most, needed);
  }
  return most;
}

}  // namespace

LeadingPart leading_part(const MultipoleBlock& block, const std::vector<double>& allowed) {
  const LeadingPart whole{block.rows, block.columns};
  std::vector<double> first, second;
  if (!roots(block.first, block.rows, block, first) ||
      !roots(block.second, block.columns, block, second))
    return whole;
  std::vector<double> traces(std::size_t(block.frequencies));
  for (int i = 0; i < block.rows; ++i)
    for (int k = 0; k < block.frequencies; ++k)
      traces[std::size_t(k)] += block.row_share[i * block.share_stride + block.start + k];
  double eigenvalue = *std::max_element(traces.begin(), traces.end());
  if (eigenvalue > small_trace)
    eigenvalue = std::min(eigenvalue, largest_eigenvalue(block, first, second));
  if (!(eigenvalue < 1)) return whole;
  bool matters = false;
  for (int k = 0; k < block.frequencies; ++k) {
    const double t = traces[std::size_t(k)];
    matters = matters || 0.5 * t * t / (1 - eigenvalue) > allowed[std::size_t(block.start + k)];
  }
  if (!matters) return {};
  // Rows and columns share what is allowed.
  const double factor = 2 * 3 * eigenvalue / (1 - eigenvalue);
  return {leading(block.row_share, block.rows, block, factor, allowed),
          leading(block.column_share, block.columns, block, factor, allowed)};
}

}  // namespace gapwright
