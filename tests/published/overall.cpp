#include "dutygauge/overall.hpp"

#include <string>

#include "published/published.hpp"

namespace published {
namespace {

using namespace dutygauge;

/// Walls of a 19.05 mm tube, printed in 1e-4 m2.K/W to two decimals.
Rows walls() {
  struct Metal {
    const char* name;
    double conductivity, gauge_16, gauge_14, gauge_12;
  };
  const Metal metals[] = {
      {"carbon steel", 60, 0.30e-4, 0.40e-4, 0.55e-4},
      {"90/10 copper-nickel", 45, 0.40e-4, 0.53e-4, 0.73e-4},
      {"titanium grade 2", 21.6, 0.84e-4, 1.10e-4, 1.52e-4},
      {"304", 15.5, 1.17e-4, 1.54e-4, 2.11e-4},
      {"alloy 625", 10, 1.81e-4, 2.39e-4, 3.27e-4},
  };
  Rows rows;
  const auto add = [&](const Metal& metal, const char* wall_text, double wall, double published) {
    rows.push_back({.source = "conduction through a cylinder, evaluated independently",
                    .known = Known::computed,
                    .what = std::string("wall, 19.05 mm x ") + wall_text + ", " + metal.name,
                    .unit = "m2.K/W",
                    .published = published,
                    .ours = overall::wall_resistance({0.01905, 0.01905 - 2.0 * wall}, metal.conductivity),
                    .tolerance = 0.0051e-4,
                    .relative = false,
                    .reason = {}});
  };
  for (const Metal& metal : metals) {
    add(metal, "1.65 mm", 0.00165, metal.gauge_16);
    add(metal, "2.11 mm", 0.00211, metal.gauge_14);
    add(metal, "2.77 mm", 0.00277, metal.gauge_12);
  }
  return rows;
}

/// Kern's remark on the wall of example 7.4: 0.00017 h.ft2.degF/Btu, steel of 26 Btu/h.ft.degF
/// (the conductivity is recalled, the rest seen).
Rows kern_wall() {
  return {{.source = "Kern, Process Heat Transfer (1950), Example 7.4, p. 155",
           .what = "wall, 3/4 in x 18 BWG, steel",
           .unit = "m2.K/W",
           .published = 2.9939e-5,
           .ours = overall::wall_resistance({0.01905, 0.01651}, 45.0),
           .tolerance = 0.03,
           .reason = "printed with two figures"}};
}

/// The five resistances of the first baffle spacing tried.
Rows sinnott_sum() {
  const std::string source = "Sinnott, Chemical Engineering Design, 4th ed. (2005), Example 12.1, p. 663";
  const overall::Tube tube{0.020, 0.016};
  const overall::Resistances ours{.tube_film = overall::on_outside(tube, 1.0 / 3812.0),
                                  .tube_fouling = overall::on_outside(tube, 1.0 / 3000.0),
                                  .wall = overall::wall_resistance(tube, 50.0),
                                  .shell_fouling = 1.0 / 5000.0,
                                  .shell_film = 1.0 / 2740.0};
  const auto term = [&](const char* what, double published, double value) {
    return Row{.source = source,
               .known = Known::computed,
               .what = what,
               .unit = "m2.K/W",
               .published = published,
               .ours = value,
               .tolerance = 0.00051e-4,
               .relative = false,
               .reason = {}};
  };
  return {term("tube-side film on the outside area", 3.279e-4, ours.tube_film),
          term("tube-side fouling on the outside area", 4.167e-4, ours.tube_fouling),
          term("wall", 0.446e-4, ours.wall),
          term("shell-side fouling", 2.000e-4, ours.shell_fouling),
          term("shell-side film", 3.650e-4, ours.shell_film),
          {.source = source,
           .known = Known::memory,
           .what = "U with the printed films, first spacing",
           .unit = "W/m2.K",
           .published = 738.0,
           .ours = 1.0 / ours.sum(),
           .tolerance = 0.001,
           .reason = {}}};
}

Rows rows_of_this_file() {
  Rows all;
  for (const auto& rows : {walls(), kern_wall(), sinnott_sum()})
    all.insert(all.end(), rows.begin(), rows.end());
  return all;
}

const Registration registration{&rows_of_this_file};

}  // namespace
}  // namespace published
