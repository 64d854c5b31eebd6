#pragma once
#include <array>
#include <span>
#include <string_view>

#include "dutygauge/fluids/models.hpp"

/// The gases and what is known of each: adding one is adding a row.
namespace dutygauge::fluids {

/// C1 T^C2 / (1 + C3/T + C4/T^2), SI.
struct DiluteFit {
  double c1, c2, c3, c4;
  TemperatureRange valid;
};

struct GasRow {
  std::string_view name, formula;
  double molar_mass;                ///< [kg/kmol]
  double lowest_temperature;        ///< of the heat capacity [K]
  std::array<double, 6> low, high;  ///< NASA coefficients below and above 1000 K
  struct {
    double temperature, pressure, acentric_factor;  ///< [K], [Pa], [-]
  } critical;
  DiluteFit viscosity, conductivity;  ///< [Pa.s], [W/m.K]
  bool polar;
};

std::span<const GasRow> gas_rows();

}  // namespace dutygauge::fluids
