#pragma once
#include "dutygauge/rating.hpp"

/// A water-to-water cooler that the methods rate without remark.
inline dutygauge::rating::Problem water_cooler(double shell_inlet_temperature) {
  using namespace dutygauge;
  geometry::Description d;
  d.shell_inside_diameter = 0.489;
  d.tube_count = 208;
  d.tube_passes = 2;
  d.rear_head = 'S';
  d.tube_outside_diameter = 0.01905;
  d.tube_wall = 0.00211;
  d.tube_length = 4.88;
  d.tube_pitch = 0.0254;
  d.tube_conductivity = 111.0;
  d.baffle_spacing = 0.2;
  rating::Problem problem;
  problem.exchanger = geometry::derive(d).value;
  problem.shell_side = {.name = "warm water",
                        .fluid = fluids::make_water(shell_inlet_temperature, 5e5).fluid,
                        .mass_flow = 20.0,
                        .inlet_temperature = shell_inlet_temperature,
                        .inlet_pressure = 5e5,
                        .fouling_resistance = 2e-4};
  problem.tube_side = {.name = "cooling water",
                       .fluid = fluids::make_water(300.0, 5e5).fluid,
                       .mass_flow = 25.0,
                       .inlet_temperature = 300.0,
                       .inlet_pressure = 5e5,
                       .fouling_resistance = 3e-4};
  return problem;
}
