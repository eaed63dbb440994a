#include "bundle.hpp"

#include "exit_code.hpp"
#include "output.hpp"
#include "row_text.hpp"
#include "text_table.hpp"

#include <gapwright/pair/bundle.hpp>

#include <fmt/format.h>

namespace gapwright::cli {
namespace {

std::string bundle_json(const Bundle& bundle, const Settings& settings) {
  Json object = {{"object_1", bundle.object},
                 {"arrangement", "bundle"},
                 {"diameter_1_nm", bundle.diameter_nm},
                 {"temperature_K", settings.conditions.temperature_K},
                 {"chemical_potential_eV", settings.conditions.chemical_potential_eV},
                 {"medium", settings.conditions.medium},
                 {"contact_target", settings.contact_target},
                 {"neighbours", bundle.neighbours}};
  const bool filled = bundle.model.lattice_constant_nm > 0;
  const auto number = [&](double value) { return filled ? Json(value) : Json(nullptr); };
  object["lattice_constant_nm"] = number(bundle.model.lattice_constant_nm);
  object["gap_nm"] = number(bundle.model.lattice_constant_nm - bundle.diameter_nm);
  object["energy_eV_per_nm"] = number(bundle.model.energy_eV_per_nm);
  object["first_neighbours_eV_per_nm"] = number(bundle.model.first_neighbours_eV_per_nm);
  object["beyond_eV_per_nm"] = number(bundle.beyond_eV_per_nm);
  object["pair_potential_lattice_constant_nm"] = number(bundle.pair_potential.lattice_constant_nm);
  object["pair_potential_eV_per_nm"] = number(bundle.pair_potential.energy_eV_per_nm);
  object["lattice_constant_error"] = number(bundle.lattice_constant_error_nm);
  object["energy_error"] = number(bundle.energy_error);
  object["status"] = std::string(status_word(bundle.status));
  if (!bundle.message.empty()) object["message"] = bundle.message;
  return object.dump() + "\n";
}

std::string bundle_text(const Bundle& bundle, const Settings& settings) {
  std::string text = fmt::format("hexagonal bundle of {}   {} K, {}, contact target {}\n\n",
                                 bundle.object, settings.conditions.temperature_K,
                                 settings.conditions.medium, settings.contact_target);
  if (bundle.model.lattice_constant_nm > 0) {
    TextTable table({{"", "", true},
                     {"lattice constant", "nm"},
                     {"gap", "nm"},
                     {"energy per tube", "eV/nm"},
                     {"first neighbours", "eV/nm"}});
    const auto add = [&](const char* name, const BundleEnergy& energy) {
      table.add({name, fixed(energy.lattice_constant_nm, 4),
                 fixed(energy.lattice_constant_nm - bundle.diameter_nm, 4),
                 fixed(energy.energy_eV_per_nm, 5), fixed(energy.first_neighbours_eV_per_nm, 5)});
    };
    add("dispersion and contact", bundle.model);
    add("pair potential", bundle.pair_potential);
    text += table.text();
    text += fmt::format(
        "\nnumerical errors {:.1g} nm, {:.1g} eV/nm; the {} neighbours within gaps of about {:g} "
        "nm "
        "are summed pair by pair, those beyond would add about {:.2g} eV/nm\n",
        bundle.lattice_constant_error_nm, bundle.energy_error, bundle.neighbours, bundle_reach_nm,
        bundle.beyond_eV_per_nm);
  }
  text += fmt::format("status {}", status_word(bundle.status));
  return text + (bundle.message.empty() ? "" : ": " + bundle.message) + "\n";
}

Object one_tube(const Words& words) {
  if (words.operands.size() != 1)
    throw InputError({"a bundle is of one kind of tube",
                      "--bundle",
                      {},
                      "one object, such as 10,10",
                      words.operands.empty() ? "" : words.operands.front()});
  for (const char* option :
       {"--gap-nm", "--parallel", "--crossed", "--over", "--distances", "--in", "--retarded"})
    if (words.has(option) || words.flag(option))
      throw InputError({"does not go with --bundle",
                        option,
                        {},
                        "no such option: a bundle finds its own lattice",
                        {}});
  const ParsedLabel parsed = parse_label(words.operands.front());
  for (const std::string& remark : parsed.notes) note("note: " + remark);
  if (!std::holds_alternative<TubeObject>(parsed.object))
    throw InputError(
        {label_of(parsed.object) + " is no tube", "--bundle", {}, "a tube such as 10,10", {}});
  return parsed.object;
}

}  // namespace

int bind_bundle(const Words& words, const Catalogs& catalogs, const Settings& settings) {
  const Object object = one_tube(words);
  const Binder binder(catalogs, settings);
  const Bundle bundle = hexagonal_bundle(binder, object);
  print(words.flag("--json") ? bundle_json(bundle, binder.settings())
                             : bundle_text(bundle, binder.settings()));
  if (bundle.status == Status::ok) return good;
  note("gapwright: bundle of " + bundle.object + ": " + std::string(status_word(bundle.status)) +
       ", " + bundle.message);
  return some_failed;
}

}  // namespace gapwright::cli
