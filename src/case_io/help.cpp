#include <fmt/format.h>

#include <algorithm>
#include <iterator>

#include "dutygauge/case_io.hpp"
#include "dutygauge/case_io/keys.hpp"
#include "fields.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

constexpr std::size_t comment_column = 44;

std::size_t depth(std::string_view key) {
  return static_cast<std::size_t>(std::ranges::count(key, '.'));
}

/// Whether a row stands below a fluid: the starter case shows a fluid on one line.
bool is_of_a_fluid(std::string_view key) {
  return key.find(".fluid.") != std::string_view::npos;
}

bool is_list_item(std::string_view key) {
  return key.find('#') != std::string_view::npos;
}

/// Whether a row is that of a channel beyond the first flow and the first temperature, which
/// the starter case shows for all.
bool is_of_another_channel(std::string_view key) {
  constexpr std::string_view columns = "readings.columns.";
  if (!key.starts_with(columns)) return false;
  const auto channel = key.substr(columns.size(), key.find('.', columns.size()) - columns.size());
  return channel != "hot_flow" && channel != "hot_in";
}

/// A name where any will do.
std::string_view name_of_any(std::string_view key) {
  return key == "operating_cases.?" ? "base" : "sheet";
}

/// The key of the case that an overlay's key means: all behind the case's name.
std::string_view without_overlay(std::string_view key) {
  if (key.starts_with("present.")) return key == "present.since" ? key.substr(0, 7) : key.substr(8);
  if (!key.starts_with("operating_cases.")) return key;
  const auto dot = key.find('.', key.find('.') + 1);
  return dot == std::string_view::npos ? key : key.substr(dot + 1);
}

/// What sheets usually call a value: words of the trade, common practice, no source.
struct Caption {
  std::string_view key, caption;
};
constexpr Caption captions[] = {
    {"tag", "Item No."},
    {"exchanger.tema", "Type"},
    {"exchanger.shells.in_series", "Connected in series"},
    {"exchanger.shells.in_parallel", "Connected in parallel"},
    {"exchanger.shell.inside_diameter", "Shell I.D."},
    {"exchanger.tubes.count", "Tube No."},
    {"exchanger.tubes.passes", "No. of passes"},
    {"exchanger.tubes.outside_diameter", "O.D."},
    {"exchanger.tubes.wall", "Thk., avg. or min."},
    {"exchanger.tubes.length", "Length"},
    {"exchanger.tubes.pitch", "Pitch"},
    {"exchanger.tubes.material", "Tube material"},
    {"exchanger.baffles.cut", "Baffle cut, % of diameter or area"},
    {"exchanger.baffles.spacing", "Spacing, c/c"},
    {"exchanger.baffles.inlet_spacing", "Inlet spacing"},
    {"exchanger.sealing_strip_pairs", "Seal strips"},
    {"streams.shell_side.flow", "Fluid quantity, total"},
    {"streams.tube_side.flow", "Fluid quantity, total"},
    {"streams.shell_side.inlet.temperature", "Temperature, in"},
    {"streams.tube_side.inlet.temperature", "Temperature, in"},
    {"streams.shell_side.inlet.pressure", "Inlet pressure"},
    {"streams.tube_side.inlet.pressure", "Inlet pressure"},
    {"streams.shell_side.fouling", "Fouling resistance"},
    {"streams.tube_side.fouling", "Fouling resistance"},
    {"streams.shell_side.allowable_pressure_drop", "Pressure drop, allowable"},
    {"streams.tube_side.allowable_pressure_drop", "Pressure drop, allowable"},
    {"claims.duty", "Heat exchanged"},
    {"claims.area.effective", "Surface, effective"},
    {"claims.u_service", "Transfer rate, service"},
    {"claims.u_dirty", "Transfer rate, dirty"},
    {"claims.u_clean", "Transfer rate, clean"},
    {"claims.mtd", "MTD, corrected"},
};

std::string help_of(const Field& field) {
  const auto found = std::ranges::find(captions, std::string_view(field.key), &Caption::key);
  if (found == std::end(captions)) return std::string(field.help);
  return fmt::format("\"{}\": {}", found->caption, field.help);
}

