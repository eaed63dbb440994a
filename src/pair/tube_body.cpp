#include "tube_body.hpp"

namespace gapwright {

std::shared_ptr<const Scatterer> body_scatterer(const TubeObject& object, Electrons electrons,
                                                const Window& window, TubeCache& cache) {
  const auto part = [&](std::size_t wall, Channel channel) {
    const bool outermost = wall + 1 == object.walls.size();
    return cache.scatterer(object.walls[wall], channel, electrons, window,
                           outermost ? Outside::medium : Outside::vacuum);
  };
  std::shared_ptr<const Scatterer> inside = part(0, Channel::outward);
  for (std::size_t k = 1; k < object.walls.size(); ++k)
    inside = std::make_shared<const Scatterer>(enclosed(*inside, *part(k, Channel::outward),
                                                        *part(k, Channel::inward),
                                                        *part(k, Channel::through), window));
  return inside;
}

}  // namespace gapwright
