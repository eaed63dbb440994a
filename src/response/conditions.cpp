#include <gapwright/catalog/input_error.hpp>
#include <gapwright/response/conditions.hpp>

#include <cmath>

#include <fmt/format.h>

namespace gapwright {

void validate(const Conditions& conditions) {
  const double t = conditions.temperature_K;
  if (!std::isfinite(t) || t < 0)
    throw InputError({.what = fmt::format("temperature {} K is not possible", t),
                      .where = "temperature_K",
                      .excerpt = {},
                      .expected = "0 (kelvin)",
                      .nearest = "0"});
  if (t > 0)
    throw InputError({.what = fmt::format("temperature {} K: only T = 0 is computed", t),
                      .where = "temperature_K",
                      .excerpt = {},
                      .expected = "0 (kelvin)",
                      .nearest = "0"});
  if (!std::isfinite(conditions.chemical_potential_eV) || conditions.chemical_potential_eV != 0)
    throw InputError(
        {.what = fmt::format("chemical potential {} eV: only undoped walls are computed",
                             conditions.chemical_potential_eV),
         .where = "chemical_potential_eV",
         .excerpt = {},
         .expected = "0 (eV)",
         .nearest = "0"});
  if (conditions.medium != "vacuum")
    throw InputError({.what = "medium '" + conditions.medium + "' is not known",
                      .where = "medium",
                      .excerpt = {},
                      .expected = "vacuum",
                      .nearest = "vacuum"});
}

}  // namespace gapwright
