// Running a plan: tasks over pairs, one writer, resumable.
#pragma once

#include <gapwright/pair/binder.hpp>
#include <gapwright/sweep/plan.hpp>
#include <gapwright/sweep/store.hpp>

#include <atomic>
#include <cstddef>
#include <vector>

namespace gapwright {

/// Reports on a sweep; silent by default. Called from one thread at a time.
class SweepObserver {
 public:
  virtual ~SweepObserver() = default;
  virtual void started(std::size_t /*rows*/, std::size_t /*already_stored*/) {}
  /// After every row: rows at hand, stored ones included, and how many of them failed.
  virtual void progressed(std::size_t /*done*/, std::size_t /*failed*/) {}
};

struct RunOptions {
  int threads = 0;                          ///< 0: all cores
  Store* store = nullptr;                   ///< null: nothing is kept
  const std::atomic<bool>* stop = nullptr;  ///< set: finish what is in flight, write, return
  double time_limit_s = 0.0;                ///< 0: none
  int part = 1, parts = 1;                  ///< rows k with k mod parts == part - 1
  SweepObserver* observer = nullptr;
};

/// How a run ended.
enum class RunEnd {
  finished,
  stopped,       ///< by the stop flag or the time limit
  mostly_failed  ///< more than half of at least 100 computed rows failed: something is wrong
};

struct SweepResult {
  std::vector<Binding> rows;  ///< in plan order, the finished ones
  std::size_t wanted = 0;     ///< rows of the plan, or of the part asked for
  std::size_t computed = 0;
  std::size_t from_store = 0;
  std::size_t stored_beside = 0;  ///< rows of other plans or parts in the store
  std::size_t failed = 0;         ///< rows whose status is not ok
  RunEnd end = RunEnd::finished;
};

/// Computes the rows that the store does not hold yet. Rows whose status is not ok are kept like
/// any other and the run goes on. The rows do not depend on the number of threads, on earlier runs
/// or on how often they were interrupted. What the store, the disk or a row throws ends the run
/// after the rows before it were written. Throws std::invalid_argument for a part outside 1 …
/// parts.
SweepResult run_plan(const PlanRows& rows, const std::string& plan_text, const Binder& binder,
                     const RunOptions& options);

}  // namespace gapwright
