#include <doctest/doctest.h>

#include <cmath>
#include <string>

#include "dutygauge/fluids.hpp"
#include "fluids_laws.hpp"
#include "support.hpp"

using namespace dutygauge;
using namespace dutygauge::fluids;
using fluids_laws::check_laws;
using fluids_laws::found;
using fluids_laws::metric;
using fluids_laws::objects;

namespace {

const PropertyRow warm_oil{393.15, 815.0, 2250.0, 0.121, 0.0021};
const PropertyRow cold_oil{333.15, 852.0, 2030.0, 0.127, 0.0125};

Fluid oil_table() {
  return make_table({{293.15, 880.0, 1870.0, 0.131, 0.085},
                     {333.15, 852.0, 2030.0, 0.127, 0.0125},
                     {353.15, 839.0, 2105.0, 0.125, 0.0066},
                     {393.15, 815.0, 2250.0, 0.121, 0.0021}},
                    Phase::liquid)
      .fluid;
}

Fluid water_at(double temperature, double pressure) {
  const Made made = make_water(temperature, pressure);
  REQUIRE(made.objections.empty());
  return made.fluid;
}

}  // namespace

TEST_CASE("fluids: water and steam keep the laws over their whole range at any pressure") {
  for (double p : {1e3, 1e5, 4e5, 2.5e6, 1.6e7}) check_laws(water_at(p > 1e4 ? 300.0 : 275.0, p), p);
  for (double p : {2e7, 9e7}) check_laws(water_at(400.0, p), p);
  for (double p : {500.0, 1e5, 1e6, 6e6, 1.6e7, 2e7, 5e7, 1e8}) check_laws(water_at(1000.0, p), p);
}

TEST_CASE("fluids: user data keep the laws over their whole usable range") {
  check_laws(oil_table(), 1e5);
  check_laws(make_two_point(warm_oil, cold_oil, Phase::liquid).fluid, 1e5);
  const Made constant = make_constant({995.0, 4180.0, 0.62, 7e-4}, Phase::liquid);
  CHECK(temperature_at(constant.fluid, enthalpy(constant.fluid, 330.0, 1e5), 1e5) == doctest::Approx(330.0));
  CHECK(enthalpy(constant.fluid, 273.15, 1e5) == 0.0);
  CHECK(state(constant.fluid, 300.0, 1e5).prandtl() == doctest::Approx(7e-4 * 4180.0 / 0.62));
}

TEST_CASE("fluids: a table passes its rows exactly and stays between them") {
  const Fluid fluid = oil_table();
  const auto& table = std::get<TableModel>(fluid.model);
  for (std::size_t i = 0; i < table.temperature.size(); ++i) {
    const State at = state(fluid, table.temperature[i], 1e5);
    CHECK(at.density == table.density[i]);
    CHECK(at.heat_capacity == table.heat_capacity[i]);
    CHECK(at.conductivity == table.conductivity[i]);
    CHECK(support::relative(at.viscosity, std::exp(table.log_viscosity[i])) < 1e-14);
    if (i == 0) continue;
    State before = state(fluid, table.temperature[i - 1], 1e5);
    for (int k = 1; k <= 50; ++k) {
      const double t =
          table.temperature[i - 1] + (table.temperature[i] - table.temperature[i - 1]) * k / 50.0;
      const State s = state(fluid, t, 1e5);
      CHECK(s.density <= before.density);
      CHECK(s.heat_capacity >= before.heat_capacity);
      CHECK(s.conductivity <= before.conductivity);
      CHECK(s.viscosity <= before.viscosity);
      before = s;
    }
  }
}

TEST_CASE("fluids: an interpolant through an extreme row does not overshoot it") {
  const Fluid fluid = make_table({{280.0, 999.0, 4210.0, 0.58, 1.4e-3},
                                  {310.0, 993.0, 4178.0, 0.63, 6.9e-4},
                                  {360.0, 967.0, 4203.0, 0.67, 3.2e-4}},
                                 Phase::liquid)
                          .fluid;
  for (double t = 280.0; t <= 360.0; t += 0.5) CHECK(state(fluid, t, 1e5).heat_capacity >= 4178.0);
}

