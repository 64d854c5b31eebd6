#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <numbers>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/explore.hpp"
#include "dutygauge/overall.hpp"
#include "support.hpp"

// Films given instead of computed, layers on the tube, units known by their area, low fins.

using namespace dutygauge;
using good::with;
using support::relative;

namespace {

case_io::Case built(const std::string& text) {
  return case_io::build(case_io::read_document(text, "x"));
}

rating::Outcome rated(const case_io::Case& a_case) {
  const auto rating = rating::rate(a_case.problem);
  REQUIRE_MESSAGE(rating.outcome.has_value(), rating.no_result);
  return *rating.outcome;
}

bool has_finding(const Findings& findings, std::string_view id) {
  return std::ranges::any_of(findings, [&](const Finding& finding) { return finding.id == id; });
}

/// A simulated unit, invented: both films are laws on the outside area.
const std::string by_area = R"(dutygauge: 1
exchanger:
  tema: AEL
  area: 210 m2
  wall_resistance: 0.00004 m2.K/W
  tubes: {passes: 2}
streams:
  shell_side:
    fluid: {constant: {heat_capacity: 4180 J/kg.K}}
    flow: 80 kg/s
    inlet: {temperature: 55 degC}
    fouling: 0 m2.K/W
    film_law: {value: 3600 W/m2.K, at_flow: 80 kg/s, flow_exponent: 0.6, temperature_slope: 0.006 1/K, at_temperature: 46 degC, surface: outside}
    pressure_drop_law: {value: 45 kPa, at_flow: 80 kg/s, flow_exponent: 1.8}
  tube_side:
    fluid: {constant: {heat_capacity: 4180 J/kg.K}}
    flow: 110 kg/s
    inlet: {temperature: 28 degC}
    fouling: 0 m2.K/W
    film_law: {value: 4200 W/m2.K, at_flow: 110 kg/s, flow_exponent: 0.8, temperature_slope: 0.01 1/K, at_temperature: 28 degC, surface: outside}
methods: {solution: mean}
)";

constexpr const char* fins =
    "    passes: 2\n    fins: {per_length: 19 fins/in, tip_diameter: 18.8 mm, root_diameter: 15.9 mm, "
    "thickness: 0.3 mm}\n";

}  // namespace

TEST_CASE("rating: a given film takes the place of the computed one, a multiplier multiplies it") {
  const auto plain = rated(built(std::string(good::oil_cooler)));
  const auto fixed =
      built(with("    flow: 21.5 kg/s\n",
                 "    flow: 21.5 kg/s\n    film_coefficient: 500 W/m2.K\n    because: measured\n"));
  CHECK(relative(rated(fixed).local.shell_film.coefficient, 500.0) < 1e-12);
  CHECK(has_finding(fixed.findings, "case.film_given"));
  const auto less =
      built(with("    flow: 21.5 kg/s\n",
                 "    flow: 21.5 kg/s\n    film_multiplier: 0.8\n    because: gas in the oil\n"));
  // The wall moves with the film, and with it the oil's viscosity there: here constant.
  CHECK(relative(rated(less).local.shell_film.coefficient, 0.8 * plain.local.shell_film.coefficient) < 1e-9);
  CHECK(has_finding(less.findings, "case.film_multiplied"));
  refused::check({{"no reason",
                   with("    flow: 21.5 kg/s\n", "    flow: 21.5 kg/s\n    film_multiplier: 0.8\n"),
                   {"streams.shell_side.film_multiplier", "nothing says why"}}});
}

TEST_CASE("geometry: layers add the resistance of their own radius and narrow the bore") {
  const auto plain = built(std::string(good::oil_cooler)).problem.exchanger;
  const auto lined =
      built(with("    passes: 2\n",
                 "    passes: 2\n    layers: [{on: inside, thickness: 0.5 mm, conductivity: 0.4 "
                 "W/m.K}, {on: outside, thickness: 0.1 mm, conductivity: 0.3 W/m.K}]\n"))
          .problem.exchanger;
  const double outside = 0.01905, metal_bore = 0.01905 - 2 * 0.00211, bore = metal_bore - 0.001;
  CHECK(relative(lined.tube_side.inside_diameter, bore) < 1e-12);
  CHECK(lined.area == plain.area);
  CHECK(relative(lined.outside_per_inside, outside / bore) < 1e-12);
  const double inner = outside * std::log(metal_bore / bore) / (2 * 0.4);
  const double outer = outside * std::log((outside + 0.0002) / outside) / (2 * 0.3);
  CHECK(relative(lined.layer_resistance, inner + outer) < 1e-12);
  CHECK(lined.wall_length == plain.wall_length);
  refused::check(
      {{"no bore left",
        with("    passes: 2\n",
             "    passes: 2\n    layers: [{on: inside, thickness: 8 mm, conductivity: 0.4 W/m.K}]\n"),
        {"exchanger.tubes.layers", "leave no bore"}}});
}

