#include <fmt/format.h>

#include <cmath>

#include "parts.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

using bids::Claims;
using bids::Stated;

/// The name of a case without operating cases.

bool is_digit(char c) {
  return c >= '0' && c <= '9';
}

/// Where the first number of a text ends and whether it has a decimal point; 0: none.
struct Digits {
  std::size_t end = 0;
  bool has_point = false;
};

Digits first_number(std::string_view text) {
  Digits digits;
  std::size_t at = 0;
  while (at < text.size() && !is_digit(text[at]) && text[at] != '.') ++at;
  for (; at < text.size(); ++at) {
    if (text[at] == '.' && !digits.has_point)
      digits.has_point = true;
    else if (!is_digit(text[at]))
      break;
    digits.end = at + 1;
  }
  return digits;
}

/// Half a unit of the last digit typed, in SI: the text is read again with a 5 behind that digit.
double rounding_of(const Entry& entry) {
  const Digits digits = first_number(entry.text);
  if (digits.end == 0 || entry.field->form == Form::whole) return 0.0;
  std::string finer = entry.text;
  finer.insert(digits.end, digits.has_point ? "5" : ".5");
  const auto read = units::read(finer, entry.kind());
  const auto* value = std::get_if<units::Value>(&read);
  return value ? std::abs(value->si - entry.value.si) : 0.0;
}

/// The names a claim may be `for`: those of the operating cases, or base without any.
std::string names_of_cases(const Reading& reading) {
  std::string names;
  for (const auto& name : reading.document().of_cases) names += (names.empty() ? "" : "|") + name;
  return names;
}

std::string case_named(Reading& reading) {
  const auto name = word(reading.entries(), "claims.for");
  if (!name) return {};
  const std::string known = names_of_cases(reading);
  if (is_one_of(*name, known)) return std::string(*name);
  const auto near = nearest(*name, known);
  reading.note("claims.for", fmt::format("'{}' is no operating case of this file", shown(*name)),
               listed(known),
               near.empty() ? "write one of them, or leave the key out" : fmt::format("write {}", near));
  return {};
}

bids::MarginBasis basis_of(const Entries& entries) {
  const auto basis = word(entries, "claims.surface_margin.basis");
  if (basis == "clean") return bids::MarginBasis::clean;
  return basis == "design_fouling" ? bids::MarginBasis::design_fouling : bids::MarginBasis::unstated;
}

}  // namespace

Claims claims_of(Reading& reading) {
  Claims claims;
  const Entries& entries = reading.entries();
  for (const bids::ClaimKey& claim : bids::claim_keys()) {
    std::string key = joined("claims", claim.key);
    if (claim.key == "surface_margin") key += ".value";
    const auto found = entries.find(key);
    if (found != entries.end())
      claims.*claim.place = Stated{found->second.value.si, rounding_of(found->second)};
  }
  claims.area_per = word(entries, "claims.area.per") == "shell" ? bids::Per::shell : bids::Per::unit;
  claims.surface_margin_basis = basis_of(entries);
  claims.operating_case = case_named(reading);
  return claims;
}

}  // namespace dutygauge::case_io
