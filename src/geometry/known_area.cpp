#include <fmt/core.h>

#include <cmath>

#include "parts.hpp"

// A unit known by its surface and the resistance of its wall: no dimensions of tubes or shell.

namespace dutygauge::geometry {
namespace {

/// A small unit that could be drawn, so that letters, passes and shells are checked as ever.
Description with_some_drawing(Description d) {
  d.shell_inside_diameter = 1.0;
  d.tube_count = d.tube_passes * 2;
  d.tube_outside_diameter = 0.020, d.tube_wall = 0.002, d.tube_pitch = 0.026, d.tube_length = 4.0;
  d.tube_conductivity = 50.0;
  d.baffles_known = false;
  d.area.reset();
  return d;
}

}  // namespace

Objections objections_to_area(const Description& d) {
  Objections out;
  if (!(std::isfinite(*d.area) && *d.area > 0.0))
    out.push_back({"exchanger.area", fmt::format("is {} in SI units", *d.area), "more than zero",
                   "give the effective outside area of all shells"});
  if (!d.wall_resistance || !(*d.wall_resistance >= 0.0))
    out.push_back({"exchanger.wall_resistance", "is needed beside an area: nothing tells the tube wall",
                   "a resistance on the outside area such as 0.00004 m2.K/W",
                   "take it from the sheet; 0 m2.K/W leaves the wall out"});
  for (Objection& objection : objections(with_some_drawing(d))) out.push_back(std::move(objection));
  return out;
}

Exchanger build_by_area(const Description& d) {
  Exchanger exchanger;
  exchanger.as_described = d;
  exchanger.tubes_drawn = exchanger.shell_drawn = false;
  exchanger.shells_in_series = d.shells_in_series;
  exchanger.shells_in_parallel = d.shells_in_parallel;
  exchanger.tube_side_in_series = d.tube_side_in_series;
  exchanger.flow_direction = d.flow_direction.value_or(FlowDirection::counter);
  exchanger.first_tube_pass = d.first_tube_pass;
  exchanger.layer_resistance = *d.wall_resistance;
  exchanger.area = *d.area;
  exchanger.area_per_shell = *d.area / (d.shells_in_series * d.shells_in_parallel);
  // Only their ratio can be met with: both surfaces are the one whose area is given.
  exchanger.tube_side.outside_diameter = exchanger.tube_side.inside_diameter = 1.0;
  exchanger.tube_side.passes = d.tube_passes;
  exchanger.tube_side.u_tubes = has_u_tubes(d);
  exchanger.shell_side.shell_type = d.shell_type;
  return exchanger;
}

}  // namespace dutygauge::geometry
