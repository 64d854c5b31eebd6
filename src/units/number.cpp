#include <fmt/core.h>

#include <algorithm>
#include <charconv>
#include <cmath>

#include "text.hpp"

namespace dutygauge::units {
namespace {

constexpr auto npos = std::string_view::npos;

bool digit_at(std::string_view text, std::size_t at) {
  return at < text.size() && is_digit(text[at]);
}

std::size_t digits_at(std::string_view text, std::size_t from) {
  std::size_t end = from;
  while (digit_at(text, end)) ++end;
  return end - from;
}

// The length of "7/8" at `from`; 0 if there is none ("1/K" is a unit).
std::size_t fraction_at(std::string_view text, std::size_t from) {
  const std::size_t above = digits_at(text, from);
  if (above == 0 || from + above >= text.size() || text[from + above] != '/') return 0;
  const std::size_t below = digits_at(text, from + above + 1);
  return below == 0 ? 0 : above + 1 + below;
}

double plain(std::string_view digits) {
  double value = 0;
  std::from_chars(digits.data(), digits.data() + digits.size(), value);
  return value;
}

double fraction(std::string_view text, bool behind_whole) {
  const auto slash = text.find('/');
  const double above = plain(text.substr(0, slash)), below = plain(text.substr(slash + 1));
  if (below == 0.0)
    throw Refusal{{fmt::format("{} divides by zero", quoted(text)), "a fraction was expected",
                   "write for example \"3/4 in\""}};
  if (behind_whole && above >= below)
    throw Refusal{{fmt::format("{} behind a whole number is not a part of one", quoted(text)),
                   "a fraction below one was expected", "write for example \"1 1/4 in\""}};
  return above / below;
}

// The beginning of `text` as far as it looks like a number with marks in it.
std::string_view marked_number(std::string_view text) {
  std::size_t end = 0;
  while (end < text.size()) {
    const bool mark = std::string_view(".,'_ ").find(text[end]) != npos && digit_at(text, end + 1);
    if (!is_digit(text[end]) && !mark) break;
    ++end;
  }
  return text.substr(0, end);
}

std::string without(std::string_view text, std::string_view marks) {
  std::string result;
  std::ranges::copy_if(text, std::back_inserter(result), [&](char c) { return marks.find(c) == npos; });
  return result;
}

std::string with_point(std::string_view text, char decimal) {
  std::string result = without(text, decimal == ',' ? "." : ",");
  std::ranges::replace(result, ',', '.');
  return result;
}

// Whether every group behind the first mark of a kind has its three digits.
bool has_thousands(std::string_view text, char mark) {
  for (auto at = text.find(mark); at != npos; at = text.find(mark, at + 1))
    if (digits_at(text, at + 1) != 3) return false;
  return true;
}

// Says what a number with commas, several dots or blanks in it may mean.
[[noreturn]] void refuse_marks(std::string_view text) {
  const std::string_view written = marked_number(text);
  const std::string bare = without(written, "'_ ");
  const auto commas = std::ranges::count(bare, ','), dots = std::ranges::count(bare, '.');
  const char last = bare.find_last_of(".,") == npos ? ' ' : bare[bare.find_last_of(".,")];
  const std::string expected = "a decimal point and no digit groups were expected";
  const auto comma = bare.find(',');
  if (commas == 1 && dots == 0 && bare.size() - comma == 4 && bare[0] != '0')
    throw Refusal{{fmt::format("the comma in {} may group thousands or be a decimal comma", quoted(written)),
                   expected,
                   fmt::format("write \"{}\" or \"{}\"", without(bare, ","), with_point(bare, ','))}};
  if ((dots > 1 && !has_thousands(bare, '.')) || (commas > 1 && !has_thousands(bare, ',')))
    throw Refusal{{fmt::format("{} has more than one decimal mark", quoted(written)), expected,
                   "write one decimal point and no other mark"}};
  const bool decimal_comma = commas == 1 && last == ',';
  const bool decimal_point = dots == 1 && last == '.';
  const std::string meant = decimal_comma || decimal_point ? with_point(bare, last) : without(bare, ".,");
  throw Refusal{
      {fmt::format("{} has {}", quoted(written),
                   decimal_comma ? (dots > 0 ? "digit groups and a decimal comma" : "a decimal comma")
                                 : "digit groups"),
       expected, fmt::format("write \"{}\"", meant)}};
}

[[noreturn]] void refuse_no_number(std::string_view text) {
  if (text.empty())
    throw Refusal{{"a number is missing", "a number and, as a rule, a unit were expected",
                   "write for example \"19.05 mm\""}};
  const std::string begin = lower(text.substr(0, 3));
  if (begin == "nan" || begin == "inf")
    throw Refusal{{fmt::format("{} is not a finite number", quoted(text)), "a finite number was expected",
                   "write the value, or \"unknown\" where nobody knows it"}};
  throw Refusal{{fmt::format("{} does not begin with a number", quoted(text)),
                 "a number and, as a rule, a unit were expected", "write for example \"19.05 mm\""}};
}

// What may not stand behind a number: more of a number.
void check_rest(std::string_view all, std::string_view rest) {
  if (rest.empty()) return;
  const bool plain_so_far = marked_number(all).size() > all.size() - rest.size();
  if (plain_so_far && std::string_view(".,'_").find(rest[0]) != npos && digit_at(rest, 1)) refuse_marks(all);
  if (rest[0] == ',')
    throw Refusal{{fmt::format("a comma stands behind the number in {}", quoted(all)),
                   "a number and a unit were expected", "leave the comma out"}};
  if (rest[0] == '-' && digit_at(rest, 1))
    throw Refusal{{fmt::format("{} joins two numbers by a dash", quoted(all)),
                   "one number or a range was expected", "write a range as \"10..14 in\""}};
  if (std::string_view(" .,'_").find(rest[0]) == npos || !digit_at(rest, 1)) return;
  const std::size_t digits = digits_at(rest, 1);
  // "748 1/m": the one is the unit's.
  if (digits == 1 && rest[1] == '1' && rest.size() > 2 && rest[2] == '/' && !digit_at(rest, 3)) return;
  if (digits == 3 && plain_so_far) refuse_marks(all);
  throw Refusal{{fmt::format("two numbers stand side by side in {}", quoted(all)),
                 "one number and its unit were expected",
                 "write one number; a range is \"10..14 in\", a fraction \"1 1/4 in\""}};
}

// Adds the fraction behind a whole number: "1 1/4", "1-1/4", or 3 of "3/4".
Scanned with_fraction(std::string_view whole, std::string_view rest) {
  if (rest.empty()) return {plain(whole), rest};
  if (rest[0] == '/' && digit_at(rest, 1)) {
    const std::size_t length = whole.size() + 1 + digits_at(rest, 1);
    const std::string text = fmt::format("{}{}", whole, rest.substr(0, length - whole.size()));
    return {fraction(text, false), rest.substr(length - whole.size())};
  }
  const std::size_t length = rest[0] == ' ' || rest[0] == '-' ? fraction_at(rest, 1) : 0;
  if (length == 0) return {plain(whole), rest};
  return {plain(whole) + fraction(rest.substr(1, length), true), rest.substr(1 + length)};
}

}  // namespace

Scanned scan_number(std::string_view text) {
  const std::string_view all = text;
  const bool negative = !text.empty() && text[0] == '-';
  if (negative || (!text.empty() && text[0] == '+')) text.remove_prefix(1);
  if (!digit_at(text, 0) && !(text.substr(0, 1) == "." && digit_at(text, 1))) refuse_no_number(text);
  if (text.size() > 1 && text[0] == '0' && (text[1] == 'x' || text[1] == 'X'))
    throw Refusal{{fmt::format("{} looks hexadecimal", quoted(all)), "a decimal number was expected",
                   "write it with decimal digits"}};
  double amount = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), amount);
  if (error != std::errc{} || !std::isfinite(amount))
    throw Refusal{{fmt::format("{} is too large or too small to be computed with", quoted(all)),
                   "a number of ordinary size was expected", "check the exponent"}};
  const auto length = static_cast<std::size_t>(end - text.data());
  Scanned result{amount, text.substr(length)};
  if (all_digits(text.substr(0, length))) result = with_fraction(text.substr(0, length), result.rest);
  check_rest(text, result.rest);
  if (!std::isfinite(result.amount)) refuse_no_number("inf");
  return {negative ? -result.amount : result.amount, trimmed(result.rest)};
}

std::optional<double> number(std::string_view text) {
  if (text.size() > 1 && text[0] == '+' && text[1] != '-') text.remove_prefix(1);
  double value = 0;
  const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value);
  if (error != std::errc{} || end != text.data() + text.size() || !std::isfinite(value)) return {};
  return value;
}

}  // namespace dutygauge::units
