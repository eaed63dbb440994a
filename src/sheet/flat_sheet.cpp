#include <gapwright/sheet/flat_sheet.hpp>

#include <stdexcept>

namespace gapwright {

SheetScatterer carbon_sheet(const FlatResponse& flat, const Background& background,
                            const Nodes& nodes, IndexRange wave) {
  SheetScatterer sheet{nodes, wave, flat.xi(), {}};
  const std::size_t frequencies = std::size_t(sheet.xi.count);
  sheet.reflection.resize(std::size_t(wave.count) * frequencies);
  std::vector<double> strength(frequencies);
  for (int j = 0; j < wave.count; ++j) {
    const double q = nodes.q.node(wave.first + j);
    flat.strength_nm(q, strength);
    for (std::size_t k = 0; k < frequencies; ++k) {
      const double xi = nodes.xi.node(sheet.xi.first + int(k));
      const double half = 0.5 * q * (strength[k] + background.in_plane_nm(xi));
      sheet.reflection[std::size_t(j) * frequencies + k] =
          half / (1 + half) + 0.5 * q * background.normal_nm(xi);
    }
  }
  return sheet;
}

}  // namespace gapwright
