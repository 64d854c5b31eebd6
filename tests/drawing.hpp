#pragma once
#include "dutygauge/geometry.hpp"

/// Drawings that tests start from.
namespace drawing {

/// A lube oil cooler whose drawing is complete; the numbers are invented.
inline dutygauge::geometry::Description complete() {
  dutygauge::geometry::Description d;
  d.front_head = 'A';
  d.shell_type = 'E';
  d.rear_head = 'S';
  d.shell_inside_diameter = 0.489;
  d.shell_nozzle_in = d.shell_nozzle_out = 0.154;
  d.tube_count = 208;
  d.tube_passes = 2;
  d.tube_outside_diameter = 0.01905;
  d.tube_wall = 0.00211;
  d.tube_length = 4.88;
  d.tubesheet_thickness = 0.045;
  d.tube_pitch = 0.0254;
  d.layout = 30;
  d.tube_material = "admiralty brass";
  d.tube_roughness = 1.5e-6;
  d.tube_nozzle_in = d.tube_nozzle_out = 0.128;
  d.baffle_cut = 0.25;
  d.baffle_spacing = 0.150;
  d.inlet_spacing = d.outlet_spacing = 0.295;
  d.baffle_thickness = 0.006;
  d.tube_to_baffle = 0.0008;
  d.shell_to_baffle = 0.0048;
  d.bundle_to_shell = 0.045;
  d.sealing_strip_pairs = 1;
  d.pass_lanes_along_flow = 0;
  return d;
}

/// An invented 590 mm shell with 19 mm tubes.
inline dutygauge::geometry::ShellSide shell_side() {
  dutygauge::geometry::ShellSide s;
  s.inside_diameter = 0.59;
  s.bundle_to_shell = 0.0185;
  s.tube_outside_diameter = 0.01905;
  s.pitch = 0.02381;
  s.layout = 30;
  s.tube_count = 430;
  s.baffle_cut = 0.25;
  s.central_spacing = 0.25;
  s.inlet_spacing = 0.40;
  s.outlet_spacing = 0.35;
  s.baffles = 16;
  s.tube_to_baffle = 0.794e-3;
  s.shell_to_baffle = 4.8e-3;
  s.sealing_strip_pairs = 2;
  s.pass_lane_half_width = 0.0095;
  s.effective_length = 4.5;
  return s;
}

}  // namespace drawing
