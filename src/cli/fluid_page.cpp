#include "fluid_page.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <nlohmann/json.hpp>
#include <set>

#include "command.hpp"
#include "dutygauge/report.hpp"
#include "dutygauge/sources.hpp"

namespace dutygauge::cli {
namespace {

using Json = nlohmann::ordered_json;
using units::Kind;

struct Column {
  std::string_view key;    // in JSON and CSV
  std::string_view note;   // property of a PropertyNote, or empty
  std::string_view words;  // on the page
  Kind kind;
  double (*value)(const fluids::State&);
};
constexpr Column columns[] = {
    {"density_kg_m3", "density", "density", Kind::density, [](const fluids::State& s) { return s.density; }},
    {"heat_capacity_J_kgK", "heat_capacity", "heat capacity", Kind::heat_capacity,
     [](const fluids::State& s) { return s.heat_capacity; }},
    {"conductivity_W_mK", "conductivity", "conductivity", Kind::conductivity,
     [](const fluids::State& s) { return s.conductivity; }},
    {"viscosity_Pa_s", "viscosity", "viscosity", Kind::viscosity,
     [](const fluids::State& s) { return s.viscosity; }},
    {"enthalpy_J_kg", "", "enthalpy", Kind::enthalpy, [](const fluids::State& s) { return s.enthalpy; }},
    {"prandtl", "", "Prandtl", Kind::count, [](const fluids::State& s) { return s.prandtl(); }}};

std::string number(double value, Kind kind, units::System system) {
  if (kind == Kind::count) return fmt::format("{:.4g}", value);
  return units::shown_number(value, kind, system, 5);
}

std::string with_unit(double value, Kind kind, units::System system) {
  const auto unit = units::shown_unit(kind, system);
  return number(value, kind, system) + (unit.empty() || kind == Kind::count ? "" : fmt::format(" {}", unit));
}

std::string range(fluids::TemperatureRange valid, units::System system) {
  return fmt::format("{} .. {}", units::shown_number(valid.low, Kind::temperature, system),
                     with_unit(valid.high, Kind::temperature, system));
}

std::string uncertainty(double fraction) {
  return fraction > 0.0 ? fmt::format("+-{:g} %", 100.0 * fraction) : "not known";
}

/// What each property rests on.
std::string basis(const fluids::Fluid& fluid, units::System system) {
  std::string text =
      fmt::format("\n  {:<14}  {:<21}  {:>24}  {}\n", "property", "source", "valid", "uncertainty (95 %)");
  for (const fluids::PropertyNote& note : fluids::notes(fluid)) {
    std::string words(note.property);
    std::ranges::replace(words, '_', ' ');
    text += fmt::format("  {:<14}  {:<21}  {:>24}  {}\n", words,
                        note.source.empty() ? "your own data" : note.source,
                        note.source.empty() ? "" : range(note.valid, system), uncertainty(note.uncertainty));
  }
  return text;
}

std::string citations(const fluids::Fluid& fluid) {
  std::set<std::string_view> keys;
  for (const auto& note : fluids::notes(fluid))
    if (!note.source.empty()) keys.insert(note.source);
  std::string text;
  for (const auto key : keys) text += wrapped(fmt::format("  {:<21}  ", key), sources::citation(key));
  return text.empty() ? text : "\nSources\n" + text;
}

std::string beside(const FluidTable& table, units::System system) {
  std::string text;
  for (const Assumption& one : table.assumed)
    text += wrapped("  assumed  ",
                    fmt::format("{}: {} ({})", one.key,
                                one.word.empty() ? units::typed(one.value, one.kind, system) : one.word,
                                report::reason(one, system)));
  for (const Finding& one : table.findings)
    text += wrapped(fmt::format("  {:<7}  ", report::word(one.severity)), report::sentence(one, system));
  return text.empty() ? text : "\nTo know\n" + text;
}

std::string single(const FluidRow& row, units::System system) {
  std::string text;
  for (const Column& column : columns)
    text +=
        fmt::format("  {:<14}  {}\n", column.words, with_unit(column.value(row.state), column.kind, system));
  return text;
}

std::string several(const FluidTable& table, units::System system) {
  std::string names = fmt::format("  {:>11}  {:>8}", "temperature", "pressure");
  std::string units = fmt::format("  {:>11}  {:>8}", units::shown_unit(Kind::temperature, system),
                                  units::shown_unit(Kind::pressure, system));
  const auto width = [](const Column& column) { return std::max<std::size_t>(column.words.size(), 9); };
  for (const Column& column : columns) {
    names += fmt::format("  {:>{}}", column.words, width(column));
    if (column.kind != Kind::count)
      units += fmt::format("  {:>{}}", units::shown_unit(column.kind, system), width(column));
  }
  std::string text = names + "\n" + units + "\n";
  for (const FluidRow& row : table.rows) {
    text += fmt::format("  {:>11}  {:>8}", number(row.state.temperature, Kind::temperature, system),
                        number(row.pressure, Kind::pressure, system));
    for (const Column& column : columns)
      text += fmt::format("  {:>{}}", number(column.value(row.state), column.kind, system), width(column));
    text += "\n";
  }
  return text;
}

Json properties(const fluids::State& state, Json json = Json::object()) {
  for (const Column& column : columns) json[std::string(column.key)] = column.value(state);
  return json;
}

double celsius(double temperature) {
  return units::from_si(temperature, "degC", Kind::temperature);
}

}  // namespace

std::string fluid_page(const FluidTable& table, units::System system) {
  const FluidRow& first = table.rows.front();
  const std::string name =
      fmt::format("{}, {}", table.fluid.name, table.fluid.phase == fluids::Phase::gas ? "gas" : "liquid");
  std::string text;
  if (table.rows.size() == 1)
    text = fmt::format("{} at {} and {} absolute\n\n{}", name,
                       with_unit(first.state.temperature, Kind::temperature, system),
                       with_unit(first.pressure, Kind::pressure, system), single(first, system));
  else
    text = fmt::format("{}; pressures are absolute\n\n{}", name, several(table, system));
  return text + basis(table.fluid, system) + beside(table, system) + citations(table.fluid);
}

std::string fluid_json(const FluidTable& table) {
  Json json;
  if (table.rows.size() == 1) {
    json = properties(table.rows.front().state);
  } else {
    json["rows"] = Json::array();
    for (const FluidRow& row : table.rows)
      json["rows"].push_back(properties(
          row.state, {{"temperature_degC", celsius(row.state.temperature)}, {"pressure_Pa", row.pressure}}));
  }
  for (const Finding& one : table.findings)
    json["findings"].push_back({{"id", one.id},
                                {"severity", report::word(one.severity)},
                                {"text", report::sentence(one, units::System::metric)}});
  return json.dump() + "\n";
}

std::string fluid_csv(const FluidTable& table) {
  std::string text = "temperature_degC,pressure_Pa";
  for (const Column& column : columns) text += fmt::format(",{}", column.key);
  text += "\n";
  for (const FluidRow& row : table.rows) {
    text += fmt::format("{:.10g},{:.10g}", celsius(row.state.temperature), row.pressure);
    for (const Column& column : columns) text += fmt::format(",{:.10g}", column.value(row.state));
    text += "\n";
  }
  return text;
}

std::string catalogue_page(units::System system) {
  std::string text = fmt::format("{:<23}  {:>24}  {}\n", "fluid", "valid", "sources");
  for (const fluids::CatalogueEntry& entry : fluids::catalogue()) {
    text += wrapped(fmt::format("{:<23}  {:>24}  ", entry.name, range(entry.valid, system)), entry.sources);
    if (!entry.written.empty()) text += wrapped("  ", fmt::format("{{{}: {}}}", entry.name, entry.written));
  }
  text +=
      "\nA change of phase ends a range earlier. Fluids of a sheet: {constant: {...}}, {two_point: {...}},\n"
      "{table: {...}}; 'dutygauge explain fluid.table' says how.\n\nSources\n";
  std::set<std::string_view> keys;
  for (const fluids::CatalogueEntry& entry : fluids::catalogue())
    for (auto rest = entry.sources; !rest.empty();) {
      const auto blank = rest.find(' ');
      keys.insert(rest.substr(0, blank));
      rest = blank == std::string_view::npos ? std::string_view{} : rest.substr(blank + 1);
    }
  for (const auto key : keys) text += wrapped(fmt::format("  {:<21}  ", key), sources::citation(key));
  return text;
}

std::string catalogue_json() {
  Json list = Json::array();
  for (const fluids::CatalogueEntry& entry : fluids::catalogue())
    list.push_back({{"name", std::string(entry.name)},
                    {"written", std::string(entry.written)},
                    {"valid_degC", {celsius(entry.valid.low), celsius(entry.valid.high)}},
                    {"sources", std::string(entry.sources)}});
  return Json{{"fluids", list}}.dump() + "\n";
}

}  // namespace dutygauge::cli
