#include "field_rows.hpp"

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
constexpr Bounds between(double least, double most) {
  return {.least = least, .most = most};
}

// The upper bounds only catch what cannot be meant: a wrong unit, a lost decimal point.
constexpr Bounds temperatures = between(20.0, 1773.15);
constexpr Bounds any_count = between(1, 200'000);

constexpr Row rows[] = {
    {"dutygauge", version, required, Kind::count, any, "1", "version of the case format"},
    {"title", text, usual, Kind::ratio, any, "Lube oil cooler", "what the case is about"},
    {"tag", text, usual, Kind::ratio, any, "E-101", "the plant's name of the unit"},
    {"display", word, usual, Kind::ratio, any, "metric", "units of the text result; JSON stays SI",
     "si|metric|us"},
    {"document", block, optional, Kind::ratio, any, "", "where the case comes from"},
    {"document.revision", text, optional, Kind::ratio, any, "A", "revision of the case"},
    {"document.date", text, optional, Kind::ratio, any, "2026-01-31", "date of the case"},
    {"document.purpose", text, optional, Kind::ratio, any, "new duty", "what the case is for"},
    {"document.prepared_by", text, optional, Kind::ratio, any, "A. Person", "who wrote the case"},
    {"document.sources", block, optional, Kind::ratio, any, "", "documents the values come from"},
    {"document.sources.?", text, optional, Kind::ratio, any, "datasheet 4711",
     "one document, under any name"},

    {"exchanger", block, required, Kind::ratio, any, "",
     "as built; tubes and baffles are those of ONE shell"},
    {"exchanger.tema", tema, required, Kind::ratio, any, "AES",
     "TEMA letters of front head, shell, rear head"},
    {"exchanger.orientation", word, optional, Kind::ratio, any, "horizontal", "how the shell lies",
     "horizontal|vertical"},
    {"exchanger.shells", block, optional, Kind::ratio, any, "", "how many shells, and how they are joined"},
    {"exchanger.shells.in_series", whole, optional, Kind::count, between(1, 100), "1",
     "shells each stream passes in turn"},
    {"exchanger.shells.in_parallel", whole, optional, Kind::count, between(1, 100), "1",
     "banks that share both flows"},
    {"exchanger.flow_direction", word, optional, Kind::ratio, any, "counter", "of units with one tube pass",
     "counter|parallel"},
    {"exchanger.first_tube_pass", word, optional, Kind::ratio, any, "against_shell_flow",
     "which way the first pass runs; without effect in E shells with an even number of passes",
     "against_shell_flow|with_shell_flow"},
    {"exchanger.shell", block, required, Kind::ratio, any, "", "one shell"},
    {"exchanger.shell.inside_diameter", bore, required, Kind::length, positive(10.0), "489 mm",
     "or a pipe: NPS 20 sch 20"},
    {"exchanger.shell.nozzle_in", bore, usual, Kind::length, positive(5.0), "154 mm",
     "bore, or a pipe: NPS 6 sch 40"},
    {"exchanger.shell.nozzle_out", bore, usual, Kind::length, positive(5.0), "154 mm",
     "bore, or a pipe: NPS 6 sch 40"},
    {"exchanger.shell.impingement_plate", boolean, optional, Kind::ratio, any, "false",
     "a plate under the inlet nozzle"},

    {"exchanger.tubes", block, required, Kind::ratio, any, "", "the tubes of one shell"},
    {"exchanger.tubes.count", whole, required, Kind::count, any_count, "208", "holes in one tubesheet", "",
     "u_tubes"},
    {"exchanger.tubes.u_tubes", whole, optional, Kind::count, between(1, 100'000), "104",
     "instead of count: two holes each"},
    {"exchanger.tubes.plugged", whole_or_list, optional, Kind::count, from_zero(200'000), "0",
     "holes plugged; or per pass: [8, 4]"},
    {"exchanger.tubes.plugged.#", whole, optional, Kind::count, from_zero(200'000), "4",
     "holes plugged in one pass"},
    {"exchanger.tubes.passes", whole, required, Kind::count, between(1, 32), "2", "tube passes of one shell"},
    {"exchanger.tubes.outside_diameter", quantity, required, Kind::length, positive(0.3), "19.05 mm",
     "of the tubes"},
    {"exchanger.tubes.wall", wall, required, Kind::length, positive(0.05), "2.11 mm",
     "or a gauge: 14 BWG, 14 BWG min"},
    {"exchanger.tubes.length", quantity, required, Kind::length, positive(40.0), "4.88 m",
     "between the tubesheets' outer faces; U-tubes: straight part"},
    {"exchanger.tubes.tubesheet_thickness", quantity, usual, Kind::length, from_zero(1.0), "45 mm",
     "of one tubesheet"},
    {"exchanger.tubes.pitch", quantity, required, Kind::length, positive(0.6), "25.4 mm",
     "from tube centre to tube centre"},
    {"exchanger.tubes.layout", angle, required, Kind::angle, any, "30",
     "angle of the tube pattern to the crossflow", "30|45|60|90"},
    {"exchanger.tubes.material", text, required, Kind::ratio, any, "admiralty brass",
     "name of the tube material", "", "conductivity"},
    {"exchanger.tubes.conductivity", quantity, optional, Kind::conductivity, positive(2000.0), "111 W/m.K",
     "instead of a material"},
    {"exchanger.tubes.roughness", quantity, usual, Kind::length, from_zero(0.005), "1.5 um",
     "inside the tubes"},
    {"exchanger.tubes.nozzle_in", bore, usual, Kind::length, positive(5.0), "128 mm",
     "bore, or a pipe: NPS 5 sch 40"},
    {"exchanger.tubes.nozzle_out", bore, usual, Kind::length, positive(5.0), "128 mm",
     "bore, or a pipe: NPS 5 sch 40"},

    {"exchanger.baffles", block, required, Kind::ratio, any, "", "of one shell"},
    {"exchanger.baffles.style", word, optional, Kind::ratio, any, "single_segmental",
     "how the baffles are cut", "single_segmental"},
    {"exchanger.baffles.cut", quantity, required, Kind::ratio, positive(0.5), "25 %",
     "window height over the shell's inside diameter"},
    {"exchanger.baffles.spacing", quantity, usual, Kind::length, positive(20.0), "150 mm",
     "centre to centre; of spacing, count and end spacings what is left out follows"},
    {"exchanger.baffles.count", whole, optional, Kind::count, between(1, 10'000), "27",
     "baffles along the whole shell"},
    {"exchanger.baffles.compartments", whole, optional, Kind::count, between(2, 10'001), "28",
     "instead of count: one more"},
    {"exchanger.baffles.inlet_spacing", quantity, usual, Kind::length, positive(20.0), "295 mm",
     "first baffle to tubesheet"},
    {"exchanger.baffles.outlet_spacing", quantity, usual, Kind::length, positive(20.0), "295 mm",
     "last baffle to tubesheet"},
    {"exchanger.baffles.thickness", quantity, usual, Kind::length, positive(0.3), "6 mm", "of one baffle"},
    {"exchanger.clearances", block, usual, Kind::ratio, any, "", "diametral"},
    {"exchanger.clearances.tube_to_baffle", quantity, usual, Kind::length, from_zero(0.1), "0.8 mm",
     "hole less tube"},
    {"exchanger.clearances.shell_to_baffle", quantity, usual, Kind::length, from_zero(0.5), "4.8 mm",
     "shell less baffle"},
    {"exchanger.clearances.bundle_to_shell", quantity, usual, Kind::length, from_zero(2.0), "45 mm",
     "shell less outer tube limit"},
    {"exchanger.sealing_strip_pairs", whole, usual, Kind::count, from_zero(100), "1",
     "pairs that block the way round the bundle"},
    {"exchanger.pass_lanes", block, optional, Kind::ratio, any, "",
     "lanes parallel to the crossflow, not blanked"},
    {"exchanger.pass_lanes.along_flow", whole, optional, Kind::count, from_zero(100), "0", "how many"},
    {"exchanger.pass_lanes.width", quantity, optional, Kind::length, from_zero(1.0), "16 mm", "of one lane"},

    {"streams", block, required, Kind::ratio, any, "", "flows are those of the whole unit"},
    {"streams.*", block, required, Kind::ratio, any, "", "outside the tubes // inside the tubes"},
    {"streams.*.name", text, usual, Kind::ratio, any, "lube oil // cooling water",
     "what people call the stream"},
    {"streams.*.fluid", fluid, required, Kind::ratio, any,
     "{constant: {density: 865 kg/m3, heat_capacity: 2.05 kJ/kg.K, conductivity: 0.13 W/m.K, viscosity: 22 "
     "cP, phase: liquid}} // water",
     "a name, or its properties"},
    {"streams.*.flow", flow, required, Kind::mass_flow, positive(1e5), "21.5 kg/s // 62 m3/h at inlet",
     "of the whole unit"},
    {"streams.*.inlet", block, required, Kind::ratio, any, "", "as the stream enters the unit"},
    {"streams.*.inlet.temperature", quantity, required, Kind::temperature, temperatures, "68 degC // 29 degC",
     "at the inlet"},
    {"streams.*.inlet.pressure", quantity, required, Kind::pressure, positive(2e8), "6 bara // 4 bara",
     "at the inlet, absolute (bara) or gauge (barg)"},
    {"streams.*.fouling", quantity, required, Kind::fouling_resistance, from_zero(0.1),
     "0.00018 m2.K/W // 0.00035 m2.K/W", "on the surface it sits on; 0 m2.K/W for clean"},
    {"streams.*.allowable_pressure_drop", quantity, usual, Kind::pressure_difference, positive(1e8),
     "100 kPa // 70 kPa", "flange to flange"},

    {"service", block, usual, Kind::ratio, any, "", "what must hold; every line"},
    {"service.*_outlet", block, usual, Kind::ratio, any, "",
     "limits of the shell-side outlet // limits of the tube-side outlet"},
    {"service.*_outlet.at_most", quantity, usual, Kind::temperature, temperatures, "58 degC // 45 degC",
     "outlet temperature"},
    {"service.*_outlet.at_least", quantity, optional, Kind::temperature, temperatures, "40 degC // 31 degC",
     "outlet temperature"},
    {"service.duty", block, optional, Kind::ratio, any, "", "heat to be moved"},
    {"service.duty.at_least", quantity, optional, Kind::power, positive(1e10), "400 kW", "duty"},
    {"service.duty.at_most", quantity, optional, Kind::power, positive(1e10), "900 kW", "duty"},

    {"claims", block, optional, Kind::ratio, any, "", "what the sheet says of the exchanger as built"},
    {"claims.for", text, optional, Kind::ratio, any, "base", "the operating case the sheet speaks of"},
    {"claims.duty", quantity, optional, Kind::power, positive(1e10), "580 kW", "of the whole unit"},
    {"claims.*_outlet", quantity, optional, Kind::temperature, temperatures, "56 degC // 37 degC",
     "outlet on the sheet"},
    {"claims.area", block, optional, Kind::ratio, any, "", "outside surface on the sheet"},
    {"claims.area.effective", quantity, optional, Kind::area, positive(1e6), "59.6 m2",
     "between the tubesheets"},
    {"claims.area.gross", quantity, optional, Kind::area, positive(1e6), "60.7 m2", "of the full length"},
    {"claims.area.per", word, optional, Kind::ratio, any, "unit", "what the areas stand for; left out: unit",
     "unit|shell"},
    {"claims.u_service", quantity, optional, Kind::film_coefficient, positive(1e6), "353 W/m2.K",
     "duty over area and corrected difference; never compared with ours"},
    {"claims.u_dirty", quantity, optional, Kind::film_coefficient, positive(1e6), "380 W/m2.K",
     "with both foulings"},
    {"claims.u_clean", quantity, optional, Kind::film_coefficient, positive(1e6), "470 W/m2.K",
     "without fouling"},
    {"claims.lmtd", quantity, optional, Kind::temperature_difference, positive(2000.0), "29.1 K",
     "log-mean difference of the four temperatures"},
    {"claims.f_correction", quantity, optional, Kind::ratio, positive(1.0), "0.96", "of the arrangement"},
    {"claims.mtd", quantity, optional, Kind::temperature_difference, positive(2000.0), "27.9 K",
     "F times LMTD"},
    {"claims.tube_side_velocity", quantity, optional, Kind::velocity, positive(1000.0), "1.6 m/s",
     "in the tubes"},
    {"claims.*_pressure_drop", quantity, optional, Kind::pressure_difference, positive(1e8),
     "60 kPa // 35 kPa", "calculated, flange to flange"},
    {"claims.*_film_coefficient", quantity, optional, Kind::film_coefficient, positive(1e6),
     "700 W/m2.K // 5200 W/m2.K", "on the outside of the tubes // on the bore"},
    {"claims.tube_count", whole, optional, Kind::count, any_count, "208", "holes in one tubesheet"},
    {"claims.nozzle_rho_v2", quantity, optional, Kind::momentum_flux, positive(1e8), "1500 kg/m.s2",
     "of the nozzle the sheet speaks of"},
    {"claims.surface_margin", block, optional, Kind::ratio, any, "", "surface to spare"},
    {"claims.surface_margin.value", quantity, required, Kind::ratio, between(-0.9, 20.0), "24 %",
     "installed over needed, less one"},
    {"claims.surface_margin.basis", word, optional, Kind::ratio, any, "design_fouling",
     "with or without fouling; left out: unstated", "clean|design_fouling|unstated"},
    {"claims.weight", quantity, optional, Kind::mass, positive(1e7), "2400 kg", "not checked"},

    {"methods", block, optional, Kind::ratio, any, "", "how it is rated"},
    {"methods.tube_side", word, optional, Kind::ratio, any, "gnielinski", "film inside the tubes",
     "gnielinski"},
    {"methods.shell_side", word, optional, Kind::ratio, any, "bell_delaware", "film outside the tubes",
     "bell_delaware|kern"},
    {"methods.solution", word, optional, Kind::ratio, any, "march",
     "march: along the streams with local properties; mean: at the mean temperatures", "march|mean"},
};

constexpr Bounds densities = positive(30'000.0);
constexpr Bounds heat_capacities = positive(1e5);
constexpr Bounds conductivities = positive(1000.0);
constexpr Bounds viscosities = positive(1e6);
constexpr const char* phases = "liquid|gas";
constexpr const char* phase_help = "left out: liquid, listed as assumed";

constexpr Row fluid_rows_of_all_families[] = {
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
};

}  // namespace

std::span<const Row> case_rows() {
  return rows;
}

std::span<const Row> fluid_rows() {
  return fluid_rows_of_all_families;
}

}  // namespace dutygauge::case_io
