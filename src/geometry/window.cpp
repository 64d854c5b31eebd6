#include <algorithm>
#include <cmath>
#include <numbers>

#include "parts.hpp"

namespace dutygauge::geometry {

using std::numbers::pi;

Rows rows(const ShellSide& shell) {
  switch (shell.layout) {
    case 30:
      return {.distance = 0.5 * std::numbers::sqrt3 * shell.pitch, .gap_divisor = shell.pitch};
    case 60:
      return {.distance = 0.5 * shell.pitch, .gap_divisor = 0.5 * std::numbers::sqrt3 * shell.pitch};
    case 45:
      return {.distance = shell.pitch / std::numbers::sqrt2,
              .gap_divisor = shell.pitch / std::numbers::sqrt2};
    default:
      return {.distance = shell.pitch, .gap_divisor = shell.pitch};
  }
}

Window window(const ShellSide& shell) {
  const double diameter = shell.inside_diameter, tube = shell.tube_outside_diameter;
  const double centre_circle = shell.tube_centre_circle(), row_distance = rows(shell).distance;
  const double edge = 1.0 - 2.0 * shell.baffle_cut;  // of the baffle, from the centre, in radii

  Window w{};
  w.angle = 2.0 * std::acos(edge);
  if (shell.tubes_in_window) {
    const double angle = 2.0 * std::acos(std::clamp(diameter / centre_circle * edge, -1.0, 1.0));
    w.tube_fraction = (angle - std::sin(angle)) / (2.0 * pi);
    const double depth = shell.baffle_cut * diameter - 0.5 * (diameter - centre_circle);
    w.rows = std::max(0.0, 0.8 / row_distance * depth);
  }
  w.rows_between_tips = diameter / row_distance * edge;
  const double tubes = shell.tube_count * w.tube_fraction;
  w.area = diameter * diameter / 8.0 * (w.angle - std::sin(w.angle)) - tubes * 0.25 * pi * tube * tube;
  w.hydraulic_diameter = 4.0 * w.area / (pi * tube * tubes + 0.5 * diameter * w.angle);
  return w;
}

}  // namespace dutygauge::geometry
