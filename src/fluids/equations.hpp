#pragma once
#include <string>
#include <vector>

#include "dutygauge/fluids.hpp"
#include "dutygauge/units/mention.hpp"

/// What each model of a fluid gives to the common functions of the module: one overload a model.
namespace dutygauge::fluids {

/// Enthalpy [J/kg] and its slope by temperature at constant pressure [J/kg.K].
struct Caloric {
  double enthalpy, heat_capacity;
};

/// Where a model holds, and where it is still evaluated.
struct Limits {
  TemperatureRange valid, usable;
};

State state_of(const ConstantModel& model, Phase phase, double temperature, double pressure);
State state_of(const TableModel& model, Phase phase, double temperature, double pressure);
State state_of(const WaterModel& model, Phase phase, double temperature, double pressure);
State state_of(const SeawaterModel& model, Phase phase, double temperature, double pressure);
State state_of(const GasModel& model, Phase phase, double temperature, double pressure);
State state_of(const AirModel& model, Phase phase, double temperature, double pressure);
State state_of(const LiquidModel& model, Phase phase, double temperature, double pressure);
State state_of(const SolutionModel& model, Phase phase, double temperature, double pressure);
State state_of(const OilModel& model, Phase phase, double temperature, double pressure);

Caloric caloric_of(const ConstantModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const TableModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const WaterModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const SeawaterModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const GasModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const AirModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const LiquidModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const SolutionModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const OilModel& model, Phase phase, double temperature, double pressure);

std::vector<PropertyNote> notes_of(const ConstantModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const TableModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const WaterModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const SeawaterModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const GasModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const AirModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const LiquidModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const SolutionModel& model, Phase phase);
std::vector<PropertyNote> notes_of(const OilModel& model, Phase phase);

// Models that know their limits at a pressure at once.

Limits limits_of(const ConstantModel& model, Phase phase, double pressure);
Limits limits_of(const TableModel& model, Phase phase, double pressure);
Limits limits_of(const WaterModel& model, Phase phase, double pressure);

/// A start for the search of a temperature; anything finite will do.
double guess_temperature(const ConstantModel& model, Phase phase, double enthalpy, double pressure);
double guess_temperature(const TableModel& model, Phase phase, double enthalpy, double pressure);
double guess_temperature(const WaterModel& model, Phase phase, double enthalpy, double pressure);

std::string end_of(const ConstantModel& model, Phase phase, double pressure, bool upper);
std::string end_of(const TableModel& model, Phase phase, double pressure, bool upper);
std::string end_of(const WaterModel& model, Phase phase, double pressure, bool upper);

bool changes_phase_at_end(const ConstantModel& model, Phase phase, double pressure, bool upper);
bool changes_phase_at_end(const TableModel& model, Phase phase, double pressure, bool upper);
bool changes_phase_at_end(const WaterModel& model, Phase phase, double pressure, bool upper);

// The others: limits at any pressure, and a margin to the change of phase whose zero limits.hpp looks for.

Limits reach_of(const SeawaterModel& model);
Limits reach_of(const GasModel& model);
Limits reach_of(const AirModel& model);
Limits reach_of(const LiquidModel& model);
Limits reach_of(const SolutionModel& model);
Limits reach_of(const OilModel& model);

/// Positive where the phase stands, falling towards its end; `strict`: without remark.
double phase_margin(const SeawaterModel& model, Inlet at, bool strict);
double phase_margin(const GasModel& model, Inlet at, bool strict);
double phase_margin(const AirModel& model, Inlet at, bool strict);
double phase_margin(const LiquidModel& model, Inlet at, bool strict);
double phase_margin(const SolutionModel& model, Inlet at, bool strict);
double phase_margin(const OilModel& model, Inlet at, bool strict);

/// What happens where the margin is used up.
struct PhaseEnd {
  std::string what;    ///< "it boils"
  bool changes_phase;  ///< false: only the model ends
};
PhaseEnd phase_end(const SeawaterModel& model, Inlet at);
PhaseEnd phase_end(const GasModel& model, Inlet at);
PhaseEnd phase_end(const AirModel& model, Inlet at);
PhaseEnd phase_end(const LiquidModel& model, Inlet at);
PhaseEnd phase_end(const SolutionModel& model, Inlet at);
PhaseEnd phase_end(const OilModel& model, Inlet at);

/// Liquids freeze at the low end of their reach where this says so.
bool freezes_at_low_end(const SeawaterModel& model);
bool freezes_at_low_end(const GasModel& model);
bool freezes_at_low_end(const AirModel& model);
bool freezes_at_low_end(const LiquidModel& model);
bool freezes_at_low_end(const SolutionModel& model);
bool freezes_at_low_end(const OilModel& model);

/// Slopes dy/dx at the points of a monotone cubic; at least two points, x rising or falling.
std::vector<double> monotone_slopes(const std::vector<double>& x, const std::vector<double>& y);

/// Sets the enthalpies at the rows from the heat capacities and their slopes; 0 at 273.15 K.
void fill_enthalpies(TableModel& model);

/// ln(vapour pressure / critical pressure) by corresponding states (Lee & Kesler 1975).
double log_reduced_vapour_pressure(double reduced_temperature, double acentric_factor);

/// Refuses the fluid with one objection.
Made refused(std::string key, std::string what, std::string expected, std::string remedy);

/// A temperature, a difference, and a pressure, for a message: units::mention of it.
std::string said(double temperature);
std::string said_difference(double kelvin);
std::string said_pressure(double pressure);

}  // namespace dutygauge::fluids
