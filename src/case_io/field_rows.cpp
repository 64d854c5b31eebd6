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
     "of the shell, or a pipe: NPS 20 sch 20"},
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
     "of a tube; or a gauge: 14 BWG, 14 BWG min"},
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
    {"exchanger.clearances", block, usual, Kind::ratio, any, "", "gaps, all diametral"},
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

    {"service", block, usual, Kind::ratio, any, "", "what must hold, every line of it"},
    {"service.*_outlet", block, usual, Kind::ratio, any, "",
     "limits of the shell-side outlet // limits of the tube-side outlet"},
    {"service.*_outlet.at_most", quantity, usual, Kind::temperature, temperatures, "58 degC // 45 degC",
     "the highest outlet temperature"},
    {"service.*_outlet.at_least", quantity, optional, Kind::temperature, temperatures, "40 degC // 31 degC",
     "the lowest outlet temperature"},
    {"service.duty", block, optional, Kind::ratio, any, "", "heat to be moved"},
    {"service.duty.at_least", quantity, optional, Kind::power, positive(1e10), "400 kW", "the least duty"},
    {"service.duty.at_most", quantity, optional, Kind::power, positive(1e10), "900 kW", "the most duty"},
    {"service.confidence", quantity, optional, Kind::ratio, between(0.5, 0.99), "80 %",
     "the probability from which the sentence may begin with yes"},

    {"methods", block, optional, Kind::ratio, any, "", "how it is rated"},
    {"methods.tube_side", word, optional, Kind::ratio, any, "gnielinski", "film inside the tubes",
     "gnielinski"},
    {"methods.shell_side", word, optional, Kind::ratio, any, "bell_delaware", "film outside the tubes",
     "bell_delaware|kern"},
    {"methods.solution", word, optional, Kind::ratio, any, "march",
     "march: along the streams with local properties; mean: at the mean temperatures", "march|mean"},
};

}  // namespace

std::span<const Row> case_rows() {
  return rows;
}

}  // namespace dutygauge::case_io
