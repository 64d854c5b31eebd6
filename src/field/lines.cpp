#include "lines.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <system_error>

namespace dutygauge::field {
namespace {

constexpr std::size_t block = 256 * 1024;
constexpr std::uint64_t longest_mark = 4;  ///< of what a file begins with
constexpr const char* check_file = "check that this is a CSV file of readings";
constexpr const char* a_text_file = "a text file with one reading a line";

}  // namespace

FileError::FileError(std::string file, std::int64_t line, int column, Text text)
    : std::runtime_error(fmt::format("{}: {}", file, text.what)),
      file_(std::move(file)),
      line_(line),
      column_(column),
      text_(std::move(text)) {}

std::string shown(std::string_view text, std::size_t longest) {
  std::string result;
  for (const char c : text) {
    if (result.size() >= longest) return result + "...";
    const auto byte = static_cast<unsigned char>(c);
    result += byte < 0x20 || byte >= 0x7F ? '?' : c;
  }
  return result;
}

Lines::Lines(std::string file, const KeepOn& keep_on) : file_(std::move(file)), keep_on_(keep_on) {
  handle_ = file_ == "-" ? STDIN_FILENO : ::open(file_.c_str(), O_RDONLY | O_CLOEXEC | O_NOCTTY);
  const auto refuse = [&](std::string what, std::string remedy) {
    if (handle_ > STDIN_FILENO) ::close(handle_);
    throw FileError(file_, 0, 0, {std::move(what), "a CSV file of readings", std::move(remedy)});
  };
  struct stat status {};
  if (handle_ < 0 || ::fstat(handle_, &status) != 0)
    refuse("cannot be read: " + std::generic_category().message(errno), "check the name and the permissions");
  if (S_ISDIR(status.st_mode)) refuse("is a folder", "name the files in it");
  regular_ = S_ISREG(status.st_mode);
  if (!regular_ && !S_ISFIFO(status.st_mode) && file_ != "-")
    refuse("is neither a file nor a pipe", "name a file");
  buffer_.resize(block + longest_line + 2);
}

Lines::~Lines() {
  if (handle_ > STDIN_FILENO) ::close(handle_);
}

void Lines::fail(int column, std::string what, std::string expected, std::string remedy) const {
  throw FileError(file_, number_, column, {std::move(what), std::move(expected), std::move(remedy)});
}

void Lines::fill() {
  std::memmove(buffer_.data(), buffer_.data() + begin_, end_ - begin_);
  end_ -= begin_;
  begin_ = 0;
  do {
    if (keep_on_ && !keep_on_(bytes_)) throw Interrupted();
    const ssize_t count = ::read(handle_, buffer_.data() + end_, block);
    if (count < 0 && errno == EINTR) continue;
    if (count < 0) {
      number_ = 0;
      fail(0, "cannot be read: " + std::generic_category().message(errno), "a CSV file of readings",
           "check the file and the device it is on");
    }
    const bool was_begin = bytes_ < longest_mark;
    if (count == 0) ended_ = true;
    end_ += static_cast<std::size_t>(count);
    bytes_ += static_cast<std::uint64_t>(count);
    if (was_begin && (bytes_ >= longest_mark || ended_)) check_first_bytes();
  } while (!ended_ && bytes_ < longest_mark);  // a pipe may hand over its first bytes one by one
}

void Lines::check_first_bytes() {
  const std::string_view begin(buffer_.data(), end_);
  number_ = 1;
  if (begin.starts_with("\xFF\xFE") || begin.starts_with("\xFE\xFF"))
    fail(1, "the file is UTF-16", "UTF-8", "save it as UTF-8");
  if (begin.starts_with("\x1F\x8B") || begin.starts_with("PK\x03\x04"))
    fail(1, "the file is compressed, or a workbook", a_text_file, "unpack it, or export it as CSV");
  if (begin.starts_with("\xEF\xBB\xBF")) begin_ = 3;
  number_ = 0;
}

bool Lines::next(std::string_view& line) {
  std::size_t looked = 0;
  for (;;) {
    const char* from = buffer_.data() + begin_;
    const std::size_t available = end_ - begin_;
    const void* found = available > looked ? std::memchr(from + looked, '\n', available - looked) : nullptr;
    std::size_t length =
        found == nullptr ? available : static_cast<std::size_t>(static_cast<const char*>(found) - from);
    if (length > longest_line) {
      ++number_;
      fail(1, fmt::format("a line of more than {} bytes", longest_line), a_text_file, check_file);
    }
    if (found == nullptr && !ended_) {
      looked = available;
      fill();
      continue;
    }
    if (found == nullptr && available == 0) return false;
    ++number_;
    begin_ += length + (found == nullptr ? 0 : 1);
    line = std::string_view(from, length);
    if (const auto nul = line.find('\0'); nul != std::string_view::npos)
      fail(static_cast<int>(nul) + 1, "a zero byte", a_text_file, check_file);
    if (line.ends_with('\r')) line.remove_suffix(1);
    return true;
  }
}

}  // namespace dutygauge::field
