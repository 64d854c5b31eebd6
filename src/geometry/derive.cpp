#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include "dutygauge/units/mention.hpp"
#include "parts.hpp"

namespace dutygauge::geometry {
namespace {

using std::numbers::pi;

double circle(double diameter) {
  return 0.25 * pi * diameter * diameter;
}

void set_metal(const Description& d, Exchanger& exchanger) {
  if (d.tube_conductivity) {
    exchanger.wall_conductivity = {.temperature = {293.15}, .value = {*d.tube_conductivity}};
    return;
  }
  for (const ConductivityPoint& point : find_material(d.tube_material)->conductivity) {
    exchanger.wall_conductivity.temperature.push_back(point.celsius + 273.15);
    exchanger.wall_conductivity.value.push_back(point.value);
  }
}

void set_roughness(const Description& d, TubeSide& tubes, Assumptions& assumed) {
  const Material* material = find_material(d.tube_material);
  const Span usual = material ? material->roughness : unnamed_roughness();
  tubes.roughness = d.tube_roughness.value_or(usual.value);
  if (d.tube_roughness) return;
  const std::string what =
      material ? std::string(material->name) : "a tube of unnamed material, as drawn steel";
  assumed.push_back({.key = "exchanger.tubes.roughness",
                     .value = usual.value,
                     .kind = units::Kind::length,
                     .why = "usual for " + what,
                     .low = usual.low,
                     .high = usual.high,
                     .look_in = "tube specification"});
}

/// The bore's area, or 0 with a word that its drop is left out.
double nozzle_area(const std::optional<double>& bore, const char* key, Assumptions& assumed) {
  if (bore) return circle(*bore);
  assumed.push_back({.key = key,
                     .kind = units::Kind::length,
                     .word = "not counted",
                     .why = "no bore given: the pressure drop of this nozzle is left out",
                     .look_in = "nozzle list"});
  return 0.0;
}

TubeSide tube_side(const Description& d, const Exchanger& exchanger, Assumptions& assumed) {
  TubeSide tubes;
  tubes.inside_diameter = bore(d);
  tubes.outside_diameter = d.tube_outside_diameter;
  tubes.passes = d.tube_passes;
  tubes.u_tubes = has_u_tubes(d);
  tubes.flow_area = circle(tubes.inside_diameter) * exchanger.tubes_open / d.tube_passes;
  tubes.heated_length = exchanger.effective_length * (tubes.u_tubes ? 2.0 : 1.0);
  tubes.friction_length = d.tube_length * d.tube_passes;
  if (tubes.u_tubes) {
    // The mean bend is 2/3 of the bundle circle: the integral over the half circle.
    const double bundle = d.shell_inside_diameter - bundle_gap(d);
    tubes.friction_length += 0.5 * d.tube_passes * (2.0 / 3.0) * bundle;
  }
  set_roughness(d, tubes, assumed);
  tubes.nozzle_in_area = nozzle_area(d.tube_nozzle_in, "exchanger.tubes.nozzle_in", assumed);
  tubes.nozzle_out_area = nozzle_area(d.tube_nozzle_out, "exchanger.tubes.nozzle_out", assumed);
  return tubes;
}

ShellSide shell_side(const Description& d, const Baffles& baffles, double exposed_length,
                     Assumptions& assumed) {
  ShellSide shell;
  shell.shell_type = d.shell_type;
  shell.inside_diameter = d.shell_inside_diameter;
  shell.tube_outside_diameter = d.tube_outside_diameter;
  if (d.fins) {
    const Fins& fins = *d.fins;
    shell.tube_outside_diameter = fins.tip_diameter;
    shell.blocked_diameter =
        fins.root_diameter + (fins.tip_diameter - fins.root_diameter) * fins.per_length * fins.thickness;
  }
  shell.pitch = d.tube_pitch;
  shell.layout = d.layout;
  shell.tube_count = d.tube_count;
  shell.baffle_cut = d.baffle_cut;
  shell.central_spacing = baffles.central;
  shell.inlet_spacing = baffles.inlet;
  // The last space of a U-tube bundle reaches into the bends (Thome, Engineering Data Book III, ch. 3).
  shell.outlet_spacing = baffles.outlet + (has_u_tubes(d) ? 0.5 * d.shell_inside_diameter : 0.0);
  shell.baffles = baffles.count;
  shell.effective_length = exposed_length;
  shell.impingement_plate = d.impingement_plate;
  set_clearances(d, baffles, shell, assumed);
  set_seals(d, shell, assumed);
  shell.nozzle_in_area = nozzle_area(d.shell_nozzle_in, "exchanger.shell.nozzle_in", assumed);
  shell.nozzle_out_area = nozzle_area(d.shell_nozzle_out, "exchanger.shell.nozzle_out", assumed);
  return shell;
}

void assume_lengths_and_flow(const Description& d, double thickness, Assumptions& assumed) {
  if (!d.tubesheet_thickness)
    assumed.push_back(
        {.key = "exchanger.tubes.tubesheet_thickness",
         .value = thickness,
         .kind = units::Kind::length,
         .why = fmt::format("a twentieth of the shell diameter, at least {}: common practice, no source",
                            units::mention(20e-3, units::Kind::length)),
         .look_in = "bundle drawing"});
  if (!d.flow_direction && d.tube_passes == 1 && d.shell_type == 'E')
    assumed.push_back({.key = "exchanger.flow_direction",
                       .word = "counter",
                       .why = "one-pass units are nearly always piped in counterflow",
                       .look_in = "piping drawing"});
}

void report_vertical(const Description& d, Findings& findings) {
  if (!d.vertical) return;
  findings.push_back({.id = "geometry.vertical",
                      .text =
                          "the unit stands vertical: forced single-phase flow is rated as in a horizontal "
                          "one. Slow viscous flow feels natural convection, which then helps or hinders "
                          "and is not counted; see that vents and drains keep both sides full",
                      .ground = Ground::method});
}

/// Both bases of the area, since sheets state either.
void report_fins(const Description& d, const Exchanger& exchanger, Findings& findings) {
  if (!d.fins) return;
  const double plain = exchanger.area * pi * d.tube_outside_diameter / outside_per_length(d);
  findings.push_back(
      {.id = "geometry.fins",
       .text =
           fmt::format("area, U and shell-side fouling are on the finned surface, {{value}}. On the plain "
                       "outside diameter the same tubes have {{limit}}, and U is {:.2f} times as large: see "
                       "which one a sheet means. The wall is counted from the fins' root",
                       exchanger.area / plain),
       .ground = Ground::geometry,
       .value = exchanger.area,
       .limit = plain,
       .kind = units::Kind::area,
       .source = "taborek_1983"});
}

}  // namespace

int nearest(double z) {
  return static_cast<int>(std::floor(z + 0.5));
}

double tubesheet_thickness(const Description& d) {
  return d.tubesheet_thickness.value_or(std::max(0.020, 0.05 * d.shell_inside_diameter));
}

double effective_length(const Description& d) {
  return d.tube_length - (has_u_tubes(d) ? 1.0 : 2.0) * tubesheet_thickness(d);
}

Checked<Exchanger> build(const Description& d) {
  Checked<Exchanger> out;
  Exchanger& exchanger = out.value;
  exchanger.as_described = d;
  exchanger.shells_in_series = d.shells_in_series;
  exchanger.shells_in_parallel = d.shells_in_parallel;
  exchanger.tube_side_in_series = d.tube_side_in_series;
  exchanger.flow_direction = d.flow_direction.value_or(FlowDirection::counter);
  exchanger.first_tube_pass = d.first_tube_pass;
  exchanger.tubesheet_thickness = tubesheet_thickness(d);
  exchanger.effective_length = effective_length(d);
  exchanger.tubes_open = d.tube_count - plugged_in_shell(d);
  exchanger.area_per_shell = outside_per_length(d) * exchanger.effective_length * exchanger.tubes_open;
  exchanger.area = exchanger.area_per_shell * d.shells_in_series * d.shells_in_parallel;

  assume_lengths_and_flow(d, exchanger.tubesheet_thickness, out.assumed);
  exchanger.shell_drawn = d.baffles_known;
  if (d.baffles_known) {
    const Baffles baffles = place_baffles(d);
    report_baffles(d, baffles, out);
    exchanger.shell_side = shell_side(d, baffles, exchanger.effective_length, out.assumed);
  } else {
    exchanger.shell_side.shell_type = d.shell_type;
  }
  exchanger.tube_side = tube_side(d, exchanger, out.assumed);
  set_metal(d, exchanger);
  set_wall_path(d, exchanger);
  report_plugging(d, out.findings, out.assumed);
  report_fins(d, exchanger, out.findings);
  report_vertical(d, out.findings);
  return out;
}

Checked<Exchanger> derive(const Description& description) {
  if (const Objections found = objections(description); !found.empty())
    throw std::invalid_argument("this exchanger cannot be: " + found.front().key + ": " + found.front().what);
  if (description.area) return {build_by_area(description), {}, {}};
  return build(description);
}

}  // namespace dutygauge::geometry
