#include <fmt/format.h>

#include <algorithm>

#include "parts.hpp"
#include "wording.hpp"

// A family of fluids is one row of `families` or `names`, its keys in the field
// rows, and a function that makes it from the values read.

namespace dutygauge::case_io {
namespace {

using fluids::Made;
using fluids::Phase;

/// A family's block, and what else its making needs.
struct Source {
  Reading& reading;
  std::string key;  ///< "streams.shell_side.fluid.constant"
  Inlet inlet;

  std::optional<double> value(std::string_view name) const {
    return si(reading.entries(), joined(key, name));
  }
  /// As written, or assumed.
  Phase phase() const;
};

Phase Source::phase() const {
  const std::string phase_key = joined(key, "phase");
  if (const auto typed = word(reading.entries(), phase_key))
    return *typed == "gas" ? Phase::gas : Phase::liquid;
  if (!reading.has(phase_key))
    reading.assume(
        {.key = phase_key, .word = "liquid", .why = "the phase is left out", .look_in = "datasheet"});
  return Phase::liquid;
}

std::optional<fluids::PropertyRow> row_of(const Entries& entries, const std::string& key) {
  const auto temperature = si(entries, joined(key, "temperature")),
             density = si(entries, joined(key, "density")),
             heat_capacity = si(entries, joined(key, "heat_capacity")),
             conductivity = si(entries, joined(key, "conductivity")),
             viscosity = si(entries, joined(key, "viscosity"));
  if (!temperature || !density || !heat_capacity || !conductivity || !viscosity) return {};
  return fluids::PropertyRow{*temperature, *density, *heat_capacity, *conductivity, *viscosity};
}

std::optional<Made> constant(const Source& source) {
  const auto density = source.value("density"), heat_capacity = source.value("heat_capacity"),
             conductivity = source.value("conductivity"), viscosity = source.value("viscosity");
  if (!density || !heat_capacity || !conductivity || !viscosity) return {};
  return fluids::make_constant({*density, *heat_capacity, *conductivity, *viscosity}, source.phase());
}

std::optional<Made> table(const Source& source) {
  std::vector<fluids::PropertyRow> rows;
  for (std::size_t i = 0;; ++i) {
    const std::string key = fmt::format("{}.rows.{}", source.key, i);
    if (!source.reading.has(key)) break;
    const auto row = row_of(source.reading.entries(), key);
    if (!row) return {};
    rows.push_back(*row);
  }
  if (!source.reading.has(joined(source.key, "rows"))) return {};
  return fluids::make_table(std::move(rows), source.phase());
}

std::optional<Made> two_point(const Source& source) {
  fluids::PropertyRow first{}, second{};
  const auto take = [&](std::string_view name, double fluids::PropertyRow::*member) {
    const auto found = source.reading.entries().find(joined(source.key, name));
    if (found == source.reading.entries().end()) return false;
    first.*member = found->second.value.si;
    second.*member = found->second.second;
    return true;
  };
  const bool complete = take("at", &fluids::PropertyRow::temperature) &
                        take("density", &fluids::PropertyRow::density) &
                        take("heat_capacity", &fluids::PropertyRow::heat_capacity) &
                        take("conductivity", &fluids::PropertyRow::conductivity) &
                        take("viscosity", &fluids::PropertyRow::viscosity);
  if (!complete) return {};
  return fluids::make_two_point(first, second, source.phase());
}

std::optional<Made> water(const Source& source) {
  if (!source.inlet.temperature || !source.inlet.pressure) return {};
  return fluids::make_water(*source.inlet.temperature, *source.inlet.pressure);
}

struct Family {
  std::string_view name;
  std::optional<Made> (*make)(const Source&);
};
constexpr Family families[] = {{"constant", constant}, {"table", table}, {"two_point", two_point}};
constexpr Family names[] = {{"water", water}};

template <std::size_t n>
const Family* find(const Family (&all)[n], std::string_view name) {
  const auto* found = std::ranges::find(all, name, &Family::name);
  return found == std::end(all) ? nullptr : found;
}

std::optional<Made> by_name(Reading& reading, const std::string& key, const Inlet& inlet,
                            const std::string& name) {
  if (const Family* family = find(names, name)) return family->make({reading, key, inlet});
  const std::string what = fmt::format("'{}'", shown(name));
  if (find(families, name) != nullptr)
    reading.note(key, what + " needs its properties", std::string(known_fluids),
                 fmt::format("write {{{}: {{...}}}}", name));
  else if (is_later_fluid(name))
    reading.note(key, what + " is not built in yet", std::string(known_fluids),
                 "give its properties as a table");
  else
    reading.note(key, what + " is not a fluid known here", std::string(known_fluids),
                 is_near(name, "water") ? "write water" : "give its properties as a table");
  return {};
}

/// The objections and assumptions of a fluid, with full keys.
void put_keys_in_full(Made& made, const std::string& key) {
  for (Objection& objection : made.objections) objection.key = joined(key, objection.key);
  for (Assumption& assumption : made.assumed) assumption.key = joined(key, assumption.key);
}

std::optional<Made> made_of(Reading& reading, const std::string& key, const Inlet& inlet) {
  if (const auto name = word(reading.entries(), key)) return by_name(reading, key, inlet, std::string(*name));
  if (!reading.document().blocks.contains(key)) return {};
  std::vector<const Family*> given;
  for (const Family& family : families)
    if (reading.has(joined(key, family.name))) given.push_back(&family);
  if (given.size() == 1) return given[0]->make({reading, joined(key, given[0]->name), inlet});
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
