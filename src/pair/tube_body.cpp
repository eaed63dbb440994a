#include "tube_body.hpp"

namespace gapwright {

std::shared_ptr<const Scatterer> body_scatterer(const TubeObject& object, Electrons electrons,
                                                const Window& window, TubeCache& cache) {
  const auto part = [&](const Tube& wall, Channel channel) {
    return cache.scatterer(wall, channel, electrons, window);
  };
  std::shared_ptr<const Scatterer> inside = part(object.walls.front(), Channel::outward);
  for (std::size_t k = 1; k < object.walls.size(); ++k) {
    const Tube& wall = object.walls[k];
    inside = std::make_shared<const Scatterer>(enclosed(*inside, *part(wall, Channel::outward),
                                                        *part(wall, Channel::inward),
                                                        *part(wall, Channel::through), window));
  }
  return inside;
}

}  // namespace gapwright