TEST_CASE("fluids: two points are a straight line, in either order") {
  const Fluid fluid = make_two_point(warm_oil, cold_oil, Phase::liquid).fluid;
  const Fluid same = make_two_point(cold_oil, warm_oil, Phase::liquid).fluid;
  const State middle = state(fluid, 363.15, 1e5);
  CHECK(middle.density == doctest::Approx(0.5 * (815.0 + 852.0)).epsilon(1e-13));
  CHECK(middle.heat_capacity == doctest::Approx(2140.0).epsilon(1e-13));
  CHECK(middle.viscosity == state(same, 363.15, 1e5).viscosity);
  // ln mu is linear in 1/T: the harmonic mean of the temperatures has the geometric mean of mu.
  const double harmonic = 2.0 / (1.0 / 333.15 + 1.0 / 393.15);
  CHECK(state(fluid, harmonic, 1e5).viscosity == doctest::Approx(std::sqrt(0.0125 * 0.0021)).epsilon(1e-12));
}

TEST_CASE("fluids: user data continue with their end slopes, up to half the span and 40 K for two points") {
  const Fluid table = oil_table();
  CHECK(valid_temperatures(table, 1e5).low == 293.15);
  CHECK(valid_temperatures(table, 1e5).high == 393.15);
  CHECK(usable_temperatures(table, 1e5).high == doctest::Approx(443.15));
  CHECK(usable_temperatures(table, 1e5).low == doctest::Approx(243.15));
  const Fluid two = make_two_point(warm_oil, cold_oil, Phase::liquid).fluid;
  CHECK(usable_temperatures(two, 1e5).high == doctest::Approx(433.15));
  CHECK(usable_temperatures(two, 1e5).low == doctest::Approx(293.15));
  CHECK(state(two, 413.15, 1e5).density == doctest::Approx(815.0 - 20.0 * 37.0 / 60.0).epsilon(1e-12));
  const State end = state(table, 393.15, 1e5), next = state(table, 393.15 + 1e-3, 1e5);
  const State far = state(table, 393.15 + 20.0, 1e5);
  CHECK(far.heat_capacity - end.heat_capacity ==
        doctest::Approx(2e4 * (next.heat_capacity - end.heat_capacity)).epsilon(1e-6));
  // Density falls by 0.617 kg/m3.K: from 20 kg/m3 it is used up after 32 K, before the 40 K.
  const Fluid thin =
      make_two_point({300.0, 420.0, 2000.0, 0.1, 2e-4}, {400.0, 20.0, 2100.0, 0.1, 1e-4}, Phase::liquid)
          .fluid;
  CHECK(usable_temperatures(thin, 1e5).high == doctest::Approx(405.0));
  CHECK(state(thin, usable_temperatures(thin, 1e5).high, 1e5).density > 0.0);
}

TEST_CASE("fluids: a temperature outside the range is said, with how far") {
  const Fluid table = oil_table();
  CHECK(check_bulk(table, 393.15, 1e5, "shell side, inlet").empty());
  const Findings near = check_bulk(table, 398.15, 1e5, "shell side, inlet");
  REQUIRE(near.size() == 1);
  CHECK(near[0].id == "fluids.extrapolated");
  CHECK(near[0].severity == Severity::should);
  CHECK(metric(near[0].text).find("5.0 K above") != std::string::npos);
  // What no thermometer shows and no page could print is no extrapolation.
  CHECK(check_bulk(table, 393.15 + 0.049, 1e5, "shell side, inlet").empty());
  CHECK(found(check_bulk(table, 393.15 + 0.051, 1e5, "shell side, inlet"), "fluids.extrapolated"));
  CHECK(check_wall(table, 393.15 + 0.049, 1e5, "shell side").empty());
  CHECK(found(check_wall(table, 393.15 + 0.051, 1e5, "shell side"), "fluids.wall_outside"));
  const Findings far = check_bulk(table, 453.15, 1e5, "shell side, inlet");
  REQUIRE(far.size() == 1);
  CHECK(far[0].id == "fluids.beyond_usable");
  CHECK(far[0].severity == Severity::must);
  const Findings wall = check_wall(table, 400.0, 1e5, "shell side");
  REQUIRE(wall.size() == 1);
  CHECK(wall[0].severity == Severity::note);
  CHECK(check_wall(table, 390.0, 1e5, "shell side").empty());
}

