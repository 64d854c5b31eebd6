#include "dutygauge/shellside.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <random>

#include "drawing.hpp"
#include "support.hpp"

using namespace dutygauge;
using namespace dutygauge::shellside;
using drawing::shell_side;
using std::numbers::pi;
using support::relative;

namespace {

fluids::State liquid(double viscosity) {
  return {.temperature = 330,
          .density = 900,
          .heat_capacity = 2000,
          .conductivity = 0.13,
          .viscosity = viscosity};
}

Bundle bell(const geometry::ShellSide& s) {
  return prepare(s, Method::bell_delaware);
}

/// Film and drop at a Reynolds number, by the flow that gives it.
struct At {
  Film film;
  PressureDrop drop;
};
At at(const Bundle& bundle, double reynolds) {
  const fluids::State state = liquid(0.02);
  const double flow = reynolds * state.viscosity / bundle.drawing.tube_outside_diameter *
                      bundle.centreline_area / bundle.flow_share;
  return {film(bundle, flow, state, state), pressure_drop(bundle, flow, state, state)};
}

double h(const geometry::ShellSide& s, double reynolds = 4e4) {
  return at(bell(s), reynolds).film.coefficient;
}

bool has(const Findings& findings, const std::string& id) {
  return std::ranges::find(findings, id, &Finding::id) != findings.end();
}

/// Any sound drawing: layouts, pitches, cuts, ends, gaps, strips.
geometry::ShellSide random_shell(std::mt19937& engine) {
  const auto between = [&](double low, double high) {
    return std::uniform_real_distribution<double>(low, high)(engine);
  };
  geometry::ShellSide s = shell_side();
  const int layouts[] = {30, 45, 60, 90};
  s.layout = layouts[std::uniform_int_distribution<int>(0, 3)(engine)];
  s.pitch = s.tube_outside_diameter * between(1.25, 1.5);
  s.tube_count = static_cast<int>(0.7 * 0.25 * pi * 0.55 * 0.55 / (s.pitch * s.pitch));
  s.baffle_cut = between(0.16, 0.40);
  s.central_spacing = between(0.2, 1.0) * s.inside_diameter;
  s.inlet_spacing = s.central_spacing * between(1.0, 2.0);
  s.outlet_spacing = s.central_spacing * between(1.0, 2.0);
  s.baffles = std::uniform_int_distribution<int>(1, 30)(engine);
  s.tube_to_baffle = between(0.3e-3, 0.9e-3);
  s.shell_to_baffle = between(2e-3, 6e-3);
  s.bundle_to_shell = between(0.01, 0.06);
  s.sealing_strip_pairs = std::uniform_int_distribution<int>(0, 3)(engine);
  s.pass_lane_half_width = between(0.0, 0.02);
  return s;
}

}  // namespace

TEST_CASE("shellside: areas and factors follow the drawing") {
  const Bundle b = bell(shell_side());
  const double centres = 0.59 - 0.0185 - 0.01905;
  CHECK(relative(b.centreline_area, 0.25 * (0.0185 + centres / 0.02381 * (0.02381 - 0.01905))) < 1e-12);
  CHECK(relative(b.bypass_area_ratio, 0.25 * (0.0185 + 0.0095) / b.centreline_area) < 1e-12);
  const double holes =
      0.25 * pi * (0.019844 * 0.019844 - 0.01905 * 0.01905) * 430 * (1.0 - b.window_tube_fraction);
  const double rim = 0.59 * 4.8e-3 / 2 * (pi - std::acos(0.5));  // half the angle of a 25 % cut: acos(1 - 2c)
  CHECK(relative(b.leakage_area_ratio, (holes + rim) / b.centreline_area) < 1e-12);
  CHECK(relative(b.shell_leakage_share, rim / (holes + rim)) < 1e-12);
  CHECK(relative(b.rows_between_tips, 0.59 / (0.02381 * std::sqrt(3.0) / 2) * 0.5) < 1e-12);
}

