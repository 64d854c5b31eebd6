#include <fmt/core.h>

#include <cmath>

#include "limits.hpp"

// Sources: Sharqawy, Lienhard & Zubair, Desalination and Water Treatment 16, 354-380 (2010);
// Nayar, Sharqawy, Banchik & Lienhard, Desalination 390, 1-24 (2016). Symbols of those papers:
// S salinity [kg/kg], s [g/kg], t [degC].

namespace dutygauge::fluids {
namespace {

constexpr double highest_salinity = 0.12;                 // [kg/kg], of the enthalpy
constexpr TemperatureRange correlations{273.15, 393.15};  // the enthalpy is given to 120 degC
constexpr double atmosphere = 101325.0;                   // [Pa]

double density(double S, double t) {
  const double water = 999.9 + t * (2.034e-2 + t * (-6.162e-3 + t * (2.261e-5 - t * 4.657e-8)));
  const double salt = 802.0 + t * (-2.001 + t * (1.677e-2 - t * 3.060e-5));
  return water + S * salt - 1.613e-5 * S * S * t * t;
}

double viscosity(double S, double t) {
  const double shifted = t + 64.993;
  const double water = 4.2844e-5 + 1.0 / (0.157 * shifted * shifted - 91.296);
  const double a = 1.541 + t * (1.998e-2 - t * 9.52e-5);
  const double b = 7.974 + t * (-7.561e-2 + t * 4.724e-4);
  return water * (1.0 + S * (a + b * S));
}

/// The temperature scale of 1968 [K], on which heat capacity and conductivity were fitted.
double scale_1968(double temperature) {
  return (temperature - 0.00025 * 273.15) / (1.0 - 0.00025);
}

double heat_capacity(double s, double T) {
  const double a = 5.328 + s * (-9.76e-2 + s * 4.04e-4);
  const double b = -6.913e-3 + s * (7.351e-4 - s * 3.15e-6);
  const double c = 9.6e-6 + s * (-1.927e-6 + s * 8.23e-9);
  const double d = 2.5e-9 + s * (1.666e-9 - s * 7.125e-12);
  return 1000.0 * (a + T * (b + T * (c + T * d)));
}

double conductivity(double s, double T) {
  const double exponent = std::log10(240.0 + 0.0002 * s) +
                          0.434 * (2.3 - (343.5 + 0.037 * s) / T) * std::cbrt(1.0 - T / (647.0 + 0.03 * s));
  return 1e-3 * std::pow(10.0, exponent);
}

/// h [J/kg] is a cubic in t; its slope is not quite the heat capacity above, which is a fit of its own.
Caloric enthalpy_fit(double S, double t, double pressure) {
  const double s = 1000.0 * S, P = (pressure - atmosphere) * 1e-6;
  const double c0 = 141.355 - S * (-23482.5 + S * (315183.0 + S * (2802690.0 - S * 14460600.0))) +
                    P * (996.7767 - 1.1748 * s);
  const double c1 = 4202.07 - S * (7826.07 + S * (-19910.8 + S * 27784.6)) + P * (-3.2406 + 0.01169 * s);
  const double c2 = -0.535 - S * (-44.1733 + 97.2801 * S) + P * (0.0127 - 2.6185e-5 * s);
  const double c3 = 0.004 - S * 0.21394 + P * (-4.7723e-5 + 7.0661e-8 * s);
  return {c0 + t * (c1 + t * (c2 + t * c3)), c1 + t * (2.0 * c2 + t * 3.0 * c3)};
}

double log_vapour_pressure(double s, double T) {
  const double water = -5800.2206 / T + 1.3914993 +
                       T * (-0.048640239 + T * (4.1764768e-5 - T * 1.4452093e-8)) + 6.5459673 * std::log(T);
  return water + s * (-4.5818e-4 - s * 2.0443e-6);
}

/// Millero (1978), as adopted by UNESCO, at atmospheric pressure. [K]
double freezing_temperature(double s) {
  return 273.15 + s * (-0.0575 + 1.710523e-3 * std::sqrt(s) - 2.154996e-4 * s);
}

}  // namespace

State state_of(const SeawaterModel& model, Phase phase, double temperature, double pressure) {
  const double S = model.salinity, s = 1000.0 * S, t = temperature - 273.15, T = scale_1968(temperature);
  return {.temperature = temperature,
          .density = density(S, t),
          .heat_capacity = heat_capacity(s, T),
          .conductivity = conductivity(s, T),
          .viscosity = viscosity(S, t),
          .enthalpy = enthalpy_fit(S, t, pressure).enthalpy,
          .phase = phase};
}

Caloric caloric_of(const SeawaterModel& model, Phase, double temperature, double pressure) {
  return enthalpy_fit(model.salinity, temperature - 273.15, pressure);
}

Limits reach_of(const SeawaterModel& model) {
  Limits limits = extended(correlations);
  limits.usable.low = std::max(limits.usable.low, freezing_temperature(1000.0 * model.salinity));
  return limits;
}

bool freezes_at_low_end(const SeawaterModel& model) {
  return freezing_temperature(1000.0 * model.salinity) > extended(correlations).usable.low;
}

double phase_margin(const SeawaterModel& model, Inlet at, bool) {
  return std::log(at.pressure) - log_vapour_pressure(1000.0 * model.salinity, at.temperature);
}

PhaseEnd phase_end(const SeawaterModel&, Inlet) {
  return {"it boils", true};
}

std::vector<PropertyNote> notes_of(const SeawaterModel& model, Phase) {
  // Beyond 80 g/kg the sources part from TEOS-10 by up to 0.5 %.
  const double density_band = model.salinity > 0.08 ? 0.01 : 0.002;
  return {{"density", "sharqawy_2010", {273.15, 453.15}, density_band},
          {"heat_capacity", "sharqawy_2010", correlations, 0.005},
          {"conductivity", "sharqawy_2010", {273.15, 453.15}, 0.03},
          {"viscosity", "sharqawy_2010", {273.15, 453.15}, 0.02}};
}

Made make_seawater(double salinity) {
  if (!(salinity >= 0.0 && salinity <= highest_salinity))
    return refused("seawater.salinity",
                   fmt::format("{:.4g} g/kg is outside the equations", 1000.0 * salinity),
                   "a salinity from 0 to 120 g/kg (ocean water: 35 g/kg)",
                   "correct the value or its unit, or give the properties as a table");
  Made made;
  made.fluid.model = SeawaterModel{salinity};
  made.fluid.name = "seawater";
  made.fluid.source = "sharqawy_2010";
  return made;
}

}  // namespace dutygauge::fluids