TEST_CASE("fluids: constant properties over a wide span are remarked on") {
  const Fluid liquid = make_constant({995.0, 4180.0, 0.62, 7e-4}, Phase::liquid).fluid;
  CHECK(check_span(liquid, {300.0, 329.0}, "tube side").empty());
  CHECK(found(check_span(liquid, {331.0, 300.0}, "tube side"), "fluids.constant_over_wide_span"));
  const Fluid gas = make_constant({1.2, 1005.0, 0.026, 1.8e-5}, Phase::gas).fluid;
  CHECK(check_span(gas, {300.0, 380.0}, "tube side").empty());
  CHECK(check_span(oil_table(), {300.0, 380.0}, "tube side").empty());
}

TEST_CASE("fluids: water takes the phase of its inlet and refuses to guess near the boiling line") {
  CHECK(water_at(300.0, 1e5).phase == Phase::liquid);
  CHECK(water_at(400.0, 1e5).phase == Phase::gas);
  CHECK(water_at(400.0, 4e5).phase == Phase::liquid);
  CHECK(water_at(300.0, 400.0).phase == Phase::gas);
  CHECK(water_at(600.0, 5e7).phase == Phase::liquid);
  CHECK(water_at(900.0, 5e7).phase == Phase::gas);
  const double saturation = 372.755919;  // at 1 bar, IAPWS R7-97(2012) table 36
  CHECK(objects(make_water(saturation - 0.04, 1e5), ""));
  CHECK(objects(make_water(saturation + 0.04, 1e5), ""));
  CHECK(make_water(saturation - 0.06, 1e5).fluid.phase == Phase::liquid);
  CHECK(make_water(saturation + 0.06, 1e5).fluid.phase == Phase::gas);
  for (const auto& [t, p] : {std::pair{273.0, 1e5},
                             {1080.0, 1e5},
                             {640.0, 2e7},
                             {700.0, 4e7},
                             {300.0, 1.1e8},
                             {300.0, 0.0},
                             {300.0, -1e5},
                             {double(NAN), 1e5},
                             {300.0, double(NAN)}}) {
    CAPTURE(t);
    CAPTURE(p);
    CHECK(objects(make_water(t, p), ""));
  }
}

TEST_CASE(
    "fluids: a boundary that is passed by next to nothing is just passed, and ice has no negative zero") {
  const Fluid liquid = water_at(300.0, 6e5);
  const double end = usable_temperatures(liquid, 6e5).high;
  const Findings beyond = check_bulk(liquid, end + 0.01, 6e5, "tube side, outlet");
  REQUIRE(found(beyond, "fluids.beyond_usable"));
  CHECK(metric(beyond[0].text).find("158.8 degC is just above what can be computed of water") !=
        std::string::npos);
  CHECK(metric(make_water(273.12, 6e5).objections.at(0).what) == "water at 0.0 degC is ice");
}

TEST_CASE("fluids: water says where it boils, condenses, freezes or is not covered") {
  const Fluid liquid = water_at(300.0, 6e5), steam = water_at(500.0, 6e5);
  CHECK(usable_temperatures(liquid, 6e5).high == doctest::Approx(431.98).epsilon(1e-4));
  CHECK(metric(why_it_ends(liquid, 6e5, true)) == "it boils at 158.8 degC");
  CHECK(metric(why_it_ends(liquid, 6e5, false)) == "it freezes at 0.0 degC");
  CHECK(metric(why_it_ends(steam, 6e5, false)) == "it condenses at 158.8 degC");
  CHECK(metric(why_it_ends(steam, 6e5, true)).find("800.0 degC") != std::string::npos);
  CHECK(why_it_ends(liquid, 3e7, true).find("near-critical") != std::string::npos);
  CHECK(found(check_bulk(liquid, 430.0, 6e5, "tube side, outlet"), "fluids.near_boiling"));
  CHECK(found(check_bulk(liquid, 432.5, 6e5, "tube side, outlet"), "fluids.beyond_usable"));
  CHECK(found(check_bulk(liquid, 273.5, 6e5, "tube side, outlet"), "fluids.near_freezing"));
  CHECK(check_bulk(liquid, 350.0, 6e5, "tube side, outlet").empty());
  CHECK(found(check_wall(liquid, 440.0, 6e5, "tube side"), "fluids.wall_changes_phase"));
  CHECK(found(check_wall(steam, 420.0, 6e5, "tube side"), "fluids.wall_changes_phase"));
}

