#include "text.hpp"

#include <algorithm>
#include <array>
#include <cstdint>

namespace dutygauge::units {
namespace {

constexpr std::size_t longest_value = 200;  // bytes; the longest sensible one has about 60
constexpr std::size_t longest_quote = 48;
constexpr std::string_view replacement = "\xEF\xBF\xBD";

struct Fold {
  char32_t from;
  std::string_view to;
};

// Sorted by code point.
constexpr Fold folds[] = {
    {0xA0, " "},      {0xAD, ""},       {0xB0, "deg"},    {0xB1, "+-"},     {0xB2, "2"},    {0xB3, "3"},
    {0xB5, "u"},      {0xB7, "."},      {0xB9, "1"},      {0xBA, "deg"},    {0xBC, " 1/4"}, {0xBD, " 1/2"},
    {0xBE, " 3/4"},   {0xD7, "*"},      {0x2DA, "deg"},   {0x3BC, "u"},     {0x200B, ""},   {0x200C, ""},
    {0x200D, ""},     {0x200E, ""},     {0x200F, ""},     {0x2010, "-"},    {0x2011, "-"},  {0x2012, "-"},
    {0x2013, "-"},    {0x2014, "-"},    {0x2018, "'"},    {0x2019, "'"},    {0x201C, "\""}, {0x201D, "\""},
    {0x2022, "."},    {0x2026, ".."},   {0x2032, "'"},    {0x2033, "\""},   {0x2044, "/"},  {0x2060, ""},
    {0x2074, "4"},    {0x207B, "^-"},   {0x2103, "degC"}, {0x2109, "degF"}, {0x212A, "K"},  {0x215B, " 1/8"},
    {0x215C, " 3/8"}, {0x215D, " 5/8"}, {0x215E, " 7/8"}, {0x2192, "->"},   {0x2212, "-"},  {0x2215, "/"},
    {0x2219, "."},    {0x22C5, "."},    {0x3000, " "},    {0xFEFF, ""},     {0xFF05, "%"},
};
static_assert(std::ranges::is_sorted(folds, {}, &Fold::from));

struct Decoded {
  char32_t point = 0;
  std::size_t length = 0;  ///< 0: not UTF-8
};

Decoded decode(std::string_view text) {
  const auto byte = [&](std::size_t i) { return static_cast<std::uint8_t>(text[i]); };
  const std::uint8_t first = byte(0);
  if (first < 0x80) return {first, 1};
  const std::size_t length = first >= 0xF0 && first < 0xF5   ? 4
                             : first >= 0xE0 && first < 0xF0 ? 3
                             : first >= 0xC2 && first < 0xE0 ? 2
                                                             : 0;
  if (length == 0 || text.size() < length) return {};
  char32_t point = first & (0x7FU >> length);
  for (std::size_t i = 1; i < length; ++i) {
    if ((byte(i) & 0xC0U) != 0x80U) return {};
    point = (point << 6U) | (byte(i) & 0x3FU);
  }
  constexpr std::array<char32_t, 5> least = {0, 0, 0x80, 0x800, 0x10000};
  if (point < least[length] || point > 0x10FFFF || (point >= 0xD800 && point <= 0xDFFF)) return {};
  return {point, length};
}

// Characters that would change how a terminal or a page shows the message.
bool is_control(char32_t point) {
  return point < 0x20 || (point >= 0x7F && point < 0xA0) || (point >= 0x2028 && point <= 0x202E) ||
         (point >= 0x2066 && point <= 0x2069);
}

std::string_view fold(char32_t point, std::string_view as_written) {
  if (point == '\t' || point == '\n' || point == '\r') return " ";
  if ((point >= 0x2002 && point <= 0x200A) || point == 0x202F || point == 0x205F) return " ";
  const auto* found = std::ranges::lower_bound(folds, point, {}, &Fold::from);
  if (found != std::end(folds) && found->from == point) return found->to;
  return is_control(point) ? replacement : as_written;
}

std::string single_blanks(std::string_view text) {
  std::string result;
  for (const char c : trimmed(text))
    if (c != ' ' || result.back() != ' ') result += c;
  return result;
}

}  // namespace

std::string folded(std::string_view text) {
  if (text.size() > longest_value)
    throw Refusal{{"the text is too long to be a value", "a number and a unit were expected",
                   "write for example \"19.05 mm\""}};
  std::string result;
  while (!text.empty()) {
    const auto [point, length] = decode(text);
    result += length == 0 ? replacement : fold(point, text.substr(0, length));
    text.remove_prefix(std::max<std::size_t>(length, 1));
  }
  result = single_blanks(result);
  for (auto at = result.find("+/-"); at != std::string::npos; at = result.find("+/-"))
    result.erase(at + 1, 1);
  if (result.empty())
    throw Refusal{{"the value is empty", "a number and, as a rule, a unit were expected",
                   "write a value, or \"unknown\" where nobody knows it"}};
  return result;
}

std::string quoted(std::string_view text) {
  if (text.size() <= longest_quote) return '"' + std::string(text) + '"';
  std::size_t end = longest_quote;
  while (end > 0 && (static_cast<std::uint8_t>(text[end]) & 0xC0U) == 0x80U) --end;
  return '"' + std::string(text.substr(0, end)) + "...\"";
}

std::string_view trimmed(std::string_view text) {
  while (!text.empty() && text.front() == ' ') text.remove_prefix(1);
  while (!text.empty() && text.back() == ' ') text.remove_suffix(1);
  return text;
}

std::string lower(std::string_view text) {
  std::string result(text);
  for (char& c : result)
    if (c >= 'A' && c <= 'Z') c = static_cast<char>(c - 'A' + 'a');
  return result;
}

std::vector<std::string_view> words(std::string_view text) {
  std::vector<std::string_view> result;
  while (!(text = trimmed(text)).empty()) {
    const auto end = std::min(text.find(' '), text.size());
    result.push_back(text.substr(0, end));
    text.remove_prefix(end);
  }
  return result;
}

bool is_digit(char c) {
  return c >= '0' && c <= '9';
}

bool all_digits(std::string_view text) {
  return !text.empty() && std::ranges::all_of(text, is_digit);
}

}  // namespace dutygauge::units
