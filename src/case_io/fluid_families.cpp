#include "fluid_families.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "wording.hpp"

// A family of fluids is one row of `families`, its keys in the fluid rows, and a
// function that makes it from the values read.

namespace dutygauge::case_io {
namespace {

using fluids::Made;
using fluids::Phase;

/// As written, or assumed.
Phase phase_of(const Source& source) {
  Reading& reading = source.reading;
  const std::string phase_key = source.joined_key("phase");
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

/// A unit known by its area needs no more of a fluid.
bool is_heat_capacity_alone(const Source& source) {
  const auto has = [&](const char* name) { return source.reading.has(source.joined_key(name)); };
  return source.reading.has("exchanger.area") && !has("density") && !has("conductivity") && !has("viscosity");
}

std::optional<Made> constant(const Source& source) {
  const auto density = source.value("density"), heat_capacity = source.value("heat_capacity"),
             conductivity = source.value("conductivity"), viscosity = source.value("viscosity");
  if (!heat_capacity) return {};
  if (is_heat_capacity_alone(source)) {
    // Nothing reads the other three where both films are laws: they only have to be numbers.
    return fluids::make_constant({1000.0, *heat_capacity, 0.6, 1e-3}, Phase::liquid);
  }
  if (!density || !conductivity || !viscosity) return {};
  return fluids::make_constant({*density, *heat_capacity, *conductivity, *viscosity}, phase_of(source));
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
  return fluids::make_table(std::move(rows), phase_of(source));
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
  if (is_heat_capacity_alone(source)) {
    if (!take("at", &fluids::PropertyRow::temperature) ||
        !take("heat_capacity", &fluids::PropertyRow::heat_capacity))
      return {};
    for (fluids::PropertyRow* row : {&first, &second})  // a liquid thins when it warms
      row->density = 1000.0, row->conductivity = 0.6, row->viscosity = 0.3 / row->temperature;
    return fluids::make_two_point(first, second, Phase::liquid);
  }
  const bool complete = take("at", &fluids::PropertyRow::temperature) &&
                        take("density", &fluids::PropertyRow::density) &&
                        take("heat_capacity", &fluids::PropertyRow::heat_capacity) &&
                        take("conductivity", &fluids::PropertyRow::conductivity) &&
                        take("viscosity", &fluids::PropertyRow::viscosity);
  if (!complete) return {};
  return fluids::make_two_point(first, second, phase_of(source));
}

std::optional<Made> seawater(const Source& source) {
  const auto salinity = source.value("salinity");
  return salinity ? std::optional(fluids::make_seawater(*salinity)) : std::nullopt;
}

std::optional<Made> gas_mixture(const Source& source) {
  std::vector<fluids::GasShare> shares;
  for (const auto& [name, entry] : source.entries_of("mole_fractions"))
    shares.push_back({shown(name), entry->value.si});
  if (shares.empty()) return {};
  return fluids::make_gas_mixture(shares);
}

/// The family's key is the solution's name.
std::optional<Made> solution(const Source& source) {
  const auto fraction = source.value("mass_fraction");
  if (!fraction) return {};
  return fluids::make_solution(last_segment(source.key), *fraction);
}

/// Measured viscosities in rising temperature; empty with a mistake noted where a key is no temperature.
std::optional<std::vector<fluids::ViscosityPoint>> viscosity_points(const Source& source) {
  std::vector<fluids::ViscosityPoint> points;
  bool readable = true;
  for (const auto& [written, entry] : source.entries_of("viscosity")) {
    const auto read = units::read(written, units::Kind::temperature);
    const auto* temperature = std::get_if<units::Value>(&read);
    const std::string key = joined(source.joined_key("viscosity"), written);
    if (temperature == nullptr || temperature->low || temperature->standard_deviation) {
      const auto* misread = std::get_if<units::Misread>(&read);
      source.reading.note(key, misread ? misread->what : "a range is no temperature",
                          "the temperature as the key: viscosity: {40 degC: 46 cSt, 100 degC: 6.7 cSt}",
                          "write the temperature with its unit before the colon");
      readable = false;
    } else
      points.push_back({temperature->si, entry->value.si, entry->dynamic});
  }
  if (!readable) return {};
  std::ranges::stable_sort(points, {}, &fluids::ViscosityPoint::temperature);
  return points;
}

std::optional<Made> petroleum(const Source& source) {
  auto points = viscosity_points(source);
  if (!points) return {};
  fluids::PetroleumData data{.api = source.value("api"),
                             .specific_gravity = source.value("specific_gravity"),
                             .watson_k = source.value("watson_k"),
                             .viscosity = std::move(*points)};
  if (const auto kind = word(source.reading.entries(), source.joined_key("kind")))
    data.kind = *kind == "crude" ? fluids::PetroleumKind::crude : fluids::PetroleumKind::product;
  return fluids::make_petroleum(data);
}

std::optional<Made> oil(const Source& source) {
  auto points = viscosity_points(source);
  if (!points) return {};
  return fluids::make_oil({.iso_vg = source.value("iso_vg"),
                           .viscosity = std::move(*points),
                           .density_15c = source.value("density_15c"),
                           .viscosity_index = source.value("viscosity_index")});
}

constexpr Family families[] = {{"constant", constant},
                               {"table", table},
                               {"two_point", two_point},
                               {"seawater", seawater},
                               {"gas_mixture", gas_mixture},
                               {"ethylene_glycol_water", solution},
                               {"propylene_glycol_water", solution},
                               {"sodium_chloride_brine", solution},
                               {"calcium_chloride_brine", solution},
                               {"petroleum", petroleum},
                               {"oil", oil}};

}  // namespace

std::vector<std::pair<std::string, const Entry*>> Source::entries_of(std::string_view name) const {
  const std::string block = joined_key(name);
  std::vector<std::pair<std::string, const Entry*>> found;
  const std::string below = block + '.';
  const Entries& all = reading.entries();
  for (auto entry = all.lower_bound(below); entry != all.end() && entry->first.starts_with(below); ++entry)
    found.emplace_back(entry->first.substr(below.size()), &entry->second);
  return found;
}

const Family* family_named(std::string_view name) {
  const auto* found = std::ranges::find(families, name, &Family::name);
  return found == std::end(families) ? nullptr : found;
}

std::vector<const Family*> families_in(const Reading& reading, const std::string& key) {
  std::vector<const Family*> found;
  for (const Family& family : families)
    if (reading.has(joined(key, family.name))) found.push_back(&family);
  return found;
}

std::vector<fluids::GivenProperty> given_in(const Source& source) {
  std::vector<fluids::GivenProperty> given;
  for (const auto& [property, entry] : source.entries_of("given"))
    given.push_back({property, entry->value.si, entry->at_temperature});
  return given;
}

}  // namespace dutygauge::case_io
