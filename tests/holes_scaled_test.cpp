#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/explore.hpp"
#include "dutygauge/rating/scaled.hpp"
#include "dutygauge/units/mention.hpp"
#include "support.hpp"

// A sheet without baffle data: film and drop on the tubes from what the sheet states of one case.

using namespace dutygauge;
using good::with;
using support::relative;

namespace {

constexpr double u_stated = 352.0, drop_stated = 61e3;

/// The invented oil cooler without its baffles, with two operating cases.
std::string no_baffles(std::string_view claims =
                           "claims: {for: design, u_dirty: 352 W/m2.K, "
                           "shell_side_pressure_drop: 61 kPa}\n") {
  std::string text(good::oil_cooler);
  const auto from = text.find("  baffles:"), to = text.find("streams:");
  text.erase(from, to - from);
  text = with("shell_side: bell_delaware", "shell_side: scaled", text);
  return text + "operating_cases: {more_oil: {streams.shell_side.flow: x1.2}, design: {}}\n" +
         std::string(claims);
}

/// The same with water in the shell: properties that go with the temperature.
std::string water_in_shell() {
  const std::string text = no_baffles();
  const auto from = text.find("    fluid: {constant:"), to = text.find("    flow: 21.5");
  return std::string(text).replace(from, to - from, "    fluid: water\n");
}

case_io::Document document(const std::string& text) {
  return case_io::read_document(text, "x");
}

case_io::Case case_named(const std::string& text, std::string_view name) {
  for (auto& one : case_io::build_all(document(text)))
    if (one.operating_case == name) return one;
  FAIL("no such case");
  return {};
}

rating::Outcome rated(const case_io::Case& a_case) {
  const auto rating = rating::rate(a_case.problem);
  REQUIRE_MESSAGE(rating.outcome.has_value(), rating.no_result);
  return *rating.outcome;
}

double film(const rating::Outcome& outcome) {
  return outcome.local.shell_film.coefficient;
}

}  // namespace

TEST_CASE("scaled: the case the sheet speaks of gives its U and drop back, by either solution") {
  for (const std::string& text : {no_baffles(), water_in_shell()})
    for (const char* solution : {"solution: mean", "solution: march"}) {
      CAPTURE(solution);
      const auto outcome = rated(case_named(with("solution: mean", solution, text), "design"));
      CHECK(relative(outcome.local.u_dirty, u_stated) < 1e-6);
      CHECK(relative(outcome.shell_drop.total(), drop_stated) < 1e-6);
    }
}

TEST_CASE("scaled: what is left of 1/U is the film, as added up by hand") {
  const auto outcome = rated(case_named(no_baffles(), "design"));
  const double bore = 0.01905 - 2 * 0.00211, outside_per_inside = 0.01905 / bore;
  const double wall = 0.01905 * std::log(outside_per_inside) / (2 * 111.0);
  const double others = outside_per_inside * (1.0 / outcome.local.tube_film.coefficient + 0.00035) + 0.00018;
  // Admiralty brass near 40 degC has 111 W/m.K within 5 %, of a wall that is 1 % of the whole.
  CHECK(relative(film(outcome), 1.0 / (1.0 / u_stated - others - wall)) < 2e-3);
}

TEST_CASE("scaled: 20 % more flow gives the film 1.2^0.6 and the drop 1.2^1.8 where nothing else changes") {
  const auto design = rated(case_named(no_baffles(), "design"));
  const auto more = rated(case_named(no_baffles(), "more_oil"));
  CHECK(relative(film(more), film(design) * std::pow(1.2, 0.6)) < 1e-9);
  CHECK(relative(more.shell_drop.total(), drop_stated * std::pow(1.2, 1.8)) < 1e-9);
}

TEST_CASE("scaled: properties at the other mean temperature scale film and drop as in a turbulent bank") {
  const auto hotter =
      with("streams.shell_side.flow: x1.2",
           "streams.shell_side.flow: x1.2, streams.shell_side.inlet.temperature: 85 degC", water_in_shell());
  const auto design = rated(case_named(hotter, "design")), more = rated(case_named(hotter, "more_oil"));
  const auto &a = design.local.shell_bulk, &b = more.local.shell_bulk;
  REQUIRE(b.temperature > a.temperature + 10.0);
  // Nu ~ Re^0.6 Pr^(1/3); drop ~ f m^2/rho with f ~ Re^-0.2.
  const double re = 1.2 * a.viscosity / b.viscosity;
  const double by_hand = film(design) * b.conductivity / a.conductivity * std::pow(re, 0.6) *
                         std::cbrt(b.prandtl() / a.prandtl());
  CHECK(relative(film(more), by_hand) < 1e-9);
  const double drop = drop_stated * 1.44 * a.density / b.density * std::pow(re, -0.2);
  CHECK(relative(more.shell_drop.total(), drop) < 1e-9);
}

