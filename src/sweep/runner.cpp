#include <gapwright/math/parallel.hpp>
#include <gapwright/sweep/runner.hpp>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <optional>
#include <set>
#include <stdexcept>

#include <fmt/format.h>
#include <tbb/global_control.h>
#include <tbb/info.h>
#include <tbb/parallel_for.h>
#include <tbb/parallel_pipeline.h>
#include <tbb/task_arena.h>

namespace gapwright {
namespace {

using Clock = std::chrono::steady_clock;

constexpr std::size_t batch_rows = 256;
constexpr double batch_seconds = 0.5;
constexpr std::size_t tokens_per_thread = 4;
// Rows are stored block by block: a block ends after this many rows, or after so many tubes whose
// response is still to be computed that a stop or a kill would lose more than a few seconds.
constexpr std::size_t block_rows = 2048;
constexpr std::size_t new_tubes_per_thread = 8;

double seconds_since(Clock::time_point start) {
  return std::chrono::duration<double>(Clock::now() - start).count();
}

// A number that is not finite must not pass for a result.
void refuse_non_finite(Binding& row) {
  for (const BindingField& field : binding_fields()) {
    const FieldValue value = field.get(row);
    const double* number = std::get_if<double>(&value);
    if (!number || std::isfinite(*number)) continue;
    field.set(row, FieldValue());
    row.status = Status::not_converged;
    row.message = fmt::format("{} is not finite", field.name);
  }
}

// Collects finished rows and writes them a batch a transaction. Used by one thread at a time.
class BatchWriter {
 public:
  explicit BatchWriter(Store* store) : store_(store) {}

  void add(const std::string& key, const Binding& row) {
    if (!store_) return;
    batch_.emplace_back(key, row);
    if (batch_.size() >= batch_rows || seconds_since(written_) >= batch_seconds) flush();
  }

  void flush() {
    if (batch_.empty()) return;
    const auto rows = std::exchange(batch_, {});  // a batch that cannot be written is not retried
    store_->write(rows);
    written_ = Clock::now();
  }

 private:
  Store* store_;
  std::vector<std::pair<std::string, Binding>> batch_;
  Clock::time_point written_ = Clock::now();
};

class Run {
 public:
  Run(const PlanRows& rows, const Binder& binder, const RunOptions& options)
      : rows_(rows), binder_(binder), options_(options), writer_(options.store) {}

  void collect() {
    const std::string settings_key = binder_.settings_key();
    const auto stored = options_.store ? options_.store->keys() : std::unordered_set<std::string>();
    const auto first = static_cast<std::size_t>(options_.part - 1);
    for (std::size_t k = first; k < rows_.size(); k += static_cast<std::size_t>(options_.parts)) {
      keys_.push_back(row_key(rows_[k], settings_key));
      places_.push_back(k);
      if (!stored.contains(keys_.back())) pending_.push_back(keys_.size() - 1);
    }
    results_.resize(keys_.size());
    read_stored(stored);
    result_.wanted = keys_.size();
    result_.stored_beside = stored.size() - result_.from_store;
    if (options_.observer) options_.observer->started(keys_.size(), result_.from_store);
  }

  std::size_t pending() const { return pending_.size(); }

  void compute(int threads) {
    if (pending_.empty()) return;
    const tbb::global_control control(tbb::global_control::max_allowed_parallelism,
                                      static_cast<std::size_t>(threads));
    tbb::task_arena arena(threads);
    binder_.contact_term(binder_.settings().contact_target);  // else every task waits for the first
    announce();
    try {
      const auto width = static_cast<std::size_t>(threads);
      for (std::size_t begin = 0; begin < pending_.size() && !must_stop();) {
        const auto [end, tubes] = next_block(begin, new_tubes_per_thread * width);
        arena.execute([&] {
          warm(tubes);
          run_pipeline(begin, end, width);
        });
        begin = end;
      }
    } catch (...) {
      writer_.flush();
      throw;
    }
    writer_.flush();
    if (result_.end == RunEnd::finished && result_.computed < pending_.size())
      result_.end = RunEnd::stopped;
  }

  SweepResult take() {
    for (auto& row : results_)
      if (row) result_.rows.push_back(std::move(*row));
    return std::move(result_);
  }

 private:
  void read_stored(const std::unordered_set<std::string>& stored) {
    if (stored.empty()) return;
    std::vector<std::string> wanted;
    std::vector<std::size_t> slots;
    for (std::size_t slot = 0; slot < keys_.size(); ++slot)
      if (stored.contains(keys_[slot])) {
        wanted.push_back(keys_[slot]);
        slots.push_back(slot);
      }
    std::vector<Binding> rows = options_.store->read(wanted);
    for (std::size_t i = 0; i < rows.size(); ++i) keep(slots[i], std::move(rows[i]));
    result_.from_store = rows.size();
  }

  void keep(std::size_t slot, Binding row) {
    if (row.status != Status::ok) ++result_.failed;
    results_[slot] = std::move(row);
  }

