#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <cstdlib>
#include <stdexcept>

#include "kinds.hpp"

namespace dutygauge::units {
namespace {

// Between these, plain digits: 0.00018 m2.K/W and 17760000 Btu/h are read more
// easily than with an exponent.
constexpr int lowest_plain_exponent = -5;
constexpr int highest_plain_exponent = 9;
constexpr int most_digits = 17;  // no double has more

void trim_zeros(std::string& text) {
  if (text.find('.') == std::string::npos) return;
  while (text.back() == '0') text.pop_back();
  if (text.back() == '.') text.pop_back();
  if (text == "-0") text = "0";
}

std::string fixed(double amount, int decimals) {
  std::array<char, 400> buffer{};
  const auto end =
      std::to_chars(buffer.data(), buffer.data() + buffer.size(), amount, std::chars_format::fixed, decimals)
          .ptr;
  std::string text(buffer.data(), end);
  trim_zeros(text);
  return text == "-0" ? "0" : text;
}

// Rounds in the scientific form, then lays the digits out plainly.
std::string significant_digits(double amount, int significant) {
  if (amount == 0.0) return "0";
  std::array<char, 40> buffer{};
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), std::abs(amount),
                                 std::chars_format::scientific, significant - 1)
                       .ptr;
  const std::string written(buffer.data(), end);
  const auto mark = written.find('e');
  const int exponent = std::atoi(written.c_str() + mark + 1);
  std::string digits = written.substr(0, mark);
  std::string text;
  if (exponent < lowest_plain_exponent || exponent >= highest_plain_exponent) {
    trim_zeros(digits);
    text = digits + 'e' + std::to_string(exponent);
  } else {
    std::erase(digits, '.');
    const int before = exponent + 1;  // digits before the point
    if (before <= 0)
      text = "0." + std::string(static_cast<std::size_t>(-before), '0') + digits;
    else if (before >= significant)
      text = digits + std::string(static_cast<std::size_t>(before - significant), '0');
    else
      text = digits.insert(static_cast<std::size_t>(before), ".");
    trim_zeros(text);
  }
  return amount < 0.0 ? '-' + text : text;
}

}  // namespace

std::string_view shown_unit(Kind kind, System system) {
  const KindFacts& known = facts(kind);
  if (system == System::si) return known.si;
  return system == System::metric ? known.metric : known.us;
}

std::string_view json_unit(Kind kind) {
  return facts(kind).json;
}

std::string shown_number(double si, Kind kind, System system, int significant) {
  if (!std::isfinite(si)) throw std::invalid_argument("only a finite number can be shown");
  significant = std::clamp(significant, 1, most_digits);
  if (kind == Kind::count) return fixed(si, 0);
  const double amount = from_si(si, shown_unit(kind, system), kind);
  // The zero of degC and degF is no reason for more decimals: as in kelvin.
  if (kind == Kind::temperature) return fixed(amount, std::max(0, significant - 3));
  return significant_digits(amount, significant);
}

std::string typed(double si, Kind kind, System system, int significant) {
  const std::string number = shown_number(si, kind, system, significant);
  const std::string_view unit = shown_unit(kind, system);
  return unit.empty() ? number : number + ' ' + std::string(unit);
}

}  // namespace dutygauge::units
