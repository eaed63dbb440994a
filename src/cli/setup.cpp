#include "setup.hpp"

#include <gapwright/math/kernel.hpp>
#include <gapwright/math/parallel.hpp>
#include <gapwright/sweep/store.hpp>

#include <algorithm>
#include <array>

#include <fmt/format.h>
#include <nlohmann/json.hpp>

namespace gapwright::cli {
namespace {

constexpr std::array kernels = {KernelVariant::portable, KernelVariant::avx2,
                                KernelVariant::avx512};
constexpr int most_threads = 1024;

std::vector<std::string> available_kernels() {
  std::vector<std::string> names;
  for (const KernelVariant variant : kernels)
    if (kernel_available(variant)) names.emplace_back(kernel_word(variant));
  return names;
}

KernelVariant parse_kernel(const std::string& word) {
  std::vector<std::string> names;
  for (const KernelVariant variant : kernels) {
    if (kernel_word(variant) == word) {
      if (kernel_available(variant)) return variant;
      throw InputError({"this machine has no " + word + " instructions",
                        "--kernel",
                        {},
                        "one of " + joined(available_kernels()),
                        {}});
    }
    names.emplace_back(kernel_word(variant));
  }
  throw InputError({"unknown kernel '" + word + "'",
                    "--kernel",
                    {},
                    "one of " + joined(names),
                    nearest_word(word, names)});
}

std::string compiler() {
#if defined(__clang__)
  return "clang " __clang_version__;
#elif defined(__GNUC__)
  return "g++ " __VERSION__;
#else
  return "unknown";
#endif
}

}  // namespace

void prepare_machine(const Words& words) {
  if (const auto word = words.text("--kernel")) select_kernel(parse_kernel(*word));
  set_inner_threads(thread_count(words));
}

int thread_count(const Words& words) {
  return words.integer("--threads", 1, most_threads).value_or(0);
}

Catalogs load_catalogs(const Words& words) {
  const auto folder = words.text("--catalogs");
  return folder ? Catalogs::from_folder(*folder) : Catalogs::built_in();
}

Settings usual_settings() {
  Settings settings;
  settings.conditions.temperature_K = usual_temperature_K;
  return settings;
}

Settings read_settings(const Words& words, const Catalogs& catalogs, Settings base) {
  Settings settings = std::move(base);
  Conditions& conditions = settings.conditions;
  if (const auto kelvin = words.number("--temperature-K", {0, 3000, "K"})) {
    conditions.temperature_K = *kelvin;
    at_option("--temperature-K", [&] { validate(conditions); });
  }
  conditions.retarded = conditions.retarded || words.flag("--retarded");
  if (const auto name = words.text("--in"))
    conditions.medium = at_option("--in", [&] { return catalogs.liquid(*name).name; });
  if (const auto name = words.text("--hopping"))
    settings.hopping = at_option("--hopping", [&] { return catalogs.hopping(*name).name; });
  if (const auto doping = words.number("--chemical-potential-eV", {-10, 10, "eV"})) {
    conditions.chemical_potential_eV = *doping;
    at_option("--chemical-potential-eV",
              [&] { validate(conditions, catalogs.hopping(settings.hopping)); });
  }
  if (const auto name = words.text("--background"))
    settings.background =
        at_option("--background", [&] { return catalogs.background(*name).name; });
  if (const auto name = words.text("--contact-target"))
    settings.contact_target =
        at_option("--contact-target", [&] { return catalogs.contact_target(*name).name; });
  settings.tolerance = words.number("--tolerance", {least_tolerance, largest_tolerance, ""})
                           .value_or(settings.tolerance);
  return settings;
}

bool has_settings(const Words& words) {
  constexpr std::array options = {"--temperature-K",
                                  "--chemical-potential-eV",
                                  "--hopping",
                                  "--background",
                                  "--contact-target",
                                  "--tolerance",
                                  "--in"};
  return std::any_of(options.begin(), options.end(),
                     [&](const char* option) { return words.has(option); });
}

std::string version_text(const Catalogs& catalogs, bool json) {
  const std::string kernel(kernel_word(kernel_variant()));
  if (!json)
    return fmt::format(
        "gapwright {}\ncompiler    {}\nkernel      {} (of {})\ncatalogues  {}\nnumbers     {}\n",
        program_version(), compiler(), kernel, joined(available_kernels()), catalogs.hash(),
        numerics_version());
  nlohmann::ordered_json object = {{"version", program_version()},
                                   {"compiler", compiler()},
                                   {"kernel", kernel},
                                   {"catalog_hash", catalogs.hash()},
                                   {"numerics_version", numerics_version()}};
  return object.dump() + "\n";
}

}  // namespace gapwright::cli