  bool must_stop() const {
    return (options_.stop && options_.stop->load()) || give_up_.load() ||
           (options_.time_limit_s > 0 && seconds_since(started_) >= options_.time_limit_s);
  }

  // Each tube's window must hold all its rows before its response is computed.
  void announce() const {
    for (const std::size_t slot : pending_) binder_.announce({rows_[places_[slot]]});
  }

  struct Block {
    std::size_t end;
    std::vector<Tube> new_tubes;  // whose response no earlier block needed
  };

  Block next_block(std::size_t begin, std::size_t most_new_tubes) {
    Block block{begin, {}};
    while (block.end < pending_.size() && block.end - begin < block_rows &&
           block.new_tubes.size() < most_new_tubes) {
      const std::size_t row = places_[pending_[block.end++]];
      for (const Tube* tube : {&rows_.inner(row), &rows_.outer(row)})
        if (warmed_.insert(tube->chirality).second) block.new_tubes.push_back(*tube);
    }
    return block;
  }

  // Each tube once: rows that share one would wait for each other.
  void warm(const std::vector<Tube>& tubes) const {
    tbb::parallel_for(std::size_t{0}, tubes.size(), [&](std::size_t i) {
      const SerialRegion serial;
      if (!must_stop()) binder_.warm(tubes[i]);
    });
  }

  // A row that cannot be computed is a row with a status; the sweep goes on.
  Binding bound(std::size_t row) const {
    const auto failed = [&](const char* why) {
      Binding binding;
      binding.object_1 = rows_.inner(row).label();
      binding.object_2 = rows_.outer(row).label();
      binding.arrangement = arrangement_word(rows_[row].arrangement);
      binding.diameter_1_nm = rows_.inner(row).diameter_nm();
      binding.diameter_2_nm = rows_.outer(row).diameter_nm();
      binding.contact_target = binder_.settings().contact_target;
      binding.status = Status::not_converged;
      binding.message = why;
      return binding;
    };
    try {
      return binder_.bind(rows_[row]);
    } catch (const std::domain_error& error) {
      return failed(error.what());
    } catch (const std::invalid_argument& error) {
      return failed(error.what());
    }
  }

  // Rows enter and leave in order and are computed in any: what is kept never depends on threads.
  void run_pipeline(std::size_t begin, std::size_t end, std::size_t threads) {
    std::size_t next = begin;
    const auto enter = [&](tbb::flow_control& control) -> std::size_t {
      if (next == end || must_stop()) {
        control.stop();
        return 0;
      }
      return pending_[next++];
    };
    const auto bind = [&](std::size_t slot) {
      const SerialRegion serial;
      Binding row = bound(places_[slot]);
      refuse_non_finite(row);
      results_[slot] = std::move(row);
      return slot;
    };
    const auto leave = [&](std::size_t slot) { finish(slot); };
    tbb::parallel_pipeline(
        threads * tokens_per_thread,
        tbb::make_filter<void, std::size_t>(tbb::filter_mode::serial_in_order, enter) &
            tbb::make_filter<std::size_t, std::size_t>(tbb::filter_mode::parallel, bind) &
            tbb::make_filter<std::size_t, void>(tbb::filter_mode::serial_in_order, leave));
  }

  void finish(std::size_t slot) {
    const Binding& row = *results_[slot];
    writer_.add(keys_[slot], row);
    ++result_.computed;
    if (row.status != Status::ok) {
      ++result_.failed;
      ++failed_now_;
    }
    if (result_.computed >= 100 && 2 * failed_now_ > result_.computed) {
      result_.end = RunEnd::mostly_failed;
      give_up_.store(true);
    }
    if (options_.observer)
      options_.observer->progressed(result_.from_store + result_.computed, result_.failed);
  }

  const PlanRows& rows_;
  const Binder& binder_;
  const RunOptions& options_;
  BatchWriter writer_;
  Clock::time_point started_ = Clock::now();
  std::vector<std::string> keys_;                // one a row of this part
  std::vector<std::size_t> places_;              // its place in the plan
  std::vector<std::size_t> pending_;             // slots to compute
  std::vector<std::optional<Binding>> results_;  // by slot
  std::atomic<bool> give_up_{false};
  std::set<Chirality> warmed_;
  std::size_t failed_now_ = 0;
  SweepResult result_;
};

}  // namespace

SweepResult run_plan(const PlanRows& rows, const std::string& plan, const Binder& binder,
                     const RunOptions& options) {
  if (options.parts < 1 || options.part < 1 || options.part > options.parts)
    throw std::invalid_argument(
        fmt::format("run_plan: part {}/{}, required 1 <= K <= N", options.part, options.parts));
  const int threads = options.threads > 0 ? options.threads : tbb::info::default_concurrency();
  Run run(rows, binder, options);
  run.collect();
  Store* store = run.pending() > 0 ? options.store : nullptr;
  const std::int64_t id = store ? store->begin_run(plan, threads) : 0;
  run.compute(threads);
  SweepResult result = run.take();
  if (store)
    store->end_run(id, result.end == RunEnd::finished, static_cast<std::int64_t>(result.computed));
  return result;
}

}  // namespace gapwright
