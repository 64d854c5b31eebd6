#include "fields.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "dutygauge/field/mapping.hpp"
#include "field_rows.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

using units::Kind;

/// One side's part of "shell // tube"; the whole where there is one part only.
std::string_view part(std::string_view text, bool shell) {
  const auto bar = text.find(" // ");
  if (bar == std::string_view::npos) return text;
  return shell ? text.substr(0, bar) : text.substr(bar + 4);
}

Field field_of(const Row& row, std::string key, bool shell) {
  return {.key = std::move(key),
          .form = row.form,
          .need = row.need,
          .kind = row.kind,
          .bounds = row.bounds,
          .example = std::string(part(row.example, shell)),
          .help = std::string(part(row.help, shell)),
          .words = row.words,
          .instead = row.instead};
}

void add_fluid(std::vector<Field>& fields, const std::string& key) {
  for (const Row& row : fluid_rows()) {
    const std::string row_key = joined(key, row.key);
    fields.push_back(field_of(row, row_key, true));
    if (last_segment(row_key) != "given") continue;
    for (const Row& given : given_rows()) fields.push_back(field_of(given, joined(row_key, given.key), true));
  }
}

/// All rows of one side that stand together, so that a block's rows follow each other.
void add_side(std::vector<Field>& fields, std::span<const Row> rows, bool shell) {
  for (const Row& row : rows) {
    std::string key = row.key;
    key.replace(key.find('*'), 1, shell ? "shell_side" : "tube_side");
    fields.push_back(field_of(row, key, shell));
    if (row.form == Form::fluid) add_fluid(fields, key);
  }
}

/// What is of flows alone.
bool is_about(const Row& row, field::Channel channel) {
  const std::string_view key = row.key;
  return field::is_flow(channel) || !(key.ends_with(".at") || key.find(".meter") != std::string::npos);
}

/// One row of a channel: its example and its kind follow from what it measures.
Field channel_field(const Row& row, field::Channel channel) {
  std::string key = row.key;
  key.replace(key.find('@'), 1, field::name(channel));
  Field result = field_of(row, key, true);
  const bool is_flow = field::is_flow(channel), is_drop = field::is_drop(channel);
  const bool is_temperature = field::is_temperature(channel);
  if (last_segment(key) == "unit")
    result.example = is_flow ? "t/h" : is_temperature ? "degC" : is_drop ? "kPa" : "\"%\"";
  if (last_segment(key) == "tag" && !is_flow) result.example = is_temperature ? "21TI1044.PV" : "21PI1045.PV";
  if (row.form != Form::uncertainty) return result;
  const bool is_random = last_segment(key) == "random";
  result.kind = is_flow          ? Kind::mass_flow
                : is_temperature ? Kind::temperature_difference
                : is_drop        ? Kind::pressure_difference
                                 : Kind::ratio;
  if (is_temperature)
    result.example = is_random ? "0.1 K" : "0.5 K";
  else
    result.example = is_random ? "1 %" : "3 %";
  return result;
}

/// All rows of one channel that stand together, so that a block's rows follow each other.
void add_record(std::vector<Field>& fields) {
  const auto rows = record_rows();
  const auto is_of_channels = [](const Row& row) {
    return std::string_view(row.key).find('@') != std::string::npos;
  };
  for (auto row = rows.begin(); row != rows.end();) {
    if (!is_of_channels(*row)) {
      fields.push_back(field_of(*row, row->key, true));
      ++row;
      continue;
    }
    const auto end = std::find_if_not(row, rows.end(), is_of_channels);
    for (std::size_t channel = 0; channel < field::channel_count; ++channel)
      for (auto one = row; one != end; ++one)
        if (is_about(*one, static_cast<field::Channel>(channel)))
          fields.push_back(channel_field(*one, static_cast<field::Channel>(channel)));
    row = end;
  }
}

std::vector<Field> all_case_fields() {
  std::vector<Field> fields;
  const auto rows = case_rows();
  const auto is_of_sides = [](const Row& row) {
    return std::string_view(row.key).find('*') != std::string::npos;
  };
  for (auto row = rows.begin(); row != rows.end();) {
    if (!is_of_sides(*row)) {
      fields.push_back(field_of(*row, row->key, true));
      ++row;
      continue;
    }
    const auto end = std::find_if_not(row, rows.end(), is_of_sides);
    for (const bool shell : {true, false}) add_side(fields, {row, end}, shell);
    row = end;
  }
  add_record(fields);
  return fields;
}

std::vector<Field> all_fluid_fields() {
  std::vector<Field> fields;
  fields.push_back({.key = "fluid",
                    .form = Form::fluid,
                    .need = Need::required,
                    .example = "water",
                    .help = "a name, or its properties"});
  add_fluid(fields, "fluid");
  return fields;
}

