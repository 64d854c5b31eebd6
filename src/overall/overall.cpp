#include "dutygauge/overall.hpp"

#include <cmath>

namespace dutygauge::overall {

double wall_resistance(const Tube& tube, double conductivity) {
  return tube.outside_diameter * std::log(tube.outside_diameter / tube.inside_diameter) /
         (2.0 * conductivity);
}

double fin_efficiency(double film, double conductivity, double thickness, double reach) {
  const double x = reach * std::sqrt(2.0 * film / (conductivity * thickness));
  return x > 1e-6 ? std::tanh(x) / x : 1.0;
}

WallTemperatures wall_temperatures(const Resistances& resistances, double tube_bulk, double shell_bulk,
                                   double flux) {
  WallTemperatures walls;
  walls.tube_wetted = tube_bulk + flux * resistances.tube_film;
  walls.shell_wetted = shell_bulk - flux * resistances.shell_film;
  const double metal_inside = walls.tube_wetted + flux * resistances.tube_fouling;
  const double metal_outside = walls.shell_wetted - flux * resistances.shell_fouling;
  walls.metal_mean = 0.5 * (metal_inside + metal_outside);
  return walls;
}

}  // namespace dutygauge::overall
