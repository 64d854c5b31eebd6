#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/service.hpp"
#include "support.hpp"

// Sheets with holes: ranges, values looked for in vain, flows found from a duty.

using namespace dutygauge;
using good::with;
using support::relative;

namespace {

case_io::Case built(const std::string& text) {
  return case_io::build(case_io::read_document(text, "x"));
}

const Assumption* assumed(const case_io::Case& a_case, std::string_view key) {
  const auto found = std::ranges::find(a_case.assumed, key, &Assumption::key);
  return found == a_case.assumed.end() ? nullptr : &*found;
}

}  // namespace

TEST_CASE("case_io: a range is rated at its middle and listed with its ends") {
  const auto a_case = built(with("spacing: 150 mm", "spacing: 140..160 mm"));
  const auto plain = built(std::string(good::oil_cooler));
  const Assumption* line = assumed(a_case, "exchanger.baffles.spacing");
  REQUIRE(line != nullptr);
  CHECK(relative(line->value, 0.150) < 1e-12);
  CHECK(relative(line->low.value(), 0.140) < 1e-12);
  CHECK(relative(line->high.value(), 0.160) < 1e-12);
  CHECK(line->look_in == "bundle drawing");
  CHECK(relative(a_case.problem.exchanger.shell_side.central_spacing,
                 plain.problem.exchanger.shell_side.central_spacing) < 1e-12);
}

TEST_CASE("case_io: a deviation is listed with one standard deviation to both sides") {
  const auto a_case = built(with("flow: 21.5 kg/s", "flow: 21.5 kg/s +- 2 %"));
  const Assumption* line = assumed(a_case, "streams.shell_side.flow");
  REQUIRE(line != nullptr);
  CHECK(relative(line->low.value(), 21.07) < 1e-12);
  CHECK(relative(line->high.value(), 21.93) < 1e-12);
  CHECK(line->why.find("one standard deviation") != std::string::npos);
}

TEST_CASE("case_io: a spread as wide as its value is refused where the value cannot be negative") {
  for (const char* typed : {"flow: 21.5 +- 22 kg/s", "flow: 21.5 kg/s +- 100 %"}) {
    CAPTURE(typed);
    try {
      built(with("flow: 21.5 kg/s", typed));
      FAIL("not refused");
    } catch (const case_io::InputError& error) {
      CHECK(error.lines().front().find("a spread as wide as the value itself") != std::string::npos);
    }
  }
}

TEST_CASE("case_io: a least wall is listed with its span") {
  const auto a_case = built(with("wall: 2.11 mm", "wall: 14 BWG min"));
  const Assumption* line = assumed(a_case, "exchanger.tubes.wall");
  REQUIRE(line != nullptr);
  // 14 BWG is 2.108 mm; minimum-wall tubes average about 10 % more (common practice, from memory).
  CHECK(relative(line->value, 1.10 * 2.108e-3) < 1e-3);
  CHECK(relative(line->low.value(), 2.108e-3) < 1e-3);
  CHECK(relative(line->high.value(), 1.2 * 2.108e-3) < 1e-3);
}

TEST_CASE("case_io: what is unknown is rated as if left out, and said to be looked for") {
  const auto unknown = built(with("tube_to_baffle: 0.8 mm", "tube_to_baffle: unknown"));
  const auto left_out = built(with("tube_to_baffle: 0.8 mm, ", ""));
  CHECK(unknown.problem.exchanger.shell_side.tube_to_baffle ==
        left_out.problem.exchanger.shell_side.tube_to_baffle);
  const Assumption* line = assumed(unknown, "exchanger.clearances.tube_to_baffle");
  REQUIRE(line != nullptr);
  CHECK(line->why.find("looked for and not found") != std::string::npos);
  const auto limit = built(with("allowable_pressure_drop: 70 kPa", "allowable_pressure_drop: unknown"));
  CHECK(!limit.service.tube_side_allowable_drop);
  REQUIRE(assumed(limit, "streams.tube_side.allowable_pressure_drop") != nullptr);
  CHECK(assumed(limit, "streams.tube_side.allowable_pressure_drop")->word == "unknown");
}

TEST_CASE("case_io: a flow from a duty is the other side's heat over its own enthalpy change") {
  auto text = with("flow: 62 m3/h at inlet", "flow: from_duty\n    outlet: {temperature: 36 degC}");
  text = with("    flow: 21.5 kg/s\n", "    flow: 21.5 kg/s\n    outlet: {temperature: 56 degC}\n", text);
  const auto a_case = built(text);
  const auto& oil = a_case.problem.shell_side;
  const auto& water = a_case.problem.tube_side;
  const double duty = 21.5 * 2050.0 * 12.0;  // constant heat capacity of the oil
  // Water between 29 and 36 degC: 4.179 kJ/kg.K within 0.03 % (IAPWS-IF97 prints 4.1788 at 30 degC).
  CHECK(relative(water.mass_flow, duty / (4179.0 * 7.0)) < 5e-4);
  CHECK(oil.mass_flow == 21.5);
  const Assumption* line = assumed(a_case, "streams.tube_side.flow");
  REQUIRE(line != nullptr);
  CHECK(line->why.find("derived") != std::string::npos);
}

