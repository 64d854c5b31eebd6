#include "reading.hpp"

#include <fmt/format.h>

#include <cmath>

#include "dutygauge/units/mention.hpp"
#include "excuses.hpp"
#include "suggestions.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

bool takes_list(Form form) {
  return form == Form::list || form == Form::whole_or_list || form == Form::wholes || form == Form::texts;
}

/// Whether values stand under the key as a block or list.
bool takes_block(Form form) {
  return form == Form::block || form == Form::fluid || takes_list(form);
}

bool takes_value(Form form) {
  return form != Form::block && form != Form::list && form != Form::wholes && form != Form::texts;
}

}  // namespace

bool Entry::is_word() const {
  switch (field->form) {
    case Form::text:
    case Form::word:
    case Form::boolean:
    case Form::version:
    case Form::tema:
    case Form::fluid:
    case Form::instant:
    case Form::money:
    case Form::energy_price:
      return true;
    default:
      return false;
  }
}

units::Kind Entry::kind() const {
  if (dynamic) return units::Kind::viscosity;
  if (relative) return units::Kind::ratio;
  if (field->form != Form::flow) return field->kind;
  return basis == units::FlowBasis::mass ? units::Kind::mass_flow : units::Kind::volume_flow;
}

std::optional<double> si(const Entries& entries, std::string_view key) {
  const auto found = entries.find(key);
  return found == entries.end() ? std::nullopt : std::optional(found->second.value.si);
}

std::optional<int> whole(const Entries& entries, std::string_view key) {
  const auto value = si(entries, key);
  return value ? std::optional(static_cast<int>(std::lround(*value))) : std::nullopt;
}

std::optional<std::string_view> word(const Entries& entries, std::string_view key) {
  const auto found = entries.find(key);
  return found == entries.end() ? std::nullopt : std::optional<std::string_view>(found->second.text);
}

Reading::Reading(const Document& document, const FieldTable& table)
    : document_(document), table_(table), mistakes_(document.mistakes) {
  for (const Mistake& mistake : mistakes_) at_fault_.insert(mistake.key);
  check_keys();
  read_leaves();
  require_all();
}

bool Reading::has(std::string_view key) const {
  const std::string name(key);
  return (document_.leaves.contains(name) && !unknown_.contains(name)) || document_.blocks.contains(name);
}

bool Reading::has_below(std::string_view key) const {
  const std::string below = std::string(key) + '.';
  const auto holds = [&](const auto& keys) {
    const auto next = keys.lower_bound(below);
    return next != keys.end() && next->first.starts_with(below);
  };
  return holds(document_.leaves) || holds(document_.blocks);
}

Position Reading::position_of(std::string_view key) const {
  for (; !key.empty(); key = parent_of(key)) {
    const std::string name(key);
    if (const auto leaf = document_.leaves.find(name); leaf != document_.leaves.end())
      return leaf->second.value_at;
    if (const auto block = document_.blocks.find(name); block != document_.blocks.end())
      return block->second.at;
  }
  return {1, 1};
}

void Reading::note(const std::string& key, const std::string& what, const std::string& expected,
                   const std::string& remedy) {
  // What modules say of a file carries mentions; messages about files are metric throughout.
  const auto said = [](const std::string& text) { return units::spoken(text, units::System::metric); };
  at_fault_.insert(key);
  mistakes_.push_back({position_of(key), key, said(what), said(expected), said(remedy)});
}

bool Reading::is_at_fault_within(std::string_view key) const {
  const auto next = at_fault_.lower_bound(std::string(key) + '.');
  return is_at_fault(key) || (next != at_fault_.end() && parent_of(*next) == key);
}

bool Reading::is_misspelt(std::string_view key) const {
  for (; !key.empty(); key = parent_of(key))
    if (suggested_.contains(key)) return true;
  return false;
}

std::string Reading::expected_in(const Field& field) const {
  return field.form == Form::block ? keys_of(table_, field.key) : expected_of(field);
}

void Reading::note_all(const Objections& objections) {
  for (const Objection& objection : objections)
    if (!is_at_fault_within(objection.key) && !is_misspelt(objection.key))
      note(objection.key, objection.what, objection.expected, objection.remedy);
}

