#include "dutygauge/tubeside.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <numbers>

#include "support.hpp"

using namespace dutygauge;
using namespace dutygauge::tubeside;

namespace {

const double prandtls[] = {0.5, 0.7, 1.0, 5.0, 50.0, 500.0, 2000.0};
const double diameters_over_length[] = {0.0005, 0.004, 0.02, 0.1};

geometry::TubeSide some_tubes() {
  geometry::TubeSide tubes;
  tubes.inside_diameter = 0.016;
  tubes.outside_diameter = 0.020;
  tubes.flow_area = 100.0 * std::numbers::pi / 4.0 * 0.016 * 0.016;
  tubes.heated_length = 4.8;
  tubes.friction_length = 2 * 4.9;
  tubes.roughness = 1.5e-6;
  tubes.passes = 2;
  return tubes;
}

fluids::State some_liquid() {
  return {.temperature = 300.0,
          .density = 995.0,
          .heat_capacity = 4180.0,
          .conductivity = 0.62,
          .viscosity = 0.8e-3,
          .phase = fluids::Phase::liquid};
}

fluids::State some_gas(double temperature = 400.0) {
  return {.temperature = temperature,
          .density = 5.0,
          .heat_capacity = 1010.0,
          .conductivity = 0.033,
          .viscosity = 2.3e-5,
          .phase = fluids::Phase::gas};
}

double flow_for(const geometry::TubeSide& tubes, const fluids::State& bulk, double reynolds) {
  return reynolds * bulk.viscosity / tubes.inside_diameter * tubes.flow_area;
}

Film film_at(double reynolds, const fluids::State& bulk, const fluids::State& wall) {
  const auto tubes = some_tubes();
  return film(tubes, flow_for(tubes, bulk, reynolds), bulk, wall);
}

PressureDrop drop_at(double reynolds, const geometry::TubeSide& tubes, const fluids::State& bulk,
                     const fluids::State& wall) {
  return pressure_drop(tubes, flow_for(tubes, bulk, reynolds), bulk, wall);
}

double head_at(double reynolds, const geometry::TubeSide& tubes, const fluids::State& bulk) {
  const double mass_flux = reynolds * bulk.viscosity / tubes.inside_diameter;
  return mass_flux * mass_flux / (2.0 * bulk.density);
}

/// Colebrook's friction factor, by iteration.
double colebrook(double reynolds, double relative_roughness) {
  double inverse_root = 7.0;
  for (int i = 0; i < 60; ++i)
    inverse_root = -2.0 * std::log10(relative_roughness / 3.7 + 2.51 * inverse_root / reynolds);
  return 1.0 / (inverse_root * inverse_root);
}

}  // namespace

TEST_CASE("tubeside: Nu has no jump at Re 2300 and 4000") {
  for (double pr : prandtls)
    for (double d_over_l : diameters_over_length)
      for (double re : {2300.0, 4000.0}) {
        CAPTURE(pr);
        CAPTURE(d_over_l);
        CAPTURE(re);
        const double at = nusselt(re, pr, d_over_l);
        CHECK(support::relative(nusselt(re * (1.0 - 1e-12), pr, d_over_l), at) < 1e-10);
        CHECK(support::relative(nusselt(re * (1.0 + 1e-12), pr, d_over_l), at) < 1e-10);
      }
}

TEST_CASE("tubeside: Nu rises with Re, with Pr and with D/L") {
  for (double pr : prandtls)
    for (double d_over_l : diameters_over_length) {
      CAPTURE(pr);
      CAPTURE(d_over_l);
      double last = 0.0;
      for (double re = 1.0; re < 5e6; re *= 1.05) {
        CAPTURE(re);
        const double nu = nusselt(re, pr, d_over_l);
        CHECK(nu > last);
        CHECK(nusselt(re, 1.1 * pr, d_over_l) > nu);
        CHECK(nusselt(re, pr, 1.1 * d_over_l) > nu);
        last = nu;
      }
    }
}

TEST_CASE(
    "tubeside: Nu in an endless laminar tube is 3.66 and half way up the transition the mean of its ends") {
  CHECK(nusselt(1e-6, 1.0, 1e-6) == doctest::Approx(3.66).epsilon(1e-3));
  for (double pr : prandtls)
    for (double d_over_l : diameters_over_length)
      CHECK(nusselt(3150.0, pr, d_over_l) ==
            doctest::Approx(0.5 * (nusselt(2300.0, pr, d_over_l) + nusselt(4000.0, pr, d_over_l)))
                .epsilon(1e-13));
}

