#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/units/mention.hpp"
#include "parts.hpp"

namespace dutygauge::geometry {
namespace {

constexpr double inch = 0.0254;

std::string length(double si) {
  return units::mention(si, units::Kind::length);
}

bool is_tight(char rear_head) {
  return rear_head == 'L' || rear_head == 'M' || rear_head == 'N' || rear_head == 'U';
}

/// Longest straight length of tube between two supports [m].
double unsupported_span(const Description& d, const Baffles& baffles) {
  if (d.shell_type == 'X') return baffles.central;
  if (baffles.count == 1) return baffles.inlet + baffles.outlet;
  return std::max({2.0 * baffles.central, baffles.central + baffles.inlet, baffles.central + baffles.outlet});
}

/// TEMA RCB-4.2 (recalled): 1/32 in up to 36 in of span or above 1 1/4 in tubes, else 1/64 in.
double default_tube_to_baffle(double tube_outside_diameter, double span) {
  return span <= 36 * inch || tube_outside_diameter > 0.0318 ? 0.794e-3 : 0.397e-3;
}

/// TEMA RCB-4.3 (recalled in part) by the shell's inside diameter in whole inches.
double default_shell_to_baffle(double shell_diameter) {
  const int nominal = nearest(shell_diameter / inch);
  if (nominal <= 17) return inch / 8;
  if (nominal <= 39) return 3 * inch / 16;
  if (nominal <= 54) return inch / 4;
  if (nominal <= 69) return 5 * inch / 16;
  return nominal <= 84 ? 3 * inch / 8 : 7 * inch / 16;
}

/// Fixed and U: Thome, Engineering Data Book III, ch. 3, after Taborek 1983. S and T: the lines of
/// the chart in Sinnott, Chemical Engineering Design, in the bundle circle D_s - L_bb (recalled).
double default_bundle_to_shell(char rear_head, double shell_diameter) {
  if (rear_head == 'S') return (44.6e-3 + 0.0278 * shell_diameter) / 1.0278;
  if (rear_head == 'T') return (86e-3 + 0.009 * shell_diameter) / 1.009;
  if (rear_head == 'P' || rear_head == 'W') return 38e-3;
  if (shell_diameter < 0.3) return 9.525e-3;
  return shell_diameter <= 1.0 ? 12.7e-3 : 15.875e-3;
}

void assume_bundle_to_shell(const Description& d, double value, Assumptions& assumed) {
  Assumption line{.key = "exchanger.clearances.bundle_to_shell",
                  .value = value,
                  .kind = units::Kind::length,
                  .why = fmt::format("usual for rear head {} in a shell of this size", d.rear_head),
                  .look_in = "bundle drawing"};
  if (is_tight(d.rear_head)) {
    // Two other published rules for the same heads: 12 mm + 0.005 D_s (Taborek 1983, recalled) and
    // 8 mm + 0.010 of the bundle circle (Sinnott's chart, recalled).
    const double other = 12e-3 + 0.005 * d.shell_inside_diameter;
    const double chart = (8e-3 + 0.010 * d.shell_inside_diameter) / 1.010;
    line.low = std::min({value, other, chart});
    line.high = std::max({value, other, chart});
  }
  assumed.push_back(std::move(line));
}

void assume_baffle_clearances(const Description& d, double span, const ShellSide& shell,
                              Assumptions& assumed) {
  if (!d.tube_to_baffle)
    assumed.push_back({.key = "exchanger.clearances.tube_to_baffle",
                       .value = shell.tube_to_baffle,
                       .kind = units::Kind::length,
                       .why = "TEMA RCB-4.2 for a longest unsupported span of " + length(span),
                       .low = 0.397e-3,
                       .high = 0.794e-3,
                       .look_in = "bundle drawing"});
  if (d.shell_to_baffle) return;
  // Closer: Thome, Engineering Data Book III, ch. 3. Wider, for rolled shells: Taborek 1983 (recalled).
  const double size = d.shell_inside_diameter;
  const double closer = size < 0.4 ? 2.0e-3 : 1.6e-3 + 0.004 * size;
  assumed.push_back({.key = "exchanger.clearances.shell_to_baffle",
                     .value = shell.shell_to_baffle,
                     .kind = units::Kind::length,
                     .why = "TEMA RCB-4.3 by the shell's inside diameter",
                     .low = std::min(shell.shell_to_baffle, closer),
                     .high = std::max(shell.shell_to_baffle, 3.1e-3 + 0.004 * size),
                     .look_in = "bundle drawing"});
}

/// Tube rows the bypass stream runs along in one crossing.
double rows_crossed(const ShellSide& shell) {
  return shell.shell_type == 'X' ? shell.tube_centre_circle() / rows(shell).distance
                                 : window(shell).rows_between_tips;
}

void set_strips(const Description& d, ShellSide& shell, Assumptions& assumed) {
  // One pair per 5 to 7 rows, and sealing above a gap of 16 mm, are the refinery rule (API 660, recalled).
  constexpr double sealed_gap = 16e-3;
  const int one_per_five = std::max(1, nearest(rows_crossed(shell) / 5.0));
  const bool narrow = is_tight(d.rear_head) && shell.bundle_to_shell < sealed_gap;
  shell.sealing_strip_pairs = d.sealing_strip_pairs.value_or(narrow ? 0 : one_per_five);
  if (d.sealing_strip_pairs) return;
  assumed.push_back(
      {.key = "exchanger.sealing_strip_pairs",
       .value = static_cast<double>(shell.sealing_strip_pairs),
       .kind = units::Kind::count,
       .why = narrow ? fmt::format("gaps below {} between bundle and shell are usually left unsealed",
                                   length(sealed_gap))
                     : "common rule: a pair for every five rows between the baffle edges",
       .low = 0.0,
       .high = static_cast<double>(one_per_five),
       .look_in = "bundle drawing"});
}

void set_lanes(const Description& d, ShellSide& shell, Assumptions& assumed) {
  const int lanes = d.pass_lanes_along_flow.value_or(0);
  shell.pass_lane_half_width = 0.5 * lanes * d.pass_lane_width.value_or(d.tube_outside_diameter);
  if (shell.shell_type == 'X') return;  // its bypass area has no lanes in it
  if (!d.pass_lanes_along_flow && (d.tube_passes >= 4 || has_u_tubes(d)))
    assumed.push_back({.key = "exchanger.pass_lanes.along_flow",
                       .value = 0.0,
                       .kind = units::Kind::count,
                       .why = "pass lanes taken to lie across the flow or to be blanked; one open lane costs "
                              "about 5 % of the shell film and 10 % of its pressure drop",
                       .low = 0.0,
                       .high = 1.0,
                       .look_in = "tube layout drawing"});
  if (lanes > 0 && !d.pass_lane_width)
    assumed.push_back(
        {.key = "exchanger.pass_lanes.width",
         .value = d.tube_outside_diameter,
         .kind = units::Kind::length,
         .why = fmt::format("one tube diameter; lanes of {} to {} are usual with tubes of {} to {}",
                            length(16e-3), length(19e-3), length(19e-3), length(25e-3)),
         .low = std::min(16e-3, d.tube_outside_diameter),
         .high = std::max(19e-3, d.tube_outside_diameter),
         .look_in = "tube layout drawing"});
}

}  // namespace

double bundle_gap(const Description& d) {
  return d.bundle_to_shell.value_or(default_bundle_to_shell(d.rear_head, d.shell_inside_diameter));
}

void set_clearances(const Description& d, const Baffles& baffles, ShellSide& shell, Assumptions& assumed) {
  const double span = unsupported_span(d, baffles);
  shell.tube_to_baffle = d.tube_to_baffle.value_or(default_tube_to_baffle(d.tube_outside_diameter, span));
  shell.shell_to_baffle = d.shell_to_baffle.value_or(default_shell_to_baffle(d.shell_inside_diameter));
  shell.bundle_to_shell = bundle_gap(d);
  // Nothing leaks through the supports of a pure crossflow shell.
  if (d.shell_type != 'X') assume_baffle_clearances(d, span, shell, assumed);
  if (!d.bundle_to_shell) assume_bundle_to_shell(d, shell.bundle_to_shell, assumed);
}

void set_seals(const Description& d, ShellSide& shell, Assumptions& assumed) {
  set_strips(d, shell, assumed);
  set_lanes(d, shell, assumed);
}

}  // namespace dutygauge::geometry
