#include <nlohmann/json.hpp>

#include "dutygauge/case_io.hpp"
#include "excuses.hpp"
#include "fields.hpp"
#include "wording.hpp"

// A YAML reader may hand an editor 208 or "208", true or "true": both are accepted.

namespace dutygauge::case_io {
namespace {

using nlohmann::ordered_json;

constexpr const char* whole_pattern = "^ *[0-9]+ *([.][.] *[0-9]+ *)?$|^unknown$";

ordered_json words_of(std::string_view words) {
  ordered_json list = ordered_json::array();
  while (!words.empty()) {
    const auto bar = words.find('|');
    const std::string word(words.substr(0, bar));
    list.push_back(word);
    if (word == "yes" || word == "no") list.push_back(word == "yes");  // older readers of YAML take them so
    if (const auto amount = units::number(word)) list.push_back(static_cast<int>(*amount));
    words = bar == std::string_view::npos ? std::string_view{} : words.substr(bar + 1);
  }
  list.push_back("unknown");
  return {{"enum", list}};
}

ordered_json whole_number(const Field& field) {
  return {{"type", {"integer", "string"}},
          {"pattern", whole_pattern},
          {"minimum", static_cast<int>(field.bounds.least)},
          {"maximum", static_cast<int>(field.bounds.most)}};
}

/// Blanks inside words of materials, units and fluids stay texts.
ordered_json leaf(const Field& field) {
  switch (field.form) {
    case Form::word:
    case Form::angle:
      return words_of(field.words);
    case Form::boolean:
      return {{"enum", {true, false, "true", "false"}}};
    case Form::version:
      return {{"enum", {1, "1"}}};
    case Form::tema:
      return {{"type", "string"}, {"pattern", "^[ABCDN][EFGHJX][LMNPSTUW]$"}};
    case Form::whole:
      return whole_number(field);
    case Form::text:
      return {{"type", {"string", "number", "boolean"}}};
    case Form::number:
      return {{"type", {"number", "string"}}};
    case Form::instant:
      return {{"type", "string"}, {"pattern", "^[0-9]{4}-[0-9]{2}-[0-9]{2}"}};
    case Form::quantity:
      if (field.kind == units::Kind::ratio) return {{"type", {"string", "number"}}};
      [[fallthrough]];
    default:
      return {{"type", "string"}, {"minLength", 1}};
  }
}

/// Fluids that need no more than their name.
ordered_json names_of_fluids() {
  ordered_json names = ordered_json::array();
  for (const fluids::CatalogueEntry& entry : fluids::catalogue())
    if (entry.written.empty() || entry.name == "seawater") names.push_back(std::string(entry.name));
  return names;
}

ordered_json object_of(const FieldTable& table, const std::string& block);

/// Values by dotted key; what they may be is checked where the case is read.
ordered_json overlay_of(const FieldTable& table) {
  ordered_json object = {{"type", {"object", "null"}},
                         {"additionalProperties", false},
                         {"properties", ordered_json::object()},
                         {"patternProperties",
                          {{"^streams\\.(shell|tube)_side\\.fluid\\.", ordered_json::object()},
                           {"^exchanger\\.tubes\\.plugged(_per_shell)?\\.", ordered_json::object()}}}};
  for (const Field& field : table.all()) {
    const bool may_differ = is_one_of(field.key.substr(0, field.key.find('.')), blocks_that_may_differ);
    const bool is_listed =
        field.key.find(".fluid.") == std::string::npos && field.key.find('#') == std::string::npos;
    if (may_differ && is_listed && field.form != Form::block)
      object["properties"][field.key] = {{"description", field.help}};
  }
  return object;
}

ordered_json schema_of(const FieldTable& table, const Field& field) {
  ordered_json json;
  if (field.form == Form::block) {
    json = object_of(table, field.key);
  } else if (field.form == Form::texts) {
    json = {{"type", "array"}, {"items", leaf(*table.find(field.key + ".#"))}};
  } else if (field.form == Form::list) {
    json = {{"type", "array"}, {"items", object_of(table, field.key + ".#")}};
  } else if (field.form == Form::overlay) {
    json = overlay_of(table);
    if (field.key == "present")
      json["properties"]["since"] = {{"type", "string"}, {"pattern", "^[0-9]{4}-[0-9]{2}-[0-9]{2}$"}};
  } else if (field.form == Form::whole_or_list) {
    json = {{"anyOf", {whole_number(field), {{"type", "array"}, {"items", whole_number(field)}}}}};
  } else if (field.form == Form::wholes) {
    json = {{"type", "array"}, {"items", whole_number(*table.find(field.key + ".#"))}};
  } else if (field.form == Form::fluid) {
    ordered_json family = object_of(table, field.key);
    family["minProperties"] = 1;
    family["maxProperties"] = 1;
    json = {{"anyOf", {{{"enum", names_of_fluids()}}, family}}};
  } else {
    json = leaf(field);
    if (!field.example.empty() && json.contains("type") && json["type"] == "string")
      json["examples"] = ordered_json::array({field.example});
  }
  if (!field.help.empty()) json["description"] = field.help;
  return json;
}

/// What a block requires: a list of names, and pairs of which one is enough.
void add_required(const Field& field, ordered_json& object) {
  const std::string name(last_segment(field.key));
  if (field.instead.empty())
    object["required"].push_back(name);
  else
    object["allOf"].push_back({{"anyOf", {{{"required", {name}}}, {{"required", {field.instead}}}}}});
}

ordered_json object_of(const FieldTable& table, const std::string& block) {
  ordered_json object = {
      {"type", "object"}, {"additionalProperties", false}, {"properties", ordered_json::object()}};
  for (const Field& field : table.all()) {
    if (parent_of(field.key) != block || (block.empty() && field.key.find('.') != std::string::npos))
      continue;
    if (last_segment(field.key) == "?")
      object["additionalProperties"] = schema_of(table, field);
    else
      object["properties"][std::string(last_segment(field.key))] = schema_of(table, field);
    if (field.need == Need::required && excuse_of(field.key) == Excuse::none) add_required(field, object);
  }
  return object;
}

/// What is required where no excuse of this kind holds.
ordered_json demands_of(const FieldTable& table, Excuse excuse) {
  ordered_json root = ordered_json::object();
  for (const Field& field : table.all()) {
    if (field.need != Need::required || excuse_of(field.key) != excuse) continue;
    ordered_json* place = &root;
    std::string_view rest = parent_of(field.key);
    while (!rest.empty()) {
      const auto dot = rest.find('.');
      place = &(*place)["properties"][std::string(rest.substr(0, dot))];
      rest = dot == std::string_view::npos ? std::string_view{} : rest.substr(dot + 1);
    }
    add_required(field, *place);
  }
  return root;
}

/// An area takes the place of the dimensions; a scaled shell side that of the baffles.
ordered_json excuses(const FieldTable& table) {
  const ordered_json area = {{"properties", {{"exchanger", {{"required", {"area"}}}}}},
                             {"required", {"exchanger"}}};
  const ordered_json scaled = {
      {"properties",
       {{"methods",
         {{"properties", {{"shell_side", {{"const", "scaled"}}}}}, {"required", {"shell_side"}}}}}},
      {"required", {"methods"}}};
  return ordered_json::array(
      {{{"if", area}, {"else", demands_of(table, Excuse::area)}},
       {{"if", {{"anyOf", {area, scaled}}}}, {"else", demands_of(table, Excuse::scaled)}}});
}

}  // namespace

std::string schema() {
  ordered_json json = {{"$schema", "http://json-schema.org/draft-07/schema#"},
                       {"title", "dutygauge case"},
                       {"description", "A shell-and-tube exchanger and the service it is to do"}};
  json.update(object_of(case_fields(), ""));
  json["allOf"] = excuses(case_fields());
  return json.dump(2) + "\n";
}

}  // namespace dutygauge::case_io
