#include "kinds.hpp"

#include <fmt/core.h>

#include <algorithm>

namespace dutygauge::units {
namespace {

// In the order of the enumeration. Dimensions are the exponents of kg m s K.
constexpr KindFacts kinds[] = {
    {Kind::ratio, "a ratio", "25 %", {}, "", "", "", ""},
    {Kind::count, "a whole number", "208", {}, "", "", "", ""},
    {Kind::length, "a length", "19.05 mm", {0, 1, 0, 0}, "m", "m", "mm", "in"},
    {Kind::area, "an area", "60.7 m2", {0, 2, 0, 0}, "m2", "m2", "m2", "ft2"},
    {Kind::time, "a time", "2 h", {0, 0, 1, 0}, "s", "s", "h", "h"},
    {Kind::mass, "a mass", "1200 kg", {1, 0, 0, 0}, "kg", "kg", "kg", "lb"},
    {Kind::temperature, "a temperature", "68 degC", {0, 0, 0, 1}, "degC", "K", "degC", "degF"},
    {Kind::temperature_difference, "a temperature difference", "5 K", {0, 0, 0, 1}, "K", "K", "K", "degF"},
    {Kind::pressure, "a pressure", "2.5 bara", {1, -1, -2, 0}, "Pa", "Pa", "bara", "psia"},
    {Kind::pressure_difference, "a pressure difference", "70 kPa", {1, -1, -2, 0}, "Pa", "Pa", "kPa", "psi"},
    {Kind::mass_flow, "a mass flow", "21.5 kg/s", {1, 0, -1, 0}, "kg/s", "kg/s", "kg/s", "lb/h"},
    {Kind::volume_flow, "a volume flow", "62 m3/h", {0, 3, -1, 0}, "m3/s", "m3/s", "m3/h", "gpm"},
    {Kind::power, "a power", "520 kW", {1, 2, -3, 0}, "W", "W", "kW", "Btu/h"},
    {Kind::density, "a density", "872 kg/m3", {1, -3, 0, 0}, "kg/m3", "kg/m3", "kg/m3", "lb/ft3"},
    {Kind::heat_capacity,
     "a heat capacity",
     "4180 J/kg.K",
     {0, 2, -2, -1},
     "J/kg.K",
     "J/kg.K",
     "kJ/kg.K",
     "Btu/lb.degF"},
    {Kind::conductivity,
     "a thermal conductivity",
     "0.62 W/m.K",
     {1, 1, -3, -1},
     "W/m.K",
     "W/m.K",
     "W/m.K",
     "Btu/h.ft.degF"},
    {Kind::viscosity, "a dynamic viscosity", "0.7 mPa.s", {1, -1, -1, 0}, "Pa.s", "Pa.s", "mPa.s", "cP"},
    {Kind::kinematic_viscosity,
     "a kinematic viscosity",
     "46 mm2/s",
     {0, 2, -1, 0},
     "m2/s",
     "m2/s",
     "mm2/s",
     "cSt"},
    {Kind::enthalpy, "a specific enthalpy", "250 kJ/kg", {0, 2, -2, 0}, "J/kg", "J/kg", "kJ/kg", "Btu/lb"},
    {Kind::film_coefficient,
     "a heat transfer coefficient",
     "3600 W/m2.K",
     {1, 0, -3, -1},
     "W/m2.K",
     "W/m2.K",
     "W/m2.K",
     "Btu/h.ft2.degF"},
    {Kind::fouling_resistance,
     "a fouling resistance",
     "0.00018 m2.K/W",
     {-1, 0, 3, 1},
     "m2.K/W",
     "m2.K/W",
     "m2.K/W",
     "h.ft2.degF/Btu"},
    {Kind::thermal_conductance,
     "a thermal conductance",
     "12 kW/K",
     {1, 2, -3, -1},
     "W/K",
     "W/K",
     "kW/K",
     "Btu/h.degF"},
    {Kind::velocity, "a velocity", "1.5 m/s", {0, 1, -1, 0}, "m/s", "m/s", "m/s", "ft/s"},
    {Kind::mass_flux,
     "a mass flux",
     "400 kg/m2.s",
     {1, -2, -1, 0},
     "kg/m2.s",
     "kg/m2.s",
     "kg/m2.s",
     "lb/h.ft2"},
    {Kind::momentum_flux,
     "a momentum flux",
     "2230 kg/m.s2",
     {1, -1, -2, 0},
     "kg/m.s2",
     "kg/m.s2",
     "kg/m.s2",
     "lb/ft.s2"},
    {Kind::per_length, "a number per length", "19 fins/in", {0, -1, 0, 0}, "1/m", "1/m", "1/m", "1/in"},
    {Kind::per_temperature,
     "a change per temperature",
     "0.006 1/K",
     {0, 0, 0, -1},
     "1/K",
     "1/K",
     "1/K",
     "1/degF"},
    {Kind::mass_fraction, "a mass fraction", "35 g/kg", {}, "kg/kg", "", "", ""},
    {Kind::angle, "an angle", "30 deg", {}, "deg", "deg", "deg", "deg"},
};
static_assert(std::ranges::is_sorted(kinds, {}, &KindFacts::kind));
static_assert(std::size(kinds) == static_cast<std::size_t>(Kind::angle) + 1);

struct Named {
  Dimension dimension;
  std::string_view name;
};

// Not kinds, but people write them.
constexpr Named others[] = {
    {{0, 3, 0, 0}, "a volume"},
    {{1, 2, -2, 0}, "an energy"},
    {{1, 1, -2, 0}, "a force"},
    {{1, 0, -3, 0}, "a heat flux"},
    {{0, 1, -2, 0}, "an acceleration"},
    {{-1, 3, 0, 0}, "a specific volume"},
    {{1, -2, 0, 0}, "a mass per area"},
    {{1, -1, 0, 0}, "a mass per length"},
    {{0, 0, -1, 0}, "a frequency"},
    {{1, -1, -3, 0}, "a power per volume"},
    {{-1, -2, 3, 1}, "a resistance to heat"},
};

}  // namespace

const KindFacts& facts(Kind kind) {
  return kinds[static_cast<std::size_t>(kind)];
}

bool may_be_bare(Kind kind) {
  return kind == Kind::ratio || kind == Kind::count || kind == Kind::mass_fraction || kind == Kind::angle;
}

std::string_view described(const Dimension& dimension) {
  if (dimension == Dimension{}) return {};
  for (const auto& kind : kinds)
    if (kind.dimension == dimension) return kind.name;
  for (const auto& other : others)
    if (other.dimension == dimension) return other.name;
  return {};
}

std::string expectation(Kind kind) {
  return fmt::format("{} was expected", facts(kind).name);
}

std::string example_remedy(Kind kind) {
  return fmt::format("write for example \"{}\"", facts(kind).example);
}

std::string_view name(Kind kind) {
  return facts(kind).name;
}

}  // namespace dutygauge::units
