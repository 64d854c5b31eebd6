#include "record_leaves.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/field/times.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

using units::Kind;
using units::Misread;

Misread misread(const Field& field, std::string what, std::string remedy) {
  return {std::move(what), expected_of(field), std::move(remedy)};
}

std::string quoted(std::string_view text) {
  return fmt::format("'{}'", shown(text));
}

bool is_capital(char c) {
  return c >= 'A' && c <= 'Z';
}

}  // namespace

std::optional<Misread> read_instant(const Entry& entry) {
  if (field::read_moment(entry.text, 0)) return {};
  const auto fault = field::TimeReader({}).read(entry.text, 0).fault;
  const bool slashes = fault == field::TimeFault::slashes;
  return misread(
      *entry.field,
      quoted(entry.text) + (slashes ? " may have its day or its month first" : " is no date and no time"),
      "write year-month-day, and behind it T13:00+01:00 for a time of day");
}

std::optional<Misread> read_money(Entry& entry, bool for_energy) {
  const std::string_view text = entry.text;
  const auto refuse = [&](std::string_view why) {
    return misread(*entry.field, quoted(text) + std::string(why),
                   fmt::format("write for example {}", entry.field->example));
  };
  const auto letters = text.find_first_of("ABCDEFGHIJKLMNOPQRSTUVWXYZ");
  const std::string_view amount = text.substr(0, std::min(letters, text.size()));
  const auto value = units::number(amount.substr(0, amount.find_last_not_of(' ') + 1));
  if (!value || letters == std::string_view::npos) return refuse(" is no amount with a currency");
  if (*value < 0.0) return refuse(" is negative");
  const std::string_view rest = text.substr(letters);
  const auto slash = rest.find('/');
  const std::string_view currency = rest.substr(0, slash);
  if (currency.size() != 3 || !std::ranges::all_of(currency, is_capital))
    return refuse(" has no currency of three capital letters");
  entry.currency = currency;
  entry.value.si = *value;
  if (for_energy != (slash != std::string_view::npos))
    return refuse(for_energy ? " is not for an energy" : " has more than a currency behind it");
  if (!for_energy) return {};
  // An energy in a second is a power, of which `units` knows every unit.
  const auto joules = units::read(fmt::format("1 {}/s", rest.substr(slash + 1)), Kind::power);
  if (!std::holds_alternative<units::Value>(joules)) return refuse(" is not for an energy");
  entry.value.si /= std::get<units::Value>(joules).si;
  return {};
}

std::optional<Misread> read_uncertainty(Entry& entry) {
  const Field& field = *entry.field;
  auto as_share = units::read(entry.text, Kind::ratio);
  const bool is_share = std::holds_alternative<units::Value>(as_share) && !units::number(entry.text);
  if (!is_share) {
    const auto read = units::read(entry.text, field.kind);
    if (const auto* mistake = std::get_if<Misread>(&read))
      return misread(field, mistake->what, mistake->remedy);
    entry.value = std::get<units::Value>(read);
    if (entry.value.si >= 0.0 && entry.value.si <= field.bounds.most) return {};
    return misread(field, quoted(entry.text) + " is negative, or larger than anything measured",
                   "check the value");
  }
  if (field.kind == Kind::temperature_difference)
    return misread(field,
                   quoted(entry.text) + ": a share of a temperature depends on where its scale has its zero",
                   "write it in K");
  entry.relative = field.kind != Kind::ratio;
  entry.value = std::get<units::Value>(std::move(as_share));
  if (entry.value.si < 0.0 || entry.value.si > 0.5)
    return misread(field, quoted(entry.text) + " is not between 0 and 50 %", "check the value");
  return {};
}

}  // namespace dutygauge::case_io
