#pragma once
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/case_io.hpp"

/// The bytes of a case file before anything is read into them.
namespace dutygauge::case_io {

constexpr std::size_t most_bytes = 4 * 1024 * 1024;
constexpr std::size_t longest_line = 64 * 1024;  ///< the parser looks ahead to the end of a line
constexpr std::size_t most_brackets = 32;        ///< opened one after the other

/// SHA-256 in hexadecimal.
std::string sha256_of(std::string_view bytes);

/// Text with its lines: finds positions, and what makes it no text at all.
class RawText {
 public:
  explicit RawText(std::string_view bytes);

  /// Without a byte-order mark.
  std::string_view content() const { return content_; }

  /// Too long, not UTF-8, binary, endless lines, brackets without end, tabs in the
  /// indentation; the first of these.
  std::optional<Mistake> mistake() const;

  /// From a line and byte column, both from 0, to what people count.
  Position position(int line, int byte_column) const;

  /// The byte there; 0 beyond the end.
  char character(int line, int byte_column) const;

  /// A line's text, without its end; empty where there is none.
  std::string_view line(int line) const;

  /// Whether a quote opens there that nothing closes.
  bool is_open_quote(int line, int byte_column) const;

 private:
  std::size_t offset(int line, int byte_column) const;
  Position position_of(std::size_t offset) const;
  std::optional<Mistake> unreadable_byte() const;
  std::optional<Mistake> unreadable_line() const;

  std::string_view content_;
  std::vector<std::size_t> line_starts_;
};

}  // namespace dutygauge::case_io
