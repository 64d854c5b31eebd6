#pragma once
#include <array>
#include <span>
#include <string_view>

/// Solutions in water: adding one is adding a row.
namespace dutygauge::fluids {

using SolutionCoefficients = std::array<std::array<double, 6>, 4>;

struct SolutionRow {
  std::string_view key, name;
  double base_temperature, base_fraction;        ///< [K], [kg/kg]
  double highest_fraction, highest_temperature;  ///< [kg/kg], [K]
  double solute_molar_mass, particles;           ///< [kg/kmol], what one molecule dissolves into
  struct {
    double density, heat_capacity, conductivity, viscosity;
  } uncertainty;  ///< 95 %, as fractions
  SolutionCoefficients density, heat_capacity, conductivity, log_viscosity;
  std::array<double, 6> freezing_temperature;
};

std::span<const SolutionRow> solution_rows();

}  // namespace dutygauge::fluids
