#pragma once
#include <fmt/core.h>

#include <string>

#include "dutygauge/case_io.hpp"
#include "dutygauge/field/plant.hpp"

/// Plants the field tests hold readings against. Invented; those named by a letter are the
/// simulated plants whose readings lie in tests/data/field.
namespace plants {

inline dutygauge::rating::Problem problem(const std::string& text) {
  return dutygauge::case_io::build(dutygauge::case_io::read_document(text, "plant")).problem;
}

/// Water to water, 1-2 shell, films as laws.
inline const std::string water_cooler = R"(dutygauge: 1
exchanger:
  tema: AEL
  shells:
    in_series: 1
    in_parallel: 1
  area: 210 m2
  wall_resistance: 4e-05 m2.K/W
  tubes:
    passes: 2
streams:
  shell_side:
    name: hot stream
    fluid:
      constant:
        heat_capacity: 4180 J/kg.K
    flow: 80 kg/s
    inlet:
      temperature: 55 degC
    fouling: 0 m2.K/W
    film_law:
      value: 3600 W/m2.K
      at_flow: 80 kg/s
      flow_exponent: 0.6
      temperature_slope: 0.006 1/K
      at_temperature: 46 degC
      surface: outside
    pressure_drop_law:
      value: 45 kPa
      at_flow: 80 kg/s
      flow_exponent: 1.8
  tube_side:
    name: cold stream
    fluid:
      constant:
        heat_capacity: 4180 J/kg.K
    flow: 110 kg/s
    inlet:
      temperature: 28 degC
    fouling: 0 m2.K/W
    film_law:
      value: 4200 W/m2.K
      at_flow: 110 kg/s
      flow_exponent: 0.8
      temperature_slope: 0.01 1/K
      at_temperature: 28 degC
      surface: outside
    pressure_drop_law:
      value: 38 kPa
      at_flow: 110 kg/s
      flow_exponent: 1.8
service:
  duty:
    at_least: 4107842 W
)";

/// Oil to oil, counterflow, films as laws; only the heat capacities count.
inline const std::string oil_preheater = R"(dutygauge: 1
exchanger:
  tema: AEL
  shells:
    in_series: 1
    in_parallel: 1
  area: 480 m2
  wall_resistance: 5.5e-05 m2.K/W
  tubes:
    passes: 1
  flow_direction: counter
streams:
  shell_side:
    name: hot stream
    fluid:
      two_point:
        at: 187 -> 287 degC
        heat_capacity: 2290 -> 2610 J/kg.K
        density: 800 -> 740 kg/m3
        conductivity: 0.11 -> 0.11 W/m.K
        viscosity: 1 -> 1 cP
    flow: 62 kg/s
    inlet:
      temperature: 290 degC
      pressure: 10 bara
    fouling: 0 m2.K/W
    film_law:
      value: 780 W/m2.K
      at_flow: 62 kg/s
      flow_exponent: 0.6
      temperature_slope: 0.004 1/K
      at_temperature: 237 degC
      surface: outside
    pressure_drop_law:
      value: 80 kPa
      at_flow: 62 kg/s
      flow_exponent: 1.8
  tube_side:
    name: cold stream
    fluid:
      two_point:
        at: 127 -> 227 degC
        heat_capacity: 2120 -> 2480 J/kg.K
        density: 800 -> 740 kg/m3
        conductivity: 0.11 -> 0.11 W/m.K
        viscosity: 1 -> 1 cP
    flow: 95 kg/s
    inlet:
      temperature: 150 degC
      pressure: 20 bara
    fouling: 0 m2.K/W
    film_law:
      value: 1250 W/m2.K
      at_flow: 95 kg/s
      flow_exponent: 0.8
      temperature_slope: 0.004 1/K
      at_temperature: 177 degC
      surface: outside
    pressure_drop_law:
      value: 120 kPa
      at_flow: 95 kg/s
      flow_exponent: 1.8
service:
  duty:
    at_least: 10971664 W
)";

/// Water to water, drawn, 1-2 shell.
inline const std::string drawn_cooler = R"(dutygauge: 1
exchanger:
  tema: AEL
  shells:
    in_series: 1
    in_parallel: 1
  shell:
    inside_diameter: 590.6 mm
  tubes:
    count: 404
    passes: 2
    outside_diameter: 19.05 mm
    wall: 1.65 mm
    length: 4.88 m
    tubesheet_thickness: 0 mm
    pitch: 23.8125 mm
    layout: 30
    conductivity: 50 W/m.K
  baffles:
    style: single_segmental
    cut: 25 %
    spacing: 300 mm
    count: 15
streams:
  shell_side:
    name: hot stream
    fluid:
      constant:
        density: 993 kg/m3
        heat_capacity: 4180 J/kg.K
        conductivity: 0.625 W/m.K
        viscosity: 0.00069 Pa.s
    flow: 46 kg/s
    inlet:
      temperature: 52 degC
      pressure: 500 kPa
    fouling: 0 m2.K/W
  tube_side:
    name: cold stream
    fluid:
      constant:
        density: 993 kg/m3
        heat_capacity: 4180 J/kg.K
        conductivity: 0.625 W/m.K
        viscosity: 0.00069 Pa.s
    flow: 85 kg/s
    inlet:
      temperature: 27 degC
      pressure: 500 kPa
    fouling: 0 m2.K/W
service:
  duty:
    at_least: 2833223 W
)";

/// Fixed films and heat capacities on a known surface, hot stream in the shell.
struct Fixed {
  int passes = 2;
  double area = 100, wall = 0, tube_film = 5000, shell_film = 5000;
  double hot_heat_capacity = 4000, cold_heat_capacity = 4000;
};
inline dutygauge::rating::Problem fixed(const Fixed& f) {
  return problem(fmt::format(R"(dutygauge: 1
exchanger: {{tema: AEL, area: {} m2, wall_resistance: {} m2.K/W, tubes: {{passes: {}}}, flow_direction: counter}}
streams:
  shell_side:
    fluid: {{constant: {{heat_capacity: {} J/kg.K}}}}
    flow: 80 kg/s
    inlet: {{temperature: 90 degC}}
    fouling: 0 m2.K/W
    film_law: {{value: {} W/m2.K, at_flow: 80 kg/s, flow_exponent: 0, surface: outside}}
  tube_side:
    fluid: {{constant: {{heat_capacity: {} J/kg.K}}}}
    flow: 110 kg/s
    inlet: {{temperature: 24 degC}}
    fouling: 0 m2.K/W
    film_law: {{value: {} W/m2.K, at_flow: 110 kg/s, flow_exponent: 0, surface: outside}}
)",
                             f.area, f.wall, f.passes, f.hot_heat_capacity, f.shell_film,
                             f.cold_heat_capacity, f.tube_film));
}

/// Instruments alike on all flows (relative) and on all temperatures [K]; drops 1 % and 2 %.
struct Accuracy {
  double flow_systematic = 0, flow_random = 0, temperature_systematic = 0, temperature_random = 0;
};
inline dutygauge::field::Instruments instruments(const Accuracy& a) {
  using dutygauge::field::Instrument;
  const Instrument flow{.systematic = a.flow_systematic, .random = a.flow_random, .relative = true};
  const Instrument temperature{.systematic = a.temperature_systematic, .random = a.temperature_random};
  const Instrument drop{.systematic = 0.01, .random = 0.02, .relative = true};
  return {flow, flow, temperature, temperature, temperature, temperature, drop, drop, {}};
}

}  // namespace plants
