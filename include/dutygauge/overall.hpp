#pragma once

/// From films to the overall coefficient and the wall temperatures between them.
namespace dutygauge::overall {

/// Series resistances on the OUTSIDE tube area [m2.K/W].
struct Resistances {
  double tube_film = 0, tube_fouling = 0, wall = 0, shell_fouling = 0, shell_film = 0;
  double sum() const { return tube_film + tube_fouling + wall + shell_fouling + shell_film; }
  double clean_sum() const { return tube_film + wall + shell_film; }
};

struct Tube {
  double outside_diameter, inside_diameter;  ///< [m]
};

/// Wall resistance of a plain tube on the outside area [m2.K/W]: D_o ln(D_o/D_i)/(2 k).
double wall_resistance(const Tube& tube, double conductivity);

/// A resistance or 1/film on the inside surface, referred to the outside area.
inline double on_outside(const Tube& tube, double inside_resistance) {
  return inside_resistance * tube.outside_diameter / tube.inside_diameter;
}

/// Efficiency of a low annular fin [-]: tanh(X)/X, X = reach sqrt(2 h/(k t)), with the film
/// [W/m2.K] through any deposit and reach = r_1 (r_2/r_1 - 1)(1 + 0.35 ln(r_2/r_1)) [m].
/// Within 0.9 % of the exact solution for low fins, h 200 to 8000, k 15 to 200.
/// Source: Schmidt, Refrig. Eng. 57, 351 (1949).
double fin_efficiency(double film, double conductivity, double thickness, double reach);

/// Temperatures through the wall at a local flux, outside area.
struct WallTemperatures {
  double tube_wetted, shell_wetted, metal_mean;  ///< [K]
};

/// Temperatures [K] at flux `q` [W/m2], positive from shell to tube side.
WallTemperatures wall_temperatures(const Resistances& resistances, double tube_bulk, double shell_bulk,
                                   double flux);

}  // namespace dutygauge::overall
