#include "command_line.hpp"

#include <algorithm>
#include <cctype>

#include <CLI/CLI.hpp>

namespace gapwright::cli {
namespace {

struct OptionText {
  const char* name;
  const char* value;  // what stands for the value in the help; empty: a flag
  const char* help;
  bool repeats = false;  // may be given more than once
};

struct CommandText {
  const char* name;
  const char* operands;
  const char* help;
  std::vector<OptionText> options;
};

const std::vector<OptionText>& common_options() {
  static const std::vector<OptionText> options = {
      {"--json", "", "One JSON object, or one a line"},
      {"--temperature-K", "T", "Temperature, 0 or 0.01 to 3000 (default 300)"},
      {"--chemical-potential-eV", "MU", "Doping, from neutrality at T = 0 (default 0)"},
      {"--hopping", "NAME", "Hopping set of the catalogue"},
      {"--background", "NAME", "Background response of the catalogue"},
      {"--contact-target", "NAME", "Target of the contact term in the catalogue"},
      {"--catalogs", "DIR", "Folder of catalogues in place of the built-in ones"},
      {"--tolerance", "X", "Relative error asked of the dispersion energy (default 1e-4)"},
      {"--threads", "N", "Threads (default: all cores)"},
      {"--kernel", "NAME", "Instruction set of the hot kernels: portable, avx2, avx512"},
      {"--version", "", "Version, compiler, kernel variant, catalogue hash"},
  };
  return options;
}

const std::vector<CommandText>& commands() {
  static const std::vector<CommandText> all = {
      {"describe", "OBJECT...", "Geometry, bands and response of tubes and of graphene", {}},
      {"bind",
       "A@B[@C...] | A B | A --over FLAT",
       "Binding of walls in walls, inner@outer, of two objects, or of one over a flat body",
       {{"--parallel", "", "Axes side by side (the default of two tubes)"},
        {"--stacked", "",
         "Face to face, a tube over the face of a ribbon (the default with ribbons)"},
        {"--coplanar", "", "Beside each other in the plane of a ribbon"},
        {"--edge-on", "", "The second ribbon upright on the face of the first, a ribbon on a tube"},
        {"--offset-nm", "Y", "Sideways, of ribbons stacked, coplanar or edge-on (default 0)"},
        {"--crossed", "DEG", "Axes at an angle of 1 to 90 degrees; energies of one crossing"},
        {"--over", "FLAT", "Over graphene, or over a half-space of a medium such as silica"},
        {"--in", "LIQUID", "In a liquid such as water (default vacuum); dispersion only"},
        {"--gap-nm", "X", "Gap between the two (default: the bottom of the well)"},
        {"--distances", "LO:HI", "A table over the gap, evenly spaced in its logarithm"},
        {"--bundle", "", "A hexagonal bundle of one tube: lattice constant, energy per tube"},
        {"--retarded", "", "Two walls A@B: fields travel at the speed of light"}}},
      {"rank",
       "[PLAN.toml]",
       "Every pair of a range, the strongest first; flags add to a plan or replace its keys",
       {{"--arrangement", "WORD", "coaxial (default), or parallel: tubes side by side"},
        {"--diameter-nm", "LO:HI", "Diameter of either wall or tube"},
        {"--inner-diameter-nm", "LO:HI", "Diameter of the inner wall, coaxial"},
        {"--outer-diameter-nm", "LO:HI", "Diameter of the outer wall, coaxial"},
        {"--index", "LO:HI", "Range of the index n"},
        {"--kind", "WORD", "any, metallic, semiconducting, armchair, zigzag, chiral"},
        {"--inner", "TUBE", "The inner wall is this tube"},
        {"--outer", "TUBE", "The outer wall is this tube"},
        {"--with", "TUBE", "Parallel: pairs that hold this tube"},
        {"--gap-nm", "LO:HI | X",
         "Coaxial: gaps to take (default 0.3:0.4); parallel: one gap (default: each well's "
         "bottom)"},
        {"--in", "LIQUID", "Parallel at one gap: in a liquid such as water (default vacuum)"},
        {"--sort", "FIELD",
         "Field to sort by (default energy_mJ_per_m2, well_depth_eV_per_nm side by side)"},
        {"--top", "N", "List the first N; --csv always holds all"},
        {"--csv", "FILE", "All rows with all fields for a spreadsheet; - for standard output"},
        {"--store", "FILE.db", "Keep rows as they are computed; the same command goes on"},
        {"--count", "", "Pairs, estimated time and disk; computes nothing"},
        {"--pair", "A@B | \"A B\"", "Recompute one row of the store and compare"},
        {"--time-limit", "SECONDS", "Stop after this time; the same command goes on"},
        {"--part", "K/N", "Only part K of N of the pairs"}}},
      {"table",
       "A B | --tubes RANGE",
       "Energy and force of two tubes against their distance, for simulations",
       {{"--parallel", "", "Side by side, per length (the default)"},
        {"--crossed", "DEG,...", "Across each other at these angles"},
        {"--beads", "", "Tubes as chains of beads: energy of two beads"},
        {"--spacing-nm", "L", "Spacing of the beads (default 0.25 times the root of the distance)"},
        {"--in", "LIQUID", "In a liquid such as water (default vacuum); dispersion only"},
        {"--inner-cut-nm", "D", "Closest distance of the axes (default: the gap 0.2 nm)"},
        {"--outer-cut-nm", "D", "Distance at which a smooth switch ends energy and force"},
        {"--csv", "FILE", "CSV into this file; - for standard output (the default)"},
        {"--template", "FILE", "The table in a form of your own, see README"},
        {"--tubes", "RANGE", "A table for every pair of these: 10,10;17,0 or LO:HI in nm"},
        {"--output", "PATH", "File of a template or of --json; folder of --tubes"}}},
      {"report",
       "STORE.db",
       "The rows of a store as one page to open in a browser, and as figures for a paper",
       {{"--output,-o", "FILE.html", "The page; - for standard output"},
        {"--svg", "DIR", "Every figure as an SVG file, its data as CSV"},
        {"--pair", "A@B ...", "Pairs with figures of their own (default: the strongest four)",
         true},
        {"--arrangement", "WORD", "Rows of this arrangement, where a store holds several"}}},
      {"check", "", "Recompute published values and print ours beside theirs", {}},
  };
  return all;
}

std::vector<std::string> command_names() {
  std::vector<std::string> names;
  for (const CommandText& command : commands()) names.emplace_back(command.name);
  return names;
}

void add_options(CLI::App& app, const std::vector<OptionText>& options, const char* group) {
  for (const OptionText& option : options) {
    if (*option.value == '\0')
      app.add_flag(option.name, option.help)->group(group);
    else
      app.add_option(option.name, option.help)
          ->type_name(option.value)
          ->multi_option_policy(CLI::MultiOptionPolicy::TakeAll)
          ->group(group);
  }
}

// Operands are no business of the parser, so the usage line is ours.
class HelpText : public CLI::Formatter {
 public:
  std::string make_usage(const CLI::App* app, std::string) const override {
    for (const CommandText& command : commands())
      if (app->get_name() == command.name)
        return std::string("Usage: gapwright ") + command.name + " " + command.operands +
               (*command.operands == '\0' ? "" : " ") + "[OPTIONS]\n";
    return "Usage: gapwright COMMAND [OPTIONS]\n";
  }
};

void describe_app(CLI::App& app) {
  auto help = std::make_shared<HelpText>();
  help->label("SUBCOMMANDS", "Commands");
  help->label("SUBCOMMAND", "COMMAND");
  app.formatter(help);
  app.set_help_flag("--help,-h", "This text");
  add_options(app,
              {{"--version", "", "Version, compiler, kernel variant, catalogue hash"},
               {"--json", "", "With --version: one JSON object"}},
              "Options");
  app.allow_extras();
  for (const CommandText& command : commands()) {
    CLI::App* sub = app.add_subcommand(command.name, command.help);
    sub->set_help_flag("--help,-h", "This text");
    sub->allow_extras();
    add_options(*sub, command.options, "Options of this command");
    add_options(*sub, common_options(), "Options of every command");
  }
}

[[noreturn]] void refuse_option(const CLI::App& app, const std::string& typed) {
  const std::string name = typed.substr(0, typed.find('='));
  std::vector<std::string> names;
  for (const CLI::Option* option : app.get_options())
    if (!option->get_lnames().empty()) names.push_back("--" + option->get_lnames().front());
  throw InputError({"unknown option '" + name + "'",
                    app.get_parent() ? app.get_name() : std::string(),
                    {},
                    "one of " + joined(names),
                    nearest_word(name, names)});
}

bool looks_like_option(const std::string& word) {
  return word.size() > 1 && word[0] == '-' && !std::isdigit(static_cast<unsigned char>(word[1]));
}

// Everything that no option took is an operand, unless it looks like an option. The parser leaves
// what follows "--" with the root, whatever it looks like.
std::vector<std::string> operands_of(const CLI::App& app) {
  std::vector<std::string> operands = app.remaining();
  for (const std::string& word : operands)
    if (looks_like_option(word)) refuse_option(app, word);
  if (const CLI::App* root = app.get_parent())
    for (const std::string& word : root->remaining()) operands.push_back(word);
  return operands;
}

std::string value_of(const CLI::Option& option, const std::string& name) {
  const std::vector<std::string>& given = option.results();
  if (given.size() > 1) throw InputError({"given more than once", name, {}, "one value", {}});
  std::string value = given.empty() ? std::string() : given.front();
  if (value.empty() || value.starts_with("--"))
    throw InputError({"has no value", name, {}, "a value: " + option.get_type_name(), {}});
  return value;
}

bool repeats(const std::string& command, const std::string& option) {
  for (const CommandText& text : commands())
    for (const OptionText& known : text.options)
      if (command == text.name && option == known.name) return known.repeats;
  return false;
}

std::vector<std::string> values_of(const CLI::Option& option, const std::string& name) {
  for (const std::string& value : option.results())
    if (value.empty() || value.starts_with("--"))
      throw InputError({"has no value", name, {}, "a value: " + option.get_type_name(), {}});
  return option.results();
}

Words words_of(const CLI::App& app) {
  Words words;
  words.command = app.get_name();
  words.operands = operands_of(app);
  for (const CLI::Option* option : app.get_options()) {
    if (option->count() == 0 || option->get_lnames().empty()) continue;
    const std::string name = "--" + option->get_lnames().front();
    if (option->get_expected_max() == 0)
      words.flags.push_back(name);
    else if (repeats(words.command, name))
      words.lists[name] = values_of(*option, name);
    else
      words.values[name] = value_of(*option, name);
  }
  return words;
}

void require_known_command(const std::string& word) {
  const auto names = command_names();
  if (std::find(names.begin(), names.end(), word) != names.end()) return;
  throw InputError({"unknown command '" + word + "'",
                    {},
                    {},
                    "one of " + joined(names),
                    nearest_word(word, names)});
}

}  // namespace

Request read_command_line(int argc, const char* const* argv) {
  if (argc < 2)
    throw InputError(
        {"no command", {}, {}, "one of " + joined(command_names()) + "; or --help", {}});
  if (argv[1][0] != '-') require_known_command(argv[1]);
  CLI::App app("Attraction of carbon nanotubes from their electronic structure.", "gapwright");
  describe_app(app);
  try {
    app.parse(argc, argv);
  } catch (const CLI::CallForHelp&) {
    const auto chosen = app.get_subcommands();
    return {{}, chosen.empty() ? app.help() : chosen.front()->help()};
  } catch (const CLI::ArgumentMismatch& error) {
    const std::string message = error.what();
    throw InputError({"has no value", message.substr(0, message.find(':')), {}, "a value", {}});
  } catch (const CLI::ParseError& error) {
    throw InputError({error.what(), {}, {}, "a command line as in gapwright --help", {}});
  }
  const auto chosen = app.get_subcommands();
  if (chosen.size() > 1)
    throw InputError({"two commands, " + chosen[0]->get_name() + " and " + chosen[1]->get_name(),
                      {},
                      {},
                      "one command",
                      {}});
  return {words_of(chosen.empty() ? app : *chosen.front()), {}};
}

}  // namespace gapwright::cli
