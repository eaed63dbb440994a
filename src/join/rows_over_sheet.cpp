#include "row_face.hpp"

#include <gapwright/catalog/constants.hpp>
#include <gapwright/join/coaxial.hpp>
#include <gapwright/join/rows_over_sheet.hpp>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include <fmt/format.h>

namespace gapwright {
namespace {

/// Phase that cos[k_⊥(y_j - y_j')] of the edge rows may turn by from one wave to the next where the
/// waves matter most, k = 1/gap: the sum over rows leaves little of it.
constexpr double largest_phase = 1.5;

}  // namespace

RowsOverSheetDensity rows_over_sheet_density(const RowScatterer& ribbon, const Reflector& sheet,
                                             double gap_nm, const Window& window, bool with_slope) {
  if (!(gap_nm > 0) || !std::isfinite(gap_nm))
    throw std::domain_error(
        fmt::format("rows_over_sheet_density: gap = {} nm, required: > 0", gap_nm));
  if (!sheet.xi().contains(window.xi))
    throw std::invalid_argument("rows_over_sheet_density: a sheet on the window is required");
  const RowFace face(ribbon, window);
  const Nodes& nodes = ribbon.nodes();
  const std::size_t frequencies = std::size_t(window.xi.count);
  const AxisWeights weights = trapezoid_weights(nodes.q, window.q, {});
  const double width = ribbon.rows().back().y_nm - ribbon.rows().front().y_nm;
  const double step = std::min(nodes.q.step, largest_phase * gap_nm / width);
  const double highest = largest_exponent(nodes.tolerance) / (2 * gap_nm);

  RowsOverSheetDensity density;
  density.first_slope.derivatives = 1;
  for (FrequencyDensity* part : {&density.first_round_trip, &density.first_slope}) {
    if (part == &density.first_slope && !with_slope) continue;
    part->full.assign(frequencies, 0.0);
    part->halved.assign(frequencies, 0.0);
  }
  std::vector<double> mirror(frequencies), whole_sheet(std::size_t(sheet.xi().count));
  const std::size_t xi = std::size_t(window.xi.first - sheet.xi().first);
  for (int j = 0; j < window.q.count; ++j) {
    const double q = nodes.q.node(window.q.first + j);
    for (int i = 0; i == 0 || q * std::cosh(i * step) <= highest; ++i) {
      const double k = q * std::cosh(i * step);
      face.at_node(j, k, q * std::sinh(i * step), mirror);
      sheet.reflection(q, k, whole_sheet);
      // Both signs of q and k_⊥, dk_⊥ = k dη: -(1/π²) dq dη e^{-2kD}·π·(k/π)r̃·r.
      const double factor =
          -(i == 0 ? 0.5 : 1.0) * step / constants::pi * std::exp(-2 * k * gap_nm);
      const auto add = [&](FrequencyDensity& part, double more) {
        for (std::size_t x = 0; x < frequencies; ++x) {
          const double value = more * factor * mirror[x] * whole_sheet[xi + x];
          part.full[x] += weights.full[std::size_t(j)] * value;
          // Every other wave of every other node.
          if (i % 2 == 0) part.halved[x] += 2 * weights.halved[std::size_t(j)] * value;
        }
      };
      add(density.first_round_trip, 1.0);
      if (with_slope) add(density.first_slope, -2 * k);
    }
  }
  return density;
}

}  // namespace gapwright
