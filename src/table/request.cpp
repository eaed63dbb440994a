#include "builders.hpp"

#include <gapwright/catalog/input_error.hpp>
#include <gapwright/join/crossed.hpp>

#include <algorithm>
#include <cmath>

#include <fmt/format.h>

namespace gapwright {
namespace {

// The switch of an outer cut must leave the well alone.
constexpr double least_switch_gap_nm = 0.5;
constexpr double farthest_cut_gap_nm = 1000.0;
constexpr double least_spacing_nm = 0.01;

InputError refusal(const char* member, const std::string& what, const std::string& expected,
                   const std::string& nearest) {
  return InputError({what, member, {}, expected, nearest});
}

// Up, so that what is said to be enough is enough.
std::string up(double value) {
  return fmt::format("{:.4f}", std::ceil(value * 1e4) / 1e4);
}
std::string down(double value) {
  return fmt::format("{:.4f}", std::floor(value * 1e4) / 1e4);
}

void check_inner_cut(const TableRequest& request, const std::string& pair, double touching) {
  if (!request.inner_cut_nm) return;
  const double cut = *request.inner_cut_nm, least = touching + min_gap_nm;
  if (cut >= least) return;
  const std::string what =
      cut <= touching
          ? fmt::format("{} overlap at {} nm: they touch at {:.4f} nm", pair, cut, touching)
          : fmt::format("{} at {} nm have a gap of {:.4f} nm", pair, cut, cut - touching);
  throw refusal("inner_cut_nm", what,
                fmt::format("a distance of the axes with a gap of {} nm or more", min_gap_nm),
                up(least));
}

void check_outer_cut(const TableRequest& request, const std::string& pair, double touching) {
  if (!request.outer_cut_nm) return;
  const double cut = *request.outer_cut_nm, first = request.inner_cut_nm.value_or(touching);
  const double least = std::max(touching + least_switch_gap_nm, first + min_gap_nm) / switch_begin;
  if (cut < least)
    throw refusal("outer_cut_nm",
                  fmt::format("{} nm is too close for {}: the switch begins at {} of it", cut, pair,
                              switch_begin),
                  fmt::format("a distance of the axes of {} nm or more", up(least)), up(least));
  if (cut > touching + farthest_cut_gap_nm)
    throw refusal("outer_cut_nm", fmt::format("{} nm is out of range", cut),
                  fmt::format("at most {} nm", down(touching + farthest_cut_gap_nm)),
                  down(touching + farthest_cut_gap_nm));
}

void check_angles(const TableRequest& request) {
  if (request.kind == TableKind::crossed && request.angles_deg.empty())
    throw refusal("angles_deg", "no crossing angle", "one or more angles of 1 to 90 degrees", {});
  for (std::size_t i = 0; i < request.angles_deg.size(); ++i) {
    const double angle = request.angles_deg[i];
    if (!(angle >= min_crossing_deg && angle <= max_crossing_deg))
      throw refusal("angles_deg", fmt::format("an angle of {} degrees is out of range", angle),
                    fmt::format("{} to {} degrees", min_crossing_deg, max_crossing_deg),
                    angle > max_crossing_deg ? "90" : "1");
    if (std::count(request.angles_deg.begin(), request.angles_deg.end(), angle) > 1)
      throw refusal("angles_deg", fmt::format("an angle of {} degrees stands there twice", angle),
                    "each angle once", {});
  }
}

void check_spacing(const TableRequest& request, double diameter_1, double diameter_2) {
  if (!request.spacing_nm) return;
  const double spacing = *request.spacing_nm, widest = std::min(diameter_1, diameter_2);
  if (spacing > widest)
    throw refusal(
        "spacing_nm",
        fmt::format("beads {} nm apart are further apart than the narrower tube is wide", spacing),
        fmt::format("at most its diameter, {} nm", down(widest)), down(widest));
  if (!(spacing >= least_spacing_nm))
    throw refusal("spacing_nm", fmt::format("a spacing of {} nm is out of range", spacing),
                  fmt::format("{} nm or more", least_spacing_nm), "0.01");
}

}  // namespace

void check_request(const TableRequest& request) {
  const Tube &one = tubes_of(request.first).walls.back(),
             &other = tubes_of(request.second).walls.back();
  const std::string pair = label_of(request.first) + " and " + label_of(request.second);
  const double touching = one.radius_nm + other.radius_nm;
  check_inner_cut(request, pair, touching);
  check_outer_cut(request, pair, touching);
  check_angles(request);
  check_spacing(request, one.diameter_nm(), other.diameter_nm());
}

}  // namespace gapwright
