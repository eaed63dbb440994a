#include "tube_cache.hpp"

#include <gapwright/join/coaxial.hpp>

#include <utility>

namespace gapwright {
namespace {

constexpr std::size_t scatterer_bytes = std::size_t(300) << 20;
// Walls of one diameter after the other, as sweeps visit them, fit into this at 20 nm, too.
constexpr std::size_t response_bytes = std::size_t(600) << 20;

// Waves of the cells of any tube: q down to that of a 20 nm wide tube; at the largest round-trip
// exponent x of a gap of 0.2 nm or more, Q stays below about 4x.
constexpr double widest_radius_nm = 10.0;
constexpr double farthest_nm = 1e4;
constexpr double flat_highest_per_exponent = 4.0;

std::size_t bytes_of(const ShellResponse& response) {
  return response.window().cells() * std::size_t(response.window().xi.count) * sizeof(double);
}

}  // namespace

TubeCache::Entry& TubeCache::entry(const Tube& tube, const Window& window) {
  const std::lock_guard lock(entries_mutex_);
  auto& slot = entries_[{tube.chirality, window.xi.first, window.fine}];
  if (!slot) slot = std::make_unique<Entry>();
  return *slot;
}

void TubeCache::announce(const Tube& tube, const Window& window) {
  Entry& e = entry(tube, window);
  const std::lock_guard lock(e.mutex);
  e.announced = e.announced.q.count == 0 ? window : united(e.announced, window);
}

void TubeCache::warm(const Tube& tube) {
  Window nothing;
  nothing.xi = contact_frequencies(carbon_.nodes);
  response(tube, nothing);
}

std::shared_ptr<const ShellResponse> TubeCache::response(const Tube& tube, const Window& window) {
  Entry& e = entry(tube, window);
  const std::lock_guard lock(e.mutex);
  if (e.response && e.response->window().covers(window)) {
    note_use(e);
    return e.response;
  }
  if (window.q.count > 0)
    e.announced = e.announced.q.count == 0 ? window : united(e.announced, window);
  if (e.announced.q.count == 0) return nullptr;
  e.response = std::make_shared<const ShellResponse>(tube_response(
      tube, carbon_.hopping, carbon_.conditions, nodes_on(window, carbon_.nodes), e.announced));
  note_use(e);
  drop_oldest(e);
  return e.response;
}

void TubeCache::note_use(Entry& e) {
  const std::lock_guard lock(used_mutex_);
  response_bytes_ -= e.bytes;
  e.bytes = bytes_of(*e.response);
  response_bytes_ += e.bytes;
  if (e.place)
    used_.splice(used_.begin(), used_, *e.place);
  else
    used_.push_front(&e);
  e.place = used_.begin();
}

void TubeCache::drop_oldest(const Entry& keep) {
  const std::lock_guard lock(used_mutex_);
  for (auto place = used_.end(); response_bytes_ > response_bytes && place != used_.begin();) {
    Entry& oldest = **--place;
    if (&oldest == &keep) continue;
    // One that another thread is at is in use.
    const std::unique_lock free(oldest.mutex, std::try_to_lock);
    if (!free) continue;
    oldest.response.reset();
    response_bytes_ -= std::exchange(oldest.bytes, 0);
    oldest.place.reset();
    place = used_.erase(place);
  }
}

TubeGaps TubeCache::gaps(const Tube& tube) {
  {
    const std::lock_guard lock(entries_mutex_);
    if (const auto found = gaps_.find(tube.chirality); found != gaps_.end()) return found->second;
  }
  const TubeGaps gaps = tube_gaps(tube, carbon_.hopping);
  const std::lock_guard lock(entries_mutex_);
  return gaps_.emplace(tube.chirality, gaps).first->second;
}

std::shared_ptr<const FlatResponse> TubeCache::shared_flat(IndexRange xi) {
  const std::lock_guard lock(flat_mutex_);
  auto& flat = flat_[xi.first];
  // Ranges towards small frequencies are those of far bodies, whose waves are as much longer. At
  // T > 0 all rows share one range.
  const Nodes& nodes = carbon_.nodes;
  const double contact = 0.5 * lowest_wave(widest_radius_nm, nodes.tolerance);
  const double lowest = nodes.warm() ? 0.5 * lowest_static_wave(farthest_nm, nodes.tolerance)
                                     : contact * nodes.xi.node(xi.first) /
                                           nodes.xi.node(contact_frequencies(nodes).first);
  if (!flat)
    flat = std::make_shared<const FlatResponse>(
        carbon_.hopping, carbon_.conditions, carbon_.nodes, xi, lowest,
        flat_highest_per_exponent * largest_exponent(carbon_.nodes.tolerance));
  return flat;
}

std::shared_ptr<const Scatterer> TubeCache::kept(const Key& key, const Window& window) {
  const std::lock_guard lock(kept_mutex_);
  const auto found = kept_index_.find(key);
  if (found == kept_index_.end() || !found->second->scatterer->window().covers(window))
    return nullptr;
  kept_.splice(kept_.begin(), kept_, found->second);
  return found->second->scatterer;
}

void TubeCache::keep(const Key& key, std::shared_ptr<const Scatterer> scatterer) {
  const std::lock_guard lock(kept_mutex_);
  if (const auto found = kept_index_.find(key); found != kept_index_.end()) {
    kept_bytes_ -= found->second->scatterer->bytes();
    kept_.erase(found->second);
    kept_index_.erase(found);
  }
  kept_bytes_ += scatterer->bytes();
  kept_.push_front({key, std::move(scatterer)});
  kept_index_[key] = kept_.begin();
  while (kept_bytes_ > scatterer_bytes && kept_.size() > 1) {
    kept_bytes_ -= kept_.back().scatterer->bytes();
    kept_index_.erase(kept_.back().key);
    kept_.pop_back();
  }
}

std::shared_ptr<const Scatterer> TubeCache::scatterer(const Tube& tube, Channel channel,
                                                      Electrons electrons, const Window& window,
                                                      Outside outside) {
  if (carbon_.in_vacuum()) outside = Outside::vacuum;
  const Key key{{tube.chirality, window.xi.first, window.fine}, channel, electrons, outside};
  if (auto found = kept(key, window)) return found;
  const auto response = shell(tube, electrons, window);
  const Window& whole = response->window();
  const auto made = std::make_shared<const Scatterer>(
      outside == Outside::vacuum
          ? shell_scatterer(channel, *response, carbon_.background, whole)
          : liquid_shell_scatterer(channel, *response, carbon_.background, carbon_.medium, whole));
  keep(key, made);
  return made;
}

std::shared_ptr<const ShellResponse> TubeCache::shell(const Tube& tube, Electrons electrons,
                                                      const Window& window) {
  auto own = response(tube, window);
  if (electrons == Electrons::own) return own;
  const Window& whole = own->window();
  return std::make_shared<const ShellResponse>(
      flat_shell_response(flat(whole.xi), tube.radius_nm, own->nodes(), whole));
}

}  // namespace gapwright
