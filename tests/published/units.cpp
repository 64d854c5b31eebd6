#include "dutygauge/units.hpp"

#include <cmath>
#include <string>

#include "published/published.hpp"

namespace units = dutygauge::units;
using published::Known;
using published::Row;
using units::Kind;

namespace {

// Half a unit of the last of `digits` printed digits.
double half_last_digit(double value, int digits) {
  return 0.5 * std::pow(10.0, std::floor(std::log10(std::abs(value))) - digits + 1);
}

double bore(const std::string& text) {
  const auto read = units::read_bore(text);
  const auto* value = std::get_if<units::Value>(&read);
  return value == nullptr ? std::nan("") : units::from_si(value->si, "in", Kind::length);
}

double wall(const std::string& text) {
  const auto read = units::read_wall(text);
  const auto* value = std::get_if<units::Value>(&read);
  return value == nullptr ? std::nan("") : units::from_si(value->si, "in", Kind::length);
}

struct Factor {
  const char* unit;
  Kind kind;
  const char* si_unit;
  double value;  ///< printed to seven digits, fewer where exact
};

// Appendix B.8 as transcribed in the R package NISTunits (file NISTfactors.R).
constexpr Factor factors[] = {
    {"in", Kind::length, "m", 0.0254},
    {"mil", Kind::length, "m", 2.54e-05},
    {"micron", Kind::length, "m", 1e-06},
    {"ft2", Kind::area, "m2", 0.09290304},
    {"in2", Kind::area, "m2", 0.00064516},
    {"lb", Kind::mass, "kg", 0.4535924},
    {"psi", Kind::pressure_difference, "Pa", 6894.757},
    {"lbf/ft2", Kind::pressure_difference, "Pa", 47.88026},
    {"atm", Kind::pressure_difference, "Pa", 101325},
    {"mbar", Kind::pressure_difference, "Pa", 100},
    {"bar", Kind::pressure_difference, "Pa", 1e5},
    {"kgf/cm2", Kind::pressure_difference, "Pa", 98066.5},
    {"ata", Kind::pressure, "Pa", 98066.5},
    {"mmHg", Kind::pressure_difference, "Pa", 133.3224},
    {"inHg", Kind::pressure_difference, "Pa", 3386.389},
    {"mmH2O", Kind::pressure_difference, "Pa", 9.80665},
    {"inH2O", Kind::pressure_difference, "Pa", 249.0889},
    {"gpm", Kind::volume_flow, "m3/s", 6.309020e-05},
    {"USgal/d", Kind::volume_flow, "m3/s", 4.381264e-08},
    {"bbl/s", Kind::volume_flow, "m3/s", 0.1589873},
    {"UKgal/s", Kind::volume_flow, "m3/s", 0.00454609},
    {"L/s", Kind::volume_flow, "m3/s", 0.001},
    {"lb/h", Kind::mass_flow, "kg/s", 0.0001259979},
    {"lb/min", Kind::mass_flow, "kg/s", 0.007559873},
    {"Btu/s", Kind::power, "W", 1055.056},
    {"Btu/h", Kind::power, "W", 0.2930711},
    {"hp", Kind::power, "W", 745.6999},
    {"ft.lbf/s", Kind::power, "W", 1.355818},
    {"kcal/s", Kind::power, "W", 4186.8},
    {"kWh/h", Kind::power, "W", 1000},
    {"lb/ft3", Kind::density, "kg/m3", 16.01846},
    {"lb/USgal", Kind::density, "kg/m3", 119.8264},
    {"lb/UKgal", Kind::density, "kg/m3", 99.77637},
    {"Btu/lb", Kind::enthalpy, "J/kg", 2326},
    {"Btu/lb.degF", Kind::heat_capacity, "J/kg.K", 4186.8},
    {"Btu/lb.degR", Kind::heat_capacity, "J/kg.K", 4186.8},
    {"Btu.ft/h.ft2.degF", Kind::conductivity, "W/m.K", 1.730735},
    {"Btu.in/h.ft2.degF", Kind::conductivity, "W/m.K", 0.1442279},
    {"Btu/h.ft2.degF", Kind::film_coefficient, "W/m2.K", 5.678263},
    {"Btu/s.ft2.degF", Kind::film_coefficient, "W/m2.K", 20441.75},
    {"P", Kind::viscosity, "Pa.s", 0.1},
    {"lb/ft.h", Kind::viscosity, "Pa.s", 0.0004133789},
    {"lb/ft.s", Kind::viscosity, "Pa.s", 1.488164},
    {"lbf.s/ft2", Kind::viscosity, "Pa.s", 47.88026},
    {"ft2/h", Kind::kinematic_viscosity, "m2/s", 2.58064e-05},
    {"ft2/s", Kind::kinematic_viscosity, "m2/s", 0.09290304},
    {"ft/s", Kind::velocity, "m/s", 0.3048},
    {"ft/min", Kind::velocity, "m/s", 0.00508},
    {"h", Kind::time, "s", 3600},
};

published::Rows factor_rows() {
  published::Rows rows;
  for (const auto& [unit, kind, si_unit, value] : factors)
    rows.push_back({.source = "NIST SP 811, appendix B.8 (through the R package NISTunits)",
                    .known = Known::seen,
                    .what = std::string("one ") + unit,
                    .unit = si_unit,
                    .published = value,
                    .ours = units::to_si(1.0, unit, kind),
                    .tolerance = half_last_digit(value, 7),
                    .relative = false,
                    .reason = {}});
  const char* table = "Basic mechanical conversion factors, table A.1 (scribd.com 340182056)";
  // T(K) = (T(F) + 459.67)/1.8, and one ton of refrigeration to six digits.
  rows.push_back({table,
                  Known::seen,
                  "60 degF",
                  "K",
                  (60.0 + 459.67) / 1.8,
                  units::to_si(60.0, "degF", Kind::temperature),
                  1e-12,
                  true,
                  {}});
  rows.push_back({table,
                  Known::seen,
                  "one ton of refrigeration",
                  "kW",
                  3.51685,
                  units::from_si(units::to_si(1.0, "TR", Kind::power), "kW", Kind::power),
                  0.5e-5,
                  false,
                  {}});
  rows.push_back({table,
                  Known::seen,
                  "one h.ft2.degF/Btu, inverse of 5.678",
                  "m2.K/W",
                  1.0 / 5.678,
                  units::to_si(1.0, "h.ft2.degF/Btu", Kind::fouling_resistance),
                  0.5e-3 / 5.678,
                  true,
                  {}});
  return rows;
}

struct Gauge {
  const char* name;
  double wall;  ///< [in], printed to three decimals
};

constexpr Gauge gauges[] = {
    {"0000", 0.454}, {"000", 0.425}, {"00", 0.380}, {"0", 0.340},  {"1", 0.300},  {"2", 0.284},
    {"3", 0.259},    {"4", 0.238},   {"5", 0.220},  {"6", 0.203},  {"7", 0.180},  {"8", 0.165},
    {"9", 0.148},    {"10", 0.134},  {"11", 0.120}, {"12", 0.109}, {"13", 0.095}, {"14", 0.083},
    {"15", 0.072},   {"16", 0.065},  {"17", 0.058}, {"18", 0.049}, {"19", 0.042}, {"20", 0.035},
    {"21", 0.032},   {"22", 0.028},  {"23", 0.025}, {"24", 0.022}, {"25", 0.020}, {"26", 0.018},
    {"27", 0.016},   {"28", 0.014},  {"29", 0.013}, {"30", 0.012}, {"31", 0.010}, {"32", 0.009},
    {"33", 0.008},   {"34", 0.007},  {"35", 0.005}, {"36", 0.004},
};

// Another chart than the one the table was read from.
published::Rows gauge_rows() {
  published::Rows rows;
  for (const auto& [name, thickness] : gauges)
    rows.push_back({"Birmingham wire gauge, engineeringtoolbox.com d_508",
                    Known::seen,
                    std::string(name) + " BWG",
                    "in",
                    thickness,
                    wall(std::string(name) + " BWG"),
                    1e-12,
                    true,
                    {}});
  return rows;
}

struct Pipe {
  const char* size;
  double bore;  ///< [in], printed to three decimals
};

constexpr Pipe schedule_40[] = {
    {"1/2", 0.622}, {"3/4", 0.824},   {"1", 1.049},   {"1 1/4", 1.380}, {"1 1/2", 1.610},
    {"2", 2.067},   {"2 1/2", 2.469}, {"3", 3.068},   {"3 1/2", 3.548}, {"4", 4.026},
    {"5", 5.047},   {"6", 6.065},     {"8", 7.981},   {"10", 10.020},   {"12", 11.938},
    {"14", 13.124}, {"16", 15.000},   {"18", 16.876}, {"20", 18.812},   {"24", 22.624},
};

// Not its NPS 10 and above: there it prints the extra strong wall (0.500 in) under
// schedule 80, against all other charts.
constexpr Pipe schedule_80[] = {
    {"1/2", 0.546}, {"3/4", 0.742},   {"1", 0.957}, {"1 1/4", 1.278}, {"1 1/2", 1.500},
    {"2", 1.939},   {"2 1/2", 2.323}, {"3", 2.900}, {"3 1/2", 3.364}, {"4", 3.826},
    {"5", 4.813},   {"6", 5.761},     {"8", 7.625},
};

// Walls of the standard column; the diameters are those of the rows above.
constexpr Pipe standard_bore[] = {
    {"10", 10.750 - 2 * 0.365}, {"12", 12.750 - 2 * 0.375}, {"14", 14.0 - 2 * 0.375},
    {"16", 16.0 - 2 * 0.375},   {"18", 18.0 - 2 * 0.375},   {"20", 20.0 - 2 * 0.375},
    {"24", 24.0 - 2 * 0.375},
};

published::Rows pipe_rows() {
  published::Rows rows;
  const auto add = [&](const char* source, const Pipe& pipe, const char* schedule) {
    const std::string text = std::string("NPS ") + pipe.size + schedule;
    rows.push_back({source, Known::seen, "bore of " + text, "in", pipe.bore, bore(text), 0.5e-3, false, {}});
  };
  for (const auto& pipe : schedule_40) add("Pipe schedule chart, follincraft.com", pipe, " sch 40");
  for (const auto& pipe : schedule_80) add("Pipe schedule chart, follincraft.com", pipe, " sch 80");
  for (const auto& pipe : standard_bore) add("Standard pipe schedules, us.misumi-ec.com", pipe, " std");
  // That chart is of an older edition, with 0.593 and 0.687 in where later ones have 0.594 and 0.688.
  const char* older = "Pipe schedules, offshorediver.com";
  rows.push_back({older, Known::seen, "bore of NPS 10 sch 80", "in", 10.75 - 2 * 0.593, bore("NPS 10 sch 80"),
                  2.1e-3, false, "walls rounded the other way in older editions"});
  rows.push_back({older, Known::seen, "bore of NPS 12 sch 80", "in", 12.75 - 2 * 0.687, bore("NPS 12 sch 80"),
                  2.1e-3, false, "walls rounded the other way in older editions"});
  return rows;
}

const published::Registration factors_registered{&factor_rows};
const published::Registration gauges_registered{&gauge_rows};
const published::Registration pipes_registered{&pipe_rows};

}  // namespace
