#pragma once
#include <string>
#include <vector>

#include "dutygauge/fluids.hpp"

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

Caloric caloric_of(const ConstantModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const TableModel& model, Phase phase, double temperature, double pressure);
Caloric caloric_of(const WaterModel& model, Phase phase, double temperature, double pressure);

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

/// Slopes dy/dx at the points of a monotone cubic; at least two points, x rising or falling.
std::vector<double> monotone_slopes(const std::vector<double>& x, const std::vector<double>& y);

/// Sets the enthalpies at the rows from the heat capacities and their slopes; 0 at 273.15 K.
void fill_enthalpies(TableModel& model);

/// A temperature for a message: "158.8 degC".
std::string celsius(double temperature);

}  // namespace dutygauge::fluids