TEST_CASE("tubeside: an oil in tubes far shorter than its entry length is not rated with Nu 3.66") {
  // Gz 220: the exact mean Nu is 9.2.
  CHECK(nusselt(30.3, 2864.0, 0.01 / 3.93) > 2.4 * 3.66);
}

TEST_CASE("tubeside: film states velocity, flux, Re, Pr and coefficient of its own bore") {
  const auto tubes = some_tubes();
  const auto liquid = some_liquid();
  const Film f = film(tubes, 40.0, liquid, liquid);
  CHECK(f.mass_flux == doctest::Approx(40.0 / tubes.flow_area).epsilon(1e-14));
  CHECK(f.velocity == doctest::Approx(40.0 / (995.0 * tubes.flow_area)).epsilon(1e-14));
  CHECK(f.reynolds == doctest::Approx(f.velocity * 995.0 * 0.016 / 0.8e-3).epsilon(1e-14));
  CHECK(f.prandtl == doctest::Approx(0.8e-3 * 4180.0 / 0.62).epsilon(1e-14));
  CHECK(f.nusselt == doctest::Approx(nusselt(f.reynolds, f.prandtl, 0.016 / 4.8)).epsilon(1e-14));
  CHECK(f.coefficient == doctest::Approx(f.nusselt * 0.62 / 0.016).epsilon(1e-14));
}

TEST_CASE("tubeside: twice the tubes with twice the flow have the same film and the same drop") {
  const auto liquid = some_liquid();
  auto tubes = some_tubes();
  const Film one = film(tubes, 10.0, liquid, liquid);
  const PressureDrop drop_one = pressure_drop(tubes, 10.0, liquid, liquid);
  tubes.flow_area *= 2.0;
  CHECK(film(tubes, 20.0, liquid, liquid).coefficient == doctest::Approx(one.coefficient).epsilon(1e-14));
  CHECK(pressure_drop(tubes, 20.0, liquid, liquid).total() ==
        doctest::Approx(drop_one.total()).epsilon(1e-14));
}

TEST_CASE("tubeside: laminar ends at Re 2300 and turbulent starts at 4000") {
  const auto liquid = some_liquid();
  CHECK(film_at(2299.999, liquid, liquid).regime == Regime::laminar);
  CHECK(film_at(2300.001, liquid, liquid).regime == Regime::transition);
  CHECK(film_at(3999.999, liquid, liquid).regime == Regime::transition);
  CHECK(film_at(4000.001, liquid, liquid).regime == Regime::turbulent);
}

TEST_CASE("tubeside: a liquid's film is corrected by (Pr/Pr_wall)^0.11 in every regime") {
  const auto bulk = some_liquid();
  auto wall = bulk;
  for (double thicker : {0.3, 1.0, 4.0}) {
    wall.viscosity = thicker * bulk.viscosity;
    for (double re : {500.0, 3000.0, 20000.0})
      CHECK(film_at(re, bulk, wall).nusselt / film_at(re, bulk, bulk).nusselt ==
            doctest::Approx(std::pow(1.0 / thicker, 0.11)).epsilon(1e-13));
  }
  wall = bulk;
  wall.temperature = 350.0;  // the temperature alone says nothing for a liquid
  CHECK(film_at(20000.0, bulk, wall).nusselt == film_at(20000.0, bulk, bulk).nusselt);
}

TEST_CASE("tubeside: a gas being heated is corrected by (T/T_wall)^0.45, one being cooled is not") {
  const auto gas = some_gas(400.0);
  const double plain = film_at(20000.0, gas, gas).nusselt;
  CHECK(film_at(20000.0, gas, some_gas(500.0)).nusselt / plain ==
        doctest::Approx(std::pow(0.8, 0.45)).epsilon(1e-13));
  CHECK(film_at(20000.0, gas, some_gas(300.0)).nusselt == plain);
  CHECK(support::relative(film_at(20000.0, gas, some_gas(400.0 + 1e-9)).nusselt, plain) < 1e-11);
  auto thick = gas;
  thick.viscosity *= 3.0;
  CHECK(film_at(20000.0, gas, thick).nusselt == plain);
}

