#pragma once
#include <array>
#include <span>
#include <string_view>

#include "dutygauge/fluids/models.hpp"

/// Pure liquids: adding one is adding a row.
namespace dutygauge::fluids {

/// The handbook's equations, by their numbers; `poly` is C1 + C2 T + ... + C5 T^4.
enum class Form { poly, dippr101, dippr105, dippr114 };

struct LiquidFit {
  Form form;
  std::array<double, 6> c;
  TemperatureRange valid;
};

struct LiquidRow {
  std::string_view key, name;
  double molar_mass;  ///< [kg/kmol]
  LiquidFit density, heat_capacity, viscosity, conductivity, vapour_pressure;
};

std::span<const LiquidRow> liquid_rows();

/// A liquid people may ask for that is not given, and why.
struct RefusedLiquid {
  std::string_view key, why;
};
std::span<const RefusedLiquid> refused_liquids();

/// Vapour pressure [Pa].
double vapour_pressure(const LiquidRow& row, double temperature);

/// The row of a name; null if there is none.
const LiquidRow* liquid_row(std::string_view name);

}  // namespace dutygauge::fluids
