#include "field_rows.hpp"

// What may stand under `fluid`: a family of fluids is a block, its keys below it.

namespace dutygauge::case_io {
namespace {

using enum Form;
using enum Need;
using units::Kind;

constexpr Bounds any{};
constexpr Bounds positive(double most) {
  return {.least = 0.0, .most = most, .least_excluded = true};
}
constexpr Bounds from_zero(double most) {
  return {.least = 0.0, .most = most};
}
constexpr Bounds temperatures = {.least = 20.0, .most = 1773.15};

constexpr Bounds densities = positive(30'000.0);
constexpr Bounds heat_capacities = positive(1e5);
constexpr Bounds conductivities = positive(1000.0);
constexpr Bounds viscosities = positive(1e6);
constexpr Bounds shares = from_zero(1.0);
constexpr const char* phases = "liquid|gas";
constexpr const char* phase_help = "left out: liquid, listed as assumed";

constexpr const char* given_help = "known properties, each at one temperature";

constexpr Row rows[] = {
    {"constant", block, optional, Kind::ratio, any, "", "the same properties at every temperature"},
    {"constant.density", quantity, required, Kind::density, densities, "865 kg/m3", "mass of a volume"},
    {"constant.heat_capacity", quantity, required, Kind::heat_capacity, heat_capacities, "2.05 kJ/kg.K",
     "at constant pressure"},
    {"constant.conductivity", quantity, required, Kind::conductivity, conductivities, "0.13 W/m.K",
     "of the fluid"},
    {"constant.viscosity", quantity, required, Kind::viscosity, viscosities, "22 cP",
     "dynamic, not kinematic"},
    {"constant.phase", word, optional, Kind::ratio, any, "liquid", phase_help, phases},
    {"table", block, optional, Kind::ratio, any, "", "properties at several temperatures"},
    {"table.phase", word, optional, Kind::ratio, any, "liquid", phase_help, phases},
    {"table.rows", list, required, Kind::ratio, any, "", "two or more, in rising temperature"},
    {"table.rows.#", block, optional, Kind::ratio, any, "", "one temperature"},
    {"table.rows.#.temperature", quantity, required, Kind::temperature, temperatures, "40 degC",
     "of the row"},
    {"table.rows.#.density", quantity, required, Kind::density, densities, "865 kg/m3", "mass of a volume"},
    {"table.rows.#.heat_capacity", quantity, required, Kind::heat_capacity, heat_capacities, "2.05 kJ/kg.K",
     "at constant pressure"},
    {"table.rows.#.conductivity", quantity, required, Kind::conductivity, conductivities, "0.13 W/m.K",
     "of the fluid"},
    {"table.rows.#.viscosity", quantity, required, Kind::viscosity, viscosities, "22 cP",
     "dynamic, not kinematic"},
    {"two_point", block, optional, Kind::ratio, any, "", "the inlet and the outlet column of a sheet"},
    {"two_point.phase", word, optional, Kind::ratio, any, "liquid", phase_help, phases},
    {"two_point.at", pair, required, Kind::temperature, temperatures, "165 -> 105 degF",
     "temperatures of the two columns"},
    {"two_point.density", pair, required, Kind::density, densities, "700 -> 741 kg/m3", "in both columns"},
    {"two_point.heat_capacity", pair, required, Kind::heat_capacity, heat_capacities, "2.3 -> 2.1 kJ/kg.K",
     "in both columns"},
    {"two_point.conductivity", pair, required, Kind::conductivity, conductivities, "0.11 -> 0.12 W/m.K",
     "in both columns"},
    {"two_point.viscosity", pair, required, Kind::viscosity, viscosities, "0.4 -> 0.6 cP", "in both columns"},
    {"seawater", block, optional, Kind::ratio, any, "", "water with sea salts"},
    {"seawater.salinity", quantity, required, Kind::mass_fraction, shares, "35 g/kg", "mass of salt in it"},
    {"seawater.given", block, optional, Kind::ratio, any, "", given_help},
    {"gas_mixture", block, optional, Kind::ratio, any, "",
     "gases by mole fraction, which is volume fraction"},
    {"gas_mixture.mole_fractions", block, required, Kind::ratio, any, "", "they add up to 1"},
    {"gas_mixture.mole_fractions.?", quantity, optional, Kind::ratio, shares, "0.72",
     "of one gas, by name or formula: nitrogen, N2; water vapour is water"},
    {"gas_mixture.given", block, optional, Kind::ratio, any, "", given_help},
    {"ethylene_glycol_water", block, optional, Kind::ratio, any, "", "without inhibitors"},
    {"ethylene_glycol_water.mass_fraction", quantity, required, Kind::mass_fraction, shares, "30 %",
     "glycol by mass, not by volume"},
    {"ethylene_glycol_water.given", block, optional, Kind::ratio, any, "", given_help},
    {"propylene_glycol_water", block, optional, Kind::ratio, any, "", "without inhibitors"},
    {"propylene_glycol_water.mass_fraction", quantity, required, Kind::mass_fraction, shares, "30 %",
     "glycol by mass, not by volume"},
    {"propylene_glycol_water.given", block, optional, Kind::ratio, any, "", given_help},
    {"sodium_chloride_brine", block, optional, Kind::ratio, any, "", "common salt in water"},
    {"sodium_chloride_brine.mass_fraction", quantity, required, Kind::mass_fraction, shares, "20 %",
     "salt by mass, not by volume"},
    {"sodium_chloride_brine.given", block, optional, Kind::ratio, any, "", given_help},
    {"calcium_chloride_brine", block, optional, Kind::ratio, any, "", "calcium chloride in water"},
    {"calcium_chloride_brine.mass_fraction", quantity, required, Kind::mass_fraction, shares, "20 %",
     "salt by mass, not by volume"},
    {"calcium_chloride_brine.given", block, optional, Kind::ratio, any, "", given_help},
    {"petroleum", block, optional, Kind::ratio, any, "", "a petroleum fraction or crude oil, liquid"},
    {"petroleum.api", number, optional, Kind::count, any, "35", "gravity in degrees API at 60 degF"},
    {"petroleum.specific_gravity", number, optional, Kind::count, any, "0.85",
     "at 60/60 degF, instead of api"},
    {"petroleum.watson_k", number, optional, Kind::count, any, "11.8", "Watson's characterization factor"},
    {"petroleum.viscosity", block, optional, Kind::ratio, any, "", "at two temperatures"},
    {"petroleum.viscosity.?", either_viscosity, optional, Kind::kinematic_viscosity, viscosities, "3.8 cSt",
     "at the temperature written as its key"},
    {"petroleum.kind", word, optional, Kind::ratio, any, "product", "left out: product, listed as assumed",
     "product|crude"},
    {"petroleum.given", block, optional, Kind::ratio, any, "", given_help},
    {"oil", block, optional, Kind::ratio, any, "", "a mineral lubricating or hydraulic oil"},
    {"oil.iso_vg", number, optional, Kind::count, any, "46", "viscosity grade by ISO 3448"},
    {"oil.viscosity", block, optional, Kind::ratio, any, "", "at two temperatures, instead of iso_vg"},
    {"oil.viscosity.?", either_viscosity, optional, Kind::kinematic_viscosity, viscosities, "46 cSt",
     "at the temperature written as its key"},
    {"oil.density_15c", quantity, optional, Kind::density, densities, "872 kg/m3", "at 15 degC"},
    {"oil.viscosity_index", number, optional, Kind::count, any, "95",
     "with iso_vg; left out: 95, listed as assumed"},
    {"oil.given", block, optional, Kind::ratio, any, "", given_help},
};

constexpr Row rows_of_given[] = {
    {"density", property, optional, Kind::density, densities, "865 kg/m3 at 20 degC", "mass of a volume"},
    {"heat_capacity", property, optional, Kind::heat_capacity, heat_capacities,
     "0.55 Btu/lb.degF at 135 degF", "at constant pressure"},
    {"conductivity", property, optional, Kind::conductivity, conductivities, "0.13 W/m.K at 40 degC",
     "of the fluid"},
    {"viscosity", property, optional, Kind::viscosity, viscosities, "22 cP at 50 degC",
     "dynamic, not kinematic"},
};

}  // namespace

std::span<const Row> fluid_rows() {
  return rows;
}

std::span<const Row> given_rows() {
  return rows_of_given;
}

}  // namespace dutygauge::case_io
