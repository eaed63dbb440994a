// What bind is asked for: bodies, how they are placed, at which gaps.
#pragma once

#include "words.hpp"

#include <gapwright/catalog/catalogs.hpp>
#include <gapwright/pair/placement.hpp>

#include <array>
#include <optional>

namespace gapwright::cli {

struct BindRequest {
  Placement placement;
  std::optional<std::array<double, 2>> distances_nm;  ///< gaps of a table
};

/// Throws InputError that names the option, also for options that exclude each other.
BindRequest read_bind_request(const Words& words, const Catalogs& catalogs);

/// Runs what does not know of options, and names the one its message is about.
template <typename Call>
auto at_bind_options(Call&& call) {
  try {
    return call();
  } catch (const InputError& error) {
    InputError::Parts parts = error.parts();
    if (parts.where == "gap_nm") parts.where = "--gap-nm";
    if (parts.where == "angle_deg") parts.where = "--crossed";
    if (parts.where == "medium") parts.where = "--in";
    if (parts.where == "retarded") parts.where = "--retarded";
    throw InputError(parts);
  }
}

}  // namespace gapwright::cli
