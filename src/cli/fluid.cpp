#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <ostream>

#include "command.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/report.hpp"
#include "dutygauge/units/mention.hpp"
#include "fluid_page.hpp"

namespace dutygauge::cli {
namespace {

using Json = nlohmann::ordered_json;
using units::Kind;

constexpr int usual_steps = 7, most_steps = 10'000;
constexpr std::string_view at_example = "'temperature=20..80 degC, pressure=4 bara'";

std::string_view trimmed(std::string_view text) {
  while (!text.empty() && text.front() == ' ') text.remove_prefix(1);
  while (!text.empty() && text.back() == ' ') text.remove_suffix(1);
  return text;
}

/// What stands behind "temperature=" or "pressure=".
units::Value value_of(std::string_view name, std::string_view text) {
  const Kind kind = name == "temperature" ? Kind::temperature : Kind::pressure;
  auto read = units::read(text, kind);
  if (const auto* misread = std::get_if<units::Misread>(&read))
    throw CallError(
        fmt::format("--at: {}: {}; {}; {}", name, misread->what, misread->expected, misread->remedy));
  auto value = std::get<units::Value>(std::move(read));
  if (value.standard_deviation)
    throw CallError(fmt::format("--at: {}: a deviation (+-) has no use here; give the value itself", name));
  if (kind == Kind::pressure && !(value.low.value_or(value.si) > 0.0))
    throw CallError("--at: pressure: zero or negative; expected an absolute pressure above zero");
  return value;
}

/// The two values of --at, each once.
struct At {
  std::optional<units::Value> temperature, pressure;
};

At at_of(std::string_view text) {
  At at;
  while (!text.empty()) {
    const auto comma = text.find(',');
    const auto part = trimmed(text.substr(0, comma));
    text = comma == std::string_view::npos ? std::string_view{} : text.substr(comma + 1);
    const auto name = trimmed(part.substr(0, part.find('=')));
    if (part.find('=') == std::string_view::npos || (name != "temperature" && name != "pressure"))
      throw CallError(fmt::format(
          "--at: '{}' is neither temperature=... nor pressure=...; write for example {}", part, at_example));
    auto& place = name == "temperature" ? at.temperature : at.pressure;
    if (place) throw CallError(fmt::format("--at: {} is given twice; give it once", name));
    place = value_of(name, trimmed(part.substr(part.find('=') + 1)));
  }
  if (!at.temperature || !at.pressure)
    throw CallError(fmt::format("--at needs a temperature and a pressure; write for example {}", at_example));
  return at;
}

int steps_of(const Call& call, bool is_range) {
  const auto typed = call.value("steps");
  if (!typed) return usual_steps;
  if (!is_range) throw CallError("--steps: --at holds no range; write for example temperature=20..80 degC");
  const auto number = units::number(*typed);
  if (!number || *number < 2.0 || *number > most_steps || *number != std::floor(*number))
    throw CallError(fmt::format("--steps: '{}' is not a number of rows; expected a whole number from 2 to {}",
                                *typed, most_steps));
  return static_cast<int>(*number);
}

/// The states asked for: one, or evenly spread over the range.
std::vector<fluids::Inlet> places_of(const Call& call, const At& at) {
  const bool temperature_runs = at.temperature->low.has_value(), pressure_runs = at.pressure->low.has_value();
  if (temperature_runs && pressure_runs)
    throw CallError("--at: two ranges; give a range of the temperature or of the pressure");
  const int steps = steps_of(call, temperature_runs || pressure_runs);
  if (!temperature_runs && !pressure_runs) return {{at.temperature->si, at.pressure->si}};
  const units::Value& range = temperature_runs ? *at.temperature : *at.pressure;
  std::vector<fluids::Inlet> places;
  for (int i = 0; i < steps; ++i) {
    const double share = static_cast<double>(i) / (steps - 1);
    const double value = *range.low + share * (*range.high - *range.low);
    places.push_back(temperature_runs ? fluids::Inlet{value, at.pressure->si}
                                      : fluids::Inlet{at.temperature->si, value});
  }
  return places;
}

void refuse_bare_pressure(const At& at, const fluids::Fluid& fluid) {
  if (at.pressure->bare_pressure && fluid.phase == fluids::Phase::gas)
    throw CallError(
        "--at: the pressure does not say whether it is absolute or gauge, and the density of a gas depends "
        "on it; write for example 6 bara or 6 barg");
}

/// Findings of the making and of both ends; what is between the ends is less far out.
Findings findings_of(const fluids::Made& made, const std::vector<fluids::Inlet>& places) {
  Findings findings = made.findings;
  const auto add = [&](const fluids::Inlet& place) {
    for (Finding& finding : fluids::check_bulk(made.fluid, place.temperature, place.pressure, "this state"))
      if (std::ranges::find(findings, finding.text, &Finding::text) == findings.end())
        findings.push_back(std::move(finding));
  };
  add(places.front());
  add(places.back());
  return findings;
}

FluidTable table_of(const Call& call, const std::string& spec) {
  const At at = at_of(*call.value("at"));
  const auto places = places_of(call, at);
  fluids::Made made = case_io::read_fluid_spec(spec, places.front().temperature, places.front().pressure);
  refuse_bare_pressure(at, made.fluid);
  for (const fluids::Inlet& place : places)
    if (const auto objections = fluids::object_to_inlet(made.fluid, place); !objections.empty())
      throw CallError(units::spoken(
          fmt::format("--at: {}; expected {}", objections.front().what, objections.front().expected),
          units::System::metric));
  FluidTable table{.fluid = made.fluid, .assumed = made.assumed, .findings = findings_of(made, places)};
  for (const std::string& open : at.pressure->taken_for_granted)
    table.assumed.push_back(
        {.key = "pressure", .value = at.pressure->si, .kind = Kind::pressure, .why = open});
  for (const fluids::Inlet& place : places)
    table.rows.push_back({place.pressure, fluids::state(made.fluid, place.temperature, place.pressure)});
  return table;
}

/// Results for programs carry the numbers alone: what is to be said beside them goes to stderr.
void say_beside(const FluidTable& table, std::ostream& err) {
  for (const Assumption& one : table.assumed)
    err << fmt::format("dutygauge: assumed: {}: {} ({})\n", one.key,
                       one.word.empty() ? units::typed(one.value, one.kind) : one.word,
                       report::reason(one, units::System::metric));
  for (const Finding& one : table.findings)
    err << fmt::format("dutygauge: {}: {}\n", report::word(one.severity),
                       report::sentence(one, units::System::metric));
}

int run_list(const Call& call, Streams streams) {
  for (const std::string_view option : {"at", "steps", "csv"})
    if (call.has(option))
      throw CallError(fmt::format("--list and --{} exclude each other; give one of them", option));
  if (!call.arguments.empty())
    throw CallError("--list takes no fluid: it names all of them; leave one of the two out");
  const auto system = units_asked_for(call).value_or(units::System::metric);
  deliver(call, call.has("json") ? catalogue_json() : catalogue_page(system), streams.out);
  return done;
}

}  // namespace

int run_fluid(const Call& call, Streams streams) {
  if (call.has("list")) return run_list(call, streams);
  if (call.has("json") && call.has("csv"))
    throw CallError("--json and --csv exclude each other; give one of them");
  if (call.arguments.size() != 1)
    throw CallError("fluid takes one SPEC, such as water or '{oil: {iso_vg: 46}}'; quote what holds blanks");
  if (!call.has("at"))
    throw CallError(
        fmt::format("fluid needs --at with a temperature and a pressure, such as {}", at_example));
  const auto system = units_asked_for(call).value_or(units::System::metric);
  const FluidTable table = table_of(call, call.arguments.front());
  if (!call.has("json") && !call.has("csv")) {
    deliver(call, fluid_page(table, system), streams.out);
    return done;
  }
  say_beside(table, streams.err);
  if (call.has("csv"))
    deliver_to("csv", call, fluid_csv(table), streams.out);
  else
    deliver(call, fluid_json(table), streams.out);
  return done;
}

}  // namespace dutygauge::cli
