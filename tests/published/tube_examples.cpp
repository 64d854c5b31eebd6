#include <cmath>
#include <numbers>
#include <string>

#include "dutygauge/arrangement.hpp"
#include "dutygauge/numerics.hpp"
#include "dutygauge/overall.hpp"
#include "dutygauge/tubeside.hpp"
#include "published/published.hpp"

// Worked examples of one tube. Not compared, since the correlations are not offered: the films by Petukhov
// (Lienhard 7.3), Haaland and Dipprey-Sabersky (Lienhard 7.4, a rough wall), Sieder-Tate (Geankoplis) and
// Dittus-Boelter (Holman) as such. Ours stands beside the printed film where the example is one of ours too.

namespace published {
namespace {

using namespace dutygauge;

/// A tube as an example states it; the length only where the source takes it into account.
struct Tube {
  double inside_diameter, length, velocity;
  fluids::State bulk, wall;
};

tubeside::Film film_of(const Tube& tube) {
  geometry::TubeSide tubes;
  tubes.inside_diameter = tube.inside_diameter;
  tubes.flow_area = std::numbers::pi / 4.0 * tube.inside_diameter * tube.inside_diameter;
  tubes.heated_length = tube.length;
  const double mass_flow = tube.velocity * tube.bulk.density * tubes.flow_area;
  return tubeside::film(tubes, mass_flow, tube.bulk, tube.wall);
}

constexpr double long_tube = 1e6;  // [m] for examples that leave the entrance out

/// Heat capacity [J/kg.K] that belongs to a printed Pr.
double heat_capacity(double prandtl, double conductivity, double viscosity) {
  return prandtl * conductivity / viscosity;
}

Rows lienhard() {
  const double viscosity = 977.0 * 4.07e-7;
  fluids::State water{.temperature = 323,
                      .density = 977,
                      .heat_capacity = heat_capacity(2.47, 0.661, viscosity),
                      .conductivity = 0.661,
                      .viscosity = viscosity};
  fluids::State wall = water;
  wall.viscosity *= 0.000310 / 0.000538;  // printed at the wall and in the bulk
  const double velocity = 21.5 / (977.0 * std::numbers::pi / 4.0 * 0.12 * 0.12);
  const auto film = film_of({0.12, long_tube, velocity, water, wall});
  return {{.source = "Lienhard & Lienhard, A Heat Transfer Textbook, Example 7.3, p. 362",
           .what = "film, water heated in a pipe, Re 574 000",
           .unit = "W/m2.K",
           .published = 8904.1,
           .ours = film.coefficient,
           .tolerance = 0.07,
           .reason = "printed by Petukhov; ours by Gnielinski with its own wall correction"}};
}

Rows geankoplis_air() {
  // Density of air at 206.8 kPa and 477.6 K as an ideal gas; L/D above 60.
  fluids::State air{.temperature = 477.6,
                    .density = 206800.0 / (287.05 * 477.6),
                    .heat_capacity = heat_capacity(0.686, 0.03894, 2.6e-5),
                    .conductivity = 0.03894,
                    .viscosity = 2.6e-5,
                    .phase = fluids::Phase::gas};
  fluids::State wall = air;
  wall.temperature = 488.7, wall.viscosity = 2.64e-5;
  const auto film = film_of({0.0254, long_tube, 7.62, air, wall});
  return {{.source = "Geankoplis, Transport Processes and Unit Operations, Example 4.5-1, p. 240",
           .what = "film, air heated in a tube",
           .unit = "W/m2.K",
           .published = 63.36,
           .ours = film.coefficient,
           .tolerance = 0.3,
           .reason = "printed by Sieder-Tate, which overstates gases by 25 to 30 %"}};
}

Rows geankoplis_water() {
  const std::string source = "Geankoplis, Transport Processes and Unit Operations, Example 4.5-2, p. 241";
  const fluids::State water{.temperature = 273.15 + 65.6,
                            .density = 980,
                            .heat_capacity = heat_capacity(2.72, 0.663, 0.000432),
                            .conductivity = 0.663,
                            .viscosity = 0.000432};
  fluids::State wall = water;
  wall.viscosity = 0.000356;
  const overall::Tube tube{0.0334, 0.0266};
  const overall::Resistances printed{.tube_film = overall::on_outside(tube, 1.0 / 13153.0),
                                     .wall = overall::wall_resistance(tube, 45.0),
                                     .shell_film = 1.0 / 10500.0};
  const double flux = (107.8 - 65.6) / printed.sum();
  const auto walls = overall::wall_temperatures(printed, 273.15 + 65.6, 273.15 + 107.8, flux);
  return {{.source = source,
           .what = "film, water heated by steam",
           .unit = "W/m2.K",
           .published = 13153.0,
           .ours = film_of({0.0266, 0.305, 2.44, water, wall}).coefficient,
           .tolerance = 0.25,
           .reason = "printed by Sieder-Tate without entrance although L/D is 11; ours adds 20 % for it"},
          {.source = source,
           .what = "heat flow with the printed films",
           .unit = "W",
           .published = 4914.0,
           .ours = flux * std::numbers::pi * tube.outside_diameter * 0.305,
           .tolerance = 0.01,
           .reason = "the source takes the arithmetic mean wall area"},
          {.source = source,
           .what = "inner wall temperature with the printed films",
           .unit = "degC",
           .published = 80.26,
           .ours = walls.tube_wetted - 273.15,
           .tolerance = 0.15,  // 1 % of the 14.7 K above the water, as for the heat flow
           .relative = false,
           .reason = "the source takes the arithmetic mean wall area"}};
}

Rows holman() {
  const std::string source = "Holman, Heat Transfer, Example 6.1";
  const fluids::State air{.temperature = 473.15,
                          .density = 202650.0 / (287.0 * 473.15),
                          .heat_capacity = heat_capacity(0.681, 0.0386, 2.57e-5),
                          .conductivity = 0.0386,
                          .viscosity = 2.57e-5,
                          .phase = fluids::Phase::gas};
  fluids::State wall = air;
  wall.temperature += 20.0;
  const auto film = film_of({0.0254, long_tube, 10.0, air, wall});
  return {{.source = source,
           .what = "Re of air in a tube",
           .unit = "-",
           .published = 14749.0,
           .ours = film.reynolds,
           .tolerance = 0.002,
           .reason = {}},
          {.source = source,
           .what = "heat flow per length at 20 K",
           .unit = "W/m",
           .published = 103.5,
           .ours = film.coefficient * std::numbers::pi * 0.0254 * 20.0,
           .tolerance = 0.15,
           .reason = "printed by Dittus-Boelter; Gnielinski is 9 % lower here, its gas factor 2 % more"}};
}

/// Length [m] that heats the oil of the example from 35 to 45 degC, without wall correction as there.
double kreith_length() {
  const double duty = 0.05 * 1964.0 * 10.0, diameter = 0.01;
  const double reynolds = 4.0 * 0.05 / (std::numbers::pi * diameter * 0.21);
  const double difference = arrangement::log_mean(100.0 - 35.0, 100.0 - 45.0);
  const auto short_of_duty = [&](double length) {
    const double film = tubeside::nusselt(reynolds, 2870.0, diameter / length) * 0.144 / diameter;
    return film * std::numbers::pi * diameter * length * difference - duty;
  };
  return numerics::find_root(short_of_duty, {0.1, 100.0}, 1e-9).value_or(0.0);
}

Rows kreith() {
  return {{.source = "Kreith, Manglik & Bohn, Principles of Heat Transfer, 7th ed., Example 6.2, p. 369",
           .known = Known::computed,
           .what = "tube length that heats an oil, exact laminar solution",
           .unit = "m",
           .published = 3.93,
           .ours = kreith_length(),
           // The length goes with Nu^-1.5: 1 % in Nu of the blend and 0.8 % for the developing velocity
           // profile, which the exact solution leaves out.
           .tolerance = 0.03,
           .reason = "the book prints 9.91 m with a developed Nu of 3.66, wrong for an oil: Gz is 220"}};
}

Rows rows_of_this_file() {
  Rows all;
  for (const auto& rows : {lienhard(), geankoplis_air(), geankoplis_water(), holman(), kreith()})
    all.insert(all.end(), rows.begin(), rows.end());
  return all;
}

const Registration registration{&rows_of_this_file};

}  // namespace
}  // namespace published
