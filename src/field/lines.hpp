#pragma once
#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/readings.hpp"

/// Lines of a file through one buffer.
namespace dutygauge::field {

constexpr std::size_t longest_line = 64 * 1024;

class Lines {
 public:
  /// "-" is standard input. Throws FileError where it cannot be read.
  Lines(std::string file, const KeepOn& keep_on);
  ~Lines();
  Lines(const Lines&) = delete;
  Lines& operator=(const Lines&) = delete;

  /// The next line without its end, valid until the next call; false at the end of the file.
  bool next(std::string_view& line);

  const std::string& file() const { return file_; }
  std::int64_t number() const { return number_; }  ///< of the line last returned, from 1
  bool is_regular() const { return regular_; }

  [[noreturn]] void fail(int column, std::string what, std::string expected, std::string remedy) const;

 private:
  void fill();
  void check_first_bytes();

  std::string file_;
  const KeepOn& keep_on_;
  int handle_ = -1;
  bool regular_ = false, ended_ = false;
  std::vector<char> buffer_;
  std::size_t begin_ = 0, end_ = 0;
  std::int64_t number_ = 0;
  std::uint64_t bytes_ = 0;
};

/// Text of a file as it may stand in a message.
std::string shown(std::string_view text, std::size_t longest = 40);

}  // namespace dutygauge::field