bool Reading::is_refused(std::string_view key) const {
  // Every dot counts: in lists of lists indices stand side by side like decimals.
  while (!refused_.contains(key)) {
    const auto dot = key.rfind('.');
    if (dot == std::string_view::npos) return false;
    key = key.substr(0, dot);
  }
  return true;
}

void Reading::refuse(const std::string& key, const Position& at, std::string what, std::string expected,
                     std::string remedy) {
  refused_.insert(key);
  at_fault_.insert(key);
  mistakes_.push_back({at, key, std::move(what), std::move(expected), std::move(remedy)});
}

void Reading::check_keys() {
  for (const auto& [key, block] : document_.blocks)
    if (!key.empty()) check_key(key, block.at, true, block.is_list);
  for (const auto& [key, leaf] : document_.leaves) check_key(key, leaf.key_at, false, false);
}

void Reading::check_key(const std::string& key, const Position& at, bool is_block, bool is_list) {
  if (is_refused(key)) return;
  if (const Unread* unread = find_unread(key))
    return refuse(key, at, fmt::format("not read yet by this version: {}", unread->meaning),
                  keys_of(table_, parent_of(key)), is_block ? "leave the block out" : "leave the key out");
  const Field* field = table_.find(key);
  if (field == nullptr) return refuse_unknown(key, at);
  const bool fits =
      is_block ? takes_block(field->form) && (is_list == takes_list(field->form)) : takes_value(field->form);
  if (!fits)
    refuse_shape(key, at, *field, is_block, is_list);
  else if (is_block && !has_below(key))
    refuse(key, at, is_list ? "the list is empty" : "the block is empty", expected_in(*field),
           "fill it in, or leave it out");
}

void Reading::refuse_unknown(const std::string& key, const Position& at) {
  const Field* block = table_.find(parent_of(key));
  const std::string name(last_segment(key));
  if (block != nullptr && block->form == Form::fluid && fluids::nearest_name(name) == name)
    return refuse(key, at, fmt::format("{} is a fluid without data of its own", name), "its name alone",
                  fmt::format("write fluid: {}", name));
  const Suggestion suggestion = suggest(table_, key);
  if (!suggestion.meant.empty()) suggested_.insert(suggestion.meant);
  refuse(key, at, "there is no such key", suggestion.expected, suggestion.remedy);
}

void Reading::refuse_shape(const std::string& key, const Position& at, const Field& field, bool is_block,
                           bool is_list) {
  const auto leaf = document_.leaves.find(key);
  if (leaf != document_.leaves.end() && leaf->second.text.empty())
    return refuse(key, at, "the block is empty", expected_in(field), "fill it in, or leave it out");
  const std::string_view found = is_list ? "a list" : is_block ? "a block of keys" : "a single value";
  const bool wants_value = takes_value(field.form);
  refuse(key, at, fmt::format("{} stands here", found), expected_in(field),
         wants_value && is_list ? "write one value; a decimal is written with a point, not a comma"
         : wants_value          ? "write the value behind the colon"
                                : "write its keys below it, indented, or in { }");
}

void Reading::require_all() {
  for (const Field& field : table_.all()) {
    if (field.need != Need::required) continue;
    const std::string parent(parent_of(field.key));
    if (!parent.ends_with('#')) {
      require(field, parent);
      continue;
    }
    const std::string list(parent_of(parent));
    for (std::size_t i = 0; document_.blocks.contains(joined(list, std::to_string(i))); ++i)
      require(field, joined(list, std::to_string(i)));
  }
}

void Reading::require(const Field& field, const std::string& parent) {
  if (!parent.empty() && (!document_.blocks.contains(parent) || is_refused(parent))) return;
  const std::string key = joined(parent, last_segment(field.key));
  if (has(key) || suggested_.contains(key) || is_at_fault(key)) return;
  const bool has_neighbour = !field.instead.empty() && has(joined(parent, field.instead));
  if (has_neighbour || is_excused(*this, key)) return;
  const std::string help = field.help.empty() ? "" : fmt::format(" ({})", field.help);
  const std::string neighbour = field.instead.empty() ? "" : fmt::format(", or {}", field.instead);
  if (unknown_.contains(key))
    return note(key, "is 'unknown', and no practice could stand for it: this value is needed",
                expected_in(field) + help, "find it" + neighbour + "; a range such as 10..14 serves too");
  note(key, "is missing", expected_in(field) + help, "add it" + neighbour);
}

}  // namespace dutygauge::case_io
