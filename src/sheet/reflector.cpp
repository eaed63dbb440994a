#include <gapwright/sheet/reflector.hpp>

#include <algorithm>

namespace gapwright {

CarbonReflector::CarbonReflector(std::shared_ptr<const FlatResponse> flat,
                                 const Background& background, const Nodes& nodes)
    : flat_(std::move(flat)) {
  for (int k = 0; k < flat_->xi().count; ++k) {
    const double xi = nodes.xi.node(flat_->xi().first + k);
    in_plane_.push_back(background.in_plane_nm(xi));
    normal_.push_back(background.normal_nm(xi));
  }
}

void CarbonReflector::reflection(double /*axial*/, double wave, std::span<double> out) const {
  flat_->strength_nm(wave, out);
  for (std::size_t k = 0; k < out.size(); ++k) {
    const double half = 0.5 * wave * (out[k] + in_plane_[k]);
    out[k] = half / (1 + half) + 0.5 * wave * normal_[k];
  }
}

HalfSpaceReflector::HalfSpaceReflector(const Medium& body, const Medium& outside,
                                       const Nodes& nodes, IndexRange xi)
    : xi_(xi) {
  for (int k = 0; k < xi.count; ++k) {
    const double at = nodes.xi.node(xi.first + k);
    const double inside = body.permittivity(at), around = outside.permittivity(at);
    reflection_.push_back((inside - around) / (inside + around));
  }
}

void HalfSpaceReflector::reflection(double /*axial*/, double /*wave*/,
                                    std::span<double> out) const {
  std::copy(reflection_.begin(), reflection_.end(), out.begin());
}

}  // namespace gapwright
