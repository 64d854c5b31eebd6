#pragma once
#include <span>

#include "equations.hpp"
#include "gas_data.hpp"

/// Thermodynamics and transport of gases, shared by single gases, mixtures and air.
namespace dutygauge::fluids {

constexpr double molar_gas_constant = 8.314462618;  // [J/mol.K], exact in the SI of 2019 to its digits

/// Second virial coefficient [m3/mol] and its derivatives by temperature.
struct Virial {
  double value, slope, curvature;
};
Virial second_virial(const GasThermal& gas, double temperature);

/// What the equation of state gives at a temperature and pressure.
struct GasState {
  double density, heat_capacity, enthalpy;  ///< [kg/m3], [J/kg.K], [J/kg]
};
GasState gas_state(const GasThermal& gas, Inlet at);

/// Ideal-gas heat capacity [J/kg.K].
double ideal_heat_capacity(const GasThermal& gas, double temperature);

/// How far |B p/(R T)| stays below what the virial equation bears.
double virial_margin(const GasThermal& gas, Inlet at, bool strict);

/// Sets mole averages of the coefficients; h = 0 at 273.15 K and zero pressure.
GasThermal mixed_thermal(std::span<const GasRow* const> rows, std::span<const double> mole_fraction);

/// Viscosity [Pa.s] and conductivity [W/m.K] of one dilute gas.
struct Transport {
  double viscosity, conductivity;
};
Transport dilute_transport(const GasRow& row, double temperature);

/// One component of a gas mixture.
struct Component {
  double mole_fraction, molar_mass;  ///< [-], any unit
  Transport transport;
};
/// Wilke (1950) for the viscosity, Mason & Saxena (1958) for the conductivity.
Transport mixed_transport(std::span<const Component> components);

/// Air by Lemmon & Jacobsen (2004).
struct AirPlace {
  double temperature, molar_density;  ///< [K], [mol/m3]
};
Transport air_transport(const AirPlace& at);

}  // namespace dutygauge::fluids
