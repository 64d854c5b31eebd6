#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "catalogue.hpp"
#include "limits.hpp"
#include "liquid_data.hpp"

namespace dutygauge::fluids {
namespace {

constexpr double enthalpy_zero = 273.15;  // [K]

double polynomial(const std::array<double, 6>& c, double t) {
  return c[0] + t * (c[1] + t * (c[2] + t * (c[3] + t * c[4])));
}

double polynomial_integral(const std::array<double, 6>& c, double t) {
  return t * (c[0] + t * (c[1] / 2.0 + t * (c[2] / 3.0 + t * (c[3] / 4.0 + t * c[4] / 5.0))));
}

/// exp(C1 + C2/T + C3 ln T + C4 T^C5)
double exponential(const std::array<double, 6>& c, double t) {
  const double power = c[3] == 0.0 ? 0.0 : c[3] * std::pow(t, c[4]);
  return std::exp(c[0] + c[1] / t + c[2] * std::log(t) + power);
}

/// C1/C2^(1 + (1 - T/C3)^C4)
double rackett(const std::array<double, 6>& c, double t) {
  const double rest = std::max(1.0 - t / c[2], 1e-9);
  return c[0] / std::pow(c[1], 1.0 + std::pow(rest, c[3]));
}

/// C1^2/x + C2 - 2 C1 C3 x - C1 C4 x^2 - C3^2 x^3/3 - C3 C4 x^4/2 - C4^2 x^5/5, x = 1 - T/C6
double near_critical(const std::array<double, 6>& c, double t) {
  const double x = std::max(1.0 - t / c[5], 1e-9);
  const double series =
      2.0 * c[0] * c[2] +
      x * (c[0] * c[3] + x * (c[2] * c[2] / 3.0 + x * (c[2] * c[3] / 2.0 + x * c[3] * c[3] / 5.0)));
  return c[0] * c[0] / x + c[1] - x * series;
}

double near_critical_integral(const std::array<double, 6>& c, double t) {
  const double x = std::max(1.0 - t / c[5], 1e-9);
  const double series =
      c[0] * c[2] +
      x * (c[0] * c[3] / 3.0 + x * (c[2] * c[2] / 12.0 + x * (c[2] * c[3] / 10.0 + x * c[3] * c[3] / 30.0)));
  return -c[5] * (c[0] * c[0] * std::log(x) + c[1] * x - x * x * series);
}

double value(const LiquidFit& fit, double t) {
  switch (fit.form) {
    case Form::poly:
      return polynomial(fit.c, t);
    case Form::dippr101:
      return exponential(fit.c, t);
    case Form::dippr105:
      return rackett(fit.c, t);
    case Form::dippr114:
      return near_critical(fit.c, t);
  }
  return 0.0;
}

Caloric molar_caloric(const LiquidFit& fit, double t) {
  if (fit.form == Form::dippr114)
    return {near_critical_integral(fit.c, t) - near_critical_integral(fit.c, enthalpy_zero),
            near_critical(fit.c, t)};
  return {polynomial_integral(fit.c, t) - polynomial_integral(fit.c, enthalpy_zero), polynomial(fit.c, t)};
}

/// Where all four properties hold.
TemperatureRange common_range(const LiquidRow& row) {
  return {std::max({row.density.valid.low, row.heat_capacity.valid.low, row.viscosity.valid.low,
                    row.conductivity.valid.low}),
          std::min({row.density.valid.high, row.heat_capacity.valid.high, row.viscosity.valid.high,
                    row.conductivity.valid.high})};
}

}  // namespace

double vapour_pressure(const LiquidRow& row, double temperature) {
  return value(row.vapour_pressure, temperature);
}

const LiquidRow* liquid_row(std::string_view name) {
  for (const LiquidRow& row : liquid_rows())
    if (same_name(row.key, name)) return &row;
  return nullptr;
}

State state_of(const LiquidModel& model, Phase phase, double temperature, double pressure) {
  const LiquidRow& row = *model.row;
  const Caloric caloric = caloric_of(model, phase, temperature, pressure);
  return {.temperature = temperature,
          .density = row.molar_mass * value(row.density, temperature),
          .heat_capacity = caloric.heat_capacity,
          .conductivity = value(row.conductivity, temperature),
          .viscosity = value(row.viscosity, temperature),
          .enthalpy = caloric.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const LiquidModel& model, Phase, double temperature, double) {
  const Caloric molar = molar_caloric(model.row->heat_capacity, temperature);
  return {molar.enthalpy / model.row->molar_mass, molar.heat_capacity / model.row->molar_mass};
}

Limits reach_of(const LiquidModel& model) {
  return extended(common_range(*model.row));
}

double phase_margin(const LiquidModel& model, Inlet at, bool) {
  return std::log(at.pressure / vapour_pressure(*model.row, at.temperature));
}

PhaseEnd phase_end(const LiquidModel&, Inlet) {
  return {"it boils", true};
}

bool freezes_at_low_end(const LiquidModel&) {
  return false;
}

std::vector<PropertyNote> notes_of(const LiquidModel& model, Phase) {
  const LiquidRow& row = *model.row;
  return {{"density", "perry_2008", row.density.valid, 0.005},
          {"heat_capacity", "perry_2008", row.heat_capacity.valid, 0.02},
          {"conductivity", "perry_2008", row.conductivity.valid, 0.04},
          {"viscosity", "perry_2008", row.viscosity.valid, 0.05}};
}

Made make_liquid(std::string_view name) {
  for (const RefusedLiquid& liquid : refused_liquids())
    if (same_name(liquid.key, name))
      return refused("", fmt::format("{} is not given: {}", spoken(liquid.key), liquid.why),
                     "a fluid whose properties are verified",
                     "give the properties as two_point or table from the supplier's data sheet");
  const LiquidRow* row = liquid_row(name);
  if (row == nullptr) {
    const std::string near = nearest_name(name);
    return refused("", fmt::format("'{}' is not a fluid known here", name),
                   near.empty() ? "a built-in name" : near,
                   near.empty() ? "correct the name, or give the properties as two_point or table"
                                : fmt::format("write {} if that is meant", near));
  }
  Made made;
  made.fluid.model = LiquidModel{row};
  made.fluid.name = row->name;
  made.fluid.source = "perry_2008";
  return made;
}

}  // namespace dutygauge::fluids