TEST_CASE("case_io: a flow from a stated duty follows the duty and an overlay's factor") {
  const auto text =
      with("21.5 kg/s", "from_duty\n    outlet: {temperature: 58 degC}") + "claims: {duty: 410 kW}\n";
  const double flow = 410e3 / (2050.0 * 10.0);
  CHECK(relative(built(text).problem.shell_side.mass_flow, flow) < 1e-12);
  const auto document = case_io::read_document(text, "x");
  const auto more = case_io::build(case_io::with_factor(document, "streams.shell_side.flow", 1.15));
  CHECK(relative(more.problem.shell_side.mass_flow, 1.15 * flow) < 1e-12);
}

TEST_CASE("case_io: a flow from a duty that cannot be is refused with the way out") {
  refused::check({
      {"no outlet", with("21.5 kg/s", "from_duty"), {"x:32:11:", "needs the outlet temperature"}},
      {"no duty",
       with("21.5 kg/s", "from_duty\n    outlet: {temperature: 58 degC}"),
       {"x:32:11:", "finds no duty"}},
      {"the wrong way",
       with("21.5 kg/s", "from_duty\n    outlet: {temperature: 70 degC}") + "claims: {duty: 410 kW}\n",
       {"streams.shell_side.outlet.temperature", "less than its inlet temperature"}},
  });
}

TEST_CASE("case_io: a cut by area is the height of the window with that share of the cross-section") {
  const auto cut = built(with("25 %", "25 % of area")).problem.exchanger.shell_side.baffle_cut;
  const double angle = 2.0 * std::acos(1.0 - 2.0 * cut);
  CHECK(relative((angle - std::sin(angle)) / (2.0 * std::numbers::pi), 0.25) < 1e-9);
  // A segment a fifth of the diameter high is 14.24 % of the circle (tables of circular segments, from
  // memory).
  CHECK(std::abs(built(with("25 %", "14.24 % of area")).problem.exchanger.shell_side.baffle_cut - 0.2) <
        1e-4);
}

TEST_CASE("case_io: a range in either column of a pair is listed with its ends") {
  const auto text = [](const char* density) {
    return with(
        "{constant: {density: 865 kg/m3, heat_capacity: 2050 J/kg.K, conductivity: 0.13 W/m.K, "
        "viscosity: 22 mPa.s, phase: liquid}}",
        std::string("{two_point: {at: 80 -> 30 degC, density: ") + density +
            " kg/m3, heat_capacity: 2.1 -> 1.9 kJ/kg.K, conductivity: 0.13 -> 0.13 W/m.K, viscosity: "
            "15 -> 60 cP, phase: liquid}}");
  };
  const auto spans = [&](const char* density) {
    std::vector<std::pair<double, double>> found;
    for (const auto& one : case_io::build(case_io::read_document(text(density), "x")).assumed)
      if (one.key.ends_with("two_point.density")) found.emplace_back(*one.low, *one.high);
    return found;
  };
  CHECK(spans("840 -> 870").empty());
  CHECK(spans("830..850 -> 870") == std::vector{std::pair{830.0, 850.0}});
  CHECK(spans("840 -> 860..880") == std::vector{std::pair{860.0, 880.0}});
  CHECK(spans("830..850 -> 860..880").size() == 2);
}

TEST_CASE("case_io: a flow found from the sheet's duty stays what it is where an operating case differs") {
  // The sheet's oil and outlet give its water flow; more oil or warmer water does not change that.
  const auto text = with("flow: 62 m3/h at inlet", "flow: from_duty\n    outlet: {temperature: 36 degC}") +
                    "claims: {duty: 400..420 kW}\noperating_cases:\n  design: {}\n  warm: "
                    "{streams.tube_side.inlet.temperature: 33 degC}\n"
                    "  more: {streams.tube_side.flow: x1.1}\n  other: {streams.tube_side.flow: 20 kg/s}\n"
                    "  outlet: {streams.tube_side.outlet.temperature: 38 degC}\n";
  const auto cases = case_io::build_all(case_io::read_document(text, "x"));
  const auto flow = [&](std::size_t i) { return cases[i].problem.tube_side.mass_flow; };
  CHECK(flow(0) == doctest::Approx(410e3 / (4178.5 * 7.0)).epsilon(1e-3));
  CHECK(flow(1) == flow(0));
  CHECK(flow(2) == doctest::Approx(1.1 * flow(0)).epsilon(1e-12));
  CHECK(flow(3) == 20.0);
  CHECK(flow(4) == doctest::Approx(flow(0) * 7.0 / 9.0).epsilon(1e-3));
  const auto assumed = std::ranges::find(cases[2].assumed, "streams.tube_side.flow", &Assumption::key);
  REQUIRE(assumed != cases[2].assumed.end());
  CHECK(*assumed->high / assumed->value == doctest::Approx(420.0 / 410.0).epsilon(1e-12));
}
