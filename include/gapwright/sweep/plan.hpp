// What a sweep is asked for: a plan file or flags.
#pragma once

#include <gapwright/lattice/candidates.hpp>
#include <gapwright/pair/binder.hpp>

#include <cstddef>
#include <cstdint>
#include <filesystem>
#include <optional>
#include <string>
#include <utility>
#include <vector>

namespace gapwright {

struct Plan {
  std::string title;
  Arrangement arrangement = Arrangement::coaxial;
  TubeFilter tubes;                           ///< both tubes of a row, unless fixed
  std::optional<Interval> inner_diameter_nm;  ///< narrows the inner wall
  std::optional<Interval> outer_diameter_nm;  ///< narrows the outer wall
  std::optional<Tube> inner;                  ///< one fixed tube
  std::optional<Tube> outer;
  std::optional<Interval> gap_nm;      ///< coaxial; none: usual_gaps_nm
  std::optional<Tube> with;            ///< parallel: pairs that hold this tube
  std::optional<double> fixed_gap_nm;  ///< parallel; none: the bottom of each pair's well
  Settings settings;
  std::string sort;                ///< field to sort by; empty: the order of the arrangement
  int top = 0;                     ///< rows to show; 0: all
  std::vector<std::string> notes;  ///< e.g. that a label was taken as its mirror image
};

/// Gaps of coaxial pairs that a plan takes when it does not say.
inline constexpr Interval usual_gaps_nm{0.30, 0.40};

/// Ranges a plan or a flag may ask for.
inline constexpr double max_gap_nm = 10.0;
inline constexpr double max_index = 256;  ///< beyond any tube of 20 nm

/// One tube from its label, "(10,10)"; notes go to `notes`. Throws InputError naming `where` for
/// walls in walls and for anything that is no tube.
Tube parse_single_tube(const std::string& label, const std::string& where,
                       std::vector<std::string>& notes);

/// The arrangement of a plan: coaxial or parallel. Throws InputError for another word.
Arrangement sweep_arrangement(std::string_view word);

/// A key of the plan that has no meaning in its arrangement.
struct Misplaced {
  std::string key;
  std::string what;
  std::string expected;
};
std::optional<Misplaced> misplaced_key(const Plan& plan);

/// A range of the index n from its bounds. Throws InputError unless both are whole.
Interval index_interval(double low, double high);

/// Reads a plan. Unknown keys, wrong types, names that are in no catalogue and values out of range
/// throw InputError with file, line, text, caret and the nearest key.
Plan read_plan(const std::filesystem::path& file, const Catalogs& catalogs);

/// The plan as TOML text, settings included: what a store and an export say of their making.
std::string plan_text(const Plan& plan);

/// The rows of a plan in a fixed order. Coaxial: outer tube by diameter, then inner tube by
/// diameter. Parallel: every unordered pair, like ones included, the thinner tube first, in tiles
/// of 64 × 64 tubes, so that what is kept of them serves a whole tile.
class PlanRows {
 public:
  /// Throws InputError when there is none, saying which bound is to blame, or when a key of the
  /// plan has no meaning in its arrangement.
  explicit PlanRows(const Plan& plan);

  std::size_t size() const { return pairs_.size(); }
  Placement operator[](std::size_t row) const;
  /// Parallel: the thinner tube, the wider one.
  const Tube& inner(std::size_t row) const { return inner_[pairs_[row].first]; }
  const Tube& outer(std::size_t row) const { return outer_[pairs_[row].second]; }

 private:
  void pair_coaxial(const Plan& plan);
  void pair_parallel(const Plan& plan);

  Arrangement arrangement_;
  std::optional<double> gap_nm_;
  std::vector<Tube> inner_;
  std::vector<Tube> outer_;
  std::vector<std::pair<std::uint32_t, std::uint32_t>> pairs_;  // inner, outer
};

/// Two tubes side by side as a sweep places them: the thinner one first.
Placement side_by_side(const Tube& first, const Tube& second, std::optional<double> gap_nm);

/// Key of one row in a store: hash of the bodies, placement and settings key.
std::string row_key(const Placement& placement, const std::string& settings_key);

}  // namespace gapwright
