#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/units.hpp"

/// The text level of the value grammar: folding, quoting, cutting.
namespace dutygauge::units {

/// How a text is refused inside the module; the public functions catch it and
/// hand the Misread on.
struct Refusal {
  Misread misread;
  bool wrong_kind = false;  ///< well formed, but a unit of something else
};

/// `text` with every typographic form brought to the plain one ("m²·K/W" is
/// "m2.K/W"), blanks trimmed and single. Valid UTF-8 without control
/// characters, whatever came in. Refuses what is empty or too long to be a value.
std::string folded(std::string_view text);

/// `text` in quotation marks for a message, shortened when long.
std::string quoted(std::string_view text);

std::string_view trimmed(std::string_view text);
std::string lower(std::string_view text);
std::vector<std::string_view> words(std::string_view text);

bool is_digit(char c);
bool all_digits(std::string_view text);

/// A number at the beginning of a text, and what stands behind it.
struct Scanned {
  double amount = 0;
  std::string_view rest;
};

/// Reads "12", "1e-4", "3/4", "1 1/4" or "1-1/4" from the beginning of `text`.
/// Refuses decimal commas, digit groups, hexadecimals, and what is not finite.
Scanned scan_number(std::string_view text);

}  // namespace dutygauge::units
