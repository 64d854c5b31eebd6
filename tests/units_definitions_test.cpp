#include <doctest/doctest.h>

#include <numbers>
#include <string>

#include "dutygauge/units.hpp"
#include "support.hpp"

namespace units = dutygauge::units;
using support::relative;
using units::Kind;

namespace {

// Exact definitions, written out independently of the table under test.
constexpr double in = 0.0254, ft = 12 * in, lb = 0.45359237, g0 = 9.80665, lbf = lb * g0;
constexpr double btu = 1055.05585262, us_gal = 231 * in * in * in, uk_gal = 4.54609e-3;

struct Named {
  std::string_view unit;
  Kind kind;
  double si;  ///< of one unit
};

constexpr Named named[] = {
    {"m", Kind::length, 1},
    {"mm", Kind::length, 1e-3},
    {"cm", Kind::length, 1e-2},
    {"km", Kind::length, 1e3},
    {"um", Kind::length, 1e-6},
    {"micron", Kind::length, 1e-6},
    {"in", Kind::length, in},
    {"inch", Kind::length, in},
    {"ft", Kind::length, ft},
    {"mil", Kind::length, 1e-3 * in},
    {"thou", Kind::length, 1e-3 * in},
    {"cm2", Kind::area, 1e-4},
    {"mm2", Kind::area, 1e-6},
    {"m2", Kind::area, 1},
    {"in2", Kind::area, in* in},
    {"ft2", Kind::area, ft* ft},
    {"s", Kind::time, 1},
    {"min", Kind::time, 60},
    {"h", Kind::time, 3600},
    {"hr", Kind::time, 3600},
    {"d", Kind::time, 86400},
    {"day", Kind::time, 86400},
    {"days", Kind::time, 86400},
    {"kg", Kind::mass, 1},
    {"g", Kind::mass, 1e-3},
    {"mg", Kind::mass, 1e-6},
    {"t", Kind::mass, 1e3},
    {"te", Kind::mass, 1e3},
    {"tonne", Kind::mass, 1e3},
    {"lb", Kind::mass, lb},
    {"lbm", Kind::mass, lb},
    {"klb", Kind::mass, 1e3 * lb},
    {"K", Kind::temperature_difference, 1},
    {"degC", Kind::temperature_difference, 1},
    {"degF", Kind::temperature_difference, 5.0 / 9.0},
    {"degR", Kind::temperature_difference, 5.0 / 9.0},
    {"Pa", Kind::pressure_difference, 1},
    {"hPa", Kind::pressure_difference, 100},
    {"kPa", Kind::pressure_difference, 1e3},
    {"MPa", Kind::pressure_difference, 1e6},
    {"mbar", Kind::pressure_difference, 100},
    {"bar", Kind::pressure_difference, 1e5},
    {"psi", Kind::pressure_difference, lbf / (in * in)},
    {"atm", Kind::pressure_difference, 101325},
    {"mmHg", Kind::pressure_difference, 133.322387415},
    {"inHg", Kind::pressure_difference, 25.4 * 133.322387415},
    {"inH2O", Kind::pressure_difference, 249.08891},
    {"mmH2O", Kind::pressure_difference, 9.80665},
    {"kgf/cm2", Kind::pressure_difference, 98066.5},
    {"lbf/ft2", Kind::pressure_difference, lbf / (ft * ft)},
    {"N/m2", Kind::pressure_difference, 1},
    {"kN/m2", Kind::pressure_difference, 1e3},
    {"bara", Kind::pressure, 1e5},
    {"mbara", Kind::pressure, 100},
    {"psia", Kind::pressure, lbf / (in * in)},
    {"kPaa", Kind::pressure, 1e3},
    {"MPaa", Kind::pressure, 1e6},
    {"ata", Kind::pressure, 98066.5},
    {"kgf/cm2a", Kind::pressure, 98066.5},
    {"barg", Kind::pressure, 1e5 + 101325},
    {"mbarg", Kind::pressure, 100 + 101325},
    {"psig", Kind::pressure, lbf / (in * in) + 101325},
    {"kPag", Kind::pressure, 1e3 + 101325},
    {"MPag", Kind::pressure, 1e6 + 101325},
    {"kgf/cm2g", Kind::pressure, 98066.5 + 101325},
    {"J/kg", Kind::enthalpy, 1},
    {"kJ/kg", Kind::enthalpy, 1e3},
    {"MJ/kg", Kind::enthalpy, 1e6},
    {"Btu/lb", Kind::enthalpy, 2326},
    {"BTU/lb", Kind::enthalpy, 2326},
    {"cal/g", Kind::enthalpy, 4186.8},
    {"kcal/kg", Kind::enthalpy, 4186.8},
    {"Mcal/t", Kind::enthalpy, 4186.8},
    {"Gcal/t", Kind::enthalpy, 4186.8e3},
    {"kgf.m/kg", Kind::enthalpy, g0},
    {"W", Kind::power, 1},
    {"kW", Kind::power, 1e3},
    {"MW", Kind::power, 1e6},
    {"hp", Kind::power, 550 * ft* lbf},
    {"TR", Kind::power, 12000 * btu / 3600},
    {"MWh/d", Kind::power, 1e6 / 24},
    {"kWh/h", Kind::power, 1e3},
    {"GJ/h", Kind::power, 1e9 / 3600},
    {"Btu/h", Kind::power, btu / 3600},
    {"kBtu/h", Kind::power, 1e3 * btu / 3600},
    {"MMBtu/h", Kind::power, 1e6 * btu / 3600},
    {"MMBTU/h", Kind::power, 1e6 * btu / 3600},
    {"kcal/h", Kind::power, 4186.8 / 3600},
    {"kg/s", Kind::mass_flow, 1},
    {"kg/h", Kind::mass_flow, 1.0 / 3600},
    {"t/h", Kind::mass_flow, 1e3 / 3600},
    {"lb/h", Kind::mass_flow, lb / 3600},
    {"klb/h", Kind::mass_flow, 1e3 * lb / 3600},
    {"m3/h", Kind::volume_flow, 1.0 / 3600},
    {"L/s", Kind::volume_flow, 1e-3},
    {"l/min", Kind::volume_flow, 1e-3 / 60},
    {"mL/s", Kind::volume_flow, 1e-6},
    {"gal/min", Kind::volume_flow, us_gal / 60},
    {"USgal/min", Kind::volume_flow, us_gal / 60},
    {"UKgal/min", Kind::volume_flow, uk_gal / 60},
    {"igal/min", Kind::volume_flow, uk_gal / 60},
    {"gpm", Kind::volume_flow, us_gal / 60},
    {"USgpm", Kind::volume_flow, us_gal / 60},
    {"igpm", Kind::volume_flow, uk_gal / 60},
    {"bbl/d", Kind::volume_flow, 42 * us_gal / 86400},
    {"kbbl/d", Kind::volume_flow, 42e3 * us_gal / 86400},
    {"bpd", Kind::volume_flow, 42 * us_gal / 86400},
    {"cfm", Kind::volume_flow, ft* ft* ft / 60},
    {"ft3/s", Kind::volume_flow, ft* ft* ft},
    {"kg/m3", Kind::density, 1},
    {"lb/ft3", Kind::density, lb / (ft * ft * ft)},
    {"lb/USgal", Kind::density, lb / us_gal},
    {"J/kg.K", Kind::heat_capacity, 1},
    {"kJ/kg.K", Kind::heat_capacity, 1e3},
    {"Btu/lb.degF", Kind::heat_capacity, 4186.8},
    {"W/m.K", Kind::conductivity, 1},
    {"Btu/h.ft.degF", Kind::conductivity, btu / 3600 / ft * 1.8},
    {"Btu.in/h.ft2.degF", Kind::conductivity, btu / 3600 / ft / 12 * 1.8},
    {"Pa.s", Kind::viscosity, 1},
    {"mPa.s", Kind::viscosity, 1e-3},
    {"uPa.s", Kind::viscosity, 1e-6},
    {"P", Kind::viscosity, 0.1},
    {"cP", Kind::viscosity, 1e-3},
    {"lb/ft.h", Kind::viscosity, lb / ft / 3600},
    {"N.s/m2", Kind::viscosity, 1},
    {"m2/s", Kind::kinematic_viscosity, 1},
    {"mm2/s", Kind::kinematic_viscosity, 1e-6},
    {"St", Kind::kinematic_viscosity, 1e-4},
    {"cSt", Kind::kinematic_viscosity, 1e-6},
    {"W/m2.K", Kind::film_coefficient, 1},
    {"kcal/h.m2.degC", Kind::film_coefficient, 1.163},
    {"Btu/h.ft2.degF", Kind::film_coefficient, btu / 3600 / (ft * ft) * 1.8},
    {"m2.K/W", Kind::fouling_resistance, 1},
    {"h.ft2.degF/Btu", Kind::fouling_resistance, 3600 * ft* ft / 1.8 / btu},
    {"h.m2.degC/kcal", Kind::fouling_resistance, 1 / 1.163},
    {"W/K", Kind::thermal_conductance, 1},
    {"Btu/h.degF", Kind::thermal_conductance, btu / 3600 * 1.8},
    {"m/s", Kind::velocity, 1},
    {"ft/s", Kind::velocity, ft},
    {"kg/m2.s", Kind::mass_flux, 1},
    {"lb/h.ft2", Kind::mass_flux, lb / 3600 / (ft * ft)},
    {"kg/m.s2", Kind::momentum_flux, 1},
    {"lb/ft.s2", Kind::momentum_flux, lb / ft},
    {"Pa", Kind::momentum_flux, 1},
    {"fins/in", Kind::per_length, 1 / in},
    {"fin/in", Kind::per_length, 1 / in},
    {"fins/m", Kind::per_length, 1},
    {"1/m", Kind::per_length, 1},
    {"1/K", Kind::per_temperature, 1},
    {"1/degF", Kind::per_temperature, 1.8},
    {"%", Kind::ratio, 0.01},
    {"ppm", Kind::ratio, 1e-6},
    {"%", Kind::mass_fraction, 0.01},
    {"g/kg", Kind::mass_fraction, 1e-3},
    {"kg/kg", Kind::mass_fraction, 1},
    {"deg", Kind::angle, 1},
    {"rad", Kind::angle, 180 / std::numbers::pi},
};

}  // namespace

TEST_CASE("units: every unit is worth its exact definition, typed and from code") {
  for (const auto& [unit, kind, si] : named) {
    CAPTURE(std::string(unit));
    const auto read = units::read("1 " + std::string(unit), kind);
    REQUIRE(std::holds_alternative<units::Value>(read));
    CHECK(relative(units::to_si(1.0, unit, kind), si) < 1e-14);
    CHECK(relative(std::get<units::Value>(read).si, si) < 1e-14);
    CHECK(relative(units::from_si(units::to_si(7.25, unit, kind), unit, kind), 7.25) < 1e-13);
  }
}