TEST_CASE("fluids: states stay finite when a solver wanders far outside") {
  for (const Fluid& fluid : {water_at(300.0, 1e5), water_at(500.0, 1e5), oil_table()})
    for (double t : {100.0, 200.0, 1080.0, 1134.1997, 5000.0}) {
      const State s = state(fluid, t, 1e5);
      CHECK(std::isfinite(s.density + s.heat_capacity + s.conductivity + s.viscosity + s.enthalpy));
    }
}

TEST_CASE("fluids: impossible user data are refused at their key") {
  CHECK(objects(make_constant({0.0, 4180.0, 0.62, 7e-4}, Phase::liquid), "constant.density"));
  CHECK(objects(make_constant({995.0, -4180.0, 0.62, 7e-4}, Phase::liquid), "constant.heat_capacity"));
  CHECK(objects(make_constant({995.0, 4180.0, double(NAN), 7e-4}, Phase::liquid), "constant.conductivity"));
  CHECK(objects(make_two_point(cold_oil, {333.9, 852.0, 2030.0, 0.127, 0.0124}, Phase::liquid),
                "two_point.at"));
  CHECK(objects(make_two_point(cold_oil, {393.15, 815.0, 2250.0, 0.121, 2.1}, Phase::liquid),
                "two_point.viscosity"));
  CHECK(
      objects(make_two_point({-5.0, 852.0, 2030.0, 0.127, 0.0125}, warm_oil, Phase::liquid), "two_point.at"));
  CHECK(objects(make_table({warm_oil}, Phase::liquid), "table.rows"));
  CHECK(objects(make_table({}, Phase::liquid), "table.rows"));
  CHECK(objects(make_table({warm_oil, cold_oil}, Phase::liquid), "table.rows.1.temperature"));
  CHECK(objects(make_table({cold_oil, cold_oil}, Phase::liquid), "table.rows.1.temperature"));
  CHECK(objects(make_table({cold_oil, {393.15, 815.0, 2250.0, 0.121, 0.0}}, Phase::liquid),
                "table.rows.1.viscosity"));
  CHECK(objects(make_table({cold_oil, {393.15, 815.0, 2250.0, 0.121, 2.1}}, Phase::liquid),
                "table.rows.1.viscosity"));
}

TEST_CASE("fluids: suspicious user data are accepted with a remark") {
  CHECK(make_constant({995.0, 4180.0, 0.62, 7e-4}, Phase::liquid).findings.empty());
  CHECK(found(make_constant({995.0, 4.18, 0.62, 7e-4}, Phase::liquid).findings, "fluids.unusual_value"));
  CHECK(found(make_constant({995.0, 4180.0, 620.0, 7e-4}, Phase::liquid).findings, "fluids.unusual_value"));
  CHECK(found(make_constant({1.2, 1005.0, 0.026, 0.018}, Phase::gas).findings, "fluids.unusual_value"));
  CHECK(found(make_two_point(cold_oil, {393.15, 815.0, 2250.0, 0.121, 0.0150}, Phase::liquid).findings,
              "fluids.unusual_trend"));
  CHECK(found(
      make_two_point({300.0, 1.2, 1005.0, 0.026, 1.8e-5}, {400.0, 0.9, 1010.0, 0.03, 1.2e-5}, Phase::gas)
          .findings,
      "fluids.unusual_trend"));
}
