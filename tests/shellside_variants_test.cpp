#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include "drawing.hpp"
#include "dutygauge/shellside.hpp"
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

}  // namespace

TEST_CASE("shellside: other shells are E shells with a share of the flow and runs in sequence") {
  const fluids::State state = liquid(0.001);
  struct Row {
    char type;
    double share;
    int runs;
    double area;
  };
  const Bundle e = bell(shell_side());
  for (const Row& row :
       {Row{'F', 2, 2, 0.5}, Row{'G', 1, 2, 0.5}, Row{'J', 0.5, 1, 1}, Row{'H', 0.5, 2, 0.5}}) {
    CAPTURE(row.type);
    geometry::ShellSide s = shell_side();
    s.shell_type = row.type;
    const Bundle b = bell(s);
    CHECK(relative(b.crossflow_area, row.area * e.centreline_area) < 1e-12);
    CHECK(film(b, 30, state, state).coefficient == film(e, 30 * row.share, state, state).coefficient);
    const PressureDrop drop = pressure_drop(b, 30, state, state);
    const PressureDrop as_e = pressure_drop(e, 30 * row.share, state, state);
    CHECK(relative(drop.crossflow, row.runs * as_e.crossflow) < 1e-12);
    CHECK(relative(drop.window, row.runs * as_e.window) < 1e-12);
    CHECK(relative(drop.ends, row.runs * as_e.ends) < 1e-12);
    // The gradient builds up over all runs.
    const double rows = (e.rows_between_tips + e.rows_in_window) * 17 * row.runs;
    CHECK(relative(at(b, 15).film.j_laminar, std::max(0.4, std::pow(10 / rows, 0.18))) < 1e-12);
  }
}

TEST_CASE("shellside: a pure crossflow shell is one bank crossed once") {
  geometry::ShellSide s = shell_side();
  s.shell_type = 'X';
  s.baffles = 0;
  const Bundle b = bell(s);
  const double centres = 0.59 - 0.0185 - 0.01905, row_distance = 0.02381 * std::sqrt(3.0) / 2;
  CHECK(relative(b.crossflow_area, 4.5 * (0.0185 + centres / 0.02381 * (0.02381 - 0.01905))) < 1e-12);
  CHECK(relative(b.bypass_area_ratio, 4.5 * 0.0185 / b.crossflow_area) < 1e-12);
  const At flow = at(b, 4e4);
  CHECK(flow.film.j_cut * flow.film.j_leakage * flow.film.j_spacing * flow.film.j_laminar == 1.0);
  CHECK(at(b, 15).film.j_laminar == 1.0);
  CHECK(relative(flow.film.coefficient, flow.film.ideal * flow.film.j_bypass) < 1e-12);
  const double head = flow.film.mass_flux * flow.film.mass_flux / 900;
  const double bare = 2 * bank_friction(b.bank, flow.film.reynolds) * centres / row_distance * head;
  CHECK(relative(flow.drop.crossflow, bare * b.turbulent.r_bypass) < 1e-12);
  CHECK(flow.drop.window == 0.0);
  CHECK(flow.drop.ends == 0.0);
  CHECK(objections(s, Method::bell_delaware).empty());
  CHECK(objections(s, Method::kern).size() == 1);
  CHECK_THROWS_AS(prepare(s, Method::kern), std::invalid_argument);
}

TEST_CASE("shellside: nozzles cost 1.5 heads in and 0.5 out, a plate one more, shared nozzles a quarter") {
  const fluids::State state = liquid(0.001);
  const double area = 0.02, head = 0.5 * 30.0 * 30.0 / (900 * area * area);
  const auto heads = [&](char type, bool plate, double in, double out,
                         Method method = Method::bell_delaware) {
    geometry::ShellSide s = shell_side();
    s.shell_type = type;
    s.impingement_plate = plate;
    s.nozzle_in_area = in;
    s.nozzle_out_area = out;
    return pressure_drop(prepare(s, method), 30, state, state).nozzles / head;
  };
  CHECK(relative(heads('E', false, area, area), 2.0) < 1e-12);
  CHECK(relative(heads('E', true, area, area), 3.0) < 1e-12);
  CHECK(relative(heads('E', false, area, 0), 1.5) < 1e-12);
  CHECK(relative(heads('E', false, 0, area), 0.5) < 1e-12);
  CHECK(heads('E', true, 0, 0) == 0.0);
  CHECK(relative(heads('G', false, area, area), 2.0) < 1e-12);
  CHECK(relative(heads('J', false, area, area), 1.5 + 0.5 / 4) < 1e-12);
  CHECK(relative(heads('H', false, area, area), 2.0 / 4) < 1e-12);
  CHECK(relative(heads('E', false, area, area, Method::kern), 2.0) < 1e-12);
}

TEST_CASE("shellside: Kern's film has no factors and its drop no parts") {
  const Bundle b = prepare(shell_side(), Method::kern);
  const fluids::State state = liquid(0.001);
  const double diameter =
      4 * (std::sqrt(3.0) / 4 * 0.02381 * 0.02381 - pi * 0.01905 * 0.01905 / 8) / (pi * 0.01905 / 2);
  CHECK(relative(b.kern_equivalent_diameter, diameter) < 1e-12);
  const Film f = film(b, 30, state, state);
  CHECK(f.ideal == 0.0);
  CHECK(f.j_cut * f.j_leakage * f.j_bypass * f.j_spacing * f.j_laminar == 1.0);
  CHECK(relative(f.mass_flux, 30 / (0.59 * (0.02381 - 0.01905) * 0.25 / 0.02381)) < 1e-12);
  CHECK(relative(f.reynolds, diameter * f.mass_flux / 0.001) < 1e-12);
  const PressureDrop drop = pressure_drop(b, 30, state, state);
  CHECK(drop.total() == drop.crossflow);
  CHECK(relative(pressure_drop(b, 60, state, state).total() / drop.total(), std::pow(2.0, 1.81)) < 1e-12);
  geometry::ShellSide square = shell_side();
  square.layout = 90;
  CHECK(relative(prepare(square, Method::kern).kern_equivalent_diameter,
                 4 * (0.02381 * 0.02381 - pi * 0.01905 * 0.01905 / 4) / (pi * 0.01905)) < 1e-12);
}