TEST_CASE("shellside: neither film nor drop steps at any Reynolds border") {
  // Borders of j, f, the constant sets and J_r, and the ends of the go-overs between them.
  const double borders[] = {8, 10, 12.5, 20, 50, 80, 100, 125, 200, 800, 1e3, 1250, 8000, 1e4, 12500, 1e5};
  std::mt19937 engine(7);
  for (int i = 0; i < 200; ++i) {
    const Bundle b = bell(random_shell(engine));
    for (const double border : borders) {
      CAPTURE(border);
      const At below = at(b, border * (1 - 1e-9)), above = at(b, border * (1 + 1e-9));
      CHECK(relative(above.film.coefficient, below.film.coefficient) < 1e-7);
      CHECK(relative(above.drop.total(), below.drop.total()) < 1e-7);
    }
  }
}

TEST_CASE("shellside: the film rises with the flow from Re 10 to 10 000") {
  std::mt19937 engine(11);
  for (int i = 0; i < 200; ++i) {
    const Bundle b = bell(random_shell(engine));
    double last = 0;
    for (double re = 10; re < 1e4; re *= 1.02) {
      CAPTURE(re);
      CAPTURE(b.drawing.layout);
      const double now = at(b, re).film.coefficient;
      CHECK(now > last);
      last = now;
    }
  }
}

TEST_CASE("shellside: more leakage, more bypass or longer ends mean less film and less drop") {
  const double film_drawn = h(shell_side()), drop_drawn = at(bell(shell_side()), 4e4).drop.total();
  using Change = void (*)(geometry::ShellSide&);
  const Change changes[] = {
      [](geometry::ShellSide& s) { s.tube_to_baffle *= 1.5; },
      [](geometry::ShellSide& s) { s.shell_to_baffle *= 1.5; },
      [](geometry::ShellSide& s) { s.pass_lane_half_width *= 2; },
      [](geometry::ShellSide& s) { s.sealing_strip_pairs = 0; },
      [](geometry::ShellSide& s) { s.inlet_spacing *= 1.5; },
  };
  for (const Change change : changes) {
    geometry::ShellSide s = shell_side();
    change(s);
    CHECK(h(s) < film_drawn);
    CHECK(at(bell(s), 4e4).drop.total() < drop_drawn);
  }
}

TEST_CASE("shellside: clearances, strips and cut count for as much as an independent program says") {
  // Water at Re 44 300 in this shell, flow held; film and drop in whole per cent, so half a per cent is
  // allowed.
  struct Row {
    const char* what;
    void (*change)(geometry::ShellSide&);
    double film, drop;
  };
  const Row rows[] = {
      {"tube holes halved", [](geometry::ShellSide& s) { s.tube_to_baffle = 0.397e-3; }, 12, 11},
      {"shell gap halved", [](geometry::ShellSide& s) { s.shell_to_baffle = 2.4e-3; }, 9, 16},
      {"both halved", [](geometry::ShellSide& s) { s.tube_to_baffle = 0.397e-3, s.shell_to_baffle = 2.4e-3; },
       24, 33},
      {"both doubled",
       [](geometry::ShellSide& s) { s.tube_to_baffle = 1.588e-3, s.shell_to_baffle = 9.6e-3; }, -27, -35},
      {"no strips", [](geometry::ShellSide& s) { s.sealing_strip_pairs = 0; }, -16, -20},
      {"cut 20 %", [](geometry::ShellSide& s) { s.baffle_cut = 0.20; }, 4, 11},
      {"cut 30 %", [](geometry::ShellSide& s) { s.baffle_cut = 0.30; }, -5, -9},
      {"tube holes closed", [](geometry::ShellSide& s) { s.tube_to_baffle = 0.0; }, 29, 8},
  };
  const fluids::State water{
      .temperature = 300, .density = 995, .heat_capacity = 4180, .conductivity = 0.615, .viscosity = 0.8e-3};
  const Bundle drawn = bell(shell_side());
  const double film_drawn = film(drawn, 60, water, water).coefficient;
  const double drop_drawn = pressure_drop(drawn, 60, water, water).total();
  for (const Row& row : rows) {
    const std::string what = row.what;
    CAPTURE(what);
    geometry::ShellSide s = shell_side();
    row.change(s);
    const Bundle changed = bell(s);
    CHECK(std::abs(100 * (film(changed, 60, water, water).coefficient / film_drawn - 1) - row.film) <= 0.51);
    CHECK(std::abs(100 * (pressure_drop(changed, 60, water, water).total() / drop_drawn - 1) - row.drop) <=
          0.51);
  }
}

