#include "dutygauge/overall.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "support.hpp"

using namespace dutygauge::overall;

namespace {

constexpr Tube tube{0.020, 0.016};

/// An example with both foulings [m2.K/W].
constexpr Resistances some{.tube_film = 3.3e-4,
                           .tube_fouling = 4.2e-4,
                           .wall = 0.45e-4,
                           .shell_fouling = 2e-4,
                           .shell_film = 3.6e-4};

}  // namespace

TEST_CASE("overall: a thin wall is a plane one") {
  for (double wall : {1e-4, 1e-6}) {
    const Tube thin{0.020, 0.020 - 2.0 * wall};
    CHECK(support::relative(wall_resistance(thin, 50.0), wall / 50.0) < 2.0 * wall / 0.020);
  }
}

TEST_CASE("overall: a lined tube is its two layers, the inner one referred to the outside area") {
  const Tube whole{0.020, 0.014}, outer{0.020, 0.016}, inner{0.016, 0.014};
  CHECK(support::relative(wall_resistance(outer, 50.0) + on_outside(outer, wall_resistance(inner, 50.0)),
                          wall_resistance(whole, 50.0)) < 1e-14);
}

TEST_CASE("overall: wall resistance goes with 1/conductivity and rises with the wall's thickness") {
  CHECK(support::relative(wall_resistance(tube, 10.0), 5.0 * wall_resistance(tube, 50.0)) < 1e-14);
  CHECK(wall_resistance({0.020, 0.015}, 50.0) > wall_resistance({0.020, 0.016}, 50.0));
}

TEST_CASE("overall: a film's UA is the same whichever area it is referred to") {
  const double inside_film = 3800.0, length = 4.8;
  const double inside_area = std::numbers::pi * tube.inside_diameter * length;
  const double outside_area = std::numbers::pi * tube.outside_diameter * length;
  CHECK(support::relative(outside_area / on_outside(tube, 1.0 / inside_film), inside_area * inside_film) <
        1e-14);

  // The whole of it, once on the outside and once on the inside area.
  const double outside_film = 1500.0, conductivity = 45.0;
  const Resistances outside{.tube_film = on_outside(tube, 1.0 / inside_film),
                            .wall = wall_resistance(tube, conductivity),
                            .shell_film = 1.0 / outside_film};
  const double ratio = tube.inside_diameter / tube.outside_diameter;
  const double inside_sum = 1.0 / inside_film +
                            tube.inside_diameter * std::log(1.0 / ratio) / (2.0 * conductivity) +
                            ratio / outside_film;
  CHECK(support::relative(outside_area / outside.sum(), inside_area / inside_sum) < 1e-14);
}

TEST_CASE("overall: a further layer just adds its resistance, and U is below either film") {
  CHECK(support::relative(some.sum(), 3.3e-4 + 4.2e-4 + 0.45e-4 + 2e-4 + 3.6e-4) < 1e-14);
  CHECK(support::relative(some.sum() - some.clean_sum(), some.tube_fouling + some.shell_fouling) < 1e-13);
  Resistances more = some;
  more.shell_fouling += 1e-4;
  CHECK(support::relative(more.sum() - some.sum(), 1e-4) < 1e-12);
  CHECK(more.clean_sum() == some.clean_sum());
  CHECK(1.0 / some.clean_sum() < std::min(1.0 / some.shell_film, 1.0 / some.tube_film));
}

TEST_CASE("overall: the walls lie in order between the two streams, whichever is the hot one") {
  for (double shell_bulk : {360.0, 290.0}) {
    const double tube_bulk = 320.0, direction = shell_bulk > tube_bulk ? 1.0 : -1.0;
    const double flux = (shell_bulk - tube_bulk) / some.sum();
    const auto walls = wall_temperatures(some, tube_bulk, shell_bulk, flux);
    CHECK(direction * (walls.tube_wetted - tube_bulk) > 0.0);
    CHECK(direction * (walls.metal_mean - walls.tube_wetted) > 0.0);
    CHECK(direction * (walls.shell_wetted - walls.metal_mean) > 0.0);
    CHECK(direction * (shell_bulk - walls.shell_wetted) > 0.0);
    // What is left between the wetted walls is two deposits and the metal.
    CHECK(support::relative(walls.shell_wetted - walls.tube_wetted,
                            flux * (some.tube_fouling + some.wall + some.shell_fouling)) < 1e-12);
    // The metal's mean is half the wall away from either of its faces.
    CHECK(support::relative(walls.metal_mean - walls.tube_wetted,
                            flux * (some.tube_fouling + 0.5 * some.wall)) < 1e-12);
  }
}

TEST_CASE("overall: without flux each wall has its stream's temperature") {
  const auto walls = wall_temperatures(some, 320.0, 360.0, 0.0);
  CHECK(walls.tube_wetted == 320.0);
  CHECK(walls.shell_wetted == 360.0);
  CHECK(walls.metal_mean == 340.0);
}

TEST_CASE("overall: a wall takes the temperature of the stream with the far better film") {
  Resistances gas_outside = some;
  gas_outside.shell_film = 1.0, gas_outside.tube_film = 1e-6;
  const auto walls = wall_temperatures(gas_outside, 320.0, 420.0, 100.0 / gas_outside.sum());
  CHECK(std::abs(walls.tube_wetted - 320.0) < 1e-3);
  CHECK(walls.shell_wetted - 320.0 < 0.1);
}
