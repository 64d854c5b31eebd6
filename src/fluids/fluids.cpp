#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "models.hpp"

namespace dutygauge::fluids {
namespace {

/// The temperature at which the model has an enthalpy: Newton steps on the model's own
/// enthalpy, kept inside the usable range and between the ends already tried.
template <class Model>
double solve_temperature(const Model& model, Phase phase, double enthalpy, double pressure) {
  const TemperatureRange range = limits_of(model, phase, pressure).usable;
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

Limits limits(const Fluid& fluid, double pressure) {
  return std::visit([&](const auto& model) { return limits_of(model, fluid.phase, pressure); }, fluid.model);
}

}  // namespace

std::string celsius(double temperature) {
  return fmt::format("{:.1f} degC", temperature - 273.15);
}

State state(const Fluid& fluid, double temperature, double pressure) {
  return std::visit([&](const auto& model) { return state_of(model, fluid.phase, temperature, pressure); },
                    fluid.model);
}

double enthalpy(const Fluid& fluid, double temperature, double pressure) {
  return std::visit(
      [&](const auto& model) { return caloric_of(model, fluid.phase, temperature, pressure).enthalpy; },
      fluid.model);
}

double temperature_at(const Fluid& fluid, double enthalpy, double pressure) {
  return std::visit(
      [&](const auto& model) { return solve_temperature(model, fluid.phase, enthalpy, pressure); },
      fluid.model);
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
