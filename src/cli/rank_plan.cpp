#include "rank_plan.hpp"

#include "setup.hpp"

#include <gapwright/sweep/ranking.hpp>

#include <algorithm>
#include <array>
#include <charconv>
#include <limits>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

constexpr std::array selecting = {
    "--diameter-nm", "--inner-diameter-nm", "--outer-diameter-nm", "--index", "--inner", "--outer"};

void apply_interval(const Words& words, const std::string& option, const NumberRange& range,
                    std::optional<Interval>& target) {
  if (const auto bounds = words.interval(option, range))
    target = Interval{(*bounds)[0], (*bounds)[1]};
}

/// True when something bounds the tubes: else every pair of all tubes is meant, and hardly by will.
bool selects(const Plan& plan) {
  if (plan.arrangement == Arrangement::parallel)
    return plan.with || plan.tubes.diameter_nm || plan.tubes.index;
  return plan.inner || plan.outer || plan.inner_diameter_nm || plan.outer_diameter_nm ||
         plan.tubes.diameter_nm || plan.tubes.index;
}

void apply_gap(const Words& words, Plan& plan) {
  const auto typed = words.text("--gap-nm");
  if (!typed) return;
  if (plan.arrangement == Arrangement::coaxial) {
    apply_interval(words, "--gap-nm", {min_gap_nm, max_gap_nm, "nm"}, plan.gap_nm);
  } else if (typed->find(':') == std::string::npos) {
    plan.fixed_gap_nm = words.number("--gap-nm", {min_gap_nm, farthest_gap_nm, "nm"});
  } else {
    throw InputError({"'" + *typed + "' is a range, and parallel pairs stand at one gap",
                      "--gap-nm",
                      {},
                      "one gap in nm, or none for the bottom of each well",
                      {}});
  }
}

/// Two labels with a blank between them mean tubes side by side.
bool names_parallel_pair(const std::string& pair) {
  return pair.find(' ') != std::string::npos && pair.find('@') == std::string::npos;
}

/// Names the option or the plan that holds a key without meaning.
void require_in_place(const Words& words, const Plan& plan) {
  const auto misplaced = misplaced_key(plan);
  if (!misplaced) return;
  std::string option = "--" + misplaced->key;
  std::replace(option.begin(), option.end(), '_', '-');
  const std::string where = words.has(option) || words.operands.empty()
                                ? option
                                : words.operands.front() + ", key " + misplaced->key;
  throw InputError({misplaced->what, where, {}, misplaced->expected, {}});
}

void apply_flags(const Words& words, Plan& plan) {
  const NumberRange diameters{min_diameter_nm, max_diameter_nm, "nm"};
  if (const auto word = words.text("--arrangement"))
    plan.arrangement = at_option("--arrangement", [&] { return sweep_arrangement(*word); });
  else if (names_parallel_pair(words.text("--pair").value_or("")))
    plan.arrangement = Arrangement::parallel;
  apply_interval(words, "--diameter-nm", diameters, plan.tubes.diameter_nm);
  if (const auto bounds = words.interval("--index", {1, max_index, ""}))
    plan.tubes.index =
        at_option("--index", [&] { return index_interval((*bounds)[0], (*bounds)[1]); });
  if (const auto word = words.text("--kind"))
    plan.tubes.kind = at_option("--kind", [&] { return parse_kind(*word); });
  apply_interval(words, "--inner-diameter-nm", diameters, plan.inner_diameter_nm);
  apply_interval(words, "--outer-diameter-nm", diameters, plan.outer_diameter_nm);
  if (const auto label = words.text("--inner"))
    plan.inner = parse_single_tube(*label, "--inner", plan.notes);
  if (const auto label = words.text("--outer"))
    plan.outer = parse_single_tube(*label, "--outer", plan.notes);
  if (const auto label = words.text("--with"))
    plan.with = parse_single_tube(*label, "--with", plan.notes);
  apply_gap(words, plan);
  if (const auto field = words.text("--sort"))
    plan.sort = at_option("--sort", [&] { return order_of(*field).field; });
  plan.top = words.integer("--top", 1, std::numeric_limits<int>::max()).value_or(plan.top);
}

// "K/N", 1 <= K <= N.
void read_part(const Words& words, RankRequest& request) {
  const auto typed = words.text("--part");
  if (!typed) return;
  const char* end = typed->data() + typed->size();
  const auto first = std::from_chars(typed->data(), end, request.part);
  const bool slash = first.ec == std::errc() && first.ptr != end && *first.ptr == '/';
  const auto second = slash ? std::from_chars(first.ptr + 1, end, request.parts) : first;
  if (!slash || second.ec != std::errc() || second.ptr != end || request.part < 1 ||
      request.part > request.parts)
    throw InputError(
        {"'" + *typed + "' is no part", "--part", {}, "K/N with 1 <= K <= N, such as 2/4", {}});
}

Plan read_base_plan(const Words& words, const Catalogs& catalogs) {
  if (words.operands.size() > 1)
    throw InputError({"more than one plan: " + joined(words.operands),
                      "rank",
                      {},
                      "one plan file, or flags",
                      {}});
  if (!words.operands.empty()) return read_plan(words.operands.front(), catalogs);
  Plan plan;
  plan.settings = usual_settings();
  return plan;
}

/// Liquids act on what lies beside each other, and leave no well.
void require_liquid_in_place(const Words& words, const Plan& plan, const Catalogs& catalogs) {
  const std::string& liquid = plan.settings.conditions.medium;
  if (liquid.empty() || liquid == catalogs.medium().name) return;
  const std::string where =
      words.has("--in") ? std::string("--in") : words.operands.front() + ", key medium";
  if (plan.arrangement == Arrangement::coaxial)
    throw InputError({"a liquid stays outside walls in walls and changes nothing between them",
                      where,
                      {},
                      "no liquid for coaxial pairs",
                      {}});
  if (!plan.fixed_gap_nm)
    throw InputError({"no contact term exists in " + liquid + ", so that there is no well",
                      where,
                      {},
                      "one gap beside it: --gap-nm X",
                      {}});
}

}  // namespace

RankRequest read_rank_request(const Words& words, const Catalogs& catalogs) {
  RankRequest request;
  request.plan = read_base_plan(words, catalogs);
  apply_flags(words, request.plan);
  require_in_place(words, request.plan);
  request.plan.settings = read_settings(words, catalogs, request.plan.settings);
  require_liquid_in_place(words, request.plan, catalogs);
  if (const auto file = words.text("--csv")) request.csv = *file;
  if (const auto file = words.text("--store")) request.store = *file;
  request.pair = words.text("--pair").value_or("");
  request.time_limit_s = words.number("--time-limit", {1e-3, 1e9, "s"}).value_or(0.0);
  read_part(words, request);
  request.threads = thread_count(words);
  request.json = words.flag("--json");
  request.count = words.flag("--count");
  if (!selects(request.plan) && request.pair.empty()) {
    const std::vector<std::string> options =
        request.plan.arrangement == Arrangement::parallel
            ? std::vector<std::string>{"--diameter-nm", "--index", "--with"}
            : std::vector<std::string>(selecting.begin(), selecting.end());
    throw InputError({"nothing says which tubes to take",
                      "rank",
                      {},
                      "a plan file, or one of " + joined(options),
                      {}});
  }
  return request;
}

}  // namespace gapwright::cli