TEST_CASE("tubeside: the friction factor is 64/Re in laminar flow") {
  for (double re : {0.1, 10.0, 200.0, 1000.0})
    for (double roughness : {0.0, 1e-3})
      CHECK(support::relative(darcy_friction(re, roughness), 64.0 / re) < 1e-4);
}

TEST_CASE("tubeside: the friction factor is within 2.5 % of Colebrook from Re 5000, eps/D to 0.005") {
  for (double re = 5000.0; re < 1e8; re *= 1.3)
    for (double roughness : {0.0, 1e-5, 1e-4, 1e-3, 5e-3}) {
      CAPTURE(re);
      CAPTURE(roughness);
      CHECK(support::relative(darcy_friction(re, roughness), colebrook(re, roughness)) < 0.025);
    }
}

TEST_CASE("tubeside: the friction factor is finite, and higher in a rougher tube") {
  for (double re = 1e-3; re < 1e9; re *= 2.0) {
    CAPTURE(re);
    double last = 0.0;
    for (double roughness : {0.0, 1e-4, 1e-3, 1e-2, 5e-2}) {
      const double f = darcy_friction(re, roughness);
      REQUIRE(std::isfinite(f));
      CHECK(f >= last * (1.0 - 1e-14));
      last = f;
    }
  }
}

TEST_CASE("tubeside: friction goes with the length, turns and nozzles do not") {
  const auto liquid = some_liquid();
  auto tubes = some_tubes();
  tubes.nozzle_in_area = 0.01, tubes.nozzle_out_area = 0.008;
  const auto one = drop_at(20000.0, tubes, liquid, liquid);
  CHECK(one.total() == doctest::Approx(one.friction + one.turns + one.nozzles).epsilon(1e-15));
  tubes.friction_length *= 2.0;
  const auto two = drop_at(20000.0, tubes, liquid, liquid);
  CHECK(two.friction == doctest::Approx(2.0 * one.friction).epsilon(1e-14));
  CHECK(two.turns == one.turns);
  CHECK(two.nozzles == one.nozzles);
}

TEST_CASE("tubeside: the drop goes with flow in laminar friction and with its square in turns and nozzles") {
  const auto liquid = some_liquid();
  auto tubes = some_tubes();
  tubes.nozzle_in_area = 0.01, tubes.nozzle_out_area = 0.008;
  const auto one = drop_at(200.0, tubes, liquid, liquid), two = drop_at(400.0, tubes, liquid, liquid);
  CHECK(two.friction == doctest::Approx(2.0 * one.friction).epsilon(1e-9));
  CHECK(two.turns == doctest::Approx(4.0 * one.turns).epsilon(1e-13));
  CHECK(two.nozzles == doctest::Approx(4.0 * one.nozzles).epsilon(1e-13));
}

TEST_CASE("tubeside: at one mass flow every part of the drop goes with 1/density") {
  const auto heavy = some_liquid();
  auto light = heavy;
  light.density /= 5.0;
  auto tubes = some_tubes();
  tubes.nozzle_in_area = 0.01, tubes.nozzle_out_area = 0.008;
  const auto one = drop_at(9000.0, tubes, heavy, heavy), five = drop_at(9000.0, tubes, light, light);
  CHECK(five.friction == doctest::Approx(5.0 * one.friction).epsilon(1e-13));
  CHECK(five.turns == doctest::Approx(5.0 * one.turns).epsilon(1e-13));
  CHECK(five.nozzles == doctest::Approx(5.0 * one.nozzles).epsilon(1e-13));
}

TEST_CASE("tubeside: shells in series multiply every part of the drop") {
  const PressureDrop three = PressureDrop{10.0, 20.0, 30.0}.times(3);
  CHECK(three.friction == 30.0);
  CHECK(three.turns == 60.0);
  CHECK(three.nozzles == 90.0);
  CHECK(three.total() == 180.0);
}

