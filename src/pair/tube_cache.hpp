// Responses and scatterers of tubes, shared by all rows of a Binder.
#pragma once

#include <gapwright/bands/tube_bands.hpp>
#include <gapwright/catalog/entries.hpp>
#include <gapwright/catalog/media.hpp>
#include <gapwright/response/flat_response.hpp>
#include <gapwright/shell/scatterer.hpp>

#include <list>
#include <map>
#include <memory>
#include <mutex>
#include <optional>
#include <tuple>

namespace gapwright {

/// The carbon of a Binder: what every body's response depends on.
struct Carbon {
  HoppingSet hopping;
  Background background;
  Conditions conditions;
  Nodes nodes;
  Medium medium{};  ///< around all bodies

  bool in_vacuum() const { return medium.name == Medium{}.name; }
};

/// Whose π electrons a shell has.
enum class Electrons { own, flat };

/// What stands outside a wall; inside is vacuum.
enum class Outside { vacuum, medium };

/// Computes each tube's response on the largest window asked for so far; responses and scatterers
/// are kept in stores of bounded size, the least recently used one leaves first. Safe to call from
/// several threads.
class TubeCache {
 public:
  explicit TubeCache(const Carbon& carbon) : carbon_(carbon) {}

  /// Announces that the tube will be asked for this window.
  void announce(const Tube& tube, const Window& window);
  /// Computes the response of contact rows now, if it is announced and not there.
  void warm(const Tube& tube);

  /// A scatterer whose window covers the one given.
  std::shared_ptr<const Scatterer> scatterer(const Tube& tube, Channel channel, Electrons electrons,
                                             const Window& window,
                                             Outside outside = Outside::vacuum);
  /// The response itself, with own or flat π electrons, on a window that covers the one given.
  std::shared_ptr<const ShellResponse> shell(const Tube& tube, Electrons electrons,
                                             const Window& window);
  TubeGaps gaps(const Tube& tube);

  /// The flat sheet's response on waves that any tube's cells need at these frequencies.
  const FlatResponse& flat(IndexRange xi) { return *shared_flat(xi); }
  std::shared_ptr<const FlatResponse> shared_flat(IndexRange xi);

 private:
  struct Entry {
    std::mutex mutex;
    Window announced;
    std::shared_ptr<const ShellResponse> response;
    std::size_t bytes = 0;                             // of the response; guarded by used_mutex_,
    std::optional<std::list<Entry*>::iterator> place;  // as is its place among used_
  };
  // Rows of one frequency range and one lattice of wave numbers share responses; the range's first
  // index stands for it.
  using EntryKey = std::tuple<Chirality, int, bool>;
  using Key = std::tuple<EntryKey, Channel, Electrons, Outside>;
  struct Kept {
    Key key;
    std::shared_ptr<const Scatterer> scatterer;
  };

  Entry& entry(const Tube& tube, const Window& window);
  std::shared_ptr<const ShellResponse> response(const Tube& tube, const Window& window);
  void note_use(Entry& e);
  void drop_oldest(const Entry& keep);
  std::shared_ptr<const Scatterer> kept(const Key& key, const Window& window);
  void keep(const Key& key, std::shared_ptr<const Scatterer> scatterer);

  const Carbon& carbon_;
  std::mutex entries_mutex_;
  std::map<EntryKey, std::unique_ptr<Entry>> entries_;
  std::map<Chirality, TubeGaps> gaps_;
  std::mutex used_mutex_;
  std::list<Entry*> used_;  // entries with a response, most recent first
  std::size_t response_bytes_ = 0;
  std::mutex kept_mutex_;
  std::list<Kept> kept_;  // most recent first
  std::map<Key, std::list<Kept>::iterator> kept_index_;
  std::size_t kept_bytes_ = 0;
  std::mutex flat_mutex_;
  std::map<int, std::shared_ptr<const FlatResponse>> flat_;
};

}  // namespace gapwright
