#include "output.hpp"

#include <gapwright/catalog/input_error.hpp>

#include <cerrno>
#include <system_error>
#include <utility>

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

namespace gapwright::cli {
namespace {

namespace fs = std::filesystem;

InputError cannot_write(const std::string& where, int error) {
  return InputError({std::string("cannot be written: ") + std::generic_category().message(error),
                     where,
                     {},
                     "a place with space that may be written to",
                     {}});
}

// Zero, or the error number.
int write_all(int descriptor, std::string_view text) {
  while (!text.empty()) {
    const ssize_t count = ::write(descriptor, text.data(), text.size());
    if (count < 0 && errno == EINTR) continue;
    if (count < 0) return errno;
    text.remove_prefix(static_cast<std::size_t>(count));
  }
  return 0;
}

// Closes and removes a half-written file unless it was given its name.
class TemporaryFile {
 public:
  explicit TemporaryFile(const fs::path& target)
      : name_((target.parent_path() / ("." + target.filename().string() + ".XXXXXX")).string()) {
    descriptor_ = ::mkstemp(name_.data());
    if (descriptor_ < 0) throw cannot_write(target.string(), errno);
  }
  ~TemporaryFile() {
    if (descriptor_ >= 0) ::close(descriptor_);
    if (!renamed_) ::unlink(name_.c_str());
  }
  TemporaryFile(const TemporaryFile&) = delete;
  TemporaryFile& operator=(const TemporaryFile&) = delete;

  void write(std::string_view text, const fs::path& target) {
    const mode_t mask = ::umask(0);
    ::umask(mask);
    if (::fchmod(descriptor_, 0666 & ~mask) != 0) throw cannot_write(target.string(), errno);
    if (const int error = write_all(descriptor_, text)) throw cannot_write(target.string(), error);
    if (::fsync(descriptor_) != 0) throw cannot_write(target.string(), errno);
    if (::close(std::exchange(descriptor_, -1)) != 0) throw cannot_write(target.string(), errno);
  }

  void rename_to(const fs::path& target) {
    if (::rename(name_.c_str(), target.c_str()) != 0) throw cannot_write(target.string(), errno);
    renamed_ = true;
    const int folder = ::open(target.parent_path().c_str(), O_RDONLY | O_DIRECTORY);
    if (folder < 0) return;
    ::fsync(folder);  // the name itself; the content is safe already
    ::close(folder);
  }

 private:
  std::string name_;
  int descriptor_ = -1;
  bool renamed_ = false;
};

// Where the file really stands: a link keeps pointing at it.
fs::path resolved(const fs::path& file) {
  std::error_code error;
  const fs::path full = fs::weakly_canonical(fs::absolute(file, error), error);
  return full.empty() ? file : full;
}

void write_to_device(const fs::path& file, std::string_view text) {
  const int descriptor = ::open(file.c_str(), O_WRONLY | O_CLOEXEC);
  if (descriptor < 0) throw cannot_write(file.string(), errno);
  const int error = write_all(descriptor, text);
  const int close_error = ::close(descriptor) != 0 ? errno : 0;
  if (error == EPIPE) throw ReaderGone{};
  if (error != 0 || close_error != 0)
    throw cannot_write(file.string(), error != 0 ? error : close_error);
}

bool is_device(const fs::path& file) {
  std::error_code error;
  const fs::file_status status = fs::status(file, error);
  return fs::exists(status) && !fs::is_regular_file(status) && !fs::is_directory(status);
}

}  // namespace

void print(std::string_view text) {
  const int error = write_all(STDOUT_FILENO, text);
  if (error == EPIPE) throw ReaderGone{};
  if (error != 0) throw cannot_write("standard output", error);
}

void close_output() {
  if (::close(STDOUT_FILENO) != 0 && errno != EBADF) throw cannot_write("standard output", errno);
}

void note(std::string_view line) {
  write_all(STDERR_FILENO, std::string(line) + "\n");
}

bool error_is_terminal() {
  return ::isatty(STDERR_FILENO) == 1;
}

void require_file_place(const fs::path& file) {
  if (is_device(file)) return;
  const fs::path target = resolved(file);
  std::error_code error;
  if (target.filename().empty() || fs::is_directory(target, error))
    throw InputError({"is a folder", file.string(), {}, "a file name", {}});
  const fs::path folder = target.parent_path();
  if (!fs::is_directory(folder, error))
    throw InputError({"folder " + folder.string() + " does not exist",
                      file.string(),
                      {},
                      "an existing folder",
                      {}});
  if (::access(folder.c_str(), W_OK) != 0) throw cannot_write(file.string(), errno);
}

void write_file(const fs::path& file, std::string_view text) {
  if (is_device(file)) return write_to_device(file, text);
  const fs::path target = resolved(file);
  TemporaryFile temporary(target);
  temporary.write(text, target);
  temporary.rename_to(target);
}

}  // namespace gapwright::cli