TEST_CASE("scaled: what is varied leaves the sheet's case as it was; another reading of it does not") {
  const auto design = case_io::overlaid(document(no_baffles()), "design");
  const auto film_of = [](const case_io::Document& of) {
    return case_io::build(of).problem.shell_side.film_law->value;
  };
  const double base = film_of(design);
  CHECK(film_of(case_io::with_value(design, "streams.shell_side.flow", "30 kg/s")) == base);
  CHECK(film_of(case_io::with_value(design, "streams.tube_side.fouling", "0 m2.K/W")) == base);
  const auto clean = case_io::with_other_reading(design, "streams.tube_side.fouling", "0 m2.K/W");
  // Less of the same U in the deposit is more of it in the film: a smaller one.
  CHECK(film_of(clean) < 0.97 * base);
  const auto more = case_io::overlaid(document(no_baffles()), "more_oil");
  CHECK(film_of(case_io::with_other_reading(more, "streams.shell_side.flow", "30 kg/s")) == base);
  CHECK(film_of(document(no_baffles() + "present: {exchanger.tubes.plugged: 40}\n")) == base);
}

TEST_CASE("scaled: what the shell side is taken from is listed, and is no claim that we confirm") {
  const auto one = case_named(no_baffles(), "more_oil");
  const auto assumed = [&](std::string_view key) {
    return std::ranges::find(one.assumed, key, &Assumption::key);
  };
  const auto law = assumed("streams.shell_side.film_law.value");
  REQUIRE(law != one.assumed.end());
  CHECK(units::spoken(law->why, units::System::metric).find("352 W/m2.K") != std::string::npos);
  CHECK(law->why.find("case design") != std::string::npos);
  CHECK(assumed("streams.shell_side.pressure_drop_law.value") != one.assumed.end());
  const auto result = explore::rate(document(no_baffles()), {});
  for (const auto& claim : result.claims) {
    CHECK(claim.verdict == bids::Agreement::not_checked);
    CHECK(claim.likely.find("scaled from it") != std::string::npos);
  }
  CHECK(result.claims.size() == 2);
}

TEST_CASE("scaled: the scatter is wider than a drawn bundle's, and grows away from the sheet's flow") {
  const auto sigma = [](const case_io::Case& one, std::string_view key) {
    const auto sources = uncertainty::sources_of(one.problem, rated(one));
    return std::ranges::find(sources, key, &uncertainty::Source::key)->sigma;
  };
  const auto drawn = case_io::build(document(std::string(good::oil_cooler)));
  const auto design = case_named(no_baffles(), "design"), more = case_named(no_baffles(), "more_oil");
  for (const char* key : {"shell_side.film", "shell_side.pressure_drop"}) {
    CAPTURE(key);
    CHECK(sigma(design, key) > sigma(drawn, key));
    CHECK(sigma(more, key) > sigma(design, key));
  }
}

TEST_CASE("scaled: a property that is wrong was as wrong on the sheet") {
  const auto one = case_named(water_in_shell(), "design");
  auto moved = one;
  uncertainty::apply({.name = "viscosity",
                      .key = "shell_side.viscosity",
                      .varied = uncertainty::Varied::viscosity,
                      .side = uncertainty::Side::shell,
                      .sigma = 0.2,
                      .source = ""},
                     1.0, moved.problem);
  CHECK(relative(film(rated(moved)), film(rated(one))) < 1e-9);
}

TEST_CASE("scaled: what is missing is named, and a U that leaves no film is refused with its numbers") {
  refused::check({
      {"no U",
       no_baffles("claims: {for: design, shell_side_pressure_drop: 61 kPa}\n"),
       {"claims.u_dirty", "is missing", "add it from the sheet"}},
      {"no drop",
       no_baffles("claims: {for: design, u_dirty: 352 W/m2.K}\n"),
       {"claims.shell_side_pressure_drop", "is missing", "60 kPa"}},
      {"no claims", no_baffles(""), {"claims.u_dirty", "is missing"}},
      {"U too high",
       no_baffles("claims: {for: design, u_dirty: 1500 W/m2.K, shell_side_pressure_drop: 61 kPa}\n"),
       {"x:", "claims.u_dirty", "1/U = 0.000667 m2.K/W leaves nothing", "wall", "both foulings"}},
      {"a film beside",
       with("    flow: 21.5 kg/s\n", "    flow: 21.5 kg/s\n    film_multiplier: 0.8\n    because: gas\n",
            no_baffles()),
       {"film_multiplier", "stands beside methods.shell_side: scaled"}},
  });
}

TEST_CASE("scaled: a unit known by its area has its shell side from the sheet too") {
  const std::string text = R"(dutygauge: 1
exchanger: {tema: AEL, area: 210 m2, wall_resistance: 0.00004 m2.K/W, tubes: {passes: 2}}
streams:
  shell_side: {fluid: water, flow: 80 kg/s, inlet: {temperature: 55 degC, pressure: 4 bara}, fouling: 0.0002 m2.K/W}
  tube_side:
    fluid: water
    flow: 110 kg/s
    inlet: {temperature: 28 degC, pressure: 4 bara}
    fouling: 0 m2.K/W
    film_law: {value: 4200 W/m2.K, at_flow: 110 kg/s, flow_exponent: 0.8}
methods: {shell_side: scaled, solution: mean}
claims: {u_dirty: 1100 W/m2.K, shell_side_pressure_drop: 45 kPa}
)";
  const auto one = case_io::build(document(text));
  const double by_hand = 1.0 / (1.0 / 1100.0 - 1.0 / 4200.0 - 0.00004 - 0.0002);
  CHECK(relative(film(rated(one)), by_hand) < 1e-9);
}
