#include <fmt/core.h>

#include <cmath>

#include "models.hpp"

// What has to be said about the temperatures at which a converged result used a fluid.

namespace dutygauge::fluids {
namespace {

// A temperature found by iteration may stand past an end by rounding alone [K].
constexpr double rounding = 1e-6;

/// Where a temperature lies outside a range; `beyond` is 0 inside.
struct Outside {
  double beyond, limit;
  bool upper;
};

Outside outside(TemperatureRange range, double temperature) {
  if (temperature > range.high + rounding) return {temperature - range.high, range.high, true};
  if (temperature < range.low - rounding) return {range.low - temperature, range.low, false};
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

/// Water on the point of boiling or freezing.
void remark_on_water(const Fluid& fluid, double temperature, double pressure, std::string_view where,
                     Findings& findings) {
  if (!std::holds_alternative<WaterModel>(fluid.model) || fluid.phase != Phase::liquid) return;
  const TemperatureRange range = usable_temperatures(fluid, pressure);
  if (temperature > range.high - 3.0)
    findings.push_back(at_temperature(
        "fluids.near_boiling", Severity::should,
        fmt::format("{}: water at {} is within 3 K of boiling ({}); the pressure drop alone may make it "
                    "flash, and no two-phase flow is considered; check the lowest pressure",
                    where, celsius(temperature), celsius(range.high)),
        temperature, range.high));
  if (temperature < 274.0)
    findings.push_back(
        at_temperature("fluids.near_freezing", Severity::should,
                       fmt::format("{}: water at {} is about to freeze; ice would block the unit", where,
                                   celsius(temperature)),
                       temperature, 273.15));
}

}  // namespace

Findings check_bulk(const Fluid& fluid, double temperature, double pressure, std::string_view where) {
  Findings findings;
  const Outside valid = outside(valid_temperatures(fluid, pressure), temperature);
  const Outside usable = outside(usable_temperatures(fluid, pressure), temperature);
  if (usable.beyond > 0.0)
    findings.push_back(
        at_temperature("fluids.beyond_usable", Severity::must,
                       fmt::format("{}: {} at {} is {:.1f} K {} what can be computed: {}", where, fluid.name,
                                   celsius(temperature), usable.beyond, usable.upper ? "above" : "below",
                                   why_it_ends(fluid, pressure, usable.upper)),
                       temperature, usable.limit));
  else if (valid.beyond > 0.0)
    findings.push_back(at_temperature(
        "fluids.extrapolated", Severity::should,
        fmt::format("{}: {} is {:.1f} K {} the range of the {} ({}); density, heat capacity, conductivity "
                    "and viscosity are extrapolated; give data that reach this temperature",
                    where, celsius(temperature), valid.beyond, valid.upper ? "above" : "below", fluid.name,
                    celsius(valid.limit)),
        temperature, valid.limit));
  else
    remark_on_water(fluid, temperature, pressure, where, findings);
  return findings;
}

Findings check_wall(const Fluid& fluid, double temperature, double pressure, std::string_view where) {
  const Outside valid = outside(valid_temperatures(fluid, pressure), temperature);
  if (valid.beyond <= 0.0) return {};
  if (std::holds_alternative<WaterModel>(fluid.model) && (valid.upper == (fluid.phase == Phase::liquid)))
    return {at_temperature(
        "fluids.wall_changes_phase", Severity::should,
        fmt::format("{}: the wall at {} is {:.1f} K {} the {} of {}, whose phase changes there ({}); its "
                    "film is computed in one phase, with the properties at that limit",
                    where, celsius(temperature), valid.beyond, valid.upper ? "above" : "below",
                    celsius(valid.limit), fluid.name, why_it_ends(fluid, pressure, valid.upper)),
        temperature, valid.limit)};
  return {at_temperature(
      "fluids.wall_outside", Severity::note,
      fmt::format("{}: the wall at {} is {:.1f} K {} the range of the {}; the wall correction uses the "
                  "properties at {}",
                  where, celsius(temperature), valid.beyond, valid.upper ? "above" : "below", fluid.name,
                  celsius(valid.limit)),
      temperature, valid.limit)};
}

Findings check_span(const Fluid& fluid, Span temperatures, std::string_view where) {
  if (!std::holds_alternative<ConstantModel>(fluid.model)) return {};
  const double limit = fluid.phase == Phase::liquid ? 30.0 : 100.0;
  const double span = std::abs(temperatures.inlet - temperatures.outlet);
  if (!(span > limit)) return {};
  return {{.id = "fluids.constant_over_wide_span",
           .severity = Severity::should,
           .text = fmt::format("{}: constant properties are used over {:.0f} K (reasonable up to {:.0f} K); "
                               "give two points or a table",
                               where, span, limit),
           .ground = Ground::judgement,
           .value = span,
           .limit = limit,
           .kind = units::Kind::temperature_difference,
           .source = "common_practice"}};
}

}  // namespace dutygauge::fluids
