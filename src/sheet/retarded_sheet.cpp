#include <gapwright/sheet/retarded_sheet.hpp>

namespace gapwright {

RetardedSheet retarded_carbon_sheet(const FlatResponse& flat, const Background& background,
                                    const Nodes& nodes, IndexRange wave) {
  RetardedSheet sheet{nodes, wave, flat.xi(), {}, {}};
  const std::size_t frequencies = std::size_t(sheet.xi.count);
  sheet.strength_nm.resize(std::size_t(wave.count) * frequencies);
  std::vector<double> in_plane;
  for (int k = 0; k < sheet.xi.count; ++k) {
    const double xi = nodes.xi.node(sheet.xi.first + k);
    in_plane.push_back(background.in_plane_nm(xi));
    sheet.normal_nm.push_back(background.normal_nm(xi));
  }
  for (int j = 0; j < wave.count; ++j) {
    const std::span<double> row(sheet.strength_nm.data() + std::size_t(j) * frequencies,
                                frequencies);
    flat.strength_nm(nodes.q.node(wave.first + j), row);
    for (std::size_t k = 0; k < frequencies; ++k) row[k] += in_plane[k];
  }
  return sheet;
}

}  // namespace gapwright
