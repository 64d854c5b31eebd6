#include <numbers>
#include <string>

#include "published/example.hpp"
#include "published/published.hpp"

// Rating examples of Sinnott, Gavhane and Janna: what the tube side, the resistances and the arrangement make
// of them. The F read from charts stand with the arrangement's rows. Not compared here: shell-side films and
// drops, and films by Dittus-Boelter as such, which is not offered.

namespace published {
namespace {

using namespace example;

Rows sinnott() {
  const char* source = "Sinnott, Chemical Engineering Design, 4th ed. (2005), Example 12.1, p. 663";
  const auto built = exchanger({0.894, 0.020, 0.016, 4.88, 0.025, 918, 2, 0.025, 30, 0.356});
  const InTubes water{68.9, 995.0, 0.0008, 4200.0, 0.59, 0.0008};
  const overall::Tube tube{0.020, 0.016};
  const overall::Resistances printed{.tube_film = overall::on_outside(tube, 1.0 / 3812.0),
                                     .tube_fouling = overall::on_outside(tube, 1.0 / 3000.0),
                                     .wall = overall::wall_resistance(tube, 50.0),
                                     .shell_fouling = 1.0 / 5000.0,
                                     .shell_film = 1.0 / 1573.0};
  const Terminals terminals{95.0, 40.0, 25.0, 40.0};
  const auto ours = film(built.tube_side, water);
  return {
      {source, Known::computed, "log mean temperature difference", "K", 30.786, terminals.log_mean(), 0.002,
       true, "the book rounds it to 31"},
      {source, Known::seen, "surface", "m2", 278.0, built.area, 0.005, true, {}},
      {source, Known::memory, "Re in the tubes", "-", 14925.0, ours.reynolds, 0.005, true, {}},
      {source, Known::memory, "tube-side film", "W/m2.K", 3812.0, ours.coefficient, 0.15, true,
       "read from a chart in the book"},
      {source,
       Known::memory,
       "U with the printed films",
       "W/m2.K",
       615.0,
       1.0 / printed.sum(),
       0.01,
       true,
       {}},
      {source, Known::seen, "tube-side pressure drop", "Pa", 7200.0, drop(built.tube_side, water).total(),
       0.3, true, "the book's chart is for commercial tubes; it counts 2.5 velocity heads a pass"},
  };
}

/// Kern-type checks of the deposit a unit can carry, with the films the book gives or computes.
Rows gavhane() {
  const char* first = "Gavhane, Heat Transfer, Example 5.10, p. 5.44";
  const double film_a = 1050.0 * 0.015 / 0.019;
  const double area = std::numbers::pi * 0.019 * 5.0 * 170;
  const double duty = 2.0139 * 2387.0 * (127.0 - 44.0);
  const double u_dirty = duty / (area * 0.9 * arrangement::log_mean(127.0 - 60.0, 44.0 - 27.0));

  const char* second = "Gavhane, Heat Transfer, Example 5.14, p. 5.55";
  const auto built = exchanger({0.6, 0.019, 0.0148, 4.88, 0, 324, 2, 0.025, 90, 0.23});
  const double film_b = 1109.6 * 0.0148 / 0.019;
  const double u_b =
      37.5 * 1986.0 * (57.0 - 22.0) / (built.area * arrangement::log_mean(147.0 - 57.0, 107.0 - 22.0));
  return {
      {first,
       Known::computed,
       "clean U with its films",
       "W/m2.K",
       316.24,
       u_of(film_a, 511.3),
       0.01,
       true,
       {}},
      {first,
       Known::seen,
       "deposit it can carry",
       "m2.K/W",
       0.00101,
       1.0 / u_dirty - 1.0 / u_of(film_a, 511.3),
       0.02,
       true,
       {}},
      {second, Known::seen, "deposit it can carry, with its films", "m2.K/W", 0.000734,
       1.0 / u_b - 1.0 / u_of(film_b, 783.49), 0.02, true,
       "with the shell film of the misprinted flow area, 0.0353 for 0.0331 m2"},
      {second, Known::computed, "tube-side film", "W/m2.K", 1109.6,
       film(built.tube_side, {37.5, 824.0, 0.0029, 1986.0, 0.136, 0.0029}).coefficient, 0.25, true,
       "by Dittus-Boelter, at Re 6900 below its range"},
  };
}

/// Outlets predicted from a clean U; the effectiveness is read from a chart to two figures.
Rows janna() {
  const char* source = "Janna, Engineering Heat Transfer, 2nd ed. (2000), Examples 9.5 and 9.6, pp. 484, 492";
  const auto built = exchanger({0.43815, 0.01905, 0.016561, 4.8768, 0, 224, 2, 0.023813, 30, 0.3048});
  const InTubes water{18.9, 999.55, 0.0010057, 4181.8, 0.5971, 0.0010057};
  const double tube_rate = 18.9 * 4181.8, shell_rate = 21.42 * 4178.4, r = tube_rate / shell_rate;
  const double p = arrangement::effectiveness({.tube_passes = 2}, r, 1987.4 * built.area / tube_rate);
  const double film_on_outside = film(built.tube_side, water).coefficient * 0.016561 / 0.01905;
  return {
      {source, Known::seen, "surface", "m2", 65.376, built.area, 0.002, true, {}},
      {source, Known::seen, "effectiveness", "-", 0.58, p, 0.03, true, "chart reading; exact 0.563"},
      {source, Known::seen, "tube-side outlet", "degC", 32.833, 18.333 + p * 25.0, 0.04, true,
       "from the effectiveness of the chart"},
      {source, Known::seen, "shell-side outlet", "degC", 30.556, 43.333 - r * p * 25.0, 0.04, true,
       "from the effectiveness of the chart"},
      // Half of U's resistance is the tube film, printed by Dittus-Boelter (25 %).
      {source, Known::seen, "clean U with the book's shell film", "W/m2.K", 1987.4,
       u_of(film_on_outside, 5708.9), 0.15, true, "tube film printed by Dittus-Boelter, wall left out"},
  };
}

Rows rows_of_this_file() {
  Rows all;
  for (const auto& rows : {sinnott(), gavhane(), janna()}) all.insert(all.end(), rows.begin(), rows.end());
  return all;
}

const Registration registration{&rows_of_this_file};

}  // namespace
}  // namespace published
