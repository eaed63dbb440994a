#include "command_line.hpp"
#include "commands.hpp"
#include "exit_code.hpp"
#include "interrupt.hpp"
#include "output.hpp"
#include "setup.hpp"

#include <exception>
#include <filesystem>

namespace gapwright::cli {
namespace {

int run_command(const Words& words) {
  prepare_machine(words);
  if (words.flag("--version")) {
    print(version_text(load_catalogs(words), words.flag("--json")));
    return good;
  }
  if (words.command == "describe") return describe(words);
  if (words.command == "bind") return bind(words);
  if (words.command == "rank") return rank(words);
  if (words.command == "table") return table(words);
  if (words.command == "report") return report(words);
  if (words.command == "check") return check(words);
  throw InputError({"no command", {}, {}, "describe, bind, rank, table, report or check", {}});
}

int run(int argc, const char* const* argv) {
  const Request request = read_command_line(argc, argv);
  if (request.text.empty()) return run_command(request.words);
  print(request.text);
  return good;
}

// Every way to end has its exit code and one message.
int guarded(int argc, const char* const* argv) {
  try {
    const int code = run(argc, argv);
    close_output();
    return code;
  } catch (const InputError& error) {
    note(std::string("gapwright: ") + error.what());
    return bad_input;
  } catch (const std::filesystem::filesystem_error& error) {
    note(std::string("gapwright: ") + error.what());
    return bad_input;
  } catch (const ReaderGone&) {
    return good;
  } catch (const std::exception& error) {
    note(std::string("gapwright: internal fault: ") + error.what());
    return fault;
  }
}

}  // namespace
}  // namespace gapwright::cli

int main(int argc, char** argv) {
  gapwright::cli::ignore_output_signals();
  return gapwright::cli::guarded(argc, argv);
}
