#include <fmt/core.h>

#include <cmath>

#include "catalogue.hpp"
#include "limits.hpp"
#include "solution_data.hpp"
#include "water.hpp"

namespace dutygauge::fluids {
namespace {

constexpr double water_molar_mass = 18.01528;  // [kg/kmol]
constexpr double enthalpy_zero = 273.15;       // [K]

double polynomial(const std::array<double, 4>& c, double x) {
  return c[0] + x * (c[1] + x * (c[2] + x * c[3]));
}

double integral(const std::array<double, 4>& c, double x) {
  return x * (c[0] + x * (c[1] / 2.0 + x * (c[2] / 3.0 + x * c[3] / 4.0)));
}

/// The coefficients of powers of the temperature at one composition.
std::array<double, 4> at_fraction(const SolutionCoefficients& coefficients, double x) {
  std::array<double, 4> result{};
  for (std::size_t i = 0; i < 4; ++i)
    for (std::size_t j = 6; j-- > 0;) result[i] = result[i] * x + coefficients[i][j];
  return result;
}

double freezing_temperature(const SolutionRow& row, double x) {
  double result = 0.0;
  for (std::size_t j = 6; j-- > 0;) result = result * x + row.freezing_temperature[j];
  return result;
}

const SolutionRow* solution_row(std::string_view name) {
  for (const SolutionRow& row : solution_rows())
    if (same_name(row.key, name)) return &row;
  return nullptr;
}

bool is_salt(const SolutionRow& row) {
  return row.particles > 1.0;
}

}  // namespace

State state_of(const SolutionModel& model, Phase phase, double temperature, double pressure) {
  const double x = temperature - model.base_temperature;
  const Caloric caloric = caloric_of(model, phase, temperature, pressure);
  return {.temperature = temperature,
          .density = polynomial(model.density, x),
          .heat_capacity = caloric.heat_capacity,
          .conductivity = polynomial(model.conductivity, x),
          .viscosity = std::exp(polynomial(model.log_viscosity, x)),
          .enthalpy = caloric.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const SolutionModel& model, Phase, double temperature, double) {
  const double x = temperature - model.base_temperature, zero = enthalpy_zero - model.base_temperature;
  return {integral(model.heat_capacity, x) - integral(model.heat_capacity, zero),
          polynomial(model.heat_capacity, x)};
}

Limits reach_of(const SolutionModel& model) {
  const TemperatureRange valid{model.freezing_temperature, model.highest_temperature};
  return {.valid = valid, .usable = {valid.low, valid.high + extension(valid)}};
}

/// Raoult's law for the water; the solute hardly evaporates.
double phase_margin(const SolutionModel& model, Inlet at, bool) {
  return std::log(at.pressure) - std::log(model.water_activity) -
         std::log(water::saturation_pressure(std::max(at.temperature, water::lowest_temperature)));
}

PhaseEnd phase_end(const SolutionModel&, Inlet) {
  return {"it boils", true};
}

bool freezes_at_low_end(const SolutionModel&) {
  return true;
}

std::vector<PropertyNote> notes_of(const SolutionModel& model, Phase) {
  const TemperatureRange range{model.freezing_temperature, model.highest_temperature};
  const auto [density, heat_capacity, conductivity, viscosity] = model.row->uncertainty;
  return {{"density", "melinder_2010", range, density},
          {"heat_capacity", "melinder_2010", range, heat_capacity},
          {"conductivity", "melinder_2010", range, conductivity},
          {"viscosity", "melinder_2010", range, viscosity}};
}

Made make_solution(std::string_view name, double mass_fraction) {
  const SolutionRow* row = solution_row(name);
  if (row == nullptr)
    return refused("", fmt::format("'{}' is not a solution known here", name),
                   "ethylene_glycol_water, propylene_glycol_water, sodium_chloride_brine or "
                   "calcium_chloride_brine",
                   "correct the name, or give the properties as two_point or table");
  const double w = mass_fraction;
  if (!(w > 0.0 && w <= row->highest_fraction))
    return refused(std::string(row->key) + ".mass_fraction",
                   fmt::format("{:.4g} % by mass is outside the data of {}", 100.0 * w, row->name),
                   fmt::format("a mass fraction above 0 and up to {:.4g} %", 100.0 * row->highest_fraction),
                   "check whether the sheet means per cent by volume; for plain water write `water`");
  const double x = w - row->base_fraction;
  const double water = (1.0 - w) / water_molar_mass, solute = row->particles * w / row->solute_molar_mass;
  Made made;
  made.fluid.model = SolutionModel{.density = at_fraction(row->density, x),
                                   .heat_capacity = at_fraction(row->heat_capacity, x),
                                   .conductivity = at_fraction(row->conductivity, x),
                                   .log_viscosity = at_fraction(row->log_viscosity, x),
                                   .base_temperature = row->base_temperature,
                                   .freezing_temperature = freezing_temperature(*row, x),
                                   .highest_temperature = row->highest_temperature,
                                   .water_activity = water / (water + solute),
                                   .row = row};
  made.fluid.name = row->name;
  made.fluid.source = "melinder_2010";
  if (!is_salt(*row))
    made.findings.push_back(
        {.id = "fluids.inhibited_glycol",
         .severity = Severity::note,
         .text = fmt::format("{} is taken as free of inhibitors; commercial coolants hold 3 to 6 % (density "
                             "+0.5 %, viscosity and conductivity within 3 %): the supplier's table is better",
                             row->name),
         .ground = Ground::method,
         .source = "melinder_2010"});
  return made;
}

}  // namespace dutygauge::fluids
