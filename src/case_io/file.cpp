#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <system_error>

#include "dutygauge/case_io.hpp"
#include "raw_text.hpp"

namespace dutygauge::case_io {
namespace {

[[noreturn]] void fail(const std::string& file, std::string what, std::string expected, std::string remedy) {
  throw InputError(file, {{{}, "", std::move(what), std::move(expected), std::move(remedy)}});
}

[[noreturn]] void fail_with(int error, const std::string& file) {
  fail(file, "cannot be read: " + std::generic_category().message(error), "a case file that may be read",
       "check the name and the permissions");
}

/// An open file, closed at the end; standard input stays open.
class Handle {
 public:
  explicit Handle(const std::string& path)
      : number_(path == "-" ? STDIN_FILENO : ::open(path.c_str(), O_RDONLY | O_CLOEXEC | O_NOCTTY)) {}
  ~Handle() {
    if (number_ > STDIN_FILENO) ::close(number_);
  }
  Handle(const Handle&) = delete;
  Handle& operator=(const Handle&) = delete;
  int number() const { return number_; }

 private:
  int number_;
};

void require_file_or_pipe(const Handle& handle, const std::string& path) {
  struct stat status {};
  if (::fstat(handle.number(), &status) != 0) fail_with(errno, path);
  if (S_ISDIR(status.st_mode)) fail(path, "is a folder", "a case file", "name a file in it");
  if (!S_ISREG(status.st_mode) && !S_ISFIFO(status.st_mode) && path != "-")
    fail(path, "is neither a file nor a pipe", "a case file", "name a file");
  if (S_ISREG(status.st_mode) && status.st_size > static_cast<off_t>(most_bytes) + 3)
    fail(path, "is larger than 4 MB", "a case of some kilobytes", "check that this is a case file");
}

std::string all_bytes(const Handle& handle, const std::string& path) {
  std::string bytes;
  char block[65536];
  while (bytes.size() <= most_bytes + 3) {
    const ssize_t count = ::read(handle.number(), block, sizeof block);
    if (count == 0) return bytes;
    if (count > 0)
      bytes.append(block, static_cast<std::size_t>(count));
    else if (errno != EINTR)
      fail_with(errno, path);
  }
  return bytes;  // over the limit: refused where the text is read
}

}  // namespace

std::string read_text(const std::string& path) {
  const Handle handle(path);
  if (handle.number() < 0) fail_with(errno, path);
  require_file_or_pipe(handle, path);
  return all_bytes(handle, path);
}

Document read_file(const std::string& path) {
  return read_document(read_text(path), path);
}

}  // namespace dutygauge::case_io
