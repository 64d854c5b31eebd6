#include <fmt/core.h>

#include <cmath>
#include <limits>
#include <numbers>

#include "parts.hpp"

namespace dutygauge::geometry {
namespace {

using units::Kind;

std::string length(double si) {
  return units::typed(si, Kind::length);
}

/// A number, its key, and from where it may start.
struct Bound {
  const char* key;
  std::optional<double> value;
  bool zero_allowed;
};

void check_numbers(const Description& d, Objections& out) {
  const Bound bounds[] = {
      {"exchanger.shell.inside_diameter", d.shell_inside_diameter, false},
      {"exchanger.shell.nozzle_in", d.shell_nozzle_in, false},
      {"exchanger.shell.nozzle_out", d.shell_nozzle_out, false},
      {"exchanger.tubes.outside_diameter", d.tube_outside_diameter, false},
      {"exchanger.tubes.wall", d.tube_wall, false},
      {"exchanger.tubes.length", d.tube_length, false},
      {"exchanger.tubes.tubesheet_thickness", d.tubesheet_thickness, true},
      {"exchanger.tubes.pitch", d.tube_pitch, false},
      {"exchanger.tubes.conductivity", d.tube_conductivity, false},
      {"exchanger.tubes.roughness", d.tube_roughness, true},
      {"exchanger.tubes.nozzle_in", d.tube_nozzle_in, false},
      {"exchanger.tubes.nozzle_out", d.tube_nozzle_out, false},
      {"exchanger.baffles.spacing", d.baffle_spacing, false},
      {"exchanger.baffles.inlet_spacing", d.inlet_spacing, false},
      {"exchanger.baffles.outlet_spacing", d.outlet_spacing, false},
      {"exchanger.baffles.thickness", d.baffle_thickness, false},
      {"exchanger.clearances.tube_to_baffle", d.tube_to_baffle, true},
      {"exchanger.clearances.shell_to_baffle", d.shell_to_baffle, true},
      {"exchanger.clearances.bundle_to_shell", d.bundle_to_shell, true},
      {"exchanger.pass_lanes.width", d.pass_lane_width, true},
  };
  for (const Bound& bound : bounds) {
    const double value = bound.value.value_or(1.0);
    if (std::isfinite(value) && (value > 0.0 || (bound.zero_allowed && value == 0.0))) continue;
    out.push_back({bound.key, fmt::format("is {} in SI units", value),
                   bound.zero_allowed ? "zero or more" : "more than zero", "give it as on the drawing"});
  }
}

void check_counts(const Description& d, Objections& out) {
  constexpr int most = 100'000;  // nobody counts further; keeps the arithmetic of counts safe
  const auto at_least = [&](const char* key, int value, int least) {
    if (value < least || value > most)
      out.push_back(
          {key, fmt::format("is {}", value), fmt::format("{} to {}", least, most), "mend the count"});
  };
  at_least("exchanger.shells.in_series", d.shells_in_series, 1);
  at_least("exchanger.shells.in_parallel", d.shells_in_parallel, 1);
  at_least("exchanger.tubes.count", d.tube_count, 1);
  at_least("exchanger.tubes.plugged", d.plugged, 0);
  at_least("exchanger.tubes.passes", d.tube_passes, 1);
  at_least("exchanger.sealing_strip_pairs", d.sealing_strip_pairs.value_or(0), 0);
  at_least("exchanger.pass_lanes.along_flow", d.pass_lanes_along_flow.value_or(0), 0);
  if (d.shell_type != 'X') at_least("exchanger.baffles.count", d.baffle_count.value_or(1), 1);
}

void check_letters(const Description& d, Objections& out) {
  const std::string_view fronts = "ABCDN", shells = "EFGHJX", rears = "LMNPSTUW";
  const auto say = [&](const char* what, char letter, std::string_view known) {
    out.push_back({"exchanger.tema", fmt::format("{} '{}' is not known here", what, letter),
                   fmt::format("one of {}", known),
                   "give the three TEMA letters of front head, shell, rear head"});
  };
  if (fronts.find(d.front_head) == std::string_view::npos) say("front head", d.front_head, fronts);
  if (shells.find(d.shell_type) == std::string_view::npos) say("shell", d.shell_type, shells);
  if (rears.find(d.rear_head) == std::string_view::npos) say("rear head", d.rear_head, rears);
}

void check_passes(const Description& d, Objections& out) {
  if (d.tube_side_in_series && d.shells_in_parallel < 2)
    out.push_back({"exchanger.shells.tube_side", "in_series, but nothing is in parallel",
                   "in_parallel of 2 or more, which only the shell stream shares then",
                   "leave it out where both streams pass the shells in turn: that is in_series"});
  if (has_u_tubes(d) && d.tube_passes % 2 != 0)
    out.push_back({"exchanger.tubes.passes", fmt::format("{} with rear head U", d.tube_passes),
                   "an even number: a U-tube goes there and back", "mend the passes or the rear head"});
  if (has_u_tubes(d) && d.tube_count % 2 != 0)
    out.push_back({"exchanger.tubes.count", fmt::format("{} holes with rear head U", d.tube_count),
                   "an even number: a U-tube has two holes",
                   "count the holes of the tubesheet, or give u_tubes"});
  if (d.flow_direction == FlowDirection::parallel && (d.tube_passes > 1 || d.shell_type != 'E'))
    out.push_back({"exchanger.flow_direction",
                   fmt::format("parallel with {} tube passes in a shell {}", d.tube_passes, d.shell_type),
                   "one tube pass in a shell E",
                   "leave it out: other units are neither parallel nor counter"});
}

void check_tubes(const Description& d, Objections& out) {
  check_wall(d, out);
  if (d.tube_pitch <= d.tube_outside_diameter)
    out.push_back({"exchanger.tubes.pitch",
                   fmt::format("{} leaves no metal between tubes of {}", length(d.tube_pitch),
                               length(d.tube_outside_diameter)),
                   "more than the outside diameter, usually 1.25 times", "check pitch and outside diameter"});
  const double metal = d.tube_pitch - d.tube_outside_diameter;
  if (metal > 0.0 && d.tube_to_baffle.value_or(0.0) >= metal)
    out.push_back({"exchanger.clearances.tube_to_baffle",
                   fmt::format("{} is no less than the {} between two tubes: the holes in the baffles meet",
                               length(*d.tube_to_baffle), length(metal)),
                   "less than the gap between tubes, usually 0.4 to 0.8 mm",
                   "give the hole's diameter less the tube's, and check its unit"});
  if (d.layout != 30 && d.layout != 45 && d.layout != 60 && d.layout != 90)
    out.push_back({"exchanger.tubes.layout", fmt::format("is {}", d.layout), "30, 45, 60 or 90",
                   "give the angle between the rows and the crossflow"});
  if (effective_length(d) <= 0.0)
    out.push_back({d.tubesheet_thickness ? "exchanger.tubes.tubesheet_thickness" : "exchanger.tubes.length",
                   fmt::format("tubesheets of {} leave nothing of a length of {}",
                               length(tubesheet_thickness(d)), length(d.tube_length)),
                   "tubes longer than their tubesheets are thick",
                   "check both; the length is between outer faces"});
  if (d.tube_conductivity) return;
  if (d.tube_material.empty())
    out.push_back({"exchanger.tubes.material", "neither material nor conductivity is given", "one of them",
                   "name the tube material, or give exchanger.tubes.conductivity"});
  else if (!find_material(d.tube_material))
    out.push_back({"exchanger.tubes.material",
                   fmt::format("'{}' is not in the list of materials", d.tube_material),
                   fmt::format("a known name; the nearest is '{}'", nearest_material(d.tube_material)),
                   "take a known name, or give exchanger.tubes.conductivity"});
}

/// Room for the bundle: the shell, its gap, and the tubes in it.
void check_fit(const Description& d, Objections& out) {
  const double shell = d.shell_inside_diameter, gap = d.bundle_to_shell.value_or(0.0);
  if (d.tube_outside_diameter >= shell) {
    out.push_back({"exchanger.tubes.outside_diameter",
                   fmt::format("a tube of {} does not go into a shell of {}", length(d.tube_outside_diameter),
                               length(shell)),
                   "less than the shell's inside diameter", "check both diameters"});
    return;
  }
  if (gap + d.tube_outside_diameter >= shell)
    out.push_back({"exchanger.clearances.bundle_to_shell",
                   fmt::format("{} leaves no bundle in a shell of {}", length(gap), length(shell)),
                   "much less than the shell's inside diameter", "give the diametral gap D_s - D_otl"});
  const double lanes =
      d.pass_lanes_along_flow.value_or(0) * d.pass_lane_width.value_or(d.tube_outside_diameter);
  if (lanes >= shell)
    out.push_back(
        {"exchanger.pass_lanes.along_flow",
         fmt::format("lanes of {} together do not fit into a shell of {}", length(lanes), length(shell)),
         "a few lanes, each about as wide as a tube", "count the open lanes parallel to the crossflow"});
  // A pitch cell may reach half a ligament beyond the outermost tube; 15 % more spares every real layout.
  const double cell =
      (d.layout == 45 || d.layout == 90 ? 1.0 : 0.5 * std::numbers::sqrt3) * d.tube_pitch * d.tube_pitch;
  const double reach = shell - gap + d.tube_pitch - d.tube_outside_diameter;
  const double room = 1.15 * 0.25 * std::numbers::pi * reach * reach;
  if (d.tube_count > 1 && d.tube_count * cell > room)
    out.push_back({"exchanger.tubes.count",
                   fmt::format("{} tubes at a pitch of {} do not fit into a shell of {}", d.tube_count,
                               length(d.tube_pitch), length(shell)),
                   fmt::format("at most about {:.0f}", room / 1.15 / cell),
                   "check count, pitch, layout and shell diameter"});
}

void check_nozzles(const Description& d, Objections& out) {
  const double shell = d.shell_inside_diameter;
  for (const auto& [key, bore] : {std::pair{"exchanger.shell.nozzle_in", d.shell_nozzle_in},
                                  std::pair{"exchanger.shell.nozzle_out", d.shell_nozzle_out},
                                  std::pair{"exchanger.tubes.nozzle_in", d.tube_nozzle_in},
                                  std::pair{"exchanger.tubes.nozzle_out", d.tube_nozzle_out}})
    if (bore && *bore > shell)
      out.push_back({key,
                     fmt::format("a bore of {} is wider than the shell of {}", length(*bore), length(shell)),
                     "less than the shell's inside diameter", "check the nozzle and the shell"});
}

void check_baffle_data(const Description& d, Objections& out) {
  if (!(d.baffle_cut > 0.0 && d.baffle_cut < 0.5))
    out.push_back({"exchanger.baffles.cut", fmt::format("is {:.4g} of the shell diameter", d.baffle_cut),
                   "more than 0 and less than 0.5",
                   "give the window height over the shell's inside diameter"});
  if (!d.baffle_spacing && !d.baffle_count) {
    out.push_back({"exchanger.baffles.spacing", "neither spacing nor count of the baffles is given",
                   "spacing or count, with or without end spacings",
                   "take either from the bundle drawing; photographs of the bundle show the count"});
    return;
  }
  const int runs = runs_along(d.shell_type);
  if (d.baffle_count && *d.baffle_count % runs != 0)
    out.push_back({"exchanger.baffles.count",
                   fmt::format("{} baffles cannot be shared by the {} runs of a shell {}", *d.baffle_count,
                               runs, d.shell_type),
                   fmt::format("a multiple of {}", runs), "count the baffles along the whole shell"});
}

/// Whether the baffles stand inside their run.
void check_baffle_room(const Description& d, Objections& out) {
  const double run = run_length(d);
  const auto too_long = [&](const char* key, std::string what) {
    out.push_back({key, std::move(what), fmt::format("all within the {} of one baffled run", length(run)),
                   "check spacings, count and tube length against the bundle drawing"});
  };
  const double spacing = d.baffle_spacing.value_or(run);
  if (spacing > run)
    return too_long("exchanger.baffles.spacing", fmt::format("{} is longer than the run", length(spacing)));
  if (run > 1000.0 * spacing)
    return too_long("exchanger.baffles.spacing",
                    fmt::format("{} makes more than a thousand baffles", length(spacing)));
  if (d.baffle_thickness && *d.baffle_thickness >= spacing)
    return too_long("exchanger.baffles.thickness",
                    fmt::format("{} fills the whole spacing", length(*d.baffle_thickness)));
  const double ends = d.inlet_spacing.value_or(0.0) + d.outlet_spacing.value_or(0.0);
  const char* end_key =
      d.inlet_spacing ? "exchanger.baffles.inlet_spacing" : "exchanger.baffles.outlet_spacing";
  // 2 % is what a drawing's roundings are allowed before the closure is remarked on.
  if (ends > 1.02 * run)
    return too_long(end_key, fmt::format("end spacings of {} leave no room", length(ends)));
  const Baffles baffles = place_baffles(d);
  if ((baffles.count - 1) * baffles.central >= run)
    return too_long("exchanger.baffles.count", fmt::format("{} baffles at {} need more than the run has",
                                                           baffles.count, length(baffles.central)));
  if (baffles.central <= 0.0 || baffles.inlet <= 0.0 || baffles.outlet <= 0.0)
    too_long(d.inlet_spacing || d.outlet_spacing ? end_key : "exchanger.baffles.count",
             fmt::format("the {} baffles of a run leave no room for one of its spacings", baffles.count));
}

/// Needs everything else to be in order.
void check_window(const Description& d, Objections& out) {
  const ShellSide shell = build(d).value.shell_side;
  if (shell.tube_centre_circle() <= 0.0)
    out.push_back({"exchanger.clearances.bundle_to_shell",
                   fmt::format("the {} usual for rear head {} leave no bundle in this shell",
                               length(shell.bundle_to_shell), d.rear_head),
                   "a bundle of at least one tube",
                   "give the diametral gap D_s - D_otl, or check the rear head"});
  else if (d.shell_type != 'X' && window(shell).area <= 0.0)
    out.push_back(
        {"exchanger.baffles.cut",
         fmt::format("the tubes in the window of a cut of {:.3g} % fill it: no area is left for the flow",
                     100.0 * d.baffle_cut),
         "an open window", "check cut, tube count, outside diameter and shell diameter"});
}

}  // namespace

Objections objections(const Description& description) {
  if (description.area) return objections_to_area(description);
  Objections out;
  check_numbers(description, out);
  check_counts(description, out);
  check_letters(description, out);
  if (!out.empty()) return out;
  check_plugging(description, out);
  check_passes(description, out);
  check_tubes(description, out);
  check_fit(description, out);
  check_nozzles(description, out);
  if (description.shell_type != 'X' && description.baffles_known) {
    const std::size_t before = out.size();
    check_baffle_data(description, out);
    if (out.size() == before && effective_length(description) > 0.0) check_baffle_room(description, out);
  }
  if (out.empty() && description.baffles_known) check_window(description, out);
  return out;
}

}  // namespace dutygauge::geometry