/// The example in US units, where it is one quantity with a unit; else as it stands.
std::string in_us_units(const Field& field) {
  constexpr int digits = 4;
  const std::string example(field.example);
  const auto is_plain = [](const units::Value& value) { return !value.low && !value.standard_deviation; };
  if (field.form == Form::flow) {
    const auto read = units::read_flow(example);
    const auto* flow = std::get_if<units::Flow>(&read);
    if (!flow || !is_plain(flow->amount)) return example;
    if (flow->basis == units::FlowBasis::mass)
      return units::typed(flow->amount.si, units::Kind::mass_flow, units::System::us, digits);
    return units::typed(flow->amount.si, units::Kind::volume_flow, units::System::us, digits) + " at inlet";
  }
  const bool is_length = field.form == Form::wall || field.form == Form::bore;
  if ((field.form != Form::quantity && !is_length) || field.kind == units::Kind::ratio) return example;
  const auto read = units::read(example, field.kind);
  const auto* value = std::get_if<units::Value>(&read);
  constexpr double fine = 1e-4;  // [m] roughness is given in micrometres everywhere
  if (value && field.kind == units::Kind::length && value->si < fine) return example;
  return value && is_plain(*value) ? units::typed(value->si, field.kind, units::System::us, digits) : example;
}

std::string example_in(const Field& field, units::System system) {
  if (system != units::System::us) return std::string(field.example);
  return field.key == "display" ? "us" : in_us_units(field);
}

/// "  key: example", a comment where it may be left out, and what it means.
std::string starter_line(const Field& field, bool commented, units::System system) {
  std::string line = std::string(2 * depth(field.key), ' ');
  if (commented) line += "# ";
  const auto name = last_segment(field.key);
  line += fmt::format("{}:", name == "?" ? name_of_any(field.key) : name);
  if (field.form != Form::block) line += " " + example_in(field, system);
  if (field.help.empty()) return line + "\n";
  if (line.size() > comment_column) return line + "\n";
  return fmt::format("{:<{}}# {}\n", line, comment_column, help_of(field));
}

/// Whether the row, or a block above it, is a comment in the starter case.
bool is_commented(const FieldTable& table, std::string_view key) {
  for (; !key.empty(); key = parent_of(key))
    if (table.find(key)->need == Need::optional) return true;
  return false;
}

bool ends_in(std::string_view key, std::string_view end) {
  return key.size() > end.size() && key.ends_with(end) && key[key.size() - end.size() - 1] == '.';
}

const Field* find_by_end(const FieldTable& table, std::string_view end) {
  for (const Field& field : table.all())
    if (ends_in(field.key, end)) return &field;
  return nullptr;
}

std::string kind_of(const Field& field) {
  switch (field.form) {
    case Form::block:
      return "block";
    case Form::list:
    case Form::wholes:
      return "list";
    case Form::text:
      return "text";
    case Form::word:
    case Form::boolean:
    case Form::version:
    case Form::tema:
      return "word";
    case Form::whole:
    case Form::whole_or_list:
      return "whole number";
    case Form::number:
      return "plain number";
    case Form::flow:
      return "flow";
    case Form::fluid:
      return "fluid";
    case Form::overlay:
      return "overlay";
    case Form::texts:
      return "list of texts";
    case Form::instant:
      return "date or time";
    case Form::money:
    case Form::energy_price:
      return "money";
    default:
      return std::string(units::name(field.kind));
  }
}

}  // namespace

std::string starter_case(units::System system) {
  std::string text =
      "# A case for dutygauge. Replace every value by your own; lines that begin with '#' may be left out.\n";
  const FieldTable& table = case_fields();
  for (const Field& field : table.all())
    if (!is_of_a_fluid(field.key) && !is_list_item(field.key) && !is_of_another_channel(field.key))
      text += starter_line(field, is_commented(table, field.key), system);
  return text;
}

std::vector<std::string> all_keys() {
  std::vector<std::string> keys;
  for (const Field& field : case_fields().all()) keys.emplace_back(field.key);
  return keys;
}

std::vector<std::string> keys_ending_in(std::string_view end) {
  std::vector<std::string> keys = all_keys();
  std::erase_if(keys, [end](const std::string& key) { return !ends_in(key, end); });
  return keys;
}

std::optional<FieldHelp> explain(std::string_view key) {
  key = without_overlay(key);
  const Field* field = case_fields().find(key);
  if (field == nullptr) field = fluid_fields().find(key);
  if (field == nullptr) field = find_by_end(case_fields(), key);
  if (field != nullptr) {
    const std::string need =
        field->need == Need::required ? "required where its block stands" : "may be left out";
    return FieldHelp{field->key, kind_of(*field), expected_of(*field),
                     fmt::format("{}; {}", field->help, need)};
  }
  if (const Unread* unread = find_unread(key))
    return FieldHelp{std::string(key), "not read yet by this version", "to be left out",
                     std::string(unread->meaning)};
  return {};
}

}  // namespace dutygauge::case_io