TEST_CASE("rating: a unit known by its area follows its laws and the arrangement's closed form") {
  const auto outcome = rated(built(by_area));
  const double shell_mean = 0.5 * (55.0 + outcome.shell_outlet - 273.15);
  const double tube_mean = 0.5 * (28.0 + outcome.tube_outlet - 273.15);
  const double shell = 3600.0 * (1 + 0.006 * (shell_mean - 46.0)),
               tube = 4200.0 * (1 + 0.01 * (tube_mean - 28.0));
  const double u = 1.0 / (1 / shell + 1 / tube + 4e-5);
  CHECK(relative(outcome.local.u_dirty, u) < 1e-9);
  // One shell pass, two tube passes (Bowman, Mueller and Nagle 1940), on the smaller stream.
  const double ratio = 80.0 / 110.0, ntu = u * 210.0 / (80.0 * 4180.0), root = std::sqrt(1 + ratio * ratio);
  const double e = std::exp(-ntu * root);
  const double p = 2.0 / (1 + ratio + root * (1 + e) / (1 - e));
  CHECK(relative(outcome.duty, p * 80.0 * 4180.0 * 27.0) < 1e-9);
  CHECK(relative(outcome.shell_drop.total(), 45e3) < 1e-12);
  const auto half = rated(built(with("flow: 80 kg/s\n", "flow: 40 kg/s\n", by_area)));
  CHECK(relative(half.shell_drop.total(), 45e3 * std::pow(0.5, 1.8)) < 1e-12);
}

TEST_CASE(
    "report: what a unit known by its area cannot have is null in the result and left out of the page") {
  for (const char* solution : {"mean", "march"}) {
    const auto result =
        explore::rate(built(with("solution: mean", std::string("solution: ") + solution, by_area)));
    const auto json = nlohmann::json::parse(report::json(result));
    CHECK(json["tube_side"]["reynolds"].is_null());
    CHECK(json["tube_side"]["pressure_drop_Pa"].is_null());
    CHECK(json["shell_side"]["crossflow_area_m2"].is_null());
    CHECK(json["shell_side"]["pressure_drop_Pa"].is_number());
    CHECK(json["shell_side"]["second_opinion"].is_null());
    CHECK(report::text(result, {}).find("not known") != std::string::npos);
    CHECK(report::text(result, {}).find("velocity") == std::string::npos);
  }
}

TEST_CASE("case_io: an area needs both films and no dimensions") {
  refused::check({
      {"a film missing",
       with("    film_law: {value: 4200 W/m2.K, at_flow: 110 kg/s, flow_exponent: 0.8, temperature_slope: "
            "0.01 "
            "1/K, at_temperature: 28 degC, surface: outside}\n",
            "", by_area),
       {"streams.tube_side", "film_law or film_coefficient"}},
      {"dimensions beside it",
       with("tubes: {passes: 2}", "tubes: {passes: 2, count: 100}", by_area),
       {"exchanger.tubes.count", "either dimensions or an area"}},
      {"no wall",
       with("  wall_resistance: 0.00004 m2.K/W\n", "", by_area),
       {"exchanger.wall_resistance", "is needed"}},
      {"an area beside a drawing",
       with("  tema: AES\n", "  tema: AES\n  area: 60 m2\n"),
       {"exchanger.shell", "either dimensions or an area"}},
  });
}

TEST_CASE("overall: Schmidt's fin efficiency agrees with the exact annular fin within 0.9 %") {
  // The exact solution by Bessel functions: Gardner, Trans. ASME 67, 621 (1945).
  const double r1 = 7.95e-3, thickness = 0.3e-3, r2 = 9.4e-3 + 0.5 * thickness;
  for (const double film : {200.0, 500.0, 2000.0, 8000.0})
    for (const double conductivity : {15.0, 45.0, 100.0, 200.0}) {
      const double m = std::sqrt(2 * film / (conductivity * thickness));
      const auto i = [](int n, double x) { return std::cyl_bessel_i(n, x); };
      const auto k = [](int n, double x) { return std::cyl_bessel_k(n, x); };
      const double exact = 2 * r1 / (m * (r2 * r2 - r1 * r1)) *
                           (k(1, m * r1) * i(1, m * r2) - i(1, m * r1) * k(1, m * r2)) /
                           (i(0, m * r1) * k(1, m * r2) + k(0, m * r1) * i(1, m * r2));
      const double reach = (r2 - r1) * (1 + 0.35 * std::log(r2 / r1));
      CAPTURE(film);
      CAPTURE(conductivity);
      CHECK(relative(overall::fin_efficiency(film, conductivity, thickness, reach), exact) < 0.009);
    }
}

TEST_CASE("geometry: low fins multiply the outside area, and the wall is counted from their root") {
  const auto a_case = built(with("    passes: 2\n", fins));
  const auto& exchanger = a_case.problem.exchanger;
  const double n = 19.0 / 0.0254, tip = 18.8e-3, root = 15.9e-3, t = 0.3e-3;
  const double surface =
      std::numbers::pi * (root * (1 - n * t) + n * (0.5 * (tip * tip - root * root) + tip * t));
  CHECK(relative(exchanger.area, surface * exchanger.effective_length * 204) < 1e-12);
  CHECK(relative(exchanger.tube_side.inside_diameter, root - 2 * 0.00211) < 1e-12);
  CHECK(relative(exchanger.shell_side.flow_diameter(), root + (tip - root) * n * t) < 1e-12);
  CHECK(has_finding(a_case.findings, "geometry.fins"));
  const auto outcome = rated(a_case);
  CHECK(outcome.local.fin_effectiveness < 1.0);
  CHECK(outcome.local.fin_effectiveness > 0.8);
  CHECK(relative(1.0 / outcome.local.u_dirty, outcome.local.resistances.sum()) < 1e-9);
  refused::check({{"kern", with("bell_delaware", "kern", with("    passes: 2\n", fins)), {"finned tubes"}}});
}
