#include "ribbon_cache.hpp"

#include <gapwright/bands/ribbon_bands.hpp>
#include <gapwright/join/density.hpp>

#include <algorithm>

namespace gapwright {
namespace {

constexpr std::size_t scatterer_bytes = std::size_t(300) << 20;

}  // namespace

RibbonCache::Entry& RibbonCache::entry(const Key& key) {
  const std::lock_guard lock(mutex_);
  auto& slot = entries_[key];
  if (!slot) slot = std::make_unique<Entry>();
  return *slot;
}

void RibbonCache::announce(const Ribbon& ribbon, const Window& window) {
  Entry& e = entry({ribbon, window.xi.first, window.fine});
  const std::lock_guard lock(e.mutex);
  e.announced = e.announced.q.count == 0 ? window : united(e.announced, window);
}

std::shared_ptr<const RowScatterer> RibbonCache::scatterer(const Ribbon& ribbon,
                                                           const Window& window) {
  Entry& e = entry({ribbon, window.xi.first, window.fine});
  std::shared_ptr<const RowScatterer> found;
  {
    const std::lock_guard lock(e.mutex);
    const auto covers = [&](const Window& have) {
      return have.q.contains(window.q) && have.xi.contains(window.xi);
    };
    if (!e.scatterer || !covers(e.scatterer->window())) {
      e.announced = e.announced.q.count == 0 ? window : united(e.announced, window);
      const RibbonHamiltonian hamiltonian(ribbon, carbon_.hopping, edges_);
      const RibbonResponse response =
          ribbon_response(hamiltonian, carbon_.conditions, nodes_on(window, carbon_.nodes),
                          e.announced.q, e.announced.xi);
      e.scatterer = std::make_shared<const RowScatterer>(
          row_scatterer(response, carbon_.background, e.announced));
    }
    found = e.scatterer;
  }
  keep_within_bound({ribbon, window.xi.first, window.fine}, found->bytes());
  return found;
}

void RibbonCache::keep_within_bound(const Key& used, std::size_t bytes) {
  const std::lock_guard lock(mutex_);
  std::erase_if(used_, [&](const auto& item) { return item.first == used; });
  used_.push_front({used, bytes});
  std::size_t sum = 0;
  for (auto item = used_.begin(); item != used_.end();) {
    sum += item->second;
    if (sum <= scatterer_bytes || item == used_.begin()) {
      ++item;
      continue;
    }
    Entry& e = *entries_.at(item->first);
    // One that is being computed stays: its turn to be counted comes.
    if (const std::unique_lock lock_entry(e.mutex, std::try_to_lock); lock_entry.owns_lock())
      e.scatterer.reset();
    item = used_.erase(item);
  }
}

double RibbonCache::band_gap_eV(const Ribbon& ribbon) {
  {
    const std::lock_guard lock(mutex_);
    if (const auto found = gaps_.find(ribbon); found != gaps_.end()) return found->second;
  }
  const double gap = ribbon_gaps(RibbonHamiltonian(ribbon, carbon_.hopping, edges_)).band_gap_eV;
  const std::lock_guard lock(mutex_);
  return gaps_.emplace(ribbon, gap).first->second;
}

}  // namespace gapwright
