#pragma once
#include <stdexcept>
#include <string>
#include <string_view>

/// An invented oil cooler as a case file, for the tests of the case reader.
namespace good {

constexpr std::string_view oil_cooler = R"(dutygauge: 1
title: Oil cooler of the tests
tag: T-1
display: metric
exchanger:
  tema: AES
  orientation: horizontal
  shells: {in_series: 1, in_parallel: 1}
  shell: {inside_diameter: 489 mm, nozzle_in: 154 mm, nozzle_out: 154 mm}
  tubes:
    count: 208
    plugged: 4
    passes: 2
    outside_diameter: 19.05 mm
    wall: 2.11 mm
    length: 4.88 m
    tubesheet_thickness: 45 mm
    pitch: 25.4 mm
    layout: 30
    material: admiralty brass
    roughness: 1.5 um
    nozzle_in: 128 mm
    nozzle_out: 128 mm
  baffles: {style: single_segmental, cut: 25 %, spacing: 150 mm, inlet_spacing: 295 mm, outlet_spacing: 295 mm, thickness: 6 mm}
  clearances: {tube_to_baffle: 0.8 mm, shell_to_baffle: 4.8 mm, bundle_to_shell: 45 mm}
  sealing_strip_pairs: 1
  pass_lanes: {along_flow: 0, width: 16 mm}
streams:
  shell_side:
    name: oil
    fluid: {constant: {density: 865 kg/m3, heat_capacity: 2050 J/kg.K, conductivity: 0.13 W/m.K, viscosity: 22 mPa.s, phase: liquid}}
    flow: 21.5 kg/s
    inlet: {temperature: 68 degC, pressure: 6 bara}
    fouling: 0.00018 m2.K/W
    allowable_pressure_drop: 100 kPa
  tube_side:
    name: cooling water
    fluid: water
    flow: 62 m3/h at inlet
    inlet:
      temperature: 29 degC
      pressure: 4 bara
    fouling: 0.00035 m2.K/W
    allowable_pressure_drop: 70 kPa
service:
  shell_side_outlet: {at_most: 58 degC}
  duty: {at_least: 400 kW}
methods: {tube_side: gnielinski, shell_side: bell_delaware, solution: mean}
)";

/// The cooler with one text in place of another, which must be there.
inline std::string with(std::string_view from, std::string_view to,
                        std::string text = std::string(oil_cooler)) {
  const auto at = text.find(from);
  if (at == std::string::npos) throw std::invalid_argument("not in the case: " + std::string(from));
  return text.replace(at, from.size(), to);
}

/// The cooler with a line added at its end.
inline std::string and_also(std::string_view line) {
  return std::string(oil_cooler) + std::string(line) + "\n";
}

}  // namespace good