TEST_CASE("shellside: a bundle without any leakage or bypass keeps its whole crossflow") {
  geometry::ShellSide s = shell_side();
  s.tube_to_baffle = s.shell_to_baffle = 0.0;
  s.sealing_strip_pairs = 100;
  s.inlet_spacing = s.outlet_spacing = s.central_spacing;
  const Bundle b = bell(s);
  CHECK(b.j_leakage == 1.0);
  CHECK(b.r_leakage == 1.0);
  for (const Bundle::Constants& set : {b.laminar, b.turbulent}) {
    CHECK(set.j_bypass == 1.0);
    CHECK(set.r_bypass == 1.0);
    CHECK(relative(set.j_spacing, 1.0) < 1e-12);
    CHECK(relative(set.r_ends, 2.0) < 1e-12);
  }
}

TEST_CASE("shellside: 60 deg takes the constants of 30 deg and its own rows and gaps") {
  for (const double re : {5.0, 50.0, 500.0, 5e3, 5e4}) {
    CHECK(colburn_factor(ideal_bank(60, 1.3), re) == colburn_factor(ideal_bank(30, 1.3), re));
    CHECK(bank_friction(ideal_bank(60, 1.3), re) == bank_friction(ideal_bank(30, 1.3), re));
  }
  geometry::ShellSide s = shell_side();
  s.layout = 60;
  CHECK(bell(s).centreline_area > bell(shell_side()).centreline_area);
  CHECK(relative(bell(s).rows_between_tips, bell(shell_side()).rows_between_tips * std::sqrt(3.0)) < 1e-12);
}

TEST_CASE("shellside: 45 deg joins its neighbours at Re 10 and 100") {
  // With the printed a1 = 0.498 the steps would be -67 % and +200 %.
  const IdealBank bank = ideal_bank(45, 1.25);
  CHECK(relative(colburn_factor(bank, 12.6), colburn_factor(bank, 7.9)) < 0.35);
  CHECK(relative(colburn_factor(bank, 126), colburn_factor(bank, 79)) < 0.35);
  // The slope between them is that of the rows: j falls by Re^-0.65 or so.
  const double slope = std::log(colburn_factor(bank, 100) / colburn_factor(bank, 10)) / std::log(10.0);
  CHECK(std::abs(slope + 0.66) < 0.03);
}

TEST_CASE("shellside: laminar rows cost film, within 0.4 and 1") {
  geometry::ShellSide s = shell_side();
  const Bundle b = bell(s);
  const double rows = (b.rows_between_tips + b.rows_in_window) * 17;
  CHECK(relative(at(b, 15).film.j_laminar, std::pow(10 / rows, 0.18)) < 1e-12);
  CHECK(relative(at(b, 60).film.j_laminar, 0.5 * (1 + std::pow(10 / rows, 0.18))) < 1e-12);
  CHECK(at(b, 100).film.j_laminar == 1.0);
  s.baffles = 1000;
  CHECK(at(bell(s), 15).film.j_laminar == 0.4);
  s = shell_side();
  s.pitch = 0.2, s.baffles = 1;
  CHECK(at(bell(s), 15).film.j_laminar == 1.0);
}

