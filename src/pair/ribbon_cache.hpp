// Responses and scatterers of ribbons, shared by all rows of a Binder.
#pragma once

#include "tube_cache.hpp"

#include <gapwright/lattice/ribbon.hpp>
#include <gapwright/response/ribbon_response.hpp>
#include <gapwright/wire/row_scatterer.hpp>

#include <list>
#include <map>
#include <memory>
#include <mutex>
#include <tuple>
#include <utility>

namespace gapwright {

/// Computes each ribbon's response once, on the largest window asked for so far, and keeps the
/// scatterers used last within a bound. Safe to call from several threads. A response is dropped
/// when its scatterer stands: what is asked for next is mostly the same window.
class RibbonCache {
 public:
  RibbonCache(const Carbon& carbon, const RibbonEdges& edges) : carbon_(carbon), edges_(edges) {}

  /// Announces that the ribbon will be asked for this window.
  void announce(const Ribbon& ribbon, const Window& window);
  /// A scatterer whose window covers the one given.
  std::shared_ptr<const RowScatterer> scatterer(const Ribbon& ribbon, const Window& window);
  double band_gap_eV(const Ribbon& ribbon);

 private:
  // Rows of one frequency range and one lattice of wave numbers share responses; the range's first
  // index stands for it.
  using Key = std::tuple<Ribbon, int, bool>;
  struct Entry {
    std::mutex mutex;
    Window announced;
    std::shared_ptr<const RowScatterer> scatterer;
  };

  Entry& entry(const Key& key);
  void keep_within_bound(const Key& used, std::size_t bytes);

  const Carbon& carbon_;
  RibbonEdges edges_;
  std::mutex mutex_;
  std::map<Key, std::unique_ptr<Entry>> entries_;
  std::list<std::pair<Key, std::size_t>> used_;  // most recent first, with its bytes
  std::map<Ribbon, double> gaps_;
};

}  // namespace gapwright
