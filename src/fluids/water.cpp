#include "water.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <optional>

namespace dutygauge::fluids {
namespace {

// Nearer to the saturation line than this [K], the phase cannot be told from the data.
constexpr double saturation_margin = 0.05;

/// A solver may wander outside the usable range; the equations stay finite within these.
double in_domain(double temperature, Phase phase) {
  return std::clamp(temperature, 230.0, phase == Phase::liquid ? 700.0 : 1078.0);
}

Made refused_range(const std::string& what) {
  return refused("", what,
                 "water between 0 and 800 degC and up to 1000 bar, outside the near-critical region",
                 "correct the inlet, or give the properties as a table");
}

/// The phase of a state inside the formulation; empty within the margin of saturation or in region 3.
std::optional<Phase> phase_at(double temperature, double pressure) {
  const TemperatureRange liquid = limits_of(WaterModel{}, Phase::liquid, pressure).usable;
  const TemperatureRange gas = limits_of(WaterModel{}, Phase::gas, pressure).usable;
  const bool saturates = pressure >= water::triple_pressure && pressure <= water::region3_pressure;
  const double margin = saturates ? saturation_margin : 0.0;
  if (pressure >= water::triple_pressure && temperature <= liquid.high - margin) return Phase::liquid;
  if (temperature >= gas.low + margin) return Phase::gas;
  return {};
}

}  // namespace

State state_of(const WaterModel&, Phase phase, double temperature, double pressure) {
  const double t = in_domain(temperature, phase);
  const water::Thermal thermal =
      phase == Phase::liquid ? water::region1(t, pressure) : water::region2(t, pressure);
  const water::Place place{t, thermal.density};
  const double viscosity = water::viscosity(place);
  return {.temperature = temperature,
          .density = thermal.density,
          .heat_capacity = thermal.heat_capacity,
          .conductivity =
              water::background_conductivity(place) + water::critical_conductivity(thermal, t, viscosity),
          .viscosity = viscosity,
          .enthalpy = thermal.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const WaterModel&, Phase phase, double temperature, double pressure) {
  const double t = in_domain(temperature, phase);
  return phase == Phase::liquid ? water::region1_caloric(t, pressure) : water::region2_caloric(t, pressure);
}

Limits limits_of(const WaterModel&, Phase phase, double pressure) {
  double saturation = water::lowest_temperature;
  if (pressure > water::region3_pressure)
    saturation = phase == Phase::liquid ? water::region3_temperature
                                        : std::min(water::boundary_temperature(pressure), 863.15);
  else if (pressure > water::triple_pressure)
    saturation = water::saturation_temperature(pressure);
  const TemperatureRange range = phase == Phase::liquid
                                     ? TemperatureRange{water::lowest_temperature, saturation}
                                     : TemperatureRange{saturation, water::highest_temperature};
  return {.valid = range, .usable = range};
}

double guess_temperature(const WaterModel&, Phase phase, double enthalpy, double pressure) {
  const double guess = phase == Phase::liquid ? water::region1_backward(enthalpy, pressure)
                                              : water::region2_backward(enthalpy, pressure);
  return std::isfinite(guess) ? guess : water::region3_temperature;
}

std::string end_of(const WaterModel& model, Phase phase, double pressure, bool upper) {
  const TemperatureRange range = limits_of(model, phase, pressure).usable;
  if (phase == Phase::liquid && !upper) return "it freezes at " + said(water::lowest_temperature);
  if (phase == Phase::gas && upper) return "the steam equations end at " + said(water::highest_temperature);
  const double end = upper ? range.high : range.low;
  if (pressure > water::region3_pressure)
    return fmt::format("near-critical water, not covered here, begins at {}", said(end));
  if (phase == Phase::liquid) return fmt::format("it boils at {}", said(end));
  if (pressure < water::triple_pressure) return "it freezes out at " + said(water::lowest_temperature);
  return fmt::format("it condenses at {}", said(end));
}

bool changes_phase_at_end(const WaterModel&, Phase phase, double pressure, bool upper) {
  if (phase == Phase::liquid) return !upper || pressure <= water::region3_pressure;
  return !upper && pressure <= water::region3_pressure;
}

std::vector<PropertyNote> notes_of(const WaterModel&, Phase phase) {
  if (phase == Phase::liquid) {
    const TemperatureRange range{water::lowest_temperature, water::region3_temperature};
    return {{"density", "iapws_if97", range, 0.0005},
            {"heat_capacity", "iapws_if97", range, 0.003},
            {"conductivity", "iapws_r15", range, 0.02},
            {"viscosity", "iapws_r12", range, 0.01}};
  }
  const TemperatureRange range{water::lowest_temperature, water::highest_temperature};
  return {{"density", "iapws_if97", range, 0.001},
          {"heat_capacity", "iapws_if97", range, 0.005},
          {"conductivity", "iapws_r15", range, 0.025},
          {"viscosity", "iapws_r12", range, 0.02}};
}

Made make_water(double inlet_temperature, double inlet_pressure) {
  const double t = inlet_temperature, p = inlet_pressure;
  if (!(p > 0.0 && p <= water::highest_pressure))
    return refused_range(fmt::format("water at {} is outside the steam equations", said_pressure(p)));
  if (!(t >= water::lowest_temperature && t <= water::highest_temperature))
    return refused_range(t < water::lowest_temperature
                             ? fmt::format("water at {} is ice", said(t))
                             : fmt::format("water at {} is outside the steam equations", said(t)));
  const std::optional<Phase> phase = phase_at(t, p);
  if (!phase && p > water::region3_pressure)
    return refused_range(
        fmt::format("water at {} and {} is near-critical, which is not covered", said(t), said_pressure(p)));
  if (!phase)
    return refused("",
                   fmt::format("water at {} and {} is at its boiling point of {}", said(t), said_pressure(p),
                               said(water::saturation_temperature(p))),
                   "liquid or steam, at least 0.05 K away from boiling",
                   "correct the inlet temperature or the pressure (gauge or absolute?); a boiling or "
                   "condensing stream cannot be rated here");
  Made made;
  made.fluid = {.model = WaterModel{},
                .phase = *phase,
                .name = *phase == Phase::liquid ? "water" : "steam",
                .source = "iapws_if97"};
  return made;
}

}  // namespace dutygauge::fluids