TEST_CASE("shellside: the wall viscosity moves film and bank friction but not the windows") {
  const Bundle b = bell(shell_side());
  const fluids::State state = liquid(0.001), cold = liquid(0.004);
  const Film plain = film(b, 30, state, state), cooled = film(b, 30, state, cold);
  CHECK(relative(cooled.coefficient / plain.coefficient, std::pow(0.25, 0.14)) < 1e-12);
  CHECK(cooled.ideal == plain.ideal);
  const PressureDrop even = pressure_drop(b, 30, state, state), thick = pressure_drop(b, 30, state, cold);
  CHECK(relative(thick.crossflow / even.crossflow, std::pow(4.0, 0.14)) < 1e-12);
  CHECK(relative(thick.ends / even.ends, std::pow(4.0, 0.14)) < 1e-12);
  CHECK(thick.window == even.window);
}

TEST_CASE("shellside: a heated gas loses film by its temperatures, a cooled one nothing, the drop nothing") {
  const Bundle b = bell(shell_side());
  fluids::State gas{.temperature = 320,
                    .density = 5,
                    .heat_capacity = 1010,
                    .conductivity = 0.027,
                    .viscosity = 19e-6,
                    .phase = fluids::Phase::gas};
  fluids::State wall = gas;
  const Film even = film(b, 3, gas, wall);
  const PressureDrop drop = pressure_drop(b, 3, gas, wall);
  wall.temperature = 400;
  wall.viscosity = 23e-6;
  CHECK(relative(film(b, 3, gas, wall).coefficient, even.coefficient * std::pow(0.8, 0.25)) < 1e-12);
  CHECK(pressure_drop(b, 3, gas, wall).total() == drop.total());
  wall.temperature = 290;
  CHECK(film(b, 3, gas, wall).coefficient == even.coefficient);
}

TEST_CASE("shellside: without flow there is a film and no drop") {
  const fluids::State state = liquid(0.001);
  for (const Method method : {Method::bell_delaware, Method::kern}) {
    const Bundle b = prepare(shell_side(), method);
    for (const double flow : {0.0, -1.0, 1e-30}) {
      const Film still = film(b, flow, state, state);
      CHECK(std::isfinite(still.coefficient));
      CHECK(still.coefficient > 0.0);
      CHECK(still.reynolds < 1e-20);
      CHECK(std::isfinite(pressure_drop(b, flow, state, state).total()));
    }
    CHECK(pressure_drop(b, 0.0, state, state).total() == 0.0);
  }
}

TEST_CASE("shellside: one baffle has two ends and one window, no inner crossflow") {
  geometry::ShellSide s = shell_side();
  s.baffles = 1;
  for (const double re : {20.0, 90.0, 5e3}) {
    const PressureDrop drop = at(bell(s), re).drop;
    CHECK(drop.crossflow == 0.0);
    CHECK(drop.window > 0.0);
    CHECK(drop.ends > 0.0);
    CHECK(std::isfinite(at(bell(s), re).film.coefficient));
  }
}

TEST_CASE("shellside: without tubes in the windows J_c is 1 and a turn costs two heads") {
  geometry::ShellSide s = shell_side();
  s.tubes_in_window = false;
  s.baffle_cut = 0.18;
  const Bundle b = bell(s);
  CHECK(b.j_cut == 1.0);
  CHECK(b.rows_in_window == 0.0);
  const double segment = 0.59 * 0.59 / 8 * (2 * std::acos(0.64) - std::sin(2 * std::acos(0.64)));
  CHECK(relative(b.window_area, segment) < 1e-12);
  const At flow = at(b, 4e4);
  const double window_flux = flow.film.mass_flux * std::sqrt(b.centreline_area / segment);
  CHECK(relative(flow.drop.window, 16 * window_flux * window_flux / 900 * b.r_leakage) < 1e-12);
  CHECK(has(check_bundle(b), "shellside.no_tubes_in_window"));
  CHECK(!has(check_bundle(bell(shell_side())), "shellside.no_tubes_in_window"));
}
