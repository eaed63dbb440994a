#include "report_figures.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <array>
#include <cerrno>
#include <cstdlib>
#include <sstream>

#include <fcntl.h>
#include <nlohmann/json.hpp>
#include <spawn.h>
#include <sys/wait.h>
#include <unistd.h>

extern char** environ;

namespace gapwright::cli {
namespace {

namespace fs = std::filesystem;

constexpr const char* node_names[] = {"node", "nodejs"};

std::string node_program() {
  const char* path = std::getenv("PATH");
  std::istringstream folders(path ? path : "/usr/local/bin:/usr/bin:/bin");
  for (std::string folder; std::getline(folders, folder, ':');)
    for (const char* name : node_names) {
      const fs::path file = fs::path(folder.empty() ? "." : folder) / name;
      std::error_code error;
      if (fs::is_regular_file(file, error) && ::access(file.c_str(), X_OK) == 0)
        return file.string();
    }
  return {};
}

InputError failed(const std::string& what) {
  return InputError({"the figures could not be drawn: " + what,
                     "--svg",
                     {},
                     "Node.js 18 or later, and the parts of the report as they were installed",
                     {}});
}

// An unnamed file of the system's folder for such: no pipe can fill up while the other end waits.
class Scratch {
 public:
  Scratch() {
    std::error_code error;
    fs::path folder = fs::temp_directory_path(error);
    std::string name = ((error ? fs::path("/tmp") : folder) / "gapwright-XXXXXX").string();
    descriptor_ = ::mkstemp(name.data());
    if (descriptor_ < 0) throw failed("no space for temporary files");
    ::unlink(name.c_str());
  }
  ~Scratch() { ::close(descriptor_); }
  Scratch(const Scratch&) = delete;
  Scratch& operator=(const Scratch&) = delete;

  int descriptor() const { return descriptor_; }

  void write(const std::string& text) {
    for (std::size_t done = 0; done < text.size();) {
      const ssize_t count = ::write(descriptor_, text.data() + done, text.size() - done);
      if (count < 0 && errno == EINTR) continue;
      if (count <= 0) throw failed("no space for temporary files");
      done += static_cast<std::size_t>(count);
    }
    ::lseek(descriptor_, 0, SEEK_SET);
  }

  std::string read() {
    ::lseek(descriptor_, 0, SEEK_SET);
    std::string text;
    std::array<char, 65536> block{};
    for (;;) {
      const ssize_t count = ::read(descriptor_, block.data(), block.size());
      if (count < 0 && errno == EINTR) continue;
      if (count <= 0) return text;
      text.append(block.data(), static_cast<std::size_t>(count));
    }
  }

 private:
  int descriptor_;
};

// Its exit code; -1 when it could not be started or was killed.
int run(const std::string& program, const std::string& script, const Scratch& in,
        const Scratch& out, const Scratch& errors) {
  posix_spawn_file_actions_t actions;
  posix_spawn_file_actions_init(&actions);
  posix_spawn_file_actions_adddup2(&actions, in.descriptor(), STDIN_FILENO);
  posix_spawn_file_actions_adddup2(&actions, out.descriptor(), STDOUT_FILENO);
  posix_spawn_file_actions_adddup2(&actions, errors.descriptor(), STDERR_FILENO);
  std::string name = program, file = script;
  std::array<char*, 3> arguments = {name.data(), file.data(), nullptr};
  pid_t process = 0;
  const int error =
      ::posix_spawn(&process, program.c_str(), &actions, nullptr, arguments.data(), environ);
  posix_spawn_file_actions_destroy(&actions);
  if (error != 0) return -1;
  int status = 0;
  while (::waitpid(process, &status, 0) < 0)
    if (errno != EINTR) return -1;
  return WIFEXITED(status) ? WEXITSTATUS(status) : -1;
}

// The line that says what went wrong, of the many that Node.js prints.
std::string reason(const std::string& errors) {
  std::istringstream lines(errors);
  std::string first;
  for (std::string line; std::getline(lines, line);) {
    if (line.find("Error") != std::string::npos) return line;
    if (first.empty()) first = line;
  }
  return first.empty() ? "Node.js ended early" : first;
}

}  // namespace

void require_node() {
  if (node_program().empty())
    throw InputError({"Node.js, which draws the figures, is not installed",
                      "--svg",
                      {},
                      "the program node on the PATH (Debian package nodejs), or a page alone: -o "
                      "FILE.html",
                      {}});
}

std::vector<std::pair<std::string, std::string>> draw_figures(const fs::path& folder,
                                                              const std::string& json) {
  require_node();
  Scratch in, out, errors;
  in.write(json);
  if (run(node_program(), (folder / "render.mjs").string(), in, out, errors) != 0)
    throw failed(reason(errors.read()));
  const auto drawn = nlohmann::json::parse(out.read(), nullptr, false);
  if (!drawn.is_object() || drawn.empty()) throw failed(reason(errors.read()));
  std::vector<std::pair<std::string, std::string>> files;
  for (const auto& [name, content] : drawn.items()) {
    if (!content.is_string() || name.find('/') != std::string::npos)
      throw failed("unexpected output");
    files.emplace_back(name, content.get<std::string>());
  }
  return files;
}

}  // namespace gapwright::cli
