#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "limits.hpp"

// What has to be said about the temperatures at which a converged result used a fluid.

namespace dutygauge::fluids {
namespace {

// A temperature found by iteration may stand past an end by rounding alone [K].
constexpr double rounding = 1e-6;
// Data end where somebody wrote down rounded numbers: past an end by less than can be shown is at it [K].
constexpr double at_the_edge = 0.05;
constexpr double phase_margin_temperature = 3.0;  // [K] nearer to boiling or freezing is remarked on

/// Where a temperature lies outside a range; `beyond` is 0 inside.
struct Outside {
  double beyond, limit;
  bool upper;

  /// "12.0 K above", and "just above" where no digit would be left of the distance.
  std::string place() const {
    return (beyond < at_the_edge ? "just" : said_difference(beyond)) + (upper ? " above" : " below");
  }
};

Outside outside(TemperatureRange range, double temperature, double allowance = rounding) {
  if (temperature > range.high + allowance) return {temperature - range.high, range.high, true};
  if (temperature < range.low - allowance) return {range.low - temperature, range.low, false};
  return {0.0, 0.0, false};
}

Finding at_temperature(std::string id, Severity severity, std::string text, double value, double limit) {
  return {.id = std::move(id),
          .severity = severity,
          .text = std::move(text),
          .ground = Ground::method,
          .value = value,
          .limit = limit,
          .kind = units::Kind::temperature,
          .source = ""};
}

bool changes_phase(const Fluid& fluid, double pressure, bool upper) {
  return std::visit(
      [&](const auto& model) { return changes_phase_at_end(model, fluid.phase, pressure, upper); },
      fluid.model);
}

/// "density, heat capacity and viscosity"
std::string list(const std::vector<std::string>& words) {
  std::string text;
  for (std::size_t i = 0; i < words.size(); ++i)
    text += (i == 0 ? "" : i + 1 == words.size() ? " and " : ", ") + words[i];
  return text;
}

/// The properties whose data do not reach a temperature, and by how much at most.
struct Extrapolated {
  std::vector<std::string> properties;
  Outside worst{0.0, 0.0, false};
};

Extrapolated extrapolated(const Fluid& fluid, double temperature) {
  Extrapolated result;
  for (const PropertyNote& note : notes(fluid)) {
    const Outside place = outside(note.valid, temperature, at_the_edge);
    if (place.beyond <= 0.0) continue;
    std::string word(note.property);
    std::ranges::replace(word, '_', ' ');
    result.properties.push_back(word);
    if (place.beyond > result.worst.beyond) result.worst = place;
  }
  return result;
}

void remark_on_extrapolation(const Fluid& fluid, double temperature, double pressure, std::string_view where,
                             Findings& findings) {
  const Extrapolated found = extrapolated(fluid, temperature);
  const Outside valid = outside(valid_temperatures(fluid, pressure), temperature, at_the_edge);
  if (!found.properties.empty())
    findings.push_back(at_temperature(
        "fluids.extrapolated", Severity::should,
        fmt::format("{}: {} is {} the data of the {} ({}); its {} {} extrapolated; give data that "
                    "reach this temperature",
                    where, said(temperature), found.worst.place(), fluid.name, said(found.worst.limit),
                    list(found.properties), found.properties.size() == 1 ? "is" : "are"),
        temperature, found.worst.limit));
  else if (valid.beyond > 0.0)
    findings.push_back(at_temperature(
        "fluids.dense_gas", Severity::should,
        fmt::format("{}: at {} and {} {} is so dense that its density and heat capacity may be 5 to "
                    "10 % wrong; they are reliable from {}; give a table",
                    where, said(temperature), said_pressure(pressure), fluid.name, said(valid.limit)),
        temperature, valid.limit));
}

void remark_on_dew(const Fluid& fluid, double temperature, double pressure, std::string_view where,
                   Findings& findings) {
  const double dew = usable_temperatures(fluid, pressure).low;
  if (temperature >= dew + phase_margin_temperature || !changes_phase(fluid, pressure, false)) return;
  findings.push_back(at_temperature(
      "fluids.near_condensing", Severity::should,
      fmt::format(
          "{}: {} at {} is within {} of condensing ({}), and colder walls will be wet and take more heat "
          "than is computed; check the dew point",
          where, fluid.name, said(temperature), said_difference(phase_margin_temperature), said(dew)),
      temperature, dew));
}

/// On the point of boiling or freezing. Water freezes from 274 K on, solutions are given 3 K.
void remark_on_phase(const Fluid& fluid, double temperature, double pressure, std::string_view where,
                     Findings& findings) {
  if (fluid.phase == Phase::gas) return remark_on_dew(fluid, temperature, pressure, where, findings);
  const TemperatureRange range = usable_temperatures(fluid, pressure);
  if (temperature > range.high - phase_margin_temperature && changes_phase(fluid, pressure, true))
    findings.push_back(at_temperature(
        "fluids.near_boiling", Severity::should,
        fmt::format("{}: {} at {} is within {} of boiling ({}); the pressure drop alone may make it flash, "
                    "and no two-phase flow is considered; check the lowest pressure",
                    where, fluid.name, said(temperature), said_difference(phase_margin_temperature),
                    said(range.high)),
        temperature, range.high));
  const double margin =
      std::holds_alternative<WaterModel>(fluid.model) ? 274.0 - range.low : phase_margin_temperature;
  if (temperature < range.low + margin && changes_phase(fluid, pressure, false))
    findings.push_back(at_temperature(
        "fluids.near_freezing", Severity::should,
        fmt::format("{}: {} at {} is about to freeze ({}), and ice would block the unit; keep the "
                    "outlet and the coldest wall warmer",
                    where, fluid.name, said(temperature), said(range.low)),
        temperature, range.low));
}

void remark_on_viscosity(const Fluid& fluid, double temperature, double pressure, std::string_view where,
                         Findings& findings) {
  if (fluid.phase != Phase::liquid) return;
  const State at = state(fluid, temperature, pressure);
  if (at.viscosity <= 1.0 && at.viscosity <= 1e-3 * at.density) return;
  findings.push_back(
      {.id = "fluids.very_viscous",
       .severity = Severity::should,
       .text = fmt::format("{}: the viscosity of {} at {} is {{value}}: near its pour point it may "
                           "not flow at all; compare the pour point",
                           where, fluid.name, said(temperature)),
       .ground = Ground::judgement,
       .value = at.viscosity,
       .limit = 1.0,
       .kind = units::Kind::viscosity,
       .source = "common_practice"});
}

/// Two published fits of seawater, of the heat capacity and of the enthalpy, part in hot and strong brines.
void remark_on_seawater(const Fluid& fluid, double temperature, double pressure, std::string_view where,
                        Findings& findings) {
  const auto* model = std::get_if<SeawaterModel>(&fluid.model);
  if (model == nullptr) return;
  const double slope = caloric_of(*model, fluid.phase, temperature, pressure).heat_capacity;
  const double ratio = slope / state_of(*model, fluid.phase, temperature, pressure).heat_capacity;
  if (std::abs(ratio - 1.0) <= 0.015) return;
  findings.push_back(
      {.id = "fluids.seawater_enthalpy",
       .severity = Severity::should,
       .text = fmt::format("{}: the published enthalpy of seawater rises {:.1f} % {} than its published heat "
                           "capacity at {}, and a duty may be wrong by as much; give a table if that decides",
                           where, 100.0 * std::abs(ratio - 1.0), ratio < 1.0 ? "less" : "more",
                           said(temperature)),
       .ground = Ground::method,
       .value = ratio,
       .limit = 1.0,
       .source = "nayar_2016"});
}

}  // namespace

Findings check_bulk(const Fluid& fluid, double temperature, double pressure, std::string_view where) {
  const Outside usable = outside(usable_temperatures(fluid, pressure), temperature);
  if (usable.beyond > 0.0)
    return {at_temperature(
        "fluids.beyond_usable", Severity::must,
        fmt::format("{}: {} is {} what can be computed of {}: {}; describe the fluid further, or "
                    "mend the temperatures",
                    where, said(temperature), usable.place(), fluid.name,
                    why_it_ends(fluid, pressure, usable.upper)),
        temperature, usable.limit)};
  Findings findings;
  remark_on_extrapolation(fluid, temperature, pressure, where, findings);
  remark_on_phase(fluid, temperature, pressure, where, findings);
  remark_on_viscosity(fluid, temperature, pressure, where, findings);
  remark_on_seawater(fluid, temperature, pressure, where, findings);
  return findings;
}

Findings check_wall(const Fluid& fluid, double temperature, double pressure, std::string_view where) {
  Findings findings;
  const Outside usable = outside(usable_temperatures(fluid, pressure), temperature);
  const Outside valid = outside(valid_temperatures(fluid, pressure), temperature, at_the_edge);
  if (usable.beyond > 0.0 && changes_phase(fluid, pressure, usable.upper))
    findings.push_back(at_temperature(
        "fluids.wall_changes_phase", Severity::should,
        fmt::format("{}: the wall at {} is {} the {} where {} changes its phase ({}), but its film is "
                    "computed in one phase, with the properties at that limit; expect another film there, or "
                    "move the wall away from it",
                    where, said(temperature), usable.place(), said(usable.limit), fluid.name,
                    why_it_ends(fluid, pressure, usable.upper)),
        temperature, usable.limit));
  else if (valid.beyond > 0.0)
    findings.push_back(at_temperature(
        "fluids.wall_outside", Severity::note,
        fmt::format("{}: the wall at {} is {} the range of the {}; the wall correction uses the "
                    "properties at {}",
                    where, said(temperature), valid.place(), fluid.name, said(valid.limit)),
        temperature, valid.limit));
  return findings;
}

Findings check_span(const Fluid& fluid, Span temperatures, std::string_view where) {
  if (!std::holds_alternative<ConstantModel>(fluid.model)) return {};
  const double limit = fluid.phase == Phase::liquid ? 30.0 : 100.0;
  const double span = std::abs(temperatures.inlet - temperatures.outlet);
  if (!(span > limit)) return {};
  return {
      {.id = "fluids.constant_over_wide_span",
       .severity = Severity::should,
       .text = fmt::format("{}: constant properties are used over {{value}} (reasonable up to {{limit}}); "
                           "give two points or a table",
                           where),
       .ground = Ground::judgement,
       .value = span,
       .limit = limit,
       .kind = units::Kind::temperature_difference,
       .source = "common_practice"}};
}

}  // namespace dutygauge::fluids
