#include "equations.hpp"

namespace dutygauge::fluids {
namespace {

constexpr double enthalpy_zero = 273.15;              // [K]
constexpr TemperatureRange everywhere{1.0, 10000.0};  // constants name no range of their own [K]

}  // namespace

State state_of(const ConstantModel& model, Phase phase, double temperature, double) {
  return {.temperature = temperature,
          .density = model.density,
          .heat_capacity = model.heat_capacity,
          .conductivity = model.conductivity,
          .viscosity = model.viscosity,
          .enthalpy = model.heat_capacity * (temperature - enthalpy_zero),
          .phase = phase};
}

Caloric caloric_of(const ConstantModel& model, Phase, double temperature, double) {
  return {model.heat_capacity * (temperature - enthalpy_zero), model.heat_capacity};
}

Limits limits_of(const ConstantModel&, Phase, double) {
  return {.valid = everywhere, .usable = everywhere};
}

double guess_temperature(const ConstantModel& model, Phase, double enthalpy, double) {
  return enthalpy_zero + enthalpy / model.heat_capacity;
}

std::string end_of(const ConstantModel&, Phase, double, bool) {
  return "constant properties name no range";
}

bool changes_phase_at_end(const ConstantModel&, Phase, double, bool) {
  return false;
}

std::vector<PropertyNote> notes_of(const ConstantModel&, Phase) {
  std::vector<PropertyNote> notes;
  for (const char* property : {"density", "heat_capacity", "conductivity", "viscosity"})
    notes.push_back({property, "", everywhere, 0.0});
  return notes;
}

}  // namespace dutygauge::fluids
