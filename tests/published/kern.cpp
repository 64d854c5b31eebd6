#include <numbers>
#include <string>

#include "published/example.hpp"
#include "published/published.hpp"

// Kern's rating examples: what the tube side, the resistances and the arrangement make of them. The F he
// reads from charts stand with the arrangement's rows. Not compared here: shell-side films and drops,
// Sieder-Tate's 84.6 W/m2.K as such and four velocity heads a pass, which are not offered: his drops are
// compared by their friction alone.

namespace published {
namespace {

using namespace example;

/// What is printed of an example of Kern's and how well it must be met. 0: not printed.
struct KernExample {
  const char* source;
  Bundle bundle;
  InTubes tubes;
  Known known;                  // of film and friction
  Known clean_known;            // of the clean U and its films
  double film, film_tolerance;  // [W/m2.K] inside
  const char* film_reason;
  double friction;  // [Pa] of all shells
  int shells;
  double area;                                                            // [m2] of one shell
  double film_on_outside, shell_film, u_clean;                            // [W/m2.K]
  Terminals terminals;                                                    // [degC]
  arrangement::Arrangement arrangement;                                   // of Kern's chart
  double log_mean, log_mean_tolerance, duty, u_dirty, u_dirty_tolerance;  // [K], [W], [W/m2.K]
};

constexpr const char* j_chart = "Kern's jH chart lies 15 to 20 % below Gnielinski";
constexpr const char* water_chart =
    "Kern's cooling-water chart lies 10 to 25 % below Gnielinski with entrance";

const KernExample kern_examples[] = {
    {.source = "Kern, Process Heat Transfer (1950), Example 7.3, p. 151",
     .bundle = {0.53975, 0.0254, 0.020574, 4.8768, 0, 158, 4, 0.03175, 90, 0.127},
     .tubes = {18.774, 830.0, 0.0036014, 2051.5, 0.13327, 0.0015006},
     .known = Known::memory,
     .clean_known = Known::memory,
     .film = 848.23,
     .film_tolerance = 0.25,
     .film_reason = "just above transition (Re 8200), where correlations disagree most",
     .friction = 43437.0,
     .shells = 1,
     .area = 61.486,
     .film_on_outside = 687.07,
     .shell_film = 919.88,
     .u_clean = 393.5,
     .terminals = {198.889, 93.333, 37.778, 76.667},
     .arrangement = {.tube_passes = 2},
     .log_mean = 84.556,
     .log_mean_tolerance = 0.002,
     .duty = 0,
     .u_dirty = 0,
     .u_dirty_tolerance = 0},
    {.source = "Kern, Process Heat Transfer (1950), Example 7.4, p. 155",
     .bundle = {0.38735, 0.01905, 0.01651, 4.8768, 0, 160, 2, 0.023813, 30, 0.3048},
     .tubes = {35.279, 1000.0, 0.00092035, 4186.8, 0.60922, 0.00092035},
     .known = Known::seen,
     .clean_known = Known::memory,
     .film = 7589.0,
     .film_tolerance = 0.3,
     .film_reason = water_chart,
     .friction = 33784.0,
     .shells = 1,
     .area = 46.698,
     .film_on_outside = 6575.4,
     .shell_film = 5735.0,
     .u_clean = 3049.2,
     .terminals = {33.889, 29.444, 23.889, 26.667},
     .arrangement = {.tube_passes = 2},
     .log_mean = 6.3522,
     .log_mean_tolerance = 0.002,
     .duty = 410300.0,
     .u_dirty = 1463.9,
     .u_dirty_tolerance = 0.01},
    {.source = "Kern, Process Heat Transfer (1950), Example 11.1, first trial, p. 231",
     .bundle = {0.38735, 0.01905, 0.015748, 4.8768, 0, 124, 2, 0.0254, 90, 0.0889},
     .tubes = {12.978, 720.0, 0.00054153, 2344.6, 0.13811, 0.00054153},
     .known = Known::seen,
     .clean_known = Known::seen,
     .film = 1868.1,
     .film_tolerance = 0.25,
     .film_reason = j_chart,
     .friction = 14479.0,
     .shells = 1,
     .area = 36.191,
     .film_on_outside = 1544.5,
     .shell_film = 738.17,
     .u_clean = 500.82,
     .terminals = {171.111, 115.556, 93.333, 110.0},
     .arrangement = {.tube_passes = 2},
     .log_mean = 0,
     .log_mean_tolerance = 0,
     .duty = 0,
     .u_dirty = 0,
     .u_dirty_tolerance = 0},
    // Two 2-4 shells in series: by the chart as four 1-2 shells.
    {.source = "Kern, Process Heat Transfer (1950), Example 11.2, first trial, p. 235",
     .bundle = {0.7874, 0.01905, 0.015748, 4.8768, 0, 580, 6, 0.0254, 90, 0.3048},
     .tubes = {10.639, 770.0, 0.0008805, 2344.6, 0.12617, 0.0008805},
     .known = Known::seen,
     .clean_known = Known::seen,
     .film = 741.58,
     .film_tolerance = 0.25,
     .film_reason = j_chart,
     .friction = 29647.0,
     .shells = 2,
     .area = 169.28,
     .film_on_outside = 613.25,
     .shell_film = 687.07,
     .u_clean = 324.23,
     .terminals = {37.778, 146.111, 176.667, 71.111},
     .arrangement = {.tube_passes = 2, .shells_in_series = 4},
     .log_mean = 0,
     .log_mean_tolerance = 0,
     .duty = 2623000.0,
     .u_dirty = 277.1,
     .u_dirty_tolerance = 0.02},
    {.source = "Kern, Process Heat Transfer (1950), Example 11.3, first trial, p. 238",
     .bundle = {0.48895, 0.0254, 0.021184, 4.8768, 0, 140, 4, 0.03175, 30, 0.1778},
     .tubes = {19.404, 1000.0, 0.00071928, 4186.8, 0.62306, 0.00071928},
     .known = Known::seen,
     .clean_known = Known::seen,
     .film = 6618.6,
     .film_tolerance = 0.3,
     .film_reason = water_chart,
     .friction = 29647.0,
     .shells = 1,
     .area = 54.481,
     .film_on_outside = 5519.3,
     .shell_film = 4081.3,
     .u_clean = 2346.3,
     .terminals = {87.778, 48.889, 26.667, 48.889},
     .arrangement = {.tube_passes = 2},
     .log_mean = 0,
     .log_mean_tolerance = 0,
     .duty = 1805300.0,
     .u_dirty = 1363.9,
     .u_dirty_tolerance = 0.02},
};

Rows rows_of(const KernExample& kern) {
  const auto built = exchanger(kern.bundle);
  const double log_mean = kern.terminals.log_mean();
  Rows rows = {
      {kern.source, kern.known, "tube-side film", "W/m2.K", kern.film,
       film(built.tube_side, kern.tubes).coefficient, kern.film_tolerance, true, kern.film_reason},
      {kern.source, kern.known, "tube-side friction, all shells", "Pa", kern.friction,
       drop(built.tube_side, kern.tubes).times(kern.shells).friction, 0.3, true,
       "Kern's friction chart is for commercial pipe; ours takes drawn steel tube, 0.015 mm rough"},
      {kern.source,
       Known::computed,
       "surface of one shell",
       "m2",
       kern.area,
       built.area_per_shell,
       0.002,
       true,
       {}},
      {kern.source,
       kern.clean_known,
       "clean U with the printed films",
       "W/m2.K",
       kern.u_clean,
       u_of(kern.film_on_outside, kern.shell_film),
       0.01,
       true,
       {}},
  };
  if (kern.log_mean > 0.0)
    rows.push_back({kern.source,
                    Known::seen,
                    "log mean temperature difference",
                    "K",
                    kern.log_mean,
                    log_mean,
                    kern.log_mean_tolerance,
                    true,
                    {}});
  if (kern.u_dirty > 0.0)
    rows.push_back(
        {kern.source, Known::seen, "U in service from the duty, with the exact F", "W/m2.K", kern.u_dirty,
         kern.duty /
             (kern.shells * built.area_per_shell * kern.terminals.correction(kern.arrangement) * log_mean),
         kern.u_dirty_tolerance, true, "Kern reads F from his chart"});
  return rows;
}

Rows kern() {
  Rows all;
  for (const KernExample& example : kern_examples) {
    const Rows rows = rows_of(example);
    all.insert(all.end(), rows.begin(), rows.end());
  }
  const KernExample& first = kern_examples[0];
  all.push_back({first.source, Known::memory, "Re in the tubes", "-", 8220.0,
                 film(exchanger(first.bundle).tube_side, first.tubes).reynolds, 0.02, true, "slide rule"});
  all.push_back({kern_examples[2].source,
                 Known::seen,
                 "deposit that makes U clean the U in service",
                 "m2.K/W",
                 0.00044028,
                 1.0 / 410.54 - 1.0 / u_of(1544.5, 738.17),
                 0.02,
                 true,
                 {}});
  return all;
}

/// Crude oil in laminar flow heated by steam: 43 tubes a pass, four times thinner at the wall. Its density,
/// not given, has no effect.
Rows kern_laminar() {
  const char* source = "Kern, Process Heat Transfer (1950), Example 10.1, p. 204";
  geometry::TubeSide tubes;
  tubes.inside_diameter = 0.022098;
  tubes.flow_area = 43.0 * std::numbers::pi / 4.0 * 0.022098 * 0.022098;
  tubes.heated_length = 3.6576;
  const auto ours = film(tubes, {2.016, 830.0, 0.0047952, 2030.6, 0.13413, 0.0011988});
  return {{source, Known::seen, "Re in the tubes", "-", 565.0, ours.reynolds, 0.02, true, "slide rule"},
          {source, Known::seen, "Pr in the tubes", "-", 72.5, ours.prandtl, 0.02, true, "slide rule"},
          {source, Known::seen, "tube-side film, laminar", "W/m2.K", 84.606, ours.coefficient, 0.25, true,
           "printed by Sieder-Tate, 21 % above the exact laminar solution at this Gz of 248"}};
}

Rows rows_of_this_file() {
  Rows all = kern();
  const Rows laminar = kern_laminar();
  all.insert(all.end(), laminar.begin(), laminar.end());
  return all;
}

const Registration registration{&rows_of_this_file};

}  // namespace
}  // namespace published
