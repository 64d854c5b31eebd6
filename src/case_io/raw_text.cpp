#include "raw_text.hpp"

#include <fmt/format.h>
#include <openssl/evp.h>

#include <algorithm>
#include <array>
#include <stdexcept>

namespace dutygauge::case_io {
namespace {

constexpr const char* check_file = "check that this is a case file";

bool is_continuation(char c) {
  return (static_cast<unsigned char>(c) & 0xC0) == 0x80;
}

/// Bytes of the UTF-8 character that begins here; 0 if there is none.
std::size_t character_length(std::string_view text) {
  const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(text[i]); };
  const unsigned char first = byte(0);
  if (first < 0x80) return 1;
  const std::size_t length = first >= 0xF0 ? 4 : first >= 0xE0 ? 3 : 2;
  if (first < 0xC2 || first > 0xF4 || text.size() < length) return 0;
  for (std::size_t i = 1; i < length; ++i)
    if (!is_continuation(text[i])) return 0;
  // Overlong forms, surrogates, beyond the last code point.
  if ((first == 0xE0 && byte(1) < 0xA0) || (first == 0xED && byte(1) > 0x9F)) return 0;
  if ((first == 0xF0 && byte(1) < 0x90) || (first == 0xF4 && byte(1) > 0x8F)) return 0;
  return length;
}

bool is_control(std::string_view text) {
  const char c = text[0];
  if (c == '\n' || c == '\t') return false;
  if (c == '\r') return text.size() < 2 || text[1] != '\n';
  return static_cast<unsigned char>(c) < 0x20 || c == 0x7F;
}

/// Where more brackets than any case needs are opened one after the other; npos: nowhere.
std::size_t too_many_brackets(std::string_view line) {
  std::size_t open = 0;
  for (std::size_t i = 0; i < line.size(); ++i) {
    if (line[i] == '[' || line[i] == '{')
      ++open;
    else if (line[i] != ' ')
      open = 0;
    if (open > most_brackets) return i;
  }
  return std::string_view::npos;
}

}  // namespace

std::string sha256_of(std::string_view bytes) {
  std::array<unsigned char, EVP_MAX_MD_SIZE> digest{};
  unsigned int length = 0;
  if (EVP_Digest(bytes.data(), bytes.size(), digest.data(), &length, EVP_sha256(), nullptr) != 1)
    throw std::runtime_error("the checksum of an input could not be computed");
  constexpr std::string_view digits = "0123456789abcdef";
  std::string text;
  for (unsigned int i = 0; i < length; ++i) {
    text += digits[digest[i] >> 4];
    text += digits[digest[i] & 15];
  }
  return text;
}

RawText::RawText(std::string_view bytes) : content_(bytes), line_starts_{0} {
  if (content_.starts_with("\xEF\xBB\xBF")) content_.remove_prefix(3);
  if (content_.size() > most_bytes) return;
  for (std::size_t i = 0; i < content_.size(); ++i)
    if (content_[i] == '\n') line_starts_.push_back(i + 1);
}

std::optional<Mistake> RawText::mistake() const {
  if (content_.size() > most_bytes)
    return Mistake{{}, "", "the file is larger than 4 MB", "a case of some kilobytes", check_file};
  if (content_.starts_with("\xFF\xFE") || content_.starts_with("\xFE\xFF"))
    return Mistake{{1, 1}, "", "the file is UTF-16", "UTF-8", "save it as UTF-8"};
  if (auto mistake = unreadable_byte()) return mistake;
  return unreadable_line();
}

std::optional<Mistake> RawText::unreadable_byte() const {
  for (std::size_t i = 0; i < content_.size();) {
    const std::size_t length = character_length(content_.substr(i));
    if (length == 0)
      return Mistake{position_of(i), "", "the bytes here are not UTF-8", "a text file in UTF-8",
                     "save it as UTF-8"};
    if (is_control(content_.substr(i)))
      return Mistake{position_of(i), "",
                     content_[i] == '\r' ? "a lone carriage return" : "a control character",
                     "a text file with lines ended by LF or CR LF", check_file};
    i += length;
  }
  return {};
}

std::optional<Mistake> RawText::unreadable_line() const {
  for (std::size_t i = 0; i < line_starts_.size(); ++i) {
    const auto text = line(static_cast<int>(i));
    if (text.size() > longest_line)
      return Mistake{position_of(line_starts_[i]), "", fmt::format("a line of {} bytes", text.size()),
                     fmt::format("at most {}", longest_line), check_file};
    if (const auto at = too_many_brackets(text); at != std::string_view::npos)
      return Mistake{position_of(line_starts_[i] + at), "",
                     fmt::format("more than {} brackets opened in a row: nested too deeply", most_brackets),
                     "at most 6 levels", "check the brackets"};
    const auto first = std::min(text.find_first_not_of(" \t"), text.size());
    const auto tab = text.substr(0, first).find('\t');
    if (tab != std::string_view::npos && first < text.size() && text[first] != '#')
      return Mistake{position_of(line_starts_[i] + tab), "", "a tab in the indentation", "blanks only",
                     "replace each tab by two blanks"};
  }
  return {};
}

std::string_view RawText::line(int line) const {
  if (line < 0 || static_cast<std::size_t>(line) >= line_starts_.size()) return {};
  const auto text = content_.substr(line_starts_[static_cast<std::size_t>(line)]);
  const auto end = text.find('\n');
  const auto result = text.substr(0, end);
  return result.ends_with('\r') ? result.substr(0, result.size() - 1) : result;
}

bool RawText::is_open_quote(int line, int byte_column) const {
  const std::size_t start = offset(line, byte_column);
  const char quote = character(line, byte_column);
  if (quote != '"' && quote != '\'') return false;
  for (std::size_t i = start + 1; i < content_.size(); ++i) {
    if (quote == '"' && content_[i] == '\\')
      ++i;
    else if (content_[i] == quote)
      return false;
  }
  return true;
}

std::size_t RawText::offset(int line, int byte_column) const {
  if (line < 0) return 0;
  if (static_cast<std::size_t>(line) >= line_starts_.size()) return content_.size();
  return std::min(
      line_starts_[static_cast<std::size_t>(line)] + static_cast<std::size_t>(std::max(byte_column, 0)),
      content_.size());
}

Position RawText::position(int line, int byte_column) const {
  return position_of(offset(line, byte_column));
}

char RawText::character(int line, int byte_column) const {
  const std::size_t at = offset(line, byte_column);
  return at < content_.size() ? content_[at] : '\0';
}

Position RawText::position_of(std::size_t offset) const {
  const auto next = std::ranges::upper_bound(line_starts_, offset);
  const std::size_t start = *std::prev(next);
  const auto line = content_.substr(start, offset - start);
  const auto characters = std::ranges::count_if(line, [](char c) { return !is_continuation(c); });
  return {static_cast<int>(next - line_starts_.begin()), static_cast<int>(characters) + 1};
}

}  // namespace dutygauge::case_io
