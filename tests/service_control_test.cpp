#include <doctest/doctest.h>

#include <algorithm>
#include <nlohmann/json.hpp>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/explore.hpp"
#include "dutygauge/units/mention.hpp"
#include "support.hpp"

// A unit held at exactly its duty, and a stream of which a part goes round it.

using namespace dutygauge;
using good::with;
using support::relative;

namespace {

report::Result result_of(const std::string& text) {
  return explore::rate(case_io::read_document(text, "x"));
}

std::string controlled(const std::string& by) {
  return with("service:\n", "service:\n  control: " + by + "\n");
}

std::string bypassing(const std::string& bypass) {
  return with("    flow: 21.5 kg/s\n", "    flow: 21.5 kg/s\n    bypass: " + bypass + "\n");
}

constexpr double kelvin = 273.15;

}  // namespace

TEST_CASE("control: the throttled flow gives exactly the required duty, and clean it is throttled further") {
  const auto result = result_of(controlled("throttle_tube_side"));
  const auto& one = result.cases.front();
  const double required = *one.design_fouling.margins.required_duty;
  for (const auto* holding : {&one.held, &one.held_clean}) {
    REQUIRE((holding->has_value() && (*holding)->controlled));
    const auto& held = *(*holding)->controlled;
    CHECK(relative(held.outcome.duty, required) < 1e-6);
    const auto& free = *one.design_fouling.rating.outcome;
    // The bulk is warmer when throttled, its density less: 0.5 %.
    CHECK(relative(held.outcome.local.tube_film.velocity, held.share * free.local.tube_film.velocity) < 0.01);
    CHECK(held.outcome.tube_outlet > free.tube_outlet);
    CHECK(held.mixed_outlet == held.outcome.tube_outlet);
  }
  CHECK(one.held->controlled->share < 1.0);
  CHECK(one.held_clean->controlled->share < one.held->controlled->share);
}

TEST_CASE("control: what goes round the shell leaves the mixed stream at the temperature of the service") {
  // One line only, 58 degC at most: at exactly that duty the mixed oil has 58 degC.
  const auto result = result_of(with("  duty: {at_least: 400 kW}\n", "", controlled("bypass_shell_side")));
  const auto& one = result.cases.front();
  const auto& held = *one.held->controlled;
  CHECK(std::abs(held.mixed_outlet - (58.0 + kelvin)) < 1e-4);
  CHECK(held.outcome.shell_outlet < held.mixed_outlet);
  // The oil's heat capacity is constant: the lever rule.
  const double inlet = 68.0 + kelvin;
  CHECK(relative(inlet - held.mixed_outlet, held.share * (inlet - held.outcome.shell_outlet)) < 1e-9);
  CHECK(relative(held.flow, 21.5 * held.share) < 1e-12);
}

TEST_CASE("control: page and JSON show the balance; a unit that does too little is said not to be held") {
  const auto result = result_of(controlled("throttle_tube_side"));
  CHECK(report::text(result, {}).find("CONTROL      at design fouling: ") != std::string::npos);
  const auto json = nlohmann::json::parse(report::json(result));
  const auto& held = *result.cases.front().held->controlled;
  CHECK(json["control"]["by"] == "throttle_tube_side");
  CHECK(json["control"]["flow_kg_s"] == held.flow);
  CHECK(json["control"]["tube_side_velocity_m_s"] == held.outcome.local.tube_film.velocity);
  CHECK(json["states"]["clean"]["control"]["share"] == result.cases.front().held_clean->controlled->share);
  CHECK(nlohmann::json::parse(report::json(result_of(std::string(good::oil_cooler))))["control"].is_null());
  const auto little =
      result_of(with("at_least: 400 kW", "at_least: 900 kW", controlled("throttle_tube_side")));
  CHECK_FALSE(little.cases.front().held->controlled.has_value());
  CHECK(report::text(little, {}).find("not held: running free it falls short by") != std::string::npos);
  CHECK(nlohmann::json::parse(report::json(little))["control"]["held"] == false);
}

TEST_CASE("bypass: limits behind the mix ask more of the exchanger, by the lever rule") {
  const auto whole = case_io::build(case_io::read_document(std::string(good::oil_cooler), "x"));
  const auto behind =
      case_io::build(case_io::read_document(bypassing("{share: 20 %, sensor: after_mix}"), "x"));
  const auto before =
      case_io::build(case_io::read_document(bypassing("{share: 20 %, sensor: before_mix}"), "x"));
  for (const auto* one : {&behind, &before})
    CHECK(relative(one->problem.shell_side.mass_flow, 0.8 * whole.problem.shell_side.mass_flow) < 1e-14);
  // 10 K of the whole are 12.5 K of four fifths.
  CHECK(relative(behind.service.demands.front().limit, 68.0 - 12.5 + kelvin) < 1e-9);
  CHECK(before.service.demands.front().limit == whole.service.demands.front().limit);
  const auto said = std::ranges::find(behind.findings, "case.bypass", &Finding::id);
  REQUIRE(said != behind.findings.end());
  const auto text = units::spoken(said->text, units::System::metric);
  CHECK(text.find("58.0 degC behind the mix asks for 55.5 degC at the exchanger") != std::string::npos);
}

TEST_CASE("bypass: a share that no outlet can make up for, or without its sensor, is refused") {
  refused::check({
      {"too much",
       with("shell_side_outlet: {at_most: 58 degC}", "tube_side_outlet: {at_least: 35 degC}",
            with("    fouling: 0.00035 m2.K/W\n",
                 "    fouling: 0.00035 m2.K/W\n    bypass: {share: 95 %, sensor: after_mix}\n")),
       {"streams.tube_side.bypass.share", "no outlet of the exchanger", "35 degC once mixed"}},
      {"no sensor", bypassing("{share: 20 %}"), {"bypass.sensor", "is missing"}},
  });
}
