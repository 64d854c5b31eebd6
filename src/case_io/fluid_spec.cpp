#include <fmt/format.h>

#include <algorithm>

#include "fluid_families.hpp"
#include "wording.hpp"

// A fluid by its name, or by the one family its block holds.

namespace dutygauge::case_io {
namespace {

using fluids::Made;

bool is_known(std::string_view name) {
  return std::ranges::any_of(fluids::catalogue(),
                             [&](const auto& entry) { return distance(entry.name, name) == 0; });
}

std::optional<Made> by_name(Reading& reading, const std::string& key, const Inlet& inlet,
                            std::string_view name) {
  if (family_named(name) != nullptr && !is_known(name)) {
    reading.note(key, fmt::format("'{}' needs its properties", shown(name)), std::string(known_fluids),
                 fmt::format("write {{{}: {{...}}}}", name));
    return {};
  }
  // Without its inlet, which is missed elsewhere, a known fluid may have any phase.
  constexpr fluids::Inlet anywhere{300.0, 1e5};
  const bool has_inlet = inlet.temperature && inlet.pressure;
  if (!has_inlet && is_known(name)) return {};
  return fluids::make_named(shown(name),
                            has_inlet ? fluids::Inlet{*inlet.temperature, *inlet.pressure} : anywhere);
}

/// Whether every value below a block could be read; if not, the mistake is noted.
bool is_read(const Reading& reading, const std::string& block) {
  const std::string below = block + '.';
  const auto& leaves = reading.document().leaves;
  for (auto leaf = leaves.lower_bound(below); leaf != leaves.end() && leaf->first.starts_with(below); ++leaf)
    if (reading.has(leaf->first) && !reading.entries().contains(leaf->first)) return false;
  return true;
}

std::optional<Made> by_family(Reading& reading, const std::string& key, const Inlet& inlet,
                              const Family& family) {
  const Source source{reading, joined(key, family.name)};
  if (!is_read(reading, source.key)) return {};
  auto made = family.make(source);
  if (!made || !inlet.temperature || !inlet.pressure) return made;
  if (const auto given = given_in(source); !given.empty())
    made = fluids::with_given(std::move(*made), family.name, given, *inlet.pressure);
  if (made->objections.empty())
    made->objections = fluids::object_to_inlet(made->fluid, {*inlet.temperature, *inlet.pressure});
  return made;
}

/// The objections and assumptions of a fluid, with full keys.
void put_keys_in_full(Made& made, const std::string& key) {
  for (Objection& objection : made.objections) objection.key = joined(key, objection.key);
  for (Assumption& assumption : made.assumed) assumption.key = joined(key, assumption.key);
}

std::optional<Made> made_of(Reading& reading, const std::string& key, const Inlet& inlet) {
  if (const auto name = word(reading.entries(), key)) return by_name(reading, key, inlet, *name);
  if (!reading.document().blocks.contains(key)) return {};
  const auto given = families_in(reading, key);
  if (given.size() == 1) return by_family(reading, key, inlet, *given[0]);
  if (given.size() > 1)
    reading.note(key, fmt::format("{} and {} are both given", given[0]->name, given[1]->name), "one of them",
                 "leave the others out");
  return {};
}

}  // namespace

std::optional<Made> fluid_of(Reading& reading, const std::string& key, const Inlet& inlet) {
  auto made = made_of(reading, key, inlet);
  if (!made) return {};
  put_keys_in_full(*made, key);
  return made;
}

fluids::Made read_fluid_spec(std::string_view spec, double temperature, double pressure) {
  constexpr std::string_view before = "fluid: ";
  const auto in_spec = [&](std::vector<Mistake> mistakes) {
    for (Mistake& mistake : mistakes)
      if (mistake.at.line == 1)
        mistake.at.column = std::max(1, mistake.at.column - static_cast<int>(before.size()));
    return InputError("fluid", std::move(mistakes));
  };
  std::optional<Document> document;
  try {
    document = read_document(std::string(before) + std::string(spec), "fluid");
  } catch (const InputError& error) {
    throw in_spec(error.mistakes());
  }
  Reading reading(*document, fluid_fields());
  auto made = fluid_of(reading, "fluid", {temperature, pressure});
  if (made) reading.note_all(made->objections);
  if (!reading.mistakes().empty() || !made) throw in_spec(reading.mistakes());
  made->assumed.insert(made->assumed.end(), reading.assumed().begin(), reading.assumed().end());
  return *made;
}

}  // namespace dutygauge::case_io