TEST_CASE("tubeside: a nozzle costs one head in and half a head out, one not given costs nothing") {
  const auto liquid = some_liquid();
  auto tubes = some_tubes();
  CHECK(pressure_drop(tubes, 20.0, liquid, liquid).nozzles == 0.0);
  tubes.nozzle_in_area = 0.01;
  const double in = 2000.0 * 2000.0 / (2.0 * 995.0);
  CHECK(pressure_drop(tubes, 20.0, liquid, liquid).nozzles == doctest::Approx(in).epsilon(1e-14));
  tubes.nozzle_out_area = 0.02;
  const double out = 1000.0 * 1000.0 / (2.0 * 995.0);
  CHECK(pressure_drop(tubes, 20.0, liquid, liquid).nozzles == doctest::Approx(in + 0.5 * out).epsilon(1e-14));
}

TEST_CASE("tubeside: one pass loses entry and exit only, a U-tube less than two straight passes") {
  const auto liquid = some_liquid();
  const auto heads = [&](int passes, bool u_tubes, double re) {
    auto tubes = some_tubes();
    tubes.passes = passes, tubes.u_tubes = u_tubes;
    return drop_at(re, tubes, liquid, liquid).turns / head_at(re, tubes, liquid);
  };
  CHECK(heads(1, false, 1000.0) == doctest::Approx(1.75).epsilon(1e-13));
  CHECK(heads(1, false, 1e5) == doctest::Approx(1.5).epsilon(1e-13));
  for (int passes : {2, 4, 6}) {
    CHECK(heads(passes, true, 1e5) < heads(passes, false, 1e5));
    CHECK(heads(passes, true, 1000.0) < heads(passes, false, 1000.0));
    CHECK(heads(passes, false, 1e5) < heads(passes, false, 1000.0));
    CHECK(heads(passes, false, 1e5) > heads(passes - 1, false, 1e5));
    CHECK(
        heads(passes, false, 3150.0) ==
        doctest::Approx(0.5 * (heads(passes, false, 2300.0) + heads(passes, false, 4000.0))).epsilon(1e-12));
  }
}

TEST_CASE("tubeside: a liquid thicker at the wall rubs more, by the power 0.25 laminar and 0.14 turbulent") {
  const auto bulk = some_liquid();
  auto wall = bulk;
  wall.viscosity = 3.0 * bulk.viscosity;
  const auto tubes = some_tubes();
  const auto factor = [&](double re) {
    return drop_at(re, tubes, bulk, wall).friction / drop_at(re, tubes, bulk, bulk).friction;
  };
  CHECK(factor(1000.0) == doctest::Approx(std::pow(3.0, 0.25)).epsilon(1e-13));
  CHECK(factor(3150.0) == doctest::Approx(std::pow(3.0, 0.195)).epsilon(1e-13));
  CHECK(factor(1e5) == doctest::Approx(std::pow(3.0, 0.14)).epsilon(1e-13));
  CHECK(drop_at(1e5, tubes, bulk, wall).turns == drop_at(1e5, tubes, bulk, bulk).turns);
  auto gas_wall = some_gas(600.0);
  gas_wall.viscosity *= 1.4;
  CHECK(drop_at(1e5, tubes, some_gas(), gas_wall).friction ==
        drop_at(1e5, tubes, some_gas(), some_gas()).friction);
}

TEST_CASE("tubeside: more flow never lowers the drop of a shell, and the drop has no jump") {
  const auto bulk = some_liquid();
  auto wall = bulk;
  wall.viscosity = 0.5 * bulk.viscosity;
  for (int passes : {1, 2, 4})
    for (bool u_tubes : {false, true}) {
      auto tubes = some_tubes();
      tubes.passes = passes, tubes.u_tubes = u_tubes, tubes.friction_length = 4.9 * passes;
      double last = 0.0;
      for (double re = 10.0; re < 1e6; re *= 1.002) {
        const double drop = drop_at(re, tubes, bulk, wall).total();
        CAPTURE(passes);
        CAPTURE(re);
        CHECK(drop > last);
        CHECK((last == 0.0 || drop < 1.03 * last));
        last = drop;
      }
    }
}

TEST_CASE("tubeside: entry lengths go with Re, Pr and the diameter") {
  CHECK(hydrodynamic_entry_length(2000.0, 0.02) == doctest::Approx(2.0).epsilon(1e-14));
  CHECK(thermal_entry_length(2000.0, 1.0, 0.02) == hydrodynamic_entry_length(2000.0, 0.02));
  CHECK(thermal_entry_length(1000.0, 30.0, 0.02) == doctest::Approx(30.0).epsilon(1e-14));
}
