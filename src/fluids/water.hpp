#pragma once
#include "equations.hpp"

/// Water and steam by the releases of IAPWS: the equations alone, without judging
/// where they hold. Temperatures in [K], pressures in [Pa].
namespace dutygauge::fluids::water {

constexpr double region1_pressure = 16.53e6;  ///< reducing pressure of region 1 [Pa]
constexpr double region2_pressure = 1e6;      ///< reducing pressure of region 2 [Pa]

/// Where regions 1 and 2 stop meeting at the saturation line: region 3 lies above.
constexpr double region3_temperature = 623.15;    // [K]
constexpr double region3_pressure = 16.529164e6;  // [Pa]

constexpr double lowest_temperature = 273.15, highest_temperature = 1073.15;  // [K]
constexpr double triple_pressure = 611.213;                                   // [Pa] saturation at 273.15 K
constexpr double highest_pressure = 100e6;                                    // [Pa]

/// What the equation of state gives.
struct Thermal {
  double density;              ///< [kg/m3]
  double heat_capacity;        ///< [J/kg.K]
  double enthalpy;             ///< [J/kg]
  double heat_capacity_ratio;  ///< cp/cv [-]
  double density_by_pressure;  ///< at constant temperature [kg/m3.Pa]
};

Thermal region1(double temperature, double pressure);
Thermal region2(double temperature, double pressure);
Caloric region1_caloric(double temperature, double pressure);
Caloric region2_caloric(double temperature, double pressure);

/// Temperature [K] from enthalpy [J/kg]: within 0.025 K of the equations above.
double region1_backward(double enthalpy, double pressure);
double region2_backward(double enthalpy, double pressure);

/// Valid from 273.15 K (611.213 Pa) to the critical point.
double saturation_pressure(double temperature);
double saturation_temperature(double pressure);

/// The temperature at which region 2 ends towards region 3; from region3_pressure upwards.
double boundary_temperature(double pressure);

struct Place {
  double temperature, density;  ///< [K], [kg/m3]
};

/// Dynamic viscosity [Pa.s], without the critical factor mu2.
double viscosity(const Place& at);

/// Thermal conductivity [W/m.K] without and the part with the critical enhancement.
double background_conductivity(const Place& at);
double critical_conductivity(const Thermal& thermal, double temperature, double viscosity);

}  // namespace dutygauge::fluids::water
