#include "page.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cctype>
#include <cmath>
#include <iterator>
#include <utility>

#include "dutygauge/units/mention.hpp"

namespace dutygauge::report {
namespace {

constexpr std::size_t section_indent = 13;

// Signs that occur in titles and names of plants. Everything else becomes '?'.
constexpr std::pair<std::string_view, std::string_view> spelled[] = {
    {"\u00a0", " "},  {"\u00b0", "deg "}, {"\u00b1", "+-"},  {"\u00b2", "2"},  {"\u00b3", "3"},
    {"\u00b5", "u"},  {"\u03bc", "u"},    {"\u00b7", "."},   {"\u00d7", "x"},  {"\u00df", "ss"},
    {"\u00e4", "ae"}, {"\u00f6", "oe"},   {"\u00fc", "ue"},  {"\u00c4", "Ae"}, {"\u00d6", "Oe"},
    {"\u00dc", "Ue"}, {"\u00e0", "a"},    {"\u00e1", "a"},   {"\u00e2", "a"},  {"\u00e3", "a"},
    {"\u00e5", "a"},  {"\u00e6", "ae"},   {"\u00e7", "c"},   {"\u00e8", "e"},  {"\u00e9", "e"},
    {"\u00ea", "e"},  {"\u00ed", "i"},    {"\u00ee", "i"},   {"\u00f1", "n"},  {"\u00f3", "o"},
    {"\u00f4", "o"},  {"\u00f5", "o"},    {"\u00f8", "o"},   {"\u00fa", "u"},  {"\u00c9", "E"},
    {"\u0394", "d"},  {"\u2013", "-"},    {"\u2014", "-"},   {"\u2018", "'"},  {"\u2019", "'"},
    {"\u201c", "\""}, {"\u201d", "\""},   {"\u2026", "..."}, {"\u2192", "->"}, {"\u2264", "<="},
    {"\u2265", ">="}, {"\u2212", "-"}};

bool continues_character(char c) {
  return (static_cast<unsigned char>(c) & 0xC0u) == 0x80u;
}

std::string padded(const std::string& cell, std::size_t width, Align align) {
  return align == Align::left ? fmt::format("{:<{}}", cell, width) : fmt::format("{:>{}}", cell, width);
}

std::string without_trailing_blanks(std::string_view text) {
  const auto end = text.find_last_not_of(' ');
  return std::string(text.substr(0, end == std::string_view::npos ? 0 : end + 1));
}

// Whether a line may end at this blank: not between a number and its unit.
bool may_break(std::string_view words, std::size_t blank) {
  if (blank == 0 || blank + 1 >= words.size()) return true;
  const auto before = static_cast<unsigned char>(words[blank - 1]);
  const auto after = static_cast<unsigned char>(words[blank + 1]);
  return !(std::isdigit(before) && (std::isalpha(after) || after == '%'));
}

// Where to end a line of at most `width`: at a blank where there is one.
std::size_t line_length(std::string_view words, std::size_t width) {
  if (words.size() <= width) return words.size();
  const auto start = words.substr(0, width + 1);
  auto blank = start.find_last_of(' ');
  while (blank != std::string_view::npos && blank > 0 && !may_break(words, blank))
    blank = start.find_last_of(' ', blank - 1);
  return blank == std::string_view::npos || blank == 0 ? width : blank;
}

std::string take_line(std::string_view& words, std::size_t width) {
  words.remove_prefix(std::min(words.find_first_not_of(' '), words.size()));
  const std::size_t length = line_length(words, width);
  std::string line = without_trailing_blanks(words.substr(0, length));
  words.remove_prefix(length);
  words.remove_prefix(std::min(words.find_first_not_of(' '), words.size()));
  return line;
}

// With one decimal; what rounds to zero has no minus.
std::string with_sign(double amount) {
  const std::string text = fmt::format("{:+.1f}", amount);
  return text == "-0.0" ? "0.0" : text;
}

}  // namespace

std::string ascii(std::string_view utf8) {
  std::string text;
  for (std::size_t i = 0; i < utf8.size();) {
    const auto byte = static_cast<unsigned char>(utf8[i]);
    if (byte < 0x80u) {
      text += byte < 0x20u || byte == 0x7Fu ? ' ' : utf8[i];
      ++i;
      continue;
    }
    std::size_t end = i + 1;
    while (end < utf8.size() && continues_character(utf8[end])) ++end;
    const auto character = utf8.substr(i, end - i);
    const auto* found =
        std::ranges::find(spelled, character, &std::pair<std::string_view, std::string_view>::first);
    text += found == std::end(spelled) ? std::string_view("?") : found->second;
    i = end;
  }
  return text;
}

std::string clipped(std::string text, std::size_t width) {
  if (text.size() <= width) return text;
  return text.substr(0, width - 3) + "...";
}

void Page::blank() {
  text_ += '\n';
}

void Page::line(std::string_view text) {
  const std::string plain = ascii(text);
  for (std::size_t at = 0; at == 0 || at < plain.size(); at += page_width)
    text_ += without_trailing_blanks(std::string_view(plain).substr(at, page_width)) + '\n';
}

void Page::paragraph(std::string_view lead, std::string_view text) {
  const std::string plain = ascii(text);
  std::string_view words = plain;
  std::string before(lead);
  do {
    line(before + take_line(words, page_width - before.size()));
    before.assign(before.size(), ' ');
  } while (!words.empty());
}

void Page::section(std::string_view name, std::string_view text) {
  paragraph(fmt::format("{:<{}}", name, section_indent), text);
}

void Page::table(const std::vector<std::vector<std::string>>& rows, const std::vector<Align>& columns,
                 std::size_t indent) {
  std::vector<std::size_t> widths(columns.size(), 0);
  for (const auto& row : rows)
    for (std::size_t i = 0; i < row.size(); ++i) widths[i] = std::max(widths[i], ascii(row[i]).size());
  for (const auto& row : rows) {
    std::string lead(indent, ' ');
    for (std::size_t i = 0; i + 1 < row.size(); ++i)
      lead += padded(ascii(row[i]), widths[i], columns[i]) + "  ";
    const std::string last = row.empty() ? "" : ascii(row.back());
    const bool right = row.size() == columns.size() && columns.back() == Align::right;
    paragraph(lead, right ? padded(last, widths.back(), Align::right) : last);
  }
}

std::string Figures::number(double si, units::Kind kind, int significant) const {
  return units::shown_figure(si, kind, system_, significant);
}

std::string Figures::unit(units::Kind kind) const {
  return std::string(units::shown_unit(kind, system_));
}

std::string Figures::with_unit(double si, units::Kind kind, int significant) const {
  return units::shown(si, kind, system_, significant);
}

std::string Figures::difference(double kelvin) const {
  const auto kind = units::Kind::temperature_difference;
  const auto name = units::shown_unit(kind, system_);
  return fmt::format("{} {}", with_sign(units::from_si(kelvin, name, kind)), name);
}

std::string signed_percent(double fraction) {
  return with_sign(100.0 * fraction) + " %";
}

}  // namespace dutygauge::report
