#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "limits.hpp"

namespace dutygauge::fluids {
namespace {

/// The temperature at which the model has an enthalpy: Newton steps on the model's own
/// enthalpy, kept inside the usable range and between the ends already tried.
template <class Model>
double solve_temperature(const Model& model, Phase phase, double enthalpy, double pressure,
                         TemperatureRange range) {
  double low = range.low, high = range.high;
  bool low_tried = false, high_tried = false;
  double t = std::clamp(guess_temperature(model, phase, enthalpy, pressure), low, high);
  for (int step = 0; step < 100; ++step) {
    const Caloric at = caloric_of(model, phase, t, pressure);
    const double excess = at.enthalpy - enthalpy;
    if (excess > 0.0) {
      if (t <= range.low) return range.low;
      high = t;
      high_tried = true;
    } else {
      if (t >= range.high) return range.high;
      low = t;
      low_tried = true;
    }
    double next = t - excess / at.heat_capacity;
    // A Newton step squares the error: what is left after so short a step is below 1e-12 of t.
    if (std::abs(next - t) <= 1e-7 * t && next >= low && next <= high) return next;
    if (!(next < high)) next = high_tried ? 0.5 * (low + high) : high;
    if (!(next > low)) next = low_tried ? 0.5 * (low + high) : low;
    t = next;
  }
  return t;
}

/// As above within the usable range. Where the phase boundary takes a search, it is looked
/// for only if the temperature turns out to lie beyond it.
template <class Model>
double solve_temperature(const Model& model, Phase phase, double enthalpy, double pressure) {
  if constexpr (Searched<Model>) {
    const double t = solve_temperature(model, phase, enthalpy, pressure, reach_of(model).usable);
    if (phase_margin(model, {t, pressure}, false) >= 0.0) return t;
    const TemperatureRange usable = limits_of(model, phase, pressure).usable;
    return std::clamp(t, usable.low, usable.high);
  } else {
    return solve_temperature(model, phase, enthalpy, pressure, limits_of(model, phase, pressure).usable);
  }
}

Limits limits(const Fluid& fluid, double pressure) {
  return std::visit([&](const auto& model) { return limits_of(model, fluid.phase, pressure); }, fluid.model);
}

}  // namespace

std::string said(double temperature) {
  return units::mention(temperature, units::Kind::temperature);
}

std::string said_difference(double kelvin) {
  return units::mention(kelvin, units::Kind::temperature_difference);
}

std::string said_pressure(double pressure) {
  return units::mention(pressure, units::Kind::pressure);
}

Made refused(std::string key, std::string what, std::string expected, std::string remedy) {
  Made made;
  made.objections.push_back({std::move(key), std::move(what), std::move(expected), std::move(remedy)});
  return made;
}

State state(const Fluid& fluid, double temperature, double pressure) {
  State at = std::visit(
      [&](const auto& model) { return state_of(model, fluid.phase, temperature, pressure); }, fluid.model);
  at.density *= fluid.scale.density;
  at.heat_capacity *= fluid.scale.heat_capacity;
  at.conductivity *= fluid.scale.conductivity;
  at.viscosity *= fluid.scale.viscosity;
  at.enthalpy *= fluid.scale.heat_capacity;
  return at;
}

double enthalpy(const Fluid& fluid, double temperature, double pressure) {
  return fluid.scale.heat_capacity *
         std::visit(
             [&](const auto& model) {
               return caloric_of(model, fluid.phase, temperature, pressure).enthalpy;
             },
             fluid.model);
}

double temperature_at(const Fluid& fluid, double enthalpy, double pressure) {
  const double unscaled = enthalpy / fluid.scale.heat_capacity;
  return std::visit(
      [&](const auto& model) { return solve_temperature(model, fluid.phase, unscaled, pressure); },
      fluid.model);
}

double reference_density(const Fluid& fluid, double temperature, double pressure) {
  // Steam at standard conditions has not condensed: by convention it has the volume of an ideal gas.
  constexpr double gas_constant_of_steam = 461.526;  // [J/kg.K], IAPWS-IF97
  if (std::holds_alternative<WaterModel>(fluid.model) && fluid.phase == Phase::gas &&
      temperature < usable_temperatures(fluid, pressure).low)
    return pressure / (gas_constant_of_steam * temperature);
  return state(fluid, temperature, pressure).density;
}

std::vector<PropertyNote> notes(const Fluid& fluid) {
  return std::visit([&](const auto& model) { return notes_of(model, fluid.phase); }, fluid.model);
}

Objections object_to_inlet(const Fluid& fluid, Inlet inlet) {
  if (!(inlet.pressure > 0.0) || !std::isfinite(inlet.pressure) || !std::isfinite(inlet.temperature))
    return {{"", "the inlet's temperature or pressure is impossible", "an absolute pressure above zero",
             "correct the inlet"}};
  const TemperatureRange usable = usable_temperatures(fluid, inlet.pressure);
  const bool above = inlet.temperature > usable.high;
  if (!above && inlet.temperature >= usable.low) return {};
  return {{"",
           fmt::format("{} cannot be used at {} and {}: {}", fluid.name, said(inlet.temperature),
                       said_pressure(inlet.pressure), why_it_ends(fluid, inlet.pressure, above)),
           fmt::format("an inlet between {} and {}", said(usable.low), said(usable.high)),
           "correct the inlet, or give the properties as two_point or table"}};
}

TemperatureRange valid_temperatures(const Fluid& fluid, double pressure) {
  return limits(fluid, pressure).valid;
}

TemperatureRange usable_temperatures(const Fluid& fluid, double pressure) {
  return limits(fluid, pressure).usable;
}

std::string why_it_ends(const Fluid& fluid, double pressure, bool at_upper_end) {
  return std::visit([&](const auto& model) { return end_of(model, fluid.phase, pressure, at_upper_end); },
                    fluid.model);
}

}  // namespace dutygauge::fluids
