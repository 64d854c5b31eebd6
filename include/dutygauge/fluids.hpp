#pragma once
#include <string>
#include <string_view>
#include <variant>
#include <vector>

#include "dutygauge/findings.hpp"

/// Fluid properties at temperature and pressure, each model with its source,
/// range and published uncertainty. Knows no exchanger and no file.
namespace dutygauge::fluids {

enum class Phase { liquid, gas };

/// All properties of a single-phase fluid at one temperature and pressure.
struct State {
  double temperature = 0;    ///< [K]
  double density = 0;        ///< [kg/m3]
  double heat_capacity = 0;  ///< [J/kg.K] isobaric
  double conductivity = 0;   ///< [W/m.K]
  double viscosity = 0;      ///< [Pa.s] dynamic
  double enthalpy = 0;       ///< [J/kg]; only differences within one fluid mean anything
  Phase phase = Phase::liquid;

  double prandtl() const { return viscosity * heat_capacity / conductivity; }
};

/// A closed interval of temperature [K].
struct TemperatureRange {
  double low, high;
};

/// One row of user data. [K, kg/m3, J/kg.K, W/m.K, Pa.s]
struct PropertyRow {
  double temperature, density, heat_capacity, conductivity, viscosity;
};

/// The same properties at every temperature; h = cp (T - 273.15 K).
struct ConstantModel {
  double density, heat_capacity, conductivity, viscosity;
};

/// Monotone cubics through user rows (Fritsch & Carlson 1980): density, heat
/// capacity and conductivity against T, ln(viscosity) against 1/T; enthalpy is
/// the exact integral of the heat-capacity interpolant. Two rows: straight lines.
struct TableModel {
  std::vector<double> temperature;                                             ///< rising [K]
  std::vector<double> density, heat_capacity, conductivity;                    ///< at the rows
  std::vector<double> log_viscosity;                                           ///< ln [Pa.s]
  std::vector<double> density_slope, heat_capacity_slope, conductivity_slope;  ///< d/dT
  std::vector<double> log_viscosity_slope;                                     ///< d/d(1/T)
  std::vector<double> enthalpy;                                                ///< [J/kg] at the rows
  TemperatureRange usable{};  ///< how far the end slopes are followed [K]
};

/// Water by IAPWS-IF97, R12-08 (viscosity), R15-11 (conductivity), in one phase.
struct WaterModel {};

/// A fluid in one phase: a model and what belongs to all models.
struct Fluid {
  std::variant<ConstantModel, TableModel, WaterModel> model;
  Phase phase = Phase::liquid;
  std::string name;    ///< as a person would say it ("water")
  std::string source;  ///< key in sources.hpp; empty for user data
};

/// The state at a temperature [K] and pressure [Pa]. Extrapolates; never throws, never
/// allocates. Outside `usable_temperatures` the numbers mean nothing.
State state(const Fluid& fluid, double temperature, double pressure);

/// Specific enthalpy [J/kg] alone: what `state` returns, cheaper.
double enthalpy(const Fluid& fluid, double temperature, double pressure);

/// The temperature [K] at which the fluid has `enthalpy` [J/kg]; inverse of
/// `enthalpy` within usable_temperatures, clamped to its ends.
double temperature_at(const Fluid& fluid, double enthalpy, double pressure);

/// Where the model holds without remark.
TemperatureRange valid_temperatures(const Fluid& fluid, double pressure);

/// Where a result is still given, with a finding: rating-procedure section 0.
TemperatureRange usable_temperatures(const Fluid& fluid, double pressure);

/// What stops the fluid at the ends of its usable range, for messages
/// ("it boils at 158.8 degC", "the table ends at 90 degC").
std::string why_it_ends(const Fluid& fluid, double pressure, bool at_upper_end);

/// Findings for a bulk temperature used by a result: outside the range, close to a change of
/// phase. `where` names it ("shell side, outlet"). Beyond the usable range: a `must`.
Findings check_bulk(const Fluid& fluid, double temperature, double pressure, std::string_view where);

/// Findings for a wall temperature (properties were taken at the end of the range).
Findings check_wall(const Fluid& fluid, double temperature, double pressure, std::string_view where);

/// Findings for the two ends of a stream together: constant properties over a wide span.
struct Span {
  double inlet, outlet;  ///< [K]
};
Findings check_span(const Fluid& fluid, Span temperatures, std::string_view where);

// --- making fluids. Mistakes in the data come back as objections with keys relative to `fluid`
// ("table.rows.2.viscosity", rows counted from 1; the empty key is `fluid` itself).

struct Made {
  Fluid fluid;
  Objections objections;  ///< if any, the fluid must not be used
  Findings findings;
  Assumptions assumed;
};

Made make_constant(const ConstantModel& values, Phase phase);
Made make_table(std::vector<PropertyRow> rows, Phase phase);

/// A sheet's inlet and outlet column: a table of two rows, in either order.
Made make_two_point(const PropertyRow& first, const PropertyRow& second, Phase phase);

/// Water in the phase it has at the inlet; objects to saturated and two-phase inlets.
Made make_water(double inlet_temperature, double inlet_pressure);

}  // namespace dutygauge::fluids
