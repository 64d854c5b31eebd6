#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <variant>

#include "cut.hpp"
#include "reading.hpp"
#include "record_leaves.hpp"
#include "wording.hpp"

// From the text of a leaf to its value, by the form of its row.

namespace dutygauge::case_io {
namespace {

using units::Kind;
using units::Misread;

using Outcome = std::variant<Entry, Misread>;

Misread misread(const Field& field, std::string what, std::string remedy) {
  return {std::move(what), expected_of(field), std::move(remedy)};
}

std::string quoted(std::string_view text) {
  return fmt::format("'{}'", shown(text));
}

std::string typed_bound(double bound, Kind kind) {
  if (kind == Kind::ratio) return fmt::format("{:.6g} %", 100.0 * bound);
  return units::typed(bound, kind, kind == Kind::length ? units::System::si : units::System::metric);
}

std::optional<Misread> out_of_bounds(const Entry& entry, double value) {
  const Field& field = *entry.field;
  const Bounds& bounds = field.bounds;
  const Kind kind = entry.kind();
  const bool is_below = bounds.least_excluded ? !(value > bounds.least) : !(value >= bounds.least);
  if (!is_below && value <= bounds.most) return {};
  std::string why;
  if (is_below && bounds.least == 0.0)
    why = value < 0.0 ? "negative" : "zero";
  else if (is_below)
    why = fmt::format("below {}, the least that is plausible", typed_bound(bounds.least, kind));
  else
    why = fmt::format("above {}, the most that is plausible", typed_bound(bounds.most, kind));
  const bool lacks_per_cent = kind == Kind::ratio && units::number(entry.text);
  return misread(field, fmt::format("{} is {}", quoted(entry.text), why),
                 lacks_per_cent ? fmt::format("write {} % if that is meant", entry.text)
                                : "check the value and its unit");
}

/// Multiplies what was read, and shows the factor behind the text.
Entry times_factor(Entry entry) {
  if (entry.factor == 1.0) return entry;
  entry.value.si *= entry.factor;
  entry.second *= entry.factor;
  for (auto* end : {&entry.value.low, &entry.value.high, &entry.value.standard_deviation})
    if (*end) **end *= entry.factor;
  entry.text += fmt::format(" x{}", entry.factor);
  return entry;
}

/// Whether a factor means anything there: not on words, counts, or what is counted from a datum.
std::optional<Misread> factor_refused(const Field& field) {
  switch (field.form) {
    case Form::quantity:
    case Form::pair:
      if (field.kind == Kind::temperature || field.kind == Kind::pressure)
        return misread(
            field, fmt::format("a factor on a {}, which is counted from a datum", units::name(field.kind)),
            "write the value itself");
      return {};
    case Form::either_viscosity:
    case Form::property:
    case Form::flow:
    case Form::wall:
    case Form::bore:
      return {};
    case Form::number:
    case Form::whole:
    case Form::whole_or_list:
      return misread(field, "a factor on a plain number", "write the number itself");
    default:
      return misread(field, "a factor on a word", "write the word itself");
  }
}

/// The checks that every number goes through: its middle and its ends.
Outcome checked(Entry entry) {
  entry = times_factor(std::move(entry));
  for (const auto& end : {std::optional(entry.value.si), entry.value.low, entry.value.high})
    if (end)
      if (auto mistake = out_of_bounds(entry, *end)) return *mistake;
  // Of what cannot be negative, a third of all values would be.
  const auto& deviation = entry.value.standard_deviation;
  if (deviation && entry.field->bounds.least == 0.0 && *deviation >= entry.value.si)
    return misread(*entry.field, quoted(entry.text) + " is a spread as wide as the value itself",
                   "give one standard deviation, or a range such as 8..12");
  return entry;
}

Outcome from_value(Entry entry, units::Read<units::Value> read) {
  if (auto* mistake = std::get_if<Misread>(&read)) return *mistake;
  entry.value = std::get<units::Value>(std::move(read));
  return checked(std::move(entry));
}

constexpr std::string_view of_area = " of area";

Outcome read_cut_by_area(Entry entry) {
  const std::string_view share = std::string_view(entry.text).substr(0, entry.text.size() - of_area.size());
  auto read = units::read(share, Kind::ratio);
  if (auto* mistake = std::get_if<Misread>(&read)) return *mistake;
  entry.value = std::get<units::Value>(std::move(read));
  if (auto mistake = out_of_bounds(entry, entry.value.si)) return *mistake;
  for (auto* end : {&entry.value.low, &entry.value.high})
    if (*end) **end = cut_of_area(**end);
  const double cut = cut_of_area(entry.value.si);
  if (auto& deviation = entry.value.standard_deviation)
    *deviation *= (cut_of_area(entry.value.si + 1e-4) - cut) / 1e-4;
  entry.value.si = cut;
  return checked(std::move(entry));
}

Outcome read_quantity(Entry entry) {
  const Field& field = *entry.field;
  if (field.key == "exchanger.baffles.cut" && entry.text.ends_with(of_area)) return read_cut_by_area(entry);
  return from_value(entry, units::read(entry.text, field.kind));
}

/// API degrees, Watson factor: numbers in which per cent would mean something else.
Outcome read_number(Entry entry) {
  const auto amount = units::number(entry.text);
  if (!amount)
    return misread(*entry.field, quoted(entry.text) + " is not a plain number",
                   "write a number alone, with a point for decimals");
  entry.value.si = *amount;
  return checked(std::move(entry));
}

Outcome read_either_viscosity(Entry entry) {
  auto read = units::read(entry.text, Kind::kinematic_viscosity);
  if (std::holds_alternative<Misread>(read)) {
    auto as_dynamic = units::read(entry.text, Kind::viscosity);
    entry.dynamic = std::holds_alternative<units::Value>(as_dynamic);
    if (entry.dynamic) read = std::move(as_dynamic);
  }
  if (auto* mistake = std::get_if<Misread>(&read)) mistake->expected = expected_of(*entry.field);
  return from_value(std::move(entry), std::move(read));
}

Outcome read_property(Entry entry) {
  auto read = units::read_value_at(entry.text, entry.field->kind);
  if (auto* mistake = std::get_if<Misread>(&read)) return *mistake;
  units::ValueAt& known = std::get<units::ValueAt>(read);
  entry.at_temperature = known.temperature;
  return from_value(std::move(entry), std::move(known.value));
}

Outcome read_angle(Entry entry) {
  const Field& field = *entry.field;
  Outcome outcome = from_value(entry, units::read(entry.text, Kind::angle));
  if (const auto* read = std::get_if<Entry>(&outcome))
    if (!is_one_of(fmt::format("{}", read->value.si), field.words))
      return misread(field, quoted(entry.text) + " is not one of the layouts", "check the drawing");
  return outcome;
}

Outcome read_flow(Entry entry) {
  if (entry.text == "from_duty") {
    entry.from_duty = true;
    if (entry.factor != 1.0) entry.text += fmt::format(" x{}", entry.factor);
    return entry;
  }
  auto read = units::read_flow(entry.text);
  if (auto* mistake = std::get_if<Misread>(&read)) return *mistake;
  units::Flow& flow = std::get<units::Flow>(read);
  entry.value = std::move(flow.amount);
  for (auto& open : flow.taken_for_granted) entry.value.taken_for_granted.push_back(std::move(open));
  entry.basis = flow.basis;
  entry.at_temperature = flow.basis_temperature;
  return checked(std::move(entry));
}

Outcome read_pair(Entry entry) {
  auto read = units::read_pair(entry.text, entry.field->kind);
  if (auto* mistake = std::get_if<Misread>(&read)) return *mistake;
  units::Pair& pair = std::get<units::Pair>(read);
  entry.value = std::move(pair.first);
  entry.second = pair.second.si;
  entry.outlet = std::move(pair.second);
  entry = times_factor(std::move(entry));
  for (const double value : {entry.value.si, entry.second})
    if (auto mistake = out_of_bounds(entry, value)) return *mistake;
  return entry;
}

Outcome read_word(Entry entry) {
  const Field& field = *entry.field;
  if (is_one_of(entry.text, field.words)) return entry;
  const auto near = nearest(entry.text, field.words);
  return misread(field, quoted(entry.text) + " is not known here",
                 near.empty() ? "write one of them" : fmt::format("write {}", near));
}

Outcome read_boolean(Entry entry) {
  if (entry.text == "true" || entry.text == "false") return entry;
  const bool is_yes =
      entry.text == "yes" || entry.text == "on" || entry.text == "Yes" || entry.text == "True";
  return misread(*entry.field, quoted(entry.text) + " is neither true nor false",
                 is_yes ? "write true" : "write true or false");
}

Outcome read_version(Entry entry) {
  if (entry.text == "1") return entry;
  return misread(*entry.field, quoted(entry.text) + " is not a version of the case format known here",
                 "write 1, or take a newer dutygauge");
}

Outcome read_tema(Entry entry) {
  const Field& field = *entry.field;
  const auto is_letter = [](char c) { return c >= 'A' && c <= 'Z'; };
  if (entry.text.size() != 3 || !std::ranges::all_of(entry.text, is_letter))
    return misread(field, quoted(entry.text) + " is not three capital letters",
                   "write front head, shell and rear head");
  if (entry.text[1] == 'K')
    return misread(field, "a kettle (K) boils on the shell side",
                   "single-phase shells are rated: E, F, G, H, J or X");
  return entry;
}

Outcome read_by_form(Entry entry) {
  switch (entry.field->form) {
    case Form::word:
      return read_word(std::move(entry));
    case Form::boolean:
      return read_boolean(std::move(entry));
    case Form::version:
      return read_version(std::move(entry));
    case Form::tema:
      return read_tema(std::move(entry));
    case Form::whole:
    case Form::whole_or_list:
      return from_value(entry, units::read(entry.text, Kind::count));
    case Form::number:
      return read_number(std::move(entry));
    case Form::quantity:
      return read_quantity(std::move(entry));
    case Form::either_viscosity:
      return read_either_viscosity(std::move(entry));
    case Form::property:
      return read_property(std::move(entry));
    case Form::angle:
      return read_angle(std::move(entry));
    case Form::wall:
      return from_value(entry, units::read_wall(entry.text));
    case Form::bore:
      return from_value(entry, units::read_bore(entry.text));
    case Form::flow:
      return read_flow(std::move(entry));
    case Form::pair:
      return read_pair(std::move(entry));
    case Form::instant:
      if (auto mistake = read_instant(entry)) return *mistake;
      return entry;
    case Form::money:
      if (auto mistake = read_money(entry, false)) return *mistake;
      return entry;
    case Form::energy_price:
      if (auto mistake = read_money(entry, true)) return *mistake;
      return entry;
    case Form::uncertainty:
      if (auto mistake = read_uncertainty(entry)) return *mistake;
      return entry;
    case Form::texts:
    case Form::text:
    case Form::fluid:
    case Form::block:
    case Form::list:
    case Form::wholes:
    case Form::overlay:
      return entry;
  }
  return entry;
}

/// The document that would settle a value.
std::string place_of(std::string_view key) {
  if (key.starts_with("exchanger.baffles") || key.starts_with("exchanger.clearances"))
    return "bundle drawing";
  if (key.starts_with("exchanger.pass_lanes")) return "tube layout drawing";
  return "datasheet";
}

std::optional<Misread> misplaced_factor(const Field& field, const Leaf& leaf) {
  if (leaf.factor != 1.0) return factor_refused(field);
  if (field.form == Form::text || !begins_like_a_factor(leaf.text)) return {};
  return misread(field, quoted(leaf.text) + " is a factor, and there is no value here that it could multiply",
                 "write the value itself; factors are for operating_cases and present");
}

}  // namespace

void Reading::read_leaves() {
  for (const auto& [key, leaf] : document_.leaves)
    if (!is_refused(key))
      if (const Field* field = table_.find(key)) read_leaf(key, leaf, *field);
}

void Reading::read_leaf(const std::string& key, const Leaf& leaf, const Field& field) {
  if (leaf.text.empty() && !leaf.quoted)
    return note(key, "has no value", expected_of(field), "write the value, or leave the key out");
  if (leaf.text == "unknown" && !leaf.quoted && (field.form != Form::text || field.need == Need::required)) {
    unknown_.insert(key);
    return;
  }
  if (const auto mistake = misplaced_factor(field, leaf))
    return note(key, mistake->what, mistake->expected, mistake->remedy);
  Outcome outcome =
      read_by_form({.field = &field, .text = leaf.text, .line = leaf.value_at.line, .factor = leaf.factor});
  if (const auto* mistake = std::get_if<Misread>(&outcome))
    return note(key, mistake->what, mistake->expected, mistake->remedy);
  take(key, std::get<Entry>(std::move(outcome)));
}

void Reading::take(const std::string& key, Entry entry) {
  // What is said of a record or of a plan does not reach a rating.
  if (key.starts_with("readings.") || key.starts_with("plan.")) {
    entries_.emplace(key, std::move(entry));
    return;
  }
  for (const std::string& open : entry.value.taken_for_granted) {
    Assumption assumption{.key = key, .value = entry.value.si, .kind = entry.kind(), .why = open};
    assumption.low = entry.value.low;
    assumption.high = entry.value.high;
    if (entry.value.bare_pressure) {
      assumption.low = entry.value.si;
      assumption.high = entry.value.si + units::to_si(0.0, "barg", Kind::pressure);
      assumption.look_in = "datasheet";
    }
    assume(std::move(assumption));
  }
  assume_spans(key, entry);
  entries_.emplace(key, std::move(entry));
}

/// What the text leaves open by a range or a deviation of its own; pairs in either column.
void Reading::assume_spans(const std::string& key, const Entry& entry) {
  assume_span(key, entry, entry.value);
  if (entry.field->form != Form::pair) return;
  // Both values of a pair are multiplied alike.
  units::Value outlet = entry.outlet;
  outlet.si = entry.second;
  for (auto* part : {&outlet.low, &outlet.high, &outlet.standard_deviation})
    if (*part) **part *= entry.factor;
  assume_span(key, entry, outlet);
}

void Reading::assume_span(const std::string& key, const Entry& entry, const units::Value& value) {
  const bool has_range = value.low && value.high && value.taken_for_granted.empty();
  if (!has_range && !value.standard_deviation) return;
  Assumption assumption{
      .key = key,
      .value = value.si,
      .kind = entry.kind(),
      .why = fmt::format("the case gives the range {}: rated at its middle", shown(entry.text)),
      .low = value.low,
      .high = value.high,
      .look_in = place_of(key),
      .span = Span::range};
  if (value.standard_deviation) {
    assumption.why =
        fmt::format("the case gives {}: low and high are one standard deviation away", shown(entry.text));
    assumption.low = value.si - *value.standard_deviation;
    assumption.high = value.si + *value.standard_deviation;
    assumption.span = Span::deviation;
  }
  assume(std::move(assumption));
}

}  // namespace dutygauge::case_io
