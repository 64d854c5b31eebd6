#include <algorithm>
#include <cmath>

#include "gas.hpp"

// Ideal-gas heat capacities and the departure from the ideal gas by the second virial coefficient:
// Pitzer & Curl (1957) with the functions of Abbott, in Smith, Van Ness & Abbott, Introduction to
// Chemical Engineering Thermodynamics, 6th ed., equations 3.61 to 3.66.

namespace dutygauge::fluids {
namespace {

constexpr double polynomial_change = 1000.0;  // [K] between the two sets of NASA coefficients
constexpr double enthalpy_zero = 273.15;      // [K]

const std::array<double, 6>& coefficients(const GasThermal& gas, double temperature) {
  return temperature <= polynomial_change ? gas.low : gas.high;
}

/// cp/R [-]
double reduced_heat_capacity(const std::array<double, 6>& a, double t) {
  return a[0] + t * (a[1] + t * (a[2] + t * (a[3] + t * a[4])));
}

/// h/R [K]
double reduced_enthalpy(const std::array<double, 6>& a, double t) {
  return a[5] + t * (a[0] + t * (a[1] / 2.0 + t * (a[2] / 3.0 + t * (a[3] / 4.0 + t * a[4] / 5.0))));
}

}  // namespace

Virial second_virial(const GasThermal& gas, double temperature) {
  const double t = temperature / gas.critical_temperature, log_t = std::log(t);
  const double simple = std::exp(-1.6 * log_t), correction = std::exp(-4.2 * log_t);
  const double omega = gas.acentric_factor;
  const double scale = molar_gas_constant / gas.critical_pressure;
  return {.value = scale * gas.critical_temperature *
                   (0.083 - 0.422 * simple + omega * (0.139 - 0.172 * correction)),
          .slope = scale * (0.6752 * simple + 0.7224 * omega * correction) / t,
          .curvature = -scale / gas.critical_temperature * (1.75552 * simple + 3.75648 * omega * correction) /
                       (t * t)};
}

GasState gas_state(const GasThermal& gas, Inlet at) {
  const double t = at.temperature, p = at.pressure, r = molar_gas_constant;
  const Virial virial = second_virial(gas, t);
  const auto& a = coefficients(gas, t);
  // Below the usable range the equation breaks down; the density stays positive and finite.
  const double compressibility = std::max(1.0 + virial.value * p / (r * t), 0.05);
  return {.density = p * gas.molar_mass / (compressibility * r * t),
          .heat_capacity = (r * reduced_heat_capacity(a, t) - t * p * virial.curvature) / gas.molar_mass,
          .enthalpy = (r * reduced_enthalpy(a, t) + p * (virial.value - t * virial.slope)) / gas.molar_mass};
}

double ideal_heat_capacity(const GasThermal& gas, double temperature) {
  return molar_gas_constant * reduced_heat_capacity(coefficients(gas, temperature), temperature) /
         gas.molar_mass;
}

double virial_margin(const GasThermal& gas, Inlet at, bool strict) {
  const double limit = !strict ? 0.15 : gas.polar ? 0.05 : 0.10;
  const double departure =
      second_virial(gas, at.temperature).value * at.pressure / (molar_gas_constant * at.temperature);
  return limit - std::abs(departure);
}

GasThermal mixed_thermal(std::span<const GasRow* const> rows, std::span<const double> mole_fraction) {
  GasThermal mixed{.low = {},
                   .high = {},
                   .molar_mass = 0.0,
                   .critical_temperature = 0.0,
                   .critical_pressure = 0.0,
                   .acentric_factor = 0.0,
                   .range = {0.0, 1200.0},
                   .polar = false};
  for (std::size_t i = 0; i < rows.size(); ++i) {
    const GasRow& row = *rows[i];
    const double y = mole_fraction[i];
    for (std::size_t k = 0; k < 6; ++k) {
      mixed.low[k] += y * row.low[k];
      mixed.high[k] += y * row.high[k];
    }
    mixed.molar_mass += y * row.molar_mass * 1e-3;
    mixed.critical_temperature += y * row.critical.temperature;
    mixed.critical_pressure += y * row.critical.pressure;
    mixed.acentric_factor += y * row.critical.acentric_factor;
    mixed.polar = mixed.polar || (row.polar && y > 0.2);
    mixed.range.low = std::max(
        {mixed.range.low, row.lowest_temperature, row.viscosity.valid.low, row.conductivity.valid.low});
    mixed.range.high = std::min({mixed.range.high, row.viscosity.valid.high, row.conductivity.valid.high});
  }
  // The two sets are meant to meet at 1000 K; they do to 1e-4, and the enthalpy exactly from here on.
  mixed.low[5] -= reduced_enthalpy(mixed.low, enthalpy_zero);
  mixed.high[5] +=
      reduced_enthalpy(mixed.low, polynomial_change) - reduced_enthalpy(mixed.high, polynomial_change);
  return mixed;
}

}  // namespace dutygauge::fluids