/// The key with list indices as "#".
std::string indices_hidden(std::string_view key) {
  std::string result;
  while (!key.empty()) {
    const auto dot = first_dot(key);
    const auto segment = key.substr(0, dot);
    const bool is_index = std::ranges::all_of(segment, [](char c) { return c >= '0' && c <= '9'; });
    result += is_index ? "#" : segment;
    if (dot != std::string_view::npos) result += '.';
    key = dot == std::string_view::npos ? std::string_view{} : key.substr(dot + 1);
  }
  return result;
}

constexpr Unread unread[] = {
    {"requirements", "a purchaser's own limits"},
    {"guarantee", "what a vendor guarantees"},
    {"inquiry", "the inquiry a bid answers"},
    {"bidder", "who made a bid"},
    {"exceptions", "what a bid excepts"},
    {"stated_streams", "streams of a bid's sheet"},
    {"exchanger.split", "streams that divide unevenly"},
    {"streams.*.fouling_area", "fouling on the other surface"},
    {"streams.*.split", "streams that divide unevenly"},
};

/// Whether `key` is what `pattern` means, or stands below it. "*" is one segment.
bool is_at_or_below(std::string_view key, std::string_view pattern) {
  while (!pattern.empty()) {
    const auto key_dot = first_dot(key), pattern_dot = first_dot(pattern);
    const auto segment = pattern.substr(0, pattern_dot);
    if (key.empty() || (segment != "*" && segment != key.substr(0, key_dot))) return false;
    key = key_dot == std::string_view::npos ? std::string_view{} : key.substr(key_dot + 1);
    pattern = pattern_dot == std::string_view::npos ? std::string_view{} : pattern.substr(pattern_dot + 1);
  }
  return true;
}

std::string kind_in_words(const Field& field) {
  switch (field.form) {
    case Form::block:
      return "a block of keys";
    case Form::list:
      return "a list of blocks";
    case Form::text:
      return "a text";
    case Form::word:
    case Form::angle:
      return listed(field.words);
    case Form::boolean:
      return "true or false";
    case Form::version:
      return "1";
    case Form::tema:
      return "three TEMA letters";
    case Form::whole:
      return "a whole number";
    case Form::whole_or_list:
      return "a whole number, or one for each tube pass";
    case Form::wholes:
      return "a list of whole numbers, one for each shell,";
    case Form::number:
      return "a plain number";
    case Form::quantity:
      return std::string(units::name(field.kind));
    case Form::either_viscosity:
      return "a kinematic or dynamic viscosity";
    case Form::property:
      return fmt::format("{} at a temperature,", units::name(field.kind));
    case Form::wall:
      return "a length or a gauge";
    case Form::bore:
      return "a length or a pipe size";
    case Form::flow:
      return "a mass or volume flow";
    case Form::pair:
      return fmt::format("two values a -> b, each {}", units::name(field.kind));
    case Form::fluid:
      return std::string(known_fluids);
    case Form::overlay:
      return "a block of values by dotted key,";
    case Form::texts:
      return "a list of texts";
    case Form::instant:
      return "a date, or a time in ISO 8601,";
    case Form::money:
      return "an amount with its currency";
    case Form::energy_price:
      return "an amount with its currency, for an energy,";
    case Form::uncertainty:
      if (field.kind == Kind::temperature_difference) return std::string(units::name(field.kind));
      return field.kind == Kind::ratio
                 ? "a share"
                 : fmt::format("a share of the reading, or {},", units::name(field.kind));
  }
  return {};
}

}  // namespace

FieldTable::FieldTable(std::vector<Field> fields) : fields_(std::move(fields)) {
  for (const Field& field : fields_) by_key_.emplace(field.key, &field);
}

const Field* FieldTable::find(std::string_view key) const {
  if (const auto exact = by_key_.find(key); exact != by_key_.end()) return exact->second;
  const std::string hidden = indices_hidden(key);
  if (const auto indexed = by_key_.find(hidden); indexed != by_key_.end()) return indexed->second;
  const std::string any_name = joined(parent_of(hidden), "?");
  const auto named = by_key_.find(any_name);
  return named == by_key_.end() ? nullptr : named->second;
}

const FieldTable& case_fields() {
  static const FieldTable table(all_case_fields());
  return table;
}

const FieldTable& fluid_fields() {
  static const FieldTable table(all_fluid_fields());
  return table;
}

std::string expected_of(const Field& field) {
  std::string text = kind_in_words(field);
  const bool is_plain = field.form == Form::block || field.form == Form::list || field.form == Form::fluid ||
                        !field.words.empty() || field.form == Form::boolean || field.form == Form::version;
  if (!is_plain && !field.example.empty()) text += " such as " + field.example;
  return text;
}

const Unread* find_unread(std::string_view key) {
  const auto* found =
      std::ranges::find_if(unread, [&](const Unread& row) { return is_at_or_below(key, row.key); });
  return found == std::end(unread) ? nullptr : found;
}

}  // namespace dutygauge::case_io
