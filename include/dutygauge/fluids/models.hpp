#pragma once
#include <array>
#include <string_view>
#include <variant>
#include <vector>

/// The models of a fluid: what each keeps from its making to its use. Only the
/// module's own sources look inside.
namespace dutygauge::fluids {

/// A closed interval of temperature [K].
struct TemperatureRange {
  double low, high;
};

/// The same properties at every temperature; h = cp (T - 273.15 K).
struct ConstantModel {
  double density, heat_capacity, conductivity, viscosity;
};

/// Monotone cubics through user rows (Fritsch & Butland 1984): density, heat
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

/// Water with sea salts (Sharqawy et al. 2010, Nayar et al. 2016).
struct SeawaterModel {
  double salinity;  ///< [kg/kg]
};

/// What gases have in common: ideal-gas heat capacity (NASA polynomials) and the
/// second virial coefficient by corresponding states (Pitzer & Curl, Abbott).
struct GasThermal {
  std::array<double, 6> low, high;  ///< cp/R and h/R coefficients below and above 1000 K
  double molar_mass;                ///< [kg/mol]
  double critical_temperature, critical_pressure, acentric_factor;  ///< of a mixture: mole averages
  TemperatureRange range;
  bool polar;
};

struct GasRow;  // a row of the module's own data

/// One gas, or several: viscosity by Wilke (1950), conductivity by Mason & Saxena (1958).
struct GasModel {
  GasThermal thermal;
  int count;
  std::array<const GasRow*, 13> component;
  std::array<double, 13> mole_fraction;
};

/// Dry air: viscosity and conductivity by Lemmon & Jacobsen (2004).
struct AirModel {
  GasThermal thermal;
};

struct LiquidRow;
struct SolutionRow;

/// A pure liquid by the equations of Perry's Handbook; saturated, at any pressure.
struct LiquidModel {
  const LiquidRow* row;
};

/// Glycols and brines (Melinder 2010) of one composition: polynomials in T - base.
struct SolutionModel {
  std::array<double, 4> density, heat_capacity, conductivity, log_viscosity;
  double base_temperature, freezing_temperature, highest_temperature;  ///< [K]
  double water_activity;  ///< mole fraction of water in the liquid [-]
  const SolutionRow* row;
};

/// Petroleum fractions and mineral oils.
struct OilModel {
  double density_15c, expansion;            ///< [kg/m3], [1/K] at 15 degC (API MPMS 11.1)
  std::array<double, 3> heat_capacity;      ///< polynomial in T
  std::array<double, 2> conductivity;       ///< straight line in T
  double walther_a, walther_b;              ///< ln ln Z = a - b ln T (ASTM D341)
  TemperatureRange range, viscosity_range;  ///< of all, and of the viscosity's points
  double critical_temperature, critical_pressure, acentric_factor;  ///< pseudo-critical; 0: unknown
  std::string_view heat_capacity_source, viscosity_source;
  double heat_capacity_uncertainty, conductivity_uncertainty, viscosity_uncertainty;
};

using Model = std::variant<ConstantModel, TableModel, WaterModel, SeawaterModel, GasModel, AirModel,
                           LiquidModel, SolutionModel, OilModel>;

}  // namespace dutygauge::fluids
